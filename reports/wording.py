"""Words that several sections share: names of carriers, of options, lists in a sentence."""

from collections.abc import Sequence
from typing import Any

CARRIERS = {
    "power": "power",
    "steam": "steam",
    "hot_water": "hot water",
    "hot_gas": "drying heat",
    "cooling": "cooling",
}
GRADES = ("hot_gas", "steam", "hot_water")

FACTORS = {
    "fuel_price": "Gas price",
    "power_price": "Power price",
    "heat_demand": "Heat demand",
    "capital": "Capital",
    "boiler_efficiency": "Boiler efficiency",
    "combined_bad": "All bad at once",
    "base": "As planned",
    "break_even": "Break-even",
}

TESTS = {
    "eu_high_efficiency": "EU high-efficiency cogeneration",
    "none": "no legal test",
}


def carrier(key: str) -> str:
    """Name of a carrier inside a sentence."""
    return CARRIERS[key]


def exhaust_heat(grade: str) -> str:
    """What the exhaust gives, as the figures name it."""
    return {"hot_gas": "Hot exhaust", "steam": "Exhaust steam", "hot_water": "Exhaust water"}[grade]


def with_article(name: str) -> str:
    """An option's name inside a sentence; a bare size or small letter takes an article.

    Examples
    --------
    >>> with_article("4.0 MW turbine"), with_article("Option A")
    ('the 4.0 MW turbine', 'Option A')
    """
    takes = name[:1].isdigit() or name[:1].islower()
    return f"the {name}" if takes and not name.lower().startswith("the ") else name


def upper_first(sentence: str) -> str:
    """A sentence with its first letter large."""
    return sentence[:1].upper() + sentence[1:]


def listed(words: Sequence[str]) -> str:
    """Words joined as in speech.

    Examples
    --------
    >>> listed(["steam", "hot water", "power"])
    'steam, hot water and power'
    """
    if len(words) <= 1:
        return "".join(words)
    return f"{', '.join(words[:-1])} and {words[-1]}"


def shortened(text: str, letters: int) -> str:
    """A text that must fit, cut at a word where it is too long.

    Examples
    --------
    >>> shortened("a turbine with a store", 15)
    'a turbine with…'
    """
    if len(text) <= letters:
        return text
    cut = text[: letters - 1]
    return (cut.rsplit(" ", 1)[0] if " " in cut else cut) + "…"


def real_subscripts(text: str) -> str:
    """CO2 as it is written in print."""
    return text.replace("CO2", "CO₂").replace("Nm3", "Nm³")


def capital_line(name: str) -> str:
    """A capital line's key in words."""
    return upper_first(name.replace("_", " "))


def has_store(option: dict[str, Any]) -> bool:
    """Whether an option's store was ever used."""
    return float(option["energy"]["store_charged_kWh"]) > 0.0


def heaters_name(results_facts: dict[str, Any]) -> str:
    """What makes the rest of the heat, by the grades that the site takes."""
    taken = {line["carrier"] for line in results_facts["demand"]["carriers"]}
    names = []
    if taken & {"steam", "hot_water"}:
        names.append("boilers")
    if "hot_gas" in taken:
        names.append("burners")
    return listed(names) or "boilers"

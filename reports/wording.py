"""Words that several sections share: names of carriers, of options, lists in a sentence."""

import re
from collections.abc import Sequence
from typing import Any

from reports.numbers import THIN

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

#: A comma between thousands.
THOUSANDS = re.compile(r"(?<=\d),(?=\d{3}(?!\d))")

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
    """A sentence with its first letter large; a field's name stays as it is.

    Examples
    --------
    >>> upper_first("one gap"), upper_first("power_kW: one gap")
    ('One gap', 'power_kW: one gap')
    """
    first = sentence.split(" ", 1)[0]
    return sentence if "_" in first or "." in first[:-1] else sentence[:1].upper() + sentence[1:]


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
    'a turbine…'
    """
    if len(text) <= letters:
        return text
    cut = text[: letters - 1]
    return (cut.rsplit(" ", 1)[0] if " " in cut else cut) + "…"


def printed(text: str) -> str:
    """A text of the results with the report's own signs for units and thousands.

    Examples
    --------
    >>> printed("4,200,000 kWh at 25 degC, 0.5 t CO2").replace(THIN, "_")
    '4_200_000 kWh at 25 °C, 0.5 t CO₂'
    """
    text = THOUSANDS.sub(THIN, text)
    for plain, real in (("CO2", "CO₂"), ("Nm3", "Nm³"), (" degC", " °C")):
        text = text.replace(plain, real)
    return text


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

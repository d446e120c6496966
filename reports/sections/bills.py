"""Page 2: today's bill beside the option's, line by line."""

from collections import defaultdict
from typing import Any

from reports.figures import Figures
from reports.numbers import money, number, signed
from reports.results_folder import Facts, ResultsFolder
from reports.wording import printed, with_article

SECTIONS = {
    "power": "Power",
    "export": "Export",
    "gas": "Gas",
    "carbon": "Carbon",
    "upkeep": "Upkeep and wear",
}
NOTHING = "–"

#: Bills longer than this leave no room for the contents on their page.
MOST_LINES_WITH_CONTENTS = 30


def bills(results: ResultsFolder, _figures: Figures) -> dict[str, Any]:
    """Both bills, and the way from their difference to the annual saving."""
    option = results.subject
    today, then = results.facts["separate_supply"]["bill"], option["bill"]
    falls = then["total"] < today["total"]
    currency = results.currency
    return {
        "title": f"The yearly bill {'falls' if falls else 'rises'} from "
        f"{money(today['total'], currency)} to {money(then['total'], currency)}",
        "option": with_article(option["name"]),
        "is_short": len({*_names(today), *_names(then)}) <= MOST_LINES_WITH_CONTENTS,
        "groups": _groups(today["lines"], then["lines"]),
        "total": _amounts(today["total"], then["total"]),
        "bridge": _bridge(results),
        "share": _biggest(today["lines"], then["lines"], currency),
    }


def _names(bill: Facts) -> list[tuple[str, str]]:
    """Lines of a bill by their names."""
    return [(line["section"], line["line"]) for line in bill["lines"]]


def _groups(today: list[Facts], then: list[Facts]) -> list[dict[str, Any]]:
    """Lines of both bills by section, in the order of the first that has them."""
    found: dict[str, dict[str, list[Facts | None]]] = {key: {} for key in SECTIONS}
    for place, lines in enumerate((today, then)):
        for line in lines:
            pair = found[line["section"]].setdefault(line["line"], [None, None])
            pair[place] = line if pair[place] is None else _added(pair[place], line)
    return [
        {
            "name": SECTIONS[key],
            "rows": [_row(name, *pair) for name, pair in rows.items()],
            "sum": _amounts(
                _sum(pair[0] for pair in rows.values()), _sum(pair[1] for pair in rows.values())
            ),
        }
        for key, rows in found.items()
        if rows
    ]


def _added(first: Facts | None, second: Facts) -> Facts:
    """Two lines of one name as one."""
    if first is None:
        return second
    quantity = first["quantity"] + second["quantity"]
    amount = first["amount"] + second["amount"]
    return {
        **first,
        "quantity": quantity,
        "amount": amount,
        "rate": amount / quantity if quantity else 0.0,
    }


def _sum(lines: Any) -> float:
    """Amounts of the lines that are there."""
    return sum(line["amount"] for line in lines if line is not None)


def _row(name: str, today: Facts | None, then: Facts | None) -> dict[str, Any]:
    """One line: quantities with their unit, rate, amounts."""
    known = today or then or {}
    unit = str(known["quantity_unit"])
    return {
        "name": printed(name),
        "quantities": [_quantity(line) for line in (today, then)],
        "unit": _unit(unit),
        "rate": _rate(float(known["rate"]), unit),
        "amounts": _amounts(today["amount"] if today else 0.0, then["amount"] if then else 0.0),
    }


def _quantity(line: Facts | None) -> str:
    """A quantity; energy in MWh."""
    if line is None:
        return NOTHING
    quantity, unit = float(line["quantity"]), str(line["quantity_unit"])
    return number(quantity / 1e3) if unit.startswith("kWh") else number(quantity)


def _unit(unit: str) -> str:
    """Unit of a quantity as printed."""
    words = unit.replace("kWh", "MWh") if unit.startswith("kWh") else unit
    return printed(words)


def _rate(rate: float, unit: str) -> str:
    """Amount a unit; for energy by the MWh."""
    if unit in ("year", "month"):
        return number(rate)
    return number(rate * 1e3, 2) if unit.startswith("kWh") else number(rate, 2)


def _amounts(today: float, then: float) -> list[str]:
    """Today, with the option, and what is more or less."""
    return [number(today), number(then), signed(then - today)]


def _bridge(results: ResultsFolder) -> list[tuple[str, str, str]]:
    """From the difference of the bills to the annual saving."""
    economics = results.subject["economics"]
    today = results.facts["separate_supply"]["bill"]["total"]
    then = results.subject["bill"]["total"]
    outage, saving = economics["expected_outage_cost"], economics["annual_saving"]
    slack = today - then - outage - saving
    return [
        (
            "Difference of the two bills",
            signed(today - then),
            "both years as dispatched, without breakdowns",
        ),
        (
            "Expected cost of breakdowns",
            signed(-outage),
            "forced outages, and demand charges that a trip loses",
        ),
        (
            "Doubt about today’s cost",
            signed(-slack),
            "what its proven lower bound lies below its bill",
        ),
        ("Annual saving", signed(saving), "first full year, real, before capital, finance and tax"),
    ]


def _biggest(today: list[Facts], then: list[Facts], currency: str) -> str:
    """Which sections move most, in one sentence."""
    moved: dict[str, float] = defaultdict(float)
    for sign, lines in ((-1.0, today), (1.0, then)):
        for line in lines:
            moved[line["section"]] += sign * line["amount"]
    less = min(moved, key=lambda key: moved[key])
    more = max(moved, key=lambda key: moved[key])
    words = []
    if moved[less] < 0.0:
        words.append(f"{SECTIONS[less]} costs {money(-moved[less], currency)} less")
    if moved[more] > 0.0:
        words.append(f"{SECTIONS[more].lower()} {money(moved[more], currency)} more")
    return f"{', '.join(words)}." if words else "Nothing moves."

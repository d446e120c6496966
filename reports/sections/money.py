"""Cash flow: capital by line, and every year of the plan."""

from typing import Any

from reports.charts.cash import draw_cash
from reports.figures import Figures
from reports.numbers import money as amount
from reports.numbers import money_scale, number, percent
from reports.results_folder import Facts, ResultsFolder
from reports.wording import capital_line, printed, upper_first

COLUMNS = (
    "capital",
    "avoided_capital",
    "power_saving",
    "gas_saving",
    "carbon_saving",
    "maintenance",
    "overhaul_reserve",
    "upkeep",
    "outage_cost",
    "net",
    "cumulative",
    "cumulative_discounted",
)


def money(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """Money over the years."""
    economics, heading = results.subject["economics"], results.heading
    flow, currency = economics["cash_flow"], results.currency
    npv = economics["npv_real"]
    later = economics["discounted_payback_years"]
    title = (
        f"The discounted balance turns in year {later}"
        if later is not None and later > 0
        else f"The discounted balance stays below zero for {heading['life_years']} years"
        if later is None
        else "The discounted balance never falls below zero"
    )
    return {
        "title": title,
        "figure": figures.add(
            draw_cash(flow, currency),
            title=f"Over {heading['life_years']} years it is worth {amount(npv, currency)}",
            see="What to see: bars are each year’s money, lines their sum; where the dark line "
            "ends is the "
            "NPV. Price paths, wear and replaced plant are in it.",
            alt=f"Net cash flow by year; first {amount(flow[0]['net'], currency)}, then "
            f"{amount(flow[1]['net'], currency)} "
            f"in the first full year; discounted balance at the end {amount(npv, currency)}.",
        ),
        "capital": _capital(economics["capital"], currency),
        **_table(flow, currency),
    }


def _capital(capital: Facts, currency: str) -> dict[str, Any]:
    """Capital by line, and what it avoids."""
    total = capital["total"]
    avoided = [(printed(line["line"]), number(-line["cost"])) for line in capital["avoided"]]
    return {
        "lines": [
            (
                capital_line(line["line"]),
                number(line["cost"]),
                percent(line["cost"] / total if total else 0.0),
            )
            for line in capital["lines"]
        ],
        "total": number(total),
        "avoided": avoided,
        "net": number(capital["net"]),
        "note": f"{upper_first(capital['accuracy_class'])}, ±{percent(capital['accuracy_frac'])}."
        + (
            f" What is avoided is worth {amount(capital['avoided_present_value'], currency)} today."
            if avoided
            else ""
        ),
    }


def _table(flow: list[Facts], currency: str) -> dict[str, Any]:
    """Every year in thousands of the currency."""
    largest = max(abs(year[key]) for year in flow for key in COLUMNS)
    _, word = money_scale(largest)
    rows = [
        (year["calendar_year"], [number(year[key] / 1e3) for key in COLUMNS], year["year"])
        for year in flow
    ]
    return {"rows": rows, "unit": f"{currency} thousand" if word else currency}

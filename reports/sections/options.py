"""All options side by side, the losing ones with the reason."""

from collections import defaultdict
from typing import Any

from reports.charts.bill_bars import draw_bill_bars
from reports.figures import Figures
from reports.numbers import money, number, percent, signed_percent, significant, unit_price, years
from reports.results_folder import Facts, ResultsFolder
from reports.sections.tornado import outcome_figure
from reports.wording import printed, with_article


def options(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """A table of all options, their bills as bars, and each one that is not advised."""
    ordered = sorted(results.facts["options"], key=lambda option: -option["economics"]["npv_real"])
    rejected = [
        option for option in ordered if not results.is_advised or option is not results.subject
    ]
    return {
        "title": _title(ordered),
        "rule": results.facts["verdict"]["rule"],
        "rows": [_row(results, option) for option in ordered],
        "figure": _bars(results, ordered, figures),
        "rejected": [_rejected(results, option, figures) for option in rejected],
    }


def _title(ordered: list[Facts]) -> str:
    """How many pay."""
    paying = sum(option["economics"]["npv_real"] > 0.0 for option in ordered)
    if len(ordered) == 1:
        return "The one option pays" if paying else "The one option does not pay"
    if not paying:
        none = "Neither option" if len(ordered) == 2 else f"None of {len(ordered)} options"  # noqa: PLR2004 - both
        return f"{none} earns its capital back"
    if paying == len(ordered):
        return "Both options pay" if len(ordered) == 2 else f"All {len(ordered)} options pay"  # noqa: PLR2004 - both
    if len(ordered) == 2:  # noqa: PLR2004 - one pays and one does not
        return "One option pays, the other does not"
    return f"{paying} of {len(ordered)} options {'pays' if paying == 1 else 'pay'}"


def _row(results: ResultsFolder, option: Facts) -> dict[str, Any]:
    """One option in figures."""
    economics, carbon = option["economics"], option["carbon"]
    currency = results.currency
    irr = economics["irr_real_frac"]
    return {
        "name": option["name"],
        "description": option["description"],
        "advised": results.is_advised and option is results.subject,
        "cells": [
            money(economics["npv_real"], currency),
            "no single one" if irr is None else percent(irr, 1),
            years(economics["simple_payback_years"], results.heading["life_years"]),
            money(economics["annual_saving"], currency),
            money(economics["capital"]["total"], currency),
            f"{significant(carbon['lifetime_saved_t'])}\u202ft",
            option["nox"]["status"],
        ],
    }


def by_section(bill: Facts) -> dict[str, float]:
    """Amounts of a bill by section."""
    amounts: dict[str, float] = defaultdict(float)
    for line in bill["lines"]:
        amounts[line["section"]] += line["amount"]
    return dict(amounts)


def _bars(results: ResultsFolder, ordered: list[Facts], figures: Figures) -> Any:
    """Bills as bars."""
    separate = results.facts["separate_supply"]["bill"]
    rows = [("Today", by_section(separate))]
    rows += [(option["name"], by_section(option["bill"])) for option in ordered]
    totals = [("today", separate["total"])]
    totals += [(option["name"], option["bill"]["total"]) for option in ordered]
    return figures.add(
        draw_bill_bars(rows, results.currency),
        title="What is paid for, today and with each option",
        see="What to see: the number at each end is the year’s bill before capital. CHP "
        "trades power "
        "for gas; what is gained is the difference.",
        alt="; ".join(f"{name}: {money(total, results.currency)} a year" for name, total in totals),
    )


def _rejected(results: ResultsFolder, option: Facts, figures: Figures) -> dict[str, Any]:
    """Half a page on an option that is not advised."""
    economics, running = option["economics"], option["running"]
    machine, currency = option["machine"], results.currency
    combined = next((v for v in option["variants"] if v["factor"] == "combined_bad"), None)
    bad = None if combined is None else combined["npv_real"]
    return {
        "name": option["name"],
        "description": printed(option["description"]),
        "why": _why(results, option),
        "figure": None if option is results.subject else outcome_figure(results, option, figures),
        "facts": [
            ("Runs", f"{number(running['run_hours'])} h, {number(running['starts'])} starts"),
            (
                "Covers",
                (
                    f"{percent(running['power_covered_frac'])} of power, "
                    f"{percent(running['heat_covered_frac'])} of heat"
                ),
            ),
            (
                "Efficiency",
                (
                    f"{percent(option['efficiency']['electrical_lhv_frac'], 1)} power, "
                    f"{percent(option['efficiency']['overall_lhv_frac'], 1)} overall (LHV)"
                ),
            ),
            ("Sheet audit", f"{percent(machine['audit_residual_frac'], 1)} of fuel unexplained"),
            (
                "NOx",
                (
                    f"{number(option['nox']['band_high_mg_per_Nm3'])} of "
                    f"{number(option['nox']['limit_mg_per_Nm3'])} mg/Nm³: {option['nox']['status']}"
                ),
            ),
            (
                "All bad at once",
                "no schedule found" if bad is None else f"NPV {money(bad, currency)}",
            ),
            ("Discounted payback", _discounted(economics, results.heading["life_years"])),
            ("NPV is zero", _zero(option, currency)),
        ],
    }


def _discounted(economics: Facts, life: int) -> str:
    """Discounted payback in words."""
    later = economics["discounted_payback_years"]
    return f"not within {life} years" if later is None else f"in year {later}"


def _zero(option: Facts, currency: str) -> str:
    """Gas price at which the option breaks even."""
    point = option["break_even"]
    zero, price = point["npv_zero_fuel_price_frac"], point["npv_zero_commodity_per_hhv_kWh"]
    if zero is None or price is None:
        return "at no gas price tried"
    return f"at gas {signed_percent(zero)}, {unit_price(price, currency)}"


def _why(results: ResultsFolder, option: Facts) -> str:
    """Why an option is not advised."""
    economics, currency = option["economics"], results.currency
    npv, life = economics["npv_real"], results.heading["life_years"]
    rate = percent(results.heading["discount_rate_real_frac"], 1)
    if npv > 0.0:
        best = results.subject
        less = best["economics"]["npv_real"] - npv
        return (
            f"It pays, with an NPV of {money(npv, currency)}, but {with_article(best['name'])} "
            f"is worth {money(less, currency)} more."
        )
    saving = economics["annual_saving"]
    if saving <= 0.0:
        return (
            f"It costs {money(-saving, currency)} a year more than today before any "
            "capital: gas, carbon "
            "and upkeep take more than the power and heat are worth."
        )
    irr = economics["irr_real_frac"]
    earns = "" if irr is None else f" It returns {percent(irr, 1)} where {rate} is asked."
    return (
        f"It saves {money(saving, currency)} a year, which over {life} years is worth "
        f"{money(-npv, currency)} less than it costs.{earns}"
    )

"""How sure: the price of gas, every variant, and what carries the site while the unit stands."""

from typing import Any

from reports.charts.price_curve import draw_price_curve
from reports.figures import Figure, Figures
from reports.numbers import (
    THIN,
    money,
    number,
    percent,
    power,
    signed_percent,
    small_percent,
    unit_price,
)
from reports.results_folder import Facts, ResultsFolder
from reports.wording import FACTORS, carrier, upper_first

NOTHING = "–"
LEAST_POINTS = 2


def certainty(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """Sensitivity and security."""
    option = results.subject
    return {
        "title": _title(results),
        "figure": _curve(results, figures),
        "break_even": _break_even(results),
        "rows": [_row(results, variant) for variant in option["variants"]],
        "security": [_security_row(line) for line in option["security"]],
        "security_title": _security_title(option["security"]),
    }


def _title(results: ResultsFolder) -> str:
    """How many variants keep the sign."""
    verdict = results.facts["verdict"]
    held, tried = verdict["holds_in_variants"], verdict["variants_tried"]
    if not tried:
        return "No variant gave an answer"
    sign = "pays" if results.is_advised else "loses"
    if held == tried:
        return f"It {sign} in every one of {tried} variants"
    return f"It {sign} in {held} of {tried} variants"


def _curve(results: ResultsFolder, figures: Figures) -> Figure | None:
    """NPV over the price of gas; None where too few points have an answer."""
    option = results.subject
    points = {0.0: option["economics"]["npv_real"]}
    for variant in option["variants"]:
        if variant["factor"] in ("fuel_price", "break_even") and variant["npv_real"] is not None:
            points[variant["change_frac"]] = variant["npv_real"]
    if len(points) < LEAST_POINTS:
        return None
    zero = option["break_even"]["npv_zero_fuel_price_frac"]
    ordered = sorted(points.items())
    return figures.add(
        draw_price_curve(ordered, zero_frac=zero, currency=results.currency),
        title=f"NPV is zero with gas {signed_percent(zero)}"
        if zero is not None
        else "NPV keeps its sign at every gas price tried",
        see="What to see: each dot is a year dispatched anew at that price, CHP and boilers alike. "
        "Transport, levies and carbon stay.",
        alt="; ".join(
            f"gas {signed_percent(c)}: NPV {money(v, results.currency)}" for c, v in ordered
        ),
    )


def _break_even(results: ResultsFolder) -> list[tuple[str, str, str]]:
    """The two break-even prices: what is zero, change, price."""
    point, currency = results.subject["break_even"], results.currency
    tried = (
        f"none between {signed_percent(point['tried_from_frac'])} and "
        f"{signed_percent(point['tried_to_frac'])}"
    )
    rows = []
    for what, key in (("NPV is zero", "npv"), ("Annual saving is zero", "saving")):
        change, price = (
            point[f"{key}_zero_fuel_price_frac"],
            point[f"{key}_zero_commodity_per_hhv_kWh"],
        )
        if change is None or price is None:
            rows.append((what, tried, NOTHING))
        else:
            rows.append((what, signed_percent(change, 1), f"{unit_price(price, currency)} (HHV)"))
    return rows


def _row(results: ResultsFolder, variant: Facts) -> dict[str, Any]:
    """One variant in figures."""
    currency = results.currency
    step = (
        NOTHING
        if variant["factor"] in ("base", "combined_bad")
        else signed_percent(variant["change_frac"], _places(variant["change_frac"]))
    )
    irr, hours, gap = variant["irr_real_frac"], variant["run_hours"], variant["gap_frac"]
    solved = variant["status"] == "solved"
    payback = variant["simple_payback_years"]
    return {
        "name": FACTORS[variant["factor"]],
        "cells": [
            step,
            _or_nothing(variant["npv_real"], lambda v: money(v, currency)),
            _or_nothing(irr, lambda v: percent(v, 1)),
            _or_nothing(variant["annual_saving"], lambda v: money(v, currency)),
            "never" if payback is None and solved else _or_nothing(payback, lambda v: number(v, 1)),
            _or_nothing(hours, number),
            _or_nothing(gap, _gap),
        ],
        "failed": "" if solved else f"no answer: {variant['note'] or 'failed'}",
        "loses": variant["npv_real"] is not None and variant["npv_real"] <= 0.0,
        "strong": variant["factor"] in ("base", "combined_bad"),
    }


def _gap(fraction: float) -> str:
    """A gap, short enough for a column."""
    return small_percent(fraction).replace(f"below{THIN}", "<")


def _places(change: float) -> int:
    """Decimals that a step in percent needs."""
    return 0 if abs(change * 100.0 - round(change * 100.0)) < 1e-6 else 1  # noqa: PLR2004 - rounding


def _or_nothing(value: float | None, write: Any) -> str:
    """A value as written, or a dash where there is none."""
    return NOTHING if value is None else str(write(value))


def _security_row(line: Facts) -> dict[str, Any]:
    """One carrier while the unit stands."""
    out = line["margin_one_heater_out_kW"]
    return {
        "name": upper_first(carrier(line["carrier"])),
        "cells": [
            power(line["peak_kW"]),
            power(line["capacity_kW"]),
            power(line["margin_kW"]),
            NOTHING if out is None else power(out),
            "yes" if line["met"] else "no",
        ],
    }


def _security_title(lines: list[Facts]) -> str:
    """What the table of security shows."""
    short = sum(not line["met"] for line in lines)
    if short:
        return f"With the unit out, {short} of {len(lines)} demands are short"
    return "With the unit out, every peak is carried"

"""What the site needs: maps, durations and the year in figures."""

from typing import Any

import numpy as np

from reports.charts import palette
from reports.charts.duration import Curve, draw_durations
from reports.charts.months import draw_months
from reports.charts.year_map import draw_year_map
from reports.figures import Figure, Figures
from reports.flows import column
from reports.numbers import energy, number, percent, power
from reports.results_folder import Facts, ResultsFolder
from reports.wording import GRADES, carrier, listed, upper_first

LINE_COLOURS = {
    "power": palette.POWER,
    "steam": palette.HEAT_HIGH,
    "hot_water": "#C77F35",
    "hot_gas": palette.RECOVERED["hot_gas"],
    "cooling": palette.EXPORT,
}
MONTH_COLOURS = {"power": palette.POWER, "cooling": palette.EXPORT, **palette.RECOVERED}


def site(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """Demands of the year."""
    demand = results.facts["demand"]
    lines = {line["carrier"]: line for line in demand["carriers"]}
    heats = [grade for grade in GRADES if grade in lines]
    return {
        "title": _title(lines, heats),
        "maps": [
            f for f in (_heat_map(results, heats, figures), _power_map(results, figures)) if f
        ],
        "durations": _durations(results, lines, figures),
        "months": _months(lines, figures),
        "rows": [_row(line) for line in demand["carriers"]],
        "weather": _weather(demand["weather"], results.heading["year"]),
        "excess": _excess(demand["within_step_excess_kW"], results.step_h),
    }


def _title(lines: dict[str, Facts], heats: list[str]) -> str:
    """Heat and power of the year."""
    heat = sum(lines[grade]["annual_kWh"] for grade in heats)
    words = []
    if "power" in lines:
        words.append(f"{energy(lines['power']['annual_kWh'])} of power")
    if heat > 0.0:
        words.append(f"{energy(heat)} of heat")
    return f"The site takes {listed(words)} a year" if words else "The site takes nothing"


def _heat_map(results: ResultsFolder, heats: list[str], figures: Figures) -> Figure | None:
    """Heat through the year; None for a site without any."""
    if not heats:
        return None
    frame = results.hourly["separate"]
    total_kW = np.sum([column(frame, f"{grade}_demand_kW") for grade in heats], axis=0)
    svg = draw_year_map(
        total_kW, steps_a_day=results.steps_a_day, stops=palette.HEAT_SCALE, name="heat"
    )
    return figures.add(
        svg,
        title=f"Heat through the year: {listed([carrier(grade) for grade in heats])}",
        see=f"What to see: {_rhythm(total_kW, results.steps_a_day)}. Hours are standard time.",
        alt=(
            "Map of heat by hour of day and day of year; the peak is "
            f"{power(float(total_kW.max()))}."
        ),
    )


def _power_map(results: ResultsFolder, figures: Figures) -> Figure | None:
    """Power through the year."""
    values_kW = column(results.hourly["separate"], "power_demand_kW")
    if not values_kW.any():
        return None
    svg = draw_year_map(
        values_kW, steps_a_day=results.steps_a_day, stops=palette.POWER_SCALE, name="power"
    )
    return figures.add(
        svg,
        title="Power through the year",
        see=f"What to see: {_rhythm(values_kW, results.steps_a_day)}. It is what the meter showed, "
        "electric chillers included.",
        alt=(
            "Map of power by hour of day and day of year; the peak is "
            f"{power(float(values_kW.max()))}."
        ),
    )


def _rhythm(values_kW: Any, steps_a_day: int) -> str:
    """Winter against summer, and day against night, in one clause."""
    days = values_kW.reshape(-1, steps_a_day)
    quarter = len(days) // 4
    cold = float(np.r_[days[: quarter // 2], days[-(quarter // 2) :]].mean())
    warm = float(days[len(days) // 2 - quarter // 2 : len(days) // 2 + quarter // 2].mean())
    clock = days.mean(axis=0)
    midday, night = (
        float(clock[steps_a_day * 9 // 24 : steps_a_day * 17 // 24].mean()),
        float(clock[: steps_a_day * 4 // 24].mean()),
    )
    season = f"midwinter takes {_times(cold, warm)} midsummer"
    return f"{season}; working hours take {_times(midday, night)} the night"


def _times(upper: float, lower: float) -> str:
    """How often one mean holds the other."""
    if lower <= 0.0:
        return "far more than"
    ratio = upper / lower
    if 0.95 < ratio < 1.05:  # noqa: PLR2004 - as much as, within a twentieth
        return "as much as"
    return f"{number(ratio, 1)} times"


def _durations(results: ResultsFolder, lines: dict[str, Facts], figures: Figures) -> Figure | None:
    """Each demand in order of its size."""
    frame = results.hourly["separate"]
    curves = [
        Curve(upper_first(carrier(key)), column(frame, f"{key}_demand_kW"), LINE_COLOURS[key])
        for key in lines
    ]
    if not curves:
        return None
    base = max(lines.values(), key=lambda line: line["load_factor_frac"])
    return figures.add(
        draw_durations(curves, results.step_h),
        title="How long each demand lasts",
        see="What to see: the flatter a line, the better it keeps a unit busy. Flattest is "
        f"{carrier(base['carrier'])}: "
        f"{power(base['base_kW'])} are exceeded nine hours in ten.",
        alt="Duration curves: "
        + "; ".join(
            f"{carrier(key)} peak {power(line['peak_kW'])}, base {power(line['base_kW'])}"
            for key, line in lines.items()
        ),
    )


def _months(lines: dict[str, Facts], figures: Figures) -> Figure | None:
    """Twelve months of each demand."""
    bands = [
        (upper_first(carrier(key)), MONTH_COLOURS[key], line["monthly_kWh"])
        for key, line in lines.items()
        if key != "cooling"
    ]
    if not bands:
        return None
    totals = np.sum([values for _, _, values in bands], axis=0)
    return figures.add(
        draw_months(bands),
        title="Month by month",
        see=(
            "What to see: the largest month takes "
            f"{number(float(totals.max() / max(totals.min(), 1.0)), 1)} times the smallest."
        ),
        alt="Monthly energy, January to December, in MWh: "
        + ", ".join(number(v / 1e3) for v in totals),
    )


def _row(line: Facts) -> dict[str, Any]:
    """One carrier in figures."""
    stamp = str(line["peak_local_time"])[:16].replace("T", " ")
    shares = sorted(line["origin_frac"].items(), key=lambda item: -item[1])
    origin = ", ".join(f"{name} {_share(share)}" for name, share in shares if share > 0.0)
    return {
        "name": upper_first(carrier(line["carrier"])),
        "cells": [
            energy(line["annual_kWh"]),
            power(line["peak_kW"]),
            stamp,
            power(line["base_kW"]),
            percent(line["load_factor_frac"]),
            origin or "derived",
        ],
    }


def _share(share: float) -> str:
    """A share, with a place where it is near none or all."""
    near = min(share, 1.0 - share)
    return percent(share, 1 if 0.0 < near < 0.02 else 0)  # noqa: PLR2004 - else it would round away


def _weather(weather: Facts, year: int) -> str:
    """The year's weather in a sentence."""
    low, mean, high = (number(weather[f"{key}_degC"], 1) for key in ("minimum", "mean", "maximum"))
    return (
        f"Weather of {year}: {low} to {high}\u202f°C with a mean of {mean}\u202f°C; "
        "relative humidity "
        f"{percent(weather['mean_relative_humidity_frac'])} and pressure "
        f"{number(weather['mean_pressure_kPa'], 1)}\u202fkPa on average."
    )


def _excess(excess_kW: list[float], step_h: float) -> str:
    """What peaks inside a step add."""
    highest = max(excess_kW)
    if highest <= 0.0:
        return ""
    return (
        f"Power moves within a step of {step_h:g}\u202fh: in the worst month its "
        f"metered peak lies {power(highest)} above "
        "the step’s mean. That is added to the import of every demand charge, with CHP and without."
    )

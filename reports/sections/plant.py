"""What the plant does: when it runs, what it carries, where the energy goes."""

from typing import Any

import numpy as np

from reports.charts import palette
from reports.charts.duration import Curve, draw_shares
from reports.charts.energy_flow import draw_energy_flow
from reports.charts.scales import MONTHS
from reports.charts.year_map import draw_year_map
from reports.figures import Figure, Figures
from reports.flows import column, direct_kW, heat_demand_kW, heaters_kW
from reports.numbers import energy, number, percent, power
from reports.results_folder import Facts, ResultsFolder
from reports.wording import GRADES, exhaust_heat, heaters_name, upper_first


def plant(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """A year of the option that the report follows."""
    option = results.subject
    running = option["running"]
    return {
        "title": f"It runs {number(running['run_hours'])} hours and carries "
        f"{percent(running['power_covered_frac'])} of power, "
        f"{percent(running['heat_covered_frac'])} of heat",
        "map": _operating_map(results, figures),
        "shares": _shares(results, figures),
        "flow": _energy_flow(results, figures),
        "facts": _facts(option),
        "months": _months(option["months"]),
        "year": _year(option["months"]),
    }


def _operating_map(results: ResultsFolder, figures: Figures) -> Figure:
    """Power of the unit through the year, with its hours a day."""
    frame = results.hourly[results.subject["key"]]
    made_kW = column(frame, "unit_power_kW")
    hours = column(frame, "unit_on").reshape(-1, results.steps_a_day).sum(axis=1) * results.step_h
    idle = int((hours == 0.0).sum())
    whole = int((hours >= 24.0 - 1e-9).sum())
    svg = draw_year_map(
        made_kW,
        steps_a_day=results.steps_a_day,
        stops=palette.POWER_SCALE,
        name="net power",
        strip_hours=hours,
        strip_name="Lower strip: running hours of each day",
        strip_colour=palette.POWER,
    )
    running = results.subject["running"]
    return figures.add(
        svg,
        title="When the unit runs, and how hard",
        see=f"What to see: pale is standing. It starts {number(running['starts'])} times, "
        "runs round the clock on "
        f"{number(whole)} days and stands still on {number(idle)}, planned service included.",
        alt=(
            f"Map of the unit's net power by hour and day; {number(running['run_hours'])} "
            "hours of running."
        ),
    )


def _shares(results: ResultsFolder, figures: Figures) -> Figure | None:
    """Heat in order of size, and what carries it."""
    frame = results.hourly[results.subject["key"]]
    demand_kW = heat_demand_kW(frame)
    if not demand_kW.any():
        return None
    parts = [
        Curve(exhaust_heat(grade), direct_kW(frame, grade), palette.RECOVERED[grade])
        for grade in GRADES
        if direct_kW(frame, grade).any()
    ]
    discharge = column(frame, "store_discharge_kW")
    if discharge.any():
        parts.append(Curve("Store", discharge, palette.STORE))
    rest = (
        np.clip(demand_kW - np.sum([p.values_kW for p in parts], axis=0), 0, None)
        if parts
        else heaters_kW(frame)
    )
    parts.append(Curve(upper_first(heaters_name(results.facts)), rest, palette.HEATERS))
    running = results.subject["running"]
    return figures.add(
        draw_shares(demand_kW, parts, results.step_h),
        title=f"The exhaust carries {percent(running['heat_covered_frac'])} of the heat",
        see="What to see: hours are ordered by heat demand, the largest left; below the "
        "line, what met "
        "it, evened out over neighbours.",
        alt=(
            f"Heat duration curve with peak {power(float(demand_kW.max()))}, filled by what "
            "carries it."
        ),
    )


def _energy_flow(results: ResultsFolder, figures: Figures) -> Figure:
    """A year's energy as bands."""
    record = results.subject["energy"]
    fuel = record["unit_fuel_lhv_kWh"]
    used = sum(record["recovered_kWh"].values()) - sum(record["dumped_kWh"].values())
    see = (
        "What to see: of 100 units of gas in the turbine, "
        f"{number(100.0 * record['power_made_kWh'] / fuel)} leave as power "
        f"and {number(100.0 * used / fuel)} as heat that the site uses."
        if fuel > 0.0
        else "What to see: the unit never runs."
    )
    return figures.add(
        draw_energy_flow(record, heaters_name(results.facts)),
        title="Where the energy goes",
        see=see,
        alt=f"Energy of a year: gas to the unit {energy(fuel)}, power made "
        f"{energy(record['power_made_kWh'])}, "
        f"heat recovered and used {energy(used)}, grid import {energy(record['grid_import_kWh'])}.",
    )


def _facts(option: Facts) -> list[tuple[str, str]]:
    """Running and energy in figures."""
    running, record = option["running"], option["energy"]
    dumped = sum(record["dumped_kWh"].values())
    recovered = sum(record["recovered_kWh"].values())
    rows = [
        (
            "Running",
            (
                f"{number(running['run_hours'])} h in {number(running['starts'])} starts, at "
                f"{percent(running['mean_load_frac'])} of what was possible; "
                f"{number(running['full_load_hours'])} full-load hours"
            ),
        ),
        (
            "Power",
            (
                f"{energy(record['power_made_kWh'])} made, {energy(record['grid_import_kWh'])} "
                f"imported, {energy(record['grid_export_kWh'])} exported"
            ),
        ),
        (
            "Heat",
            f"{energy(recovered)} offered by the exhaust, of which {energy(dumped)} found no use",
        ),
        (
            "Fuel (LHV)",
            (
                f"{energy(record['unit_fuel_lhv_kWh'])} in the unit, of which "
                f"{energy(record['start_fuel_lhv_kWh'])} for starts; "
                f"{energy(record['heater_fuel_lhv_kWh'])} in the heaters"
            ),
        ),
    ]
    return [*rows, *_store_and_cooling(record)]


def _store_and_cooling(record: Facts) -> list[tuple[str, str]]:
    """Store and chillers, where the option has them."""
    rows = []
    if record["store_charged_kWh"] > 0.0:
        charged, given_back = record["store_charged_kWh"], record["store_discharged_kWh"]
        rows.append(
            (
                "Store",
                (
                    f"{energy(charged)} charged, {energy(given_back)} given back; "
                    f"{energy(max(charged - given_back, 0.0))} lost or left"
                ),
            )
        )
    if record["absorption_cooling_kWh"] > 0.0:
        rows.append(
            (
                "Cooling",
                (
                    f"{energy(record['absorption_cooling_kWh'])} by absorption, "
                    f"{energy(record['electric_cooling_kWh'])} by electric chillers"
                ),
            )
        )
    return rows


MONTH_KEYS = (
    "power_demand_kWh",
    "power_made_kWh",
    "grid_import_kWh",
    "grid_export_kWh",
    "heat_demand_kWh",
    "recovered_used_kWh",
    "heater_heat_kWh",
    "dumped_kWh",
)


def _months(months: list[Facts]) -> list[tuple[str, list[str]]]:
    """Twelve rows in MWh, peak in kW, hours."""
    return [
        (
            MONTHS[month["month"] - 1],
            [number(month[key] / 1e3) for key in MONTH_KEYS]
            + [number(month["peak_import_kW"]), number(month["run_hours"])],
        )
        for month in months
    ]


def _year(months: list[Facts]) -> list[str]:
    """Sums of the twelve; the peak is the highest."""
    sums = [number(sum(month[key] for month in months) / 1e3) for key in MONTH_KEYS]
    peak = max(month["peak_import_kW"] for month in months)
    return [*sums, number(peak), number(sum(month["run_hours"] for month in months))]

"""From the values of a solved year to the columns of `Schedule.hourly`."""

import numpy as np
import pandas as pd

from planner.arrays import FloatArray
from planner.dispatch.commitment import starts_of
from planner.dispatch.fixed_state import FixedYear
from planner.dispatch.places import Columns, WindowProgram
from planner.dispatch.solver import Answer
from planner.dispatch.window import Window
from planner.dispatch.year_program import GRADES

#: Columns of the exhaust's shares by path name.
SHARE_COLUMNS = {
    "hot gas": "share_hot_gas_frac",
    "steam, then water": "share_steam_then_water_frac",
    "water only": "share_water_only_frac",
    "bypass": "share_bypass_frac",
}

#: Solver noise below this share of a column's largest value is taken for zero.
NOISE_FRAC = 1e-9


def hourly_flows(solved: FixedYear, index: pd.Index) -> pd.DataFrame:
    """Every flow of a solved year.

    Parameters
    ----------
    solved : FixedYear
        The year, its programme and the solution.
    index : Index
        Of the site's year.

    Returns
    -------
    DataFrame, one row a step
        Columns of `Schedule.hourly`.
    """
    year, columns, values = solved.window, solved.built.columns, solved.answer.column_values
    flows = {
        "grid_import_kW": values[columns.grid_import],
        "grid_export_kW": values[columns.grid_export],
        **_unit_flows(solved),
        **_supply_flows(year, columns, values),
        **_prices(year, solved.built, solved.answer),
    }
    return pd.DataFrame({name: _clean(flow) for name, flow in flows.items()}, index=index)


def _clean(flow: FloatArray) -> FloatArray:
    """A flow without the solver's noise about zero."""
    largest = float(np.abs(flow).max(initial=0.0))
    return np.where(np.abs(flow) <= NOISE_FRAC * largest, 0.0, flow)


def _unit_flows(solved: FixedYear) -> dict[str, FloatArray]:
    """State, power, fuel and heat of the unit."""
    year, on = solved.window, solved.on
    zero = np.zeros(year.steps)
    flows: dict[str, FloatArray] = {
        "unit_on": on.astype(np.float64),
        "unit_start": starts_of(on).astype(np.float64),
    }
    unit = year.unit
    if unit is None:
        names = ("unit_power_kW", "unit_fuel_lhv_kW", "start_fuel_lhv_kW")
        flows |= dict.fromkeys(names, zero)
        shares = dict.fromkeys(SHARE_COLUMNS.values(), zero)
        heats = {f"{kind}_{grade}_kW": zero for kind in ("unit", "dumped") for grade in GRADES}
        return flows | shares | heats
    columns, values = solved.built.columns, solved.answer.column_values
    segments_kW = solved.built.segments_kW(values, unit.segment_power_kW.shape)
    running = on.astype(np.float64)
    power_kW = unit.minimum_power_kW * running + segments_kW.sum(axis=1)
    above_lhv_kW = (unit.fuel_slope_lhv * segments_kW).sum(axis=1)
    fuel_lhv_kW = unit.fuel_at_minimum_lhv_kW * running + above_lhv_kW
    flows["unit_power_kW"] = power_kW
    flows["unit_fuel_lhv_kW"] = fuel_lhv_kW
    flows["start_fuel_lhv_kW"] = flows["unit_start"] * (unit.start_fuel_lhv_kWh / year.step_h)
    flows |= _shares(year, columns, values, fuel_lhv_kW)
    return flows | _unit_heat(year, columns, values)


def _shares(
    year: Window, columns: Columns, values: FloatArray, fuel_lhv_kW: FloatArray
) -> dict[str, FloatArray]:
    """Share of the exhaust on each path, by the fuel that made it."""
    unit = year.unit
    shares = {name: np.zeros(year.steps) for name in SHARE_COLUMNS.values()}
    if unit is None:
        return shares
    burning = np.maximum(fuel_lhv_kW, 1e-9)
    for name, part_on in columns.path_on.items():
        parts = np.column_stack([values[part] for part in columns.path_segments[name]])
        fuel = unit.fuel_at_minimum_lhv_kW * values[part_on]
        fuel = fuel + (unit.fuel_slope_lhv * parts).sum(axis=1)
        shares[SHARE_COLUMNS[name]] = np.where(fuel_lhv_kW > 0.0, fuel / burning, 0.0)
    return shares


def _unit_heat(year: Window, columns: Columns, values: FloatArray) -> dict[str, FloatArray]:
    """Heat that the paths yield, and what of it is not used."""
    flows = {}
    for grade in GRADES:
        offered_kW = np.zeros(year.steps)
        for path in year.paths:
            if grade not in path.yield_at_minimum_kW:
                continue
            parts = np.column_stack([values[part] for part in columns.path_segments[path.name]])
            offered_kW += path.yield_at_minimum_kW[grade] * values[columns.path_on[path.name]]
            offered_kW += (path.yield_slope[grade] * parts).sum(axis=1)
        used_kW = values[columns.used[grade]] if grade in columns.used else np.zeros(year.steps)
        flows[f"unit_{grade}_kW"] = offered_kW
        flows[f"dumped_{grade}_kW"] = np.maximum(offered_kW - used_kW, 0.0)
    return flows


def _supply_flows(year: Window, columns: Columns, values: FloatArray) -> dict[str, FloatArray]:
    """Heaters, chillers and store."""
    flows = {f"heater_{grade}_kW": np.zeros(year.steps) for grade in GRADES}
    fuel_lhv_kW = np.full(year.steps, year.standing_fuel_lhv_kW)
    for heater, (carrier, numbers) in zip(year.heaters, columns.heaters, strict=True):
        flows[f"heater_{carrier}_kW"] = flows[f"heater_{carrier}_kW"] + values[numbers]
        fuel_lhv_kW += heater.fuel_per_heat_lhv * values[numbers]
    flows["heater_fuel_lhv_kW"] = fuel_lhv_kW
    for name in ("electric_cooling_kW", "chiller_power_kW"):
        flows[name] = np.zeros(year.steps)
    for name in ("absorption_cooling_kW", "absorption_heat_kW"):
        flows[name] = np.zeros(year.steps)
    for chiller, numbers in zip(year.chillers, columns.chillers, strict=True):
        electric = chiller.drive == "power"
        cooling, drive = (
            ("electric_cooling_kW", "chiller_power_kW")
            if electric
            else ("absorption_cooling_kW", "absorption_heat_kW")
        )
        flows[cooling] = flows[cooling] + values[numbers]
        flows[drive] = flows[drive] + values[numbers] / chiller.cop
    return flows | _store_flows(year, columns, values)


def _store_flows(year: Window, columns: Columns, values: FloatArray) -> dict[str, FloatArray]:
    """The store's net flow, one way at a time, and its level."""
    if columns.charge is None or columns.discharge is None or columns.level is None:
        names = ("store_charge_kW", "store_discharge_kW", "store_level_kWh")
        return dict.fromkeys(names, np.zeros(year.steps))
    # In and out at once changes nothing but looks foolish.
    net_kW = values[columns.charge] - values[columns.discharge]
    return {
        "store_charge_kW": np.maximum(net_kW, 0.0),
        "store_discharge_kW": np.maximum(-net_kW, 0.0),
        "store_level_kWh": values[columns.level],
    }


def _prices(year: Window, built: WindowProgram, answer: Answer) -> dict[str, FloatArray]:
    """Marginal price of power, its demand part apart, and of each grade of heat."""
    step_h, duals = year.step_h, answer.row_duals
    peak = np.zeros(year.steps)
    for rows, steps in built.rows.peaks:
        peak[steps] += duals[rows] / step_h
    prices = {
        "price_power_per_kWh": duals[built.rows.power] / step_h - peak,
        "price_power_peak_per_kWh": peak,
    }
    for grade in GRADES:
        rows_of = built.rows.heat.get(grade)
        prices[f"price_{grade}_per_kWh"] = (
            np.zeros(year.steps) if rows_of is None else duals[rows_of] / step_h
        )
    return prices

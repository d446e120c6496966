"""Which years the fast engine knows, and their steps as tiny linear programmes.

Everything is in MW and MWh/step here, so that the numbers of a programme lie near one. A running
unit is a mixture of corners: one exhaust path, and some of its power segments full.
"""

from dataclasses import dataclass
from itertools import product
from typing import NamedTuple

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.window import Window
from planner.plant.envelope import ExhaustPath, UnitEnvelope

KW_PER_MW = 1000.0

#: Places of the first four columns of every step.
IMPORT, EXPORT, CHARGE, DISCHARGE = range(4)

GRADES = ("steam", "hot_water", "hot_gas")

#: With more segments than this the corners are too many for tiny programmes.
MOST_SEGMENTS = 4

#: With more states than this (minimum times in steps) the engine is not fast.
MOST_STATES = 64


class Steps(NamedTuple):
    """All steps of a year as programmes.

    Columns in order: import, export, charge, discharge, heaters, chillers, then (while on) dumped
    heat by recovered grade, and the unit's corners.

    Parameters
    ----------
    matrix : array, shape (rows, fixed columns)
        Coefficients that are the same in every step; rows are power, heat grades in use, cooling
        where chillers meet it, and the sum of the corners.
    upper : array, shape (fixed columns,)
        Upper bounds [MW].
    cost : array, shape (steps, fixed columns)
        Cost of each MW over a step.
    demand : array, shape (steps, rows)
        Right-hand sides; the corners sum to one.
    corner_entries : array, shape (steps, corners, rows)
        Net power and heat of each corner.
    corner_cost : array, shape (steps, corners)
        Fuel and wear of a step at each corner.
    off_rows, off_columns : int
        The part of the programme that stands while the unit is off.
    moving_row : int
        Hot water where there is a store, else power.
    lowest, highest : float
        Range of the moving quantity: heat into the store, or import [MW].
    possible : array of int, shape (steps, 2)
        Whether off, and on, are allowed at all.
    """

    matrix: FloatArray
    upper: FloatArray
    cost: FloatArray
    demand: FloatArray
    corner_entries: FloatArray
    corner_cost: FloatArray
    off_rows: int
    off_columns: int
    moving_row: int
    lowest: float
    highest: float
    possible: IntArray


@dataclass(frozen=True)
class Layout:
    """Rows and columns by name, to read flows back."""

    rows: tuple[str, ...]
    columns: tuple[str, ...]


def why_unknown(year: Window) -> str | None:
    """The reason why a year is not one for the fast engine.

    Parameters
    ----------
    year : Window
        All steps.

    Returns
    -------
    str or None
        None if it is one.
    """
    unit, prices = year.unit, year.prices
    if unit is None:
        return "no unit: one linear programme is enough"
    reasons = (
        (unit.segment_power_kW.shape[1] > MOST_SEGMENTS, "more power segments than four"),
        (sum(minimum_steps(year)) > MOST_STATES, "minimum times of very many steps"),
        (bool((year.fuel_per_lhv_kWh <= 0.0).any()), "a fuel price at or below zero"),
        (bool((year.export_per_kWh > year.import_per_kWh).any()), "export dearer than import"),
        (bool((np.diff(unit.fuel_slope_lhv, axis=1) < 0.0).any()), "fuel that is not convex"),
        (
            any(bool((charge.rate_per_kW < 0.0).any()) for charge in prices.demand_charges),
            "a demand charge below zero",
        ),
        (year.store is not None and not _has_hot_water(year), "a store that nothing can charge"),
    )
    return next((reason for holds, reason in reasons if holds), None)


def minimum_steps(year: Window) -> tuple[int, int]:
    """Least steps of a run and of a stop, at least one each.

    Parameters
    ----------
    year : Window
        With a unit.

    Returns
    -------
    tuple of int
        Up and down. A minimum as long as the window binds nothing.
    """
    unit = year.unit
    if unit is None:
        return 1, 1
    wanted = (round(hours / year.step_h) for hours in (unit.minimum_up_h, unit.minimum_down_h))
    up, down = (steps if 0 < steps < year.steps else 1 for steps in wanted)
    return up, down


def start_costs(year: Window) -> FloatArray:
    """Cost of a start in each step.

    Parameters
    ----------
    year : Window
        With a unit.

    Returns
    -------
    array, shape (steps,) [currency]
        Start fuel at the step's price and wear.
    """
    unit = year.unit
    if unit is None:
        return np.zeros(year.steps)
    return unit.cost_per_start + unit.start_fuel_lhv_kWh * year.fuel_per_lhv_kWh


def state_steps(year: Window) -> tuple[Steps, Layout]:
    """Write a year's steps as tiny programmes.

    Parameters
    ----------
    year : Window
        One that `why_unknown` has nothing against.

    Returns
    -------
    tuple of Steps and Layout
        The programmes, and the names of their rows and columns.
    """
    rows = _row_names(year)
    names, entries, upper_kW, cost_per_kW = _fixed_columns(year, rows)
    matrix = np.zeros((len(rows), len(names)))
    for j, column in enumerate(entries):
        for row, factor in column.items():
            matrix[rows.index(row), j] = factor
    demand = np.zeros((year.steps, len(rows)))
    for i, row in enumerate(rows[:-1]):
        demand[:, i] = year.demand_kW[row] / KW_PER_MW
    demand[:, -1] = 1.0
    corner_names, corner_entries, corner_cost = _corners(year, rows)
    store, available = year.store, year.unit is not None and year.unit.available
    steps = Steps(
        matrix=matrix,
        upper=np.array(upper_kW) / KW_PER_MW,
        cost=np.stack(cost_per_kW, axis=1) * KW_PER_MW * year.step_h,
        demand=demand,
        corner_entries=corner_entries,
        corner_cost=corner_cost,
        off_rows=len(rows) - 1,
        off_columns=len(names) - len(year.recovered_grades),
        moving_row=rows.index("hot_water") if store else 0,
        lowest=-store.maximum_discharge_kW / KW_PER_MW if store else 0.0,
        highest=(store.maximum_charge_kW if store else year.prices.import_limit_kW) / KW_PER_MW,
        possible=np.stack([np.ones(year.steps), np.asarray(available)], axis=1).astype(np.int64),
    )
    return steps, Layout(rows, (*names, *corner_names))


def _has_hot_water(year: Window) -> bool:
    """Whether something makes hot water."""
    made = {heater.carrier for heater in year.heaters} | set(year.recovered_grades)
    return "hot_water" in made


def _row_names(year: Window) -> tuple[str, ...]:
    """Balances of a step, the sum of the corners last."""
    made = {heater.carrier for heater in year.heaters} | set(year.recovered_grades)
    rows = ["power", *(grade for grade in GRADES if grade in made)]
    if year.chillers:
        rows.append("cooling")
    return (*rows, "corners")


def _fixed_columns(
    year: Window, rows: tuple[str, ...]
) -> tuple[list[str], list[dict[str, float]], list[float], list[FloatArray]]:
    """Names, entries, upper bounds [kW] and costs [currency/kWh] of all columns but corners."""
    prices, store, free = year.prices, year.store, np.zeros(year.steps)
    columns: list[tuple[str, dict[str, float], float, FloatArray]] = [
        ("import", {"power": 1.0}, prices.import_limit_kW, year.import_per_kWh),
        ("export", {"power": -1.0}, prices.export_limit_kW, -year.export_per_kWh),
        ("charge", {"hot_water": -1.0}, store.maximum_charge_kW if store else 0.0, free),
        ("discharge", {"hot_water": 1.0}, store.maximum_discharge_kW if store else 0.0, free),
    ]
    columns += [
        (
            f"heater {number}",
            {heater.carrier: 1.0},
            heater.maximum_heat_kW,
            heater.fuel_per_heat_lhv * year.fuel_per_lhv_kWh,
        )
        for number, heater in enumerate(year.heaters)
    ]
    columns += [
        (
            f"chiller {number}",
            {"cooling": 1.0, chiller.drive: -1.0 / chiller.cop},
            chiller.maximum_cooling_kW,
            free,
        )
        for number, chiller in enumerate(year.chillers)
    ]
    columns += [(f"dumped {grade}", {grade: -1.0}, np.inf, free) for grade in year.recovered_grades]
    known = [{row: f for row, f in entry.items() if row in rows} for _, entry, _, _ in columns]
    return [c[0] for c in columns], known, [c[2] for c in columns], [c[3] for c in columns]


def _corners(year: Window, rows: tuple[str, ...]) -> tuple[list[str], FloatArray, FloatArray]:
    """Names, entries and costs of the unit's corners."""
    unit = year.unit
    if unit is None:
        raise ValueError("a year without a unit has no corners")
    names, entries, costs = [], [], []
    for path in year.paths or (ExhaustPath("bypass", {}, {}),):
        for filled in _fillings(unit, path):
            widths_kW = unit.segment_power_kW * np.array(filled, dtype=np.float64)
            entry = np.zeros((year.steps, len(rows)))
            power_kW = unit.minimum_power_kW + widths_kW.sum(axis=1)
            entry[:, 0] = power_kW / KW_PER_MW
            for grade, heat_kW in path.yield_at_minimum_kW.items():
                further_kW = (path.yield_slope[grade] * widths_kW).sum(axis=1)
                entry[:, rows.index(grade)] = (heat_kW + further_kW) / KW_PER_MW
            entry[:, -1] = 1.0
            fuel_kW = unit.fuel_at_minimum_lhv_kW + (unit.fuel_slope_lhv * widths_kW).sum(axis=1)
            hourly = fuel_kW * year.fuel_per_lhv_kWh + unit.cost_per_kWh * power_kW
            names.append(f"{path.name}|{''.join(str(int(full)) for full in filled)}")
            entries.append(entry)
            costs.append((hourly + unit.cost_per_run_hour) * year.step_h)
    return names, np.stack(entries, axis=1), np.stack(costs, axis=1)


def _fillings(unit: UnitEnvelope, path: ExhaustPath) -> list[tuple[bool, ...]]:
    """Which segments are full at the corners of a path.

    Where no heat slope rises from a segment to the next, filling them out of order costs fuel and
    yields no more heat, so that those corners can be left out.
    """
    count = unit.segment_power_kW.shape[1]
    if all((np.diff(slope, axis=1) <= 0.0).all() for slope in path.yield_slope.values()):
        return [tuple(k < filled for k in range(count)) for filled in range(count + 1)]
    return list(product((False, True), repeat=count))

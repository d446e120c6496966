"""The dispatch of a window of steps as a `Program`, one function a family of rows.

The symbols, and the same rows one by one, are in `docs/dispatch_model.md`.
"""

from dataclasses import dataclass, field

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.program import Program
from planner.dispatch.window import Window
from planner.plant.envelope import ExhaustPath

#: Grades of heat that the balances are written for.
GRADES = ("steam", "hot_water", "hot_gas")


@dataclass
class Columns:
    """Column numbers of each quantity, by step."""

    grid_import: IntArray
    grid_export: IntArray
    on: IntArray | None = None
    start: IntArray | None = None
    segments: list[IntArray] = field(default_factory=list)
    path_on: dict[str, IntArray] = field(default_factory=dict)
    path_segments: dict[str, list[IntArray]] = field(default_factory=dict)
    used: dict[str, IntArray] = field(default_factory=dict)
    heaters: list[tuple[str, IntArray]] = field(default_factory=list)
    chillers: list[IntArray] = field(default_factory=list)
    charge: IntArray | None = None
    discharge: IntArray | None = None
    level: IntArray | None = None
    start_level: IntArray | None = None
    peaks: list[tuple[int, IntArray]] = field(default_factory=list)


@dataclass
class Rows:
    """Row numbers of the balances whose duals are prices."""

    power: IntArray
    heat: dict[str, IntArray]
    level: IntArray | None = None
    peaks: list[tuple[IntArray, IntArray]] = field(default_factory=list)


@dataclass(frozen=True)
class WindowProgram:
    """A programme with the places of its quantities."""

    program: Program
    columns: Columns
    rows: Rows


def build(
    window: Window, *, start_value: float | None = None, end_value: float | None = None
) -> WindowProgram:
    """State the dispatch of a window.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    start_value, end_value : float, optional [currency/kWh]
        Value of heat in the store at the window's borders. Given, the levels at both borders are
        free and priced: the programme then bounds this window's part of a longer year from below.
        Left out, the store ends at the level at which it began.

    Returns
    -------
    WindowProgram
        Ready to solve.
    """
    program = Program()
    columns = _grid_columns(program, window)
    _unit_columns(program, window, columns)
    _path_columns(program, window, columns)
    _supply_columns(program, window, columns)
    _unit_rows(program, window, columns)
    _path_rows(program, window, columns)
    level_rows = _store_rows(program, window, columns, start_value, end_value)
    heat = _heat_rows(program, window, columns)
    _cooling_rows(program, window, columns)
    power = _power_rows(program, window, columns)
    peaks = _peak_rows(program, window, columns)
    program.offset = window.fixed_cost
    return WindowProgram(program, columns, Rows(power, heat, level_rows, peaks))


def _grid_columns(program: Program, window: Window) -> Columns:
    """Import and export within the connection's limits."""
    prices, step_h = window.prices, window.step_h
    return Columns(
        grid_import=program.add_columns(
            window.steps, high=prices.import_limit_kW, cost=window.import_per_kWh * step_h
        ),
        grid_export=program.add_columns(
            window.steps, high=prices.export_limit_kW, cost=-window.export_per_kWh * step_h
        ),
    )


def _unit_columns(program: Program, window: Window, columns: Columns) -> None:
    """State, starts and power above the minimum, with their fuel and wear."""
    unit = window.unit
    if unit is None:
        return
    step_h, fuel = window.step_h, window.fuel_per_lhv_kWh
    running = (
        unit.fuel_at_minimum_lhv_kW * fuel
        + unit.cost_per_kWh * unit.minimum_power_kW
        + unit.cost_per_run_hour
    )
    columns.on = program.add_columns(
        window.steps, high=unit.available.astype(np.float64), cost=running * step_h, whole=True
    )
    columns.start = program.add_columns(
        window.steps, high=1.0, cost=unit.cost_per_start + unit.start_fuel_lhv_kWh * fuel
    )
    for k in range(unit.segment_power_kW.shape[1]):
        further = unit.fuel_slope_lhv[:, k] * fuel + unit.cost_per_kWh
        columns.segments.append(program.add_columns(window.steps, cost=further * step_h))


def _path_columns(program: Program, window: Window, columns: Columns) -> None:
    """The part of the unit's state and power whose exhaust takes each path."""
    for path in window.paths:
        columns.path_on[path.name] = program.add_columns(window.steps, high=1.0)
        columns.path_segments[path.name] = [
            program.add_columns(window.steps) for _ in columns.segments
        ]
    for grade in window.recovered_grades:
        columns.used[grade] = program.add_columns(window.steps)


def _supply_columns(program: Program, window: Window, columns: Columns) -> None:
    """Heaters, chillers and the store."""
    step_h = window.step_h
    for heater in window.heaters:
        cost = heater.fuel_per_heat_lhv * window.fuel_per_lhv_kWh * step_h
        numbers = program.add_columns(window.steps, high=heater.maximum_heat_kW, cost=cost)
        columns.heaters.append((heater.carrier, numbers))
    for chiller in window.chillers:
        columns.chillers.append(program.add_columns(window.steps, high=chiller.maximum_cooling_kW))
    store = window.store
    if store is not None:
        columns.charge = program.add_columns(window.steps, high=store.maximum_charge_kW)
        columns.discharge = program.add_columns(window.steps, high=store.maximum_discharge_kW)
        columns.level = program.add_columns(window.steps, high=store.capacity_kWh)


def _unit_rows(program: Program, window: Window, columns: Columns) -> None:
    """Power above the minimum only while on; starts; minimum times up and down."""
    unit, on, start = window.unit, columns.on, columns.start
    if unit is None or on is None or start is None:
        return
    for k, segment in enumerate(columns.segments):
        width_kW = unit.segment_power_kW[:, k]
        program.add_rows([(1.0, segment), (-width_kW, on)], high=0.0)
    # The state before the window is free, so its first step never counts as a start.
    program.add_rows([(1.0, start[1:]), (-1.0, on[1:]), (1.0, on[:-1])], low=0.0)
    program.add_rows([(1.0, start[:1])], high=0.0)
    _recent_starts(program, start, on, round(unit.minimum_up_h / window.step_h), up=True)
    _recent_starts(program, start, on, round(unit.minimum_down_h / window.step_h), up=False)


def _recent_starts(
    program: Program, start: IntArray, on: IntArray, reach: int, *, up: bool
) -> None:
    """At most one start within the minimum time, and only into (out of) the state it protects."""
    steps = len(on)
    if reach < 1 or steps <= reach:
        return
    if up:
        first, rows = 0, program.add_rows([(-1.0, on)], high=0.0)
    else:
        first, rows = reach, program.add_rows([(1.0, on[:-reach])], high=1.0)
    for back in range(reach):
        later = np.arange(max(first, back), steps)
        program.add_to_rows(rows[later - first], 1.0, start[later - back])


def _path_rows(program: Program, window: Window, columns: Columns) -> None:
    """Paths share the exhaust: each takes a part of the state, and of the power no more than that."""
    unit, on = window.unit, columns.on
    if unit is None or on is None or not window.paths:
        return
    path_on = [columns.path_on[path.name] for path in window.paths]
    program.add_rows([(1.0, on), *((-1.0, part) for part in path_on)], low=0.0)
    for k, segment in enumerate(columns.segments):
        width_kW = unit.segment_power_kW[:, k]
        parts = [columns.path_segments[path.name][k] for path in window.paths]
        for share, part in zip(path_on, parts, strict=True):
            program.add_rows([(1.0, part), (-width_kW, share)], high=0.0)
        left = [(1.0, segment), *((-1.0, part) for part in parts)]
        program.add_rows(left, low=0.0)
        # What is bypassed obeys the same limit.
        shares = [(width_kW, share) for share in path_on]
        program.add_rows([*left, (-width_kW, on), *shares], high=0.0)
    for grade, used in columns.used.items():
        terms = [(-1.0, used)]
        for path in window.paths:
            terms += _yield_terms(path, grade, columns)
        program.add_rows(terms, low=0.0)


def _yield_terms(
    path: ExhaustPath, grade: str, columns: Columns
) -> list[tuple[FloatArray | float, IntArray]]:
    """Heat of one grade that a path yields."""
    if grade not in path.yield_at_minimum_kW:
        return []
    slope = path.yield_slope[grade]
    return [
        (path.yield_at_minimum_kW[grade], columns.path_on[path.name]),
        *((slope[:, k], segment) for k, segment in enumerate(columns.path_segments[path.name])),
    ]


def _store_rows(
    program: Program,
    window: Window,
    columns: Columns,
    start_value: float | None,
    end_value: float | None,
) -> IntArray | None:
    """The level follows charge, discharge and loss; its ends meet, or are free and priced."""
    store, level = window.store, columns.level
    if store is None or level is None or columns.charge is None or columns.discharge is None:
        return None
    step_h = window.step_h
    kept = 1.0 - store.loss_frac_per_h * step_h
    if start_value is None or end_value is None:
        first = level[-1:]
    else:
        first = program.add_columns(1, high=store.capacity_kWh, cost=start_value)
        program.add_to_cost(level[-1], -end_value)
    columns.start_level = first
    before = np.concatenate([first, level[:-1]])
    return program.add_rows(
        [(1.0, level), (-kept, before), (-step_h, columns.charge), (step_h, columns.discharge)],
        low=0.0,
        high=0.0,
    )


def _heat_rows(program: Program, window: Window, columns: Columns) -> dict[str, IntArray]:
    """Heat used from the exhaust, heaters and store meet each grade's demand."""
    rows = {}
    for grade in GRADES:
        terms = [(1.0, numbers) for carrier, numbers in columns.heaters if carrier == grade]
        if grade in columns.used:
            terms.append((1.0, columns.used[grade]))
        if grade == "hot_water" and columns.charge is not None and columns.discharge is not None:
            terms += [(1.0, columns.discharge), (-1.0, columns.charge)]
        for chiller, numbers in zip(window.chillers, columns.chillers, strict=True):
            if chiller.drive == grade:
                terms.append((-1.0 / chiller.cop, numbers))
        if terms:
            demand_kW = window.demand_kW[grade]
            rows[grade] = program.add_rows(terms, low=demand_kW, high=demand_kW)
    return rows


def _cooling_rows(program: Program, window: Window, columns: Columns) -> None:
    """Chillers meet the cooling."""
    if columns.chillers:
        demand_kW = window.demand_kW["cooling"]
        terms = [(1.0, numbers) for numbers in columns.chillers]
        program.add_rows(terms, low=demand_kW, high=demand_kW)


def _power_rows(program: Program, window: Window, columns: Columns) -> IntArray:
    """Unit and import meet the site's power, its chillers' power and export."""
    terms = [(1.0, columns.grid_import), (-1.0, columns.grid_export)]
    if window.unit is not None and columns.on is not None:
        terms.append((window.unit.minimum_power_kW, columns.on))
        terms += [(1.0, segment) for segment in columns.segments]
    for chiller, numbers in zip(window.chillers, columns.chillers, strict=True):
        if chiller.drive == "power":
            terms.append((-1.0 / chiller.cop, numbers))
    demand_kW = window.demand_kW["power"]
    return program.add_rows(terms, low=demand_kW, high=demand_kW)


def _peak_rows(
    program: Program, window: Window, columns: Columns
) -> list[tuple[IntArray, IntArray]]:
    """Each demand charge's peak is no lower than any import that it counts; rows and their steps."""
    found = []
    for number, charge in enumerate(window.prices.demand_charges):
        counted, period = window.cut(charge.counted), window.cut(charge.period)
        present = np.unique(period[counted])
        if not present.size:
            continue
        peaks = program.add_columns(len(present), cost=charge.rate_per_kW[present])
        columns.peaks.append((number, peaks))
        place = np.searchsorted(present, period[counted])
        imports = columns.grid_import[counted]
        rows = program.add_rows([(1.0, peaks[place]), (-1.0, imports)], low=0.0)
        found.append((rows, np.flatnonzero(counted)))
    return found

"""The dispatch of a window of steps as a `Program`, one function a family of rows.

The symbols, and the same rows one by one, are in `docs/dispatch_model.md`.
"""

import numpy as np

from planner.arrays import IntArray
from planner.dispatch.places import Columns, Rows, WindowProgram
from planner.dispatch.program import Program, Term
from planner.dispatch.segment_order import SegmentOrder
from planner.dispatch.window import CARRIERS, Window
from planner.plant.envelope import ExhaustPath

#: Grades of heat that the balances are written for.
GRADES = ("steam", "hot_water", "hot_gas")

#: Price of supply from outside [currency/kWh]: dearer than anything that is for sale.
OUTSIDE_PRICE = 1e3

#: The path that yields nothing wanted; always there.
BYPASS = ExhaustPath("bypass", {}, {})


def build(
    window: Window, order: SegmentOrder | None = None, *, outside_supply: bool = False
) -> WindowProgram:
    """State the dispatch of a window.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    order : SegmentOrder, optional
        Segments that must be full, or empty.
    outside_supply : bool
        Let every demand be met from outside too, at a price that only a shortfall pays.

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
    if outside_supply:
        columns.outside = {
            carrier: program.add_columns(window.steps, cost=OUTSIDE_PRICE * window.step_h)
            for carrier in CARRIERS
        }
    _unit_rows(program, window, columns)
    _path_rows(program, window, columns)
    if order is not None:
        _order_rows(program, window, columns, order)
    level_rows = _store_rows(program, window, columns)
    heat = _heat_rows(program, window, columns)
    _cooling_rows(program, window, columns)
    power = _power_rows(program, window, columns)
    peaks = _peak_rows(program, window, columns)
    program.offset = window.fixed_cost
    loss_frac = 0.0 if window.store is None else window.store.loss_frac_per_h * window.step_h
    return WindowProgram(program, columns, Rows(power, heat, level_rows, peaks), 1.0 - loss_frac)


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
    """State and starts, with the fuel and wear of running at minimum power."""
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


def _path_columns(program: Program, window: Window, columns: Columns) -> None:
    """A copy of the unit's state and segments for each path: the part whose exhaust takes it."""
    unit = window.unit
    if unit is None or columns.on is None:
        return
    further = [
        (unit.fuel_slope_lhv[:, k] * window.fuel_per_lhv_kWh + unit.cost_per_kWh) * window.step_h
        for k in range(unit.segment_power_kW.shape[1])
    ]
    for path in (*window.paths, BYPASS):
        alone = not window.paths
        columns.path_on[path.name] = (
            columns.on if alone else program.add_columns(window.steps, high=1.0)
        )
        columns.path_segments[path.name] = [
            program.add_columns(window.steps, cost=cost) for cost in further
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
    """Starts, and minimum times up and down."""
    unit, on, start = window.unit, columns.on, columns.start
    if unit is None or on is None or start is None:
        return
    # The state before the window is free, so its first step never counts as a start.
    program.add_rows([(1.0, start[1:]), (-1.0, on[1:]), (1.0, on[:-1])], low=0.0)
    program.add_rows([(1.0, start[:1])], high=0.0)
    recent_starts(program, start, on, round(unit.minimum_up_h / window.step_h), up=True)
    recent_starts(program, start, on, round(unit.minimum_down_h / window.step_h), up=False)


def recent_starts(program: Program, start: IntArray, on: IntArray, reach: int, *, up: bool) -> None:
    """At most one start within the minimum time, and only into (out of) the state it protects.

    Parameters
    ----------
    program : Program
        Gets the rows.
    start, on : array of int, shape (steps,)
        Columns of starts and state.
    reach : int
        Minimum time in steps.
    up : bool
        Minimum time up, or down.
    """
    steps = len(on)
    if reach < 1 or (reach == 1 and not up):
        return
    rows = program.add_rows([(-1.0 if up else 1.0, on)], high=0.0 if up else 1.0)
    for distance in range(reach) if up else range(1, reach + 1):
        # Up: no start so shortly before a step that is off. Down: none so shortly after one on.
        near, far = np.arange(steps - distance), np.arange(distance, steps)
        held, starts = (far, near) if up else (near, far)
        program.add_to_rows(rows[held], 1.0, start[starts])


def _path_rows(program: Program, window: Window, columns: Columns) -> None:
    """The copies add up to the unit, each within its part; heat used is no more than yielded."""
    unit, on = window.unit, columns.on
    if unit is None or on is None:
        return
    if window.paths:
        copies = [(-1.0, part) for part in columns.path_on.values()]
        program.add_rows([(1.0, on), *copies], low=0.0, high=0.0)
    for name, segments in columns.path_segments.items():
        for k, segment in enumerate(segments):
            width_kW = unit.segment_power_kW[:, k]
            program.add_rows([(1.0, segment), (-width_kW, columns.path_on[name])], high=0.0)
    for grade, used in columns.used.items():
        terms: list[Term] = [(-1.0, used)]
        for path in window.paths:
            terms += _yield_terms(path, grade, columns)
        program.add_rows(terms, low=0.0)


def _yield_terms(path: ExhaustPath, grade: str, columns: Columns) -> list[Term]:
    """Heat of one grade that a path yields."""
    if grade not in path.yield_at_minimum_kW:
        return []
    slope = path.yield_slope[grade]
    return [
        (path.yield_at_minimum_kW[grade], columns.path_on[path.name]),
        *((slope[:, k], segment) for k, segment in enumerate(columns.path_segments[path.name])),
    ]


def _order_rows(program: Program, window: Window, columns: Columns, order: SegmentOrder) -> None:
    """Segments that must be full are, and those that must be empty are."""
    if window.unit is None or columns.on is None:
        return
    for k in range(window.unit.segment_power_kW.shape[1]):
        copies = [(1.0, copy[k]) for copy in columns.path_segments.values()]
        full, empty = np.flatnonzero(order.full[:, k]), np.flatnonzero(order.empty[:, k])
        width_kW = window.unit.segment_power_kW[full, k]
        whole = [(1.0, part[full]) for _, part in copies]
        program.add_rows([*whole, (-width_kW, columns.on[full])], low=0.0)
        program.add_rows([(1.0, part[empty]) for _, part in copies], high=0.0)


def _store_rows(program: Program, window: Window, columns: Columns) -> IntArray | None:
    """The level follows charge, discharge and loss, and ends where it began."""
    store, level = window.store, columns.level
    if store is None or level is None or columns.charge is None or columns.discharge is None:
        return None
    step_h = window.step_h
    kept = 1.0 - store.loss_frac_per_h * step_h
    before = np.roll(level, 1)
    return program.add_rows(
        [(1.0, level), (-kept, before), (-step_h, columns.charge), (step_h, columns.discharge)],
        low=0.0,
        high=0.0,
    )


def _heat_rows(program: Program, window: Window, columns: Columns) -> dict[str, IntArray]:
    """Heat used from the exhaust, heaters and store meet each grade's demand."""
    rows = {}
    for grade in GRADES:
        terms: list[Term] = [
            (1.0, numbers) for carrier, numbers in columns.heaters if carrier == grade
        ]
        if grade in columns.used:
            terms.append((1.0, columns.used[grade]))
        if grade == "hot_water" and columns.charge is not None and columns.discharge is not None:
            terms += [(1.0, columns.discharge), (-1.0, columns.charge)]
        for chiller, numbers in zip(window.chillers, columns.chillers, strict=True):
            if chiller.drive == grade:
                terms.append((-1.0 / chiller.cop, numbers))
        if terms:
            terms += columns.from_outside(grade)
            demand_kW = window.demand_kW[grade]
            rows[grade] = program.add_rows(terms, low=demand_kW, high=demand_kW)
    return rows


def _cooling_rows(program: Program, window: Window, columns: Columns) -> None:
    """Chillers meet the cooling."""
    if columns.chillers:
        demand_kW = window.demand_kW["cooling"]
        terms: list[Term] = [(1.0, numbers) for numbers in columns.chillers]
        terms += columns.from_outside("cooling")
        program.add_rows(terms, low=demand_kW, high=demand_kW)


def _power_rows(program: Program, window: Window, columns: Columns) -> IntArray:
    """Unit and import meet the site's power, its chillers' power and export."""
    terms: list[Term] = [(1.0, columns.grid_import), (-1.0, columns.grid_export)]
    if window.unit is not None and columns.on is not None:
        terms.append((window.unit.minimum_power_kW, columns.on))
        terms += [(1.0, part) for copy in columns.path_segments.values() for part in copy]
    for chiller, numbers in zip(window.chillers, columns.chillers, strict=True):
        if chiller.drive == "power":
            terms.append((-1.0 / chiller.cop, numbers))
    terms += columns.from_outside("power")
    demand_kW = window.demand_kW["power"]
    return program.add_rows(terms, low=demand_kW, high=demand_kW)


def _peak_rows(
    program: Program, window: Window, columns: Columns
) -> list[tuple[IntArray, IntArray]]:
    """Each charge's peak is no lower than any import that it counts; rows and their steps."""
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

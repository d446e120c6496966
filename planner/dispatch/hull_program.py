"""The dispatch of a window with every step's flows split by the unit's state.

Each flow is the sum of a part while the unit runs and a part while it stands. Each part meets the
step's balances and limits multiplied by its state, so that a fractional state can only mix what a
running and a standing unit could do: the linear relaxation is the hull of the two, far tighter
than the plain statement in `year_program`, at about one and a half times its size.
"""

from dataclasses import dataclass

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.program import Program, Term
from planner.dispatch.window import Window
from planner.dispatch.year_program import BYPASS, GRADES, recent_starts
from planner.plant.envelope import UnitEnvelope


@dataclass(frozen=True)
class HullProgram:
    """A programme with the columns of the unit's state.

    Parameters
    ----------
    program : Program
        Ready to solve.
    on : array of int, shape (steps,)
        Columns of the state.
    """

    program: Program
    on: IntArray


@dataclass(frozen=True)
class _Part:
    """Flows while the unit runs, or while it stands."""

    grid_import: IntArray
    charge: IntArray | None
    discharge: IntArray | None


class _State:
    """Rows that hold for one state: their right-hand sides are multiplied by it."""

    def __init__(self, program: Program, on: IntArray, *, running: bool) -> None:
        self._program, self._on, self._running = program, on, running

    def require(self, terms: list[Term], right: FloatArray | float, *, equal: bool = True) -> None:
        """Terms equal (or reach at most) the right-hand side times the state."""
        sides = np.broadcast_to(np.asarray(right, dtype=np.float64), (len(self._on),))
        high = np.zeros(len(self._on)) if self._running else sides
        state: Term = (-sides if self._running else sides, self._on)
        self._program.add_rows([*terms, state], high=high, **({"low": high} if equal else {}))


def build_hull(window: Window, *, border_values: tuple[float, float] | None) -> HullProgram:
    """State the dispatch of a window, the unit's state free at its borders.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps, with a unit.
    border_values : tuple of float or None [currency/kWh]
        Value of heat in the store at the window's beginning and end. The levels there are free and
        priced: the programme bounds this window's part of a longer year from below. None for a
        window that is the whole year: the store ends at the level at which it began.

    Returns
    -------
    HullProgram
        Ready to solve.
    """
    if window.unit is None:
        raise ValueError("a window without a unit is a linear programme already")
    program = Program()
    on = _state_columns(program, window, window.unit)
    parts = [
        _part(program, window, on, unit=unit, running=unit is not None)
        for unit in (window.unit, None)
    ]
    _store_rows(program, window, parts, border_values)
    _peak_rows(program, window, parts)
    program.offset = window.fixed_cost
    return HullProgram(program, on)


def _state_columns(program: Program, window: Window, unit: UnitEnvelope) -> IntArray:
    """State and starts, their costs and minimum times."""
    step_h, fuel = window.step_h, window.fuel_per_lhv_kWh
    running = (
        unit.fuel_at_minimum_lhv_kW * fuel
        + unit.cost_per_kWh * unit.minimum_power_kW
        + unit.cost_per_run_hour
    )
    on = program.add_columns(
        window.steps, high=unit.available.astype(np.float64), cost=running * step_h, whole=True
    )
    start = program.add_columns(
        window.steps, high=1.0, cost=unit.cost_per_start + unit.start_fuel_lhv_kWh * fuel
    )
    program.add_rows([(1.0, start[1:]), (-1.0, on[1:]), (1.0, on[:-1])], low=0.0)
    program.add_rows([(1.0, start[:1])], high=0.0)
    recent_starts(program, start, on, round(unit.minimum_up_h / step_h), up=True)
    recent_starts(program, start, on, round(unit.minimum_down_h / step_h), up=False)
    return on


def _part(
    program: Program, window: Window, on: IntArray, *, unit: UnitEnvelope | None, running: bool
) -> _Part:
    """All flows and balances of one state."""
    prices, step_h, steps = window.prices, window.step_h, window.steps
    state = _State(program, on, running=running)
    grid_import = program.add_columns(
        steps, high=prices.import_limit_kW, cost=window.import_per_kWh * step_h
    )
    grid_export = program.add_columns(
        steps, high=prices.export_limit_kW, cost=-window.export_per_kWh * step_h
    )
    state.require([(1.0, grid_export)], prices.export_limit_kW, equal=False)
    balances: dict[str, list[Term]] = {grade: [] for grade in GRADES}
    balances["power"] = [(1.0, grid_import), (-1.0, grid_export)]
    if unit is not None:
        _unit_terms(program, window, unit, on, balances)
    for heater in window.heaters:
        cost = heater.fuel_per_heat_lhv * window.fuel_per_lhv_kWh * step_h
        heat = program.add_columns(steps, high=heater.maximum_heat_kW, cost=cost)
        balances[heater.carrier].append((1.0, heat))
    charge, discharge = _store_columns(program, window, state, balances)
    _chiller_terms(program, window, state, balances)
    for carrier, terms in balances.items():
        if terms:
            state.require(terms, window.demand_kW[carrier])
    return _Part(grid_import, charge, discharge)


def _unit_terms(
    program: Program,
    window: Window,
    unit: UnitEnvelope,
    on: IntArray,
    balances: dict[str, list[Term]],
) -> None:
    """Power and heat of the unit, a copy for each exhaust path."""
    balances["power"].append((unit.minimum_power_kW, on))
    offered: dict[str, list[Term]] = {grade: [] for grade in window.recovered_grades}
    shares = []
    for path in (*window.paths, BYPASS):
        share = program.add_columns(window.steps, high=1.0) if window.paths else on
        shares.append(share)
        for grade, heat_kW in path.yield_at_minimum_kW.items():
            offered[grade].append((heat_kW, share))
        for k in range(unit.segment_power_kW.shape[1]):
            further = unit.fuel_slope_lhv[:, k] * window.fuel_per_lhv_kWh + unit.cost_per_kWh
            segment = program.add_columns(window.steps, cost=further * window.step_h)
            program.add_rows([(1.0, segment), (-unit.segment_power_kW[:, k], share)], high=0.0)
            balances["power"].append((1.0, segment))
            for grade, slope in path.yield_slope.items():
                offered[grade].append((slope[:, k], segment))
    if window.paths:
        program.add_rows([(1.0, on), *((-1.0, share) for share in shares)], low=0.0, high=0.0)
    for grade, terms in offered.items():
        used = program.add_columns(window.steps)
        balances[grade].append((1.0, used))
        program.add_rows([*terms, (-1.0, used)], low=0.0)


def _store_columns(
    program: Program, window: Window, state: _State, balances: dict[str, list[Term]]
) -> tuple[IntArray | None, IntArray | None]:
    """Charge and discharge in one state."""
    store = window.store
    if store is None:
        return None, None
    charge = program.add_columns(window.steps, high=store.maximum_charge_kW)
    discharge = program.add_columns(window.steps, high=store.maximum_discharge_kW)
    state.require([(1.0, charge)], store.maximum_charge_kW, equal=False)
    state.require([(1.0, discharge)], store.maximum_discharge_kW, equal=False)
    balances["hot_water"] += [(1.0, discharge), (-1.0, charge)]
    return charge, discharge


def _chiller_terms(
    program: Program, window: Window, state: _State, balances: dict[str, list[Term]]
) -> None:
    """Chillers in one state: their cooling, and what drives them."""
    cooling: list[Term] = []
    for chiller in window.chillers:
        made = program.add_columns(window.steps, high=chiller.maximum_cooling_kW)
        state.require([(1.0, made)], chiller.maximum_cooling_kW, equal=False)
        balances[chiller.drive].append((-1.0 / chiller.cop, made))
        cooling.append((1.0, made))
    if cooling:
        state.require(cooling, window.demand_kW["cooling"])


def _store_rows(
    program: Program,
    window: Window,
    parts: list[_Part],
    border_values: tuple[float, float] | None,
) -> None:
    """The level follows the flows of both states; its ends meet, or are free and priced."""
    store, step_h = window.store, window.step_h
    if store is None:
        return
    level = program.add_columns(window.steps, high=store.capacity_kWh)
    first = level[-1:]
    if border_values is not None:
        first = program.add_columns(1, high=store.capacity_kWh, cost=border_values[0])
        program.add_to_cost(level[-1:], -border_values[1])
    kept = 1.0 - store.loss_frac_per_h * step_h
    terms: list[Term] = [(1.0, level), (-kept, np.concatenate([first, level[:-1]]))]
    for part in parts:
        if part.charge is not None and part.discharge is not None:
            terms += [(-step_h, part.charge), (step_h, part.discharge)]
    program.add_rows(terms, low=0.0, high=0.0)


def _peak_rows(program: Program, window: Window, parts: list[_Part]) -> None:
    """Each demand charge's peak is no lower than any import that it counts."""
    for charge in window.prices.demand_charges:
        counted, period = window.cut(charge.counted), window.cut(charge.period)
        present = np.unique(period[counted])
        if not present.size:
            continue
        peaks = program.add_columns(len(present), cost=charge.rate_per_kW[present])
        imports = [(-1.0, part.grid_import[counted]) for part in parts]
        place = np.searchsorted(present, period[counted])
        program.add_rows([(1.0, peaks[place]), *imports], low=0.0)

"""The unit's state through the year, joined from months and mended at their borders."""

import numpy as np

from planner.arrays import BoolArray
from planner.dispatch.window import Window
from planner.errors import SolveError

#: Runs that are too short can cascade into their neighbours; more rounds than this mean a knot.
MOST_ROUNDS = 200


def mended(on: BoolArray, year: Window) -> BoolArray:
    """A state that keeps minimum times across the borders of months.

    Parameters
    ----------
    on : array of bool, shape (steps,)
        Months put one behind the other, each keeping its minimum times within.
    year : Window
        All steps.

    Returns
    -------
    array of bool, shape (steps,)
        A run that is too short is left out; a stop that is too short is run through where the
        site can take the minimum power, and otherwise the run after it is left out.

    Raises
    ------
    SolveError
        If no such state is found.
    """
    unit = year.unit
    if unit is None:
        return on
    shortest_up = round(unit.minimum_up_h / year.step_h)
    shortest_down = round(unit.minimum_down_h / year.step_h)
    possible = unit.available & _can_take_minimum(year)
    state = on & possible
    for _ in range(MOST_ROUNDS):
        short = _first_short_run(state, shortest_up, shortest_down)
        if short is None:
            return state
        first, after = short
        if state[first] or possible[first:after].all():
            state[first:after] = not state[first]
        else:
            state[after : _end_of_run(state, after)] = False
    raise SolveError("the months' commitments could not be joined to a year")


def starts_of(on: BoolArray) -> BoolArray:
    """Steps in which the unit starts.

    Parameters
    ----------
    on : array of bool, shape (steps,)
        State.

    Returns
    -------
    array of bool, shape (steps,)
        The year's first step is never a start: the state before it is not known.
    """
    started = np.zeros(len(on), dtype=bool)
    started[1:] = on[1:] & ~on[:-1]
    return started


def _can_take_minimum(year: Window) -> BoolArray:
    """Steps in which site and export can take the unit's minimum power."""
    if year.unit is None:
        return np.zeros(year.steps, dtype=bool)
    electric = [c for c in year.chillers if c.drive == "power"]
    cooling_kW = sum((c.maximum_cooling_kW / c.cop for c in electric), 0.0)
    taken_kW = year.demand_kW["power"] + year.prices.export_limit_kW
    taken_kW = taken_kW + np.minimum(cooling_kW, year.demand_kW["cooling"])
    return np.asarray(year.unit.minimum_power_kW <= taken_kW)


def _first_short_run(
    state: BoolArray, shortest_up: int, shortest_down: int
) -> tuple[int, int] | None:
    """First run or stop that begins and ends within the year and is too short."""
    changes = np.flatnonzero(np.diff(state.astype(np.int8))) + 1
    first, after = changes[:-1], changes[1:]
    shortest = np.where(state[first], shortest_up, shortest_down)
    short = np.flatnonzero(after - first < shortest)
    return (int(first[short[0]]), int(after[short[0]])) if short.size else None


def _end_of_run(state: BoolArray, first: int) -> int:
    """Step after the run that begins at a step."""
    different = np.flatnonzero(state[first:] != state[first])
    return first + int(different[0]) if different.size else len(state)

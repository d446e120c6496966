"""The fast engine: a year's states and a proven bound, where the shape is known.

Backwards, month by month, the cost to go is bounded for every state of the unit and every price of
stored heat; within a month the peaks of its demand charges are searched until the bound is close.
Forwards, the states that the bound's cost to go chooses are followed.
"""

from dataclasses import dataclass

import numpy as np

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.fast_bound import sweep_back
from planner.dispatch.fast_peaks import MonthSearch, months_of
from planner.dispatch.fast_prepare import prepare
from planner.dispatch.fast_shape import KW_PER_MW, state_steps
from planner.dispatch.fast_stage import Year, price_steps
from planner.dispatch.fast_walk import walk
from planner.dispatch.months import borders
from planner.dispatch.window import Window
from planner.errors import SolveError

#: Share of the asked gap that the search for peaks may leave.
SEARCH_SHARE = 0.4

#: Steps from which the value of the store at the year's border is found.
BORDER_STEPS = 240


@dataclass(frozen=True)
class FastAnswer:
    """What the fast engine found.

    Parameters
    ----------
    on : array of bool, shape (steps,)
        State of the unit; cheapest, and to be priced by a linear programme.
    bound : float [currency]
        No schedule of the year costs less.
    levels_kWh : array, shape (borders,) [kWh]
        Level of the store at the end of each month; zero without one.
    """

    on: BoolArray
    bound: float
    levels_kWh: FloatArray


def solve_window(window: Window, gap_frac: float) -> FastAnswer:
    """Bound a year and choose its states.

    Parameters
    ----------
    window : Window
        All steps, of a shape that `why_unknown` has nothing against.
    gap_frac : float [-]
        Gap that is good enough.

    Returns
    -------
    FastAnswer
        Bound and states.

    Raises
    ------
    SolveError
        If a step's programme failed, or no sequence of states exists.
    """
    steps, _ = state_steps(window)
    year = prepare(window, steps)
    value, first_level = _border(year) if window.store else (0.0, 0.0)
    states = len(year.running)
    after = np.tile(year.capacity * np.maximum(0.0, value - year.grid[-1]), (states, 1))
    allowed = SEARCH_SHARE * gap_frac * abs(_rough_cost(year)) / window.steps
    searches = []
    for month in reversed(months_of(window, year, borders(window))):
        search = MonthSearch(year, month, after)
        after = search.bound(allowed * month.steps)
        searches.append(search)
    free = [int(year.running.sum()) - 1, states - 1]
    costs = [-float(np.interp(value, year.grid[0], after[state])) for state in free]
    begun = free[int(np.argmin(costs))]
    on, levels = _forward(year, searches[::-1], begun, first_level)
    to_kWh = KW_PER_MW * window.step_h
    # The year ends at the level at which it began.
    return FastAnswer(
        on=on,
        bound=min(costs) + window.fixed_cost,
        levels_kWh=np.array([*levels[:-1], first_level]) * to_kWh,
    )


def _forward(
    year: Year, searches: list[MonthSearch], state: int, level: float
) -> tuple[BoolArray, list[float]]:
    """States of all steps, and the store's level after each month."""
    on = np.zeros(len(year.day), dtype=np.int64)
    prices = np.zeros(len(year.day))
    levels = []
    for search in searches:
        month = search.month
        search.price(search.best_peaks(state))
        part = slice(month.first, month.first + month.steps)
        state, level = _walk_back_and_forth(
            year, search, state=state, level=level, on=on[part], prices=prices[part]
        )
        levels.append(level)
    return on.astype(bool), levels


def _walk_back_and_forth(
    year: Year,
    search: MonthSearch,
    *,
    state: int,
    level: float,
    on: IntArray,
    prices: FloatArray,
) -> tuple[int, float]:
    """Follow one month, the cost to go of every step at hand."""
    month, (states, count) = search.month, search.after.shape
    values = np.zeros((month.steps, states, count))
    sweep_back(year, month.first, search.stage, search.alive, search.after, values)
    state, level = walk(
        year, month.first, search.stage, search.alive, values, state, level, on, prices
    )
    if state < 0:
        raise SolveError(f"no states serve the site from step {month.first} on")
    return state, level


def _rough_cost(year: Year) -> float:
    """Size of the year's cost: each step at its best, heat in the store at its dearest."""
    possible = year.curves.count > 0
    return float(np.where(possible, year.free.max(axis=2), np.inf).min(axis=1).sum())


def _border(year: Year) -> tuple[float, float]:
    """Value of stored heat at the year's border, and the level with which to begin.

    The year's first days are swept back with a plain guess behind them, its last days with those;
    the level that is then left at the end is where a year that closes should begin. Any value
    gives a valid bound.
    """
    steps = len(year.day)
    reach = min(BORDER_STEPS, steps)
    states, last = len(year.running), reach - 1
    guess = float(np.median(year.grid[-1]))
    dearness = guess - year.grid[year.day[last]] * year.scale[last]
    after = np.tile(year.capacity * np.maximum(0.0, dearness), (states, 1))
    opening, _ = _swept(year, 0, reach, after)
    behind = np.array([np.interp(year.grid[-1], year.grid[0], row) for row in opening])
    _, (stage, alive, values) = _swept(year, steps - reach, reach, behind)
    on, prices = np.zeros(reach, dtype=np.int64), np.zeros(reach)
    _, level = walk(
        year,
        steps - reach,
        stage,
        alive,
        values,
        int(year.running.sum()) - 1,
        0.5 * year.capacity,
        on,
        prices,
    )
    return float(prices[-1]), level


def _swept(
    year: Year, first: int, steps: int, after: FloatArray
) -> tuple[FloatArray, tuple[FloatArray, IntArray, FloatArray]]:
    """Conjugates before some steps with import free, and what a walk through them needs."""
    states, prices = after.shape
    stage, alive = np.zeros((steps, 2, prices)), np.zeros((steps, 2), dtype=np.int64)
    free = np.full(steps, np.inf)
    price_steps(year, first, free, np.zeros((steps, 2)), stage, alive)
    values = np.zeros((steps, states, prices))
    before = sweep_back(year, first, stage, alive, after, values)
    return before, (stage, alive, values)

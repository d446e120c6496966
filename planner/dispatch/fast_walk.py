"""Forward through a month: the states that the bound's cost to go chooses."""

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.fast_bound import HOPELESS
from planner.dispatch.fast_compile import compiled
from planner.dispatch.fast_stage import Year


@compiled
def _best_price(
    year: Year, step: int, left: float, values: FloatArray, stage: FloatArray
) -> tuple[float, int]:
    """Least cost from a level on, and the grid point of the price that proves it."""
    grid, scale = year.grid[year.day[step]], year.scale[step]
    best, place = -np.inf, 0
    for i in range(len(grid)):
        cost = stage[i] - values[i] - grid[i] * scale * left
        if cost > best:
            best, place = cost, i
    return best, place


@compiled
def _level_after(
    year: Year, step: int, left: float, i: int, values: FloatArray, stage: FloatArray
) -> float:
    """A level that both the step and the cost to go accept at a price of the grid."""
    steps, last = year.steps, len(values) - 1
    grid, scale = year.grid[year.day[step]], year.scale[step]
    moves_low, moves_high = steps.lowest, steps.highest
    level_low, level_high = 0.0, year.capacity
    if i > 0:
        width = (grid[i] - grid[i - 1]) * scale
        moves_low = (stage[i - 1] - stage[i]) / width
        level_high = (values[i - 1] - values[i]) / width
    if i < last:
        width = (grid[i + 1] - grid[i]) * scale
        moves_high = (stage[i] - stage[i + 1]) / width
        level_low = (values[i] - values[i + 1]) / width
    low, high = max(level_low - left, moves_low), min(level_high - left, moves_high)
    moved = 0.5 * (low + high) if low <= high else low
    moved = min(max(moved, steps.lowest), steps.highest)
    return min(max(left + moved, 0.0), year.capacity)


@compiled
def walk(
    year: Year,
    first: int,
    stage: FloatArray,
    alive: IntArray,
    values: FloatArray,
    state: int,
    level: float,
    on: IntArray,
    prices: FloatArray,
) -> tuple[int, float]:
    """Follow the cheapest states through a month.

    Parameters
    ----------
    year : Year
        The year.
    first : int
        The month's first step.
    stage, alive, values : arrays
        As `price_steps` and `sweep_back` fill them.
    state, level : int and float [MW x step]
        Before the month.
    on : array of int, shape (steps of the month,)
        Filled.
    prices : array, shape (steps of the month,)
        Filled with the price of heat in the store after each step [currency/(MW x step)].

    Returns
    -------
    tuple of int and float
        State, -1 where nothing was possible, and level after the month.
    """
    for h in range(stage.shape[0]):
        step, left = first + h, year.kept * level
        least, chosen, place = -0.5 * HOPELESS, -1, 0
        for option in range(2):
            y = year.following[state, option]
            if y < 0 or alive[h, year.running[y]] == 0:
                continue
            cost, i = _best_price(year, step, left, values[h, y], stage[h, year.running[y]])
            if year.starts[state, option] == 1:
                cost += year.start_cost[step]
            if cost < least:
                least, chosen, place = cost, y, i
        if chosen < 0:
            return -1, level
        running = year.running[chosen]
        if year.capacity > 0.0:
            level = _level_after(year, step, left, place, values[h, chosen], stage[h, running])
        state, on[h] = chosen, running
        prices[h] = year.grid[year.day[step], place] * year.scale[step]
    return state, level

"""A month's least cost for every state and store level before it, bounded from below.

The cost to go is held, for each state of the unit, as its convex conjugate over the price v of
stored heat: F(v) is the largest of -v L - V(L) over the level L. Convexity in L is imposed and
prices between grid points are interpolated; both only lower V, so that V is a bound. A step then
*adds* its own conjugate, a choice between states takes a *maximum*, and a level's limits clamp
slopes. Without a store the grid is the single price zero, and everything is exact.
"""

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.fast_compile import compiled
from planner.dispatch.fast_stage import Year

#: Conjugate of a state from which nothing is possible.
HOPELESS = -1e18


@compiled
def _subtract_and_clamp(
    z: FloatArray,
    y: int,
    here: FloatArray,
    stage: FloatArray,
    h: int,
    on: int,
    width: FloatArray,
    capacity: float,
) -> None:
    """A step added to a state's conjugate, slopes kept between minus the capacity and zero."""
    count = z.shape[1]
    for i in range(count):
        z[y, i] = here[y, i] - stage[h, on, i]
    low = 0
    while low < count - 1 and z[y, low + 1] - z[y, low] < -capacity * width[low]:
        low += 1
    for i in range(low - 1, -1, -1):
        z[y, i] = z[y, i + 1] + capacity * width[i]
    high = low
    while high < count - 1 and z[y, high + 1] <= z[y, high]:
        high += 1
    least = z[y, high]
    for i in range(high + 1, count):
        z[y, i] = least


@compiled
def _change_grid(
    old: FloatArray, new: FloatArray, scale: float, capacity: float, values: FloatArray
) -> None:
    """Conjugates from one day's prices to the day's before, chords between grid points."""
    last = len(old) - 1
    row = np.empty(len(old))
    for x in range(values.shape[0]):
        j = 0
        for i in range(last + 1):
            row[i] = values[x, i]
        for i in range(len(new)):
            price = new[i] / scale
            if price >= old[last]:
                values[x, i] = row[last]
            elif price <= old[0]:
                values[x, i] = row[0] + capacity * (old[0] - price) * scale
            else:
                while old[j + 1] < price:
                    j += 1
                part = (price - old[j]) / (old[j + 1] - old[j])
                values[x, i] = row[j] + part * (row[j + 1] - row[j])


@compiled
def _choose(
    out: FloatArray,
    z: FloatArray,
    following: IntArray,
    starts: IntArray,
    possible: IntArray,
    start_cost: float,
) -> None:
    """The better of the states that may follow, state by state and price by price."""
    count = z.shape[1]
    for x in range(out.shape[0]):
        first, second = following[x, 0], following[x, 1]
        if possible[first] == 1:
            for i in range(count):
                out[x, i] = z[first, i]
        else:
            for i in range(count):
                out[x, i] = HOPELESS
        if second >= 0 and possible[second] == 1:
            paid = start_cost * starts[x, 1]
            for i in range(count):
                out[x, i] = max(out[x, i], z[second, i] - paid)


@compiled
def sweep_back(
    year: Year,
    first: int,
    stage: FloatArray,
    alive: IntArray,
    after: FloatArray,
    kept_values: FloatArray,
) -> FloatArray:
    """Conjugates before a month from those after it.

    Parameters
    ----------
    year : Year
        The year.
    first : int
        The month's first step.
    stage, alive : arrays
        As `price_steps` fills them.
    after : array, shape (states, prices)
        Conjugates at the month's end, on the grid of its last day.
    kept_values : array, shape (steps of the month, states, prices) or (0, 0, 0)
        Filled with the conjugates after each step, if there is room.

    Returns
    -------
    array, shape (states, prices)
        On the grid of the day before.
    """
    states, prices = after.shape
    here, before, z = after.copy(), np.empty_like(after), np.empty_like(after)
    possible, width = np.zeros(states, np.int64), np.zeros(prices)
    day, scale, grid, running = year.day, year.scale, year.grid, year.running
    first_of_day, following, starts = year.first_of_day, year.following, year.starts
    start_cost, kept, capacity = year.start_cost, year.kept, year.capacity
    for h in range(stage.shape[0] - 1, -1, -1):
        step = first + h
        for i in range(prices - 1):
            width[i] = (grid[day[step], i + 1] - grid[day[step], i]) * scale[step]
        if kept_values.shape[0] > 0:
            for x in range(states):
                for i in range(prices):
                    kept_values[h, x, i] = here[x, i]
        for y in range(states):
            possible[y] = alive[h, running[y]]
            if possible[y] == 1:
                _subtract_and_clamp(z, y, here, stage, h, running[y], width, kept * capacity)
        _choose(before, z, following, starts, possible, start_cost[step])
        if first_of_day[step] == 1:
            new = grid[day[step - 1] if step > 0 else 0]
            _change_grid(grid[day[step]], new, scale[step] * kept, capacity, before)
        here, before = before, here
    return here

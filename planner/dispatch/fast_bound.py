"""A month's least cost for every state and store level before it, bounded from below.

The cost to go is held, for each state of the unit, as its convex conjugate over the price v of
stored heat: F(v) is the largest of -v L - V(L) over the level L. Convexity in L is imposed and
prices between grid points are interpolated; both only lower V, so that V is a bound. A step then
*adds* its own conjugate, a choice between states takes a *maximum*, and a level's limits clamp
slopes. Without a store the grid is the single price zero, and everything is exact.
"""

from typing import NamedTuple

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.fast_compile import compiled
from planner.dispatch.fast_curves import ROOM, Curves, Programme, curve, load_step, new_programme
from planner.dispatch.fast_shape import CHARGE, DISCHARGE, IMPORT, Steps
from planner.dispatch.fast_simplex import solve, value

#: Conjugate of a state from which nothing is possible.
HOPELESS = -1e18

#: Import may pass a cap by so much before a step counts as capped [MW].
SLACK_MW = 1e-7


class Year(NamedTuple):
    """What the sweeps need of a year, prices included.

    Parameters
    ----------
    steps : Steps
        Programmes.
    curves : Curves
        With import free.
    free : array, shape (steps, 2, prices)
        Conjugate of each step with import free.
    largest, least : array, shape (steps, 2) [MW]
        Largest import of the free curve, and the least with which the step is possible.
    grid : array, shape (days, prices)
        Prices of stored heat at the end of each day.
    day : array of int, shape (steps,)
        Day of each step.
    scale : array, shape (steps,)
        Price at a step's end over that at its day's end: heat kept until then.
    first_of_day : array of int, shape (steps,)
        1 in a day's first step.
    kept : float [-]
        Share of the level that a step leaves.
    capacity : float [MW x step]
        Of the store; zero without one.
    following : array of int, shape (states, 2)
        States that may follow, -1 for none; a start costs where `starts` is 1.
    starts : array of int, shape (states, 2)
        See there.
    running : array of int, shape (states,)
        1 while on.
    start_cost : array, shape (steps,)
        Of each step.
    """

    steps: Steps
    curves: Curves
    free: FloatArray
    largest: FloatArray
    least: FloatArray
    grid: FloatArray
    day: IntArray
    scale: FloatArray
    first_of_day: IntArray
    kept: float
    capacity: float
    following: IntArray
    starts: IntArray
    running: IntArray
    start_cost: FloatArray


@compiled
def conjugate_with_store(
    corners: FloatArray, count: int, grid: FloatArray, scale: float, out: FloatArray
) -> None:
    """Least cost less the value of the heat stored, at every price of the grid."""
    k = 0
    for i in range(len(grid)):
        price = grid[i] * scale
        best = corners[k, 1] - price * corners[k, 0]
        while k + 1 < count:
            further = corners[k + 1, 1] - price * corners[k + 1, 0]
            if further > best:
                break
            best = further
            k += 1
        out[i] = best


@compiled
def cheapest_import(corners: FloatArray, count: int, cap: float, price: float) -> tuple[float, float]:
    """Least cost with import at a price and below a cap, and that import."""
    k = 0
    while k + 1 < count and corners[k + 1, 0] <= cap:
        width = corners[k + 1, 0] - corners[k, 0]
        if corners[k + 1, 1] - corners[k, 1] + price * width >= 0.0:
            break
        k += 1
    amount, cost = corners[k, 0], corners[k, 1]
    if k + 1 < count and corners[k + 1, 0] > cap > amount:
        width = corners[k + 1, 0] - amount
        slope = (corners[k + 1, 1] - cost) / width
        if slope + price < 0.0:
            cost += slope * (cap - amount)
            amount = cap
    return cost + price * amount, amount


@compiled
def least_imports(steps: Steps, curves: Curves) -> FloatArray:
    """Least import with which each step is possible at all, whatever the store does."""
    count = steps.demand.shape[0]
    least = np.zeros((count, 2))
    stored = steps.moving_row > 0
    for on in range(2):
        made = new_programme(steps, on)
        for step in range(count):
            if curves.count[step, on] < 1:
                continue
            if not stored:
                least[step, on] = curves.corners[step, on, 0, 0]
                continue
            load_step(made, steps, step, np.inf, 0.0)
            made.cost[:] = 0.0
            made.cost[IMPORT] = 1.0
            made.upper[CHARGE], made.upper[DISCHARGE] = steps.upper[CHARGE], steps.upper[DISCHARGE]
            if solve(made.work, made.matrix, made.cost, made.upper, made.rhs) == 1:
                rows, columns = made.matrix.shape
                least[step, on] = max(value(made.work, rows, columns), 0.0)
    return least


@compiled
def free_conjugates(
    steps: Steps, curves: Curves, grid: FloatArray, day: IntArray, scale: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Conjugates and largest imports of all steps with import free."""
    count = steps.demand.shape[0]
    free = np.zeros((count, 2, grid.shape[1]))
    largest = np.zeros((count, 2))
    for step in range(count):
        for on in range(2):
            corners, size = curves.corners[step, on], curves.count[step, on]
            if size < 1:
                continue
            if steps.moving_row > 0:
                conjugate_with_store(corners, size, grid[day[step]], scale[step], free[step, on])
                for k in range(size):
                    largest[step, on] = max(largest[step, on], corners[k, 2])
            else:
                cost, amount = cheapest_import(corners, size, np.inf, steps.cost[step, IMPORT])
                free[step, on, 0] = cost
                largest[step, on] = amount
    return free, largest


@compiled
def _capped_step(
    year: Year,
    made: Programme,
    step: int,
    on: int,
    cap: float,
    surcharge: float,
    half: FloatArray,
    corners: FloatArray,
    out: FloatArray,
) -> int:
    """Conjugate of one step with import capped and surcharged: 1, 0 if impossible, -1 failed."""
    if year.steps.moving_row == 0:
        price = year.steps.cost[step, IMPORT] + surcharge
        free = year.curves.corners[step, on]
        out[0], _ = cheapest_import(free, year.curves.count[step, on], cap, price)
        return 1
    count = curve(made, year.steps, step, cap, surcharge, half, corners)
    if count > 0:
        grid = year.grid[year.day[step]]
        conjugate_with_store(corners, count, grid, year.scale[step], out)
    return min(count, 1)


@compiled
def price_steps(
    year: Year,
    first: int,
    caps: FloatArray,
    surcharges: FloatArray,
    stage: FloatArray,
    alive: IntArray,
) -> bool:
    """Conjugates of a month's steps under caps and surcharges on import.

    Parameters
    ----------
    year : Year
        The year.
    first : int
        The month's first step.
    caps : array, shape (steps of the month,) [MW]
        Most import.
    surcharges : array, shape (steps of the month, 2) [currency/MW]
        Added to the price of import, by state.
    stage : array, shape (steps of the month, 2, prices)
        Filled.
    alive : array of int, shape (steps of the month, 2)
        Filled: 1 where the state is possible.

    Returns
    -------
    bool
        False where a step's programme failed.
    """
    half, corners = np.empty((ROOM, 3)), np.empty((ROOM, 3))
    for on in range(2):
        made = new_programme(year.steps, on)
        for h in range(len(caps)):
            step = first + h
            alive[h, on] = 0
            if year.curves.count[step, on] < 1 or year.least[step, on] > caps[h] + SLACK_MW:
                continue
            if year.largest[step, on] <= caps[h] and surcharges[h, on] == 0.0:
                alive[h, on] = 1
                for i in range(stage.shape[2]):
                    stage[h, on, i] = year.free[step, on, i]
                continue
            cap = max(caps[h], year.least[step, on])
            alive[h, on] = _capped_step(
                year, made, step, on, cap, surcharges[h, on], half, corners, stage[h, on]
            )
            if alive[h, on] < 0:
                return False
    return True


@compiled
def _clamp(z: FloatArray, grid: FloatArray, scale: float, capacity: float) -> None:
    """Keep slopes between minus the capacity and zero: the level stays in the store."""
    count, low = len(z), 0
    while low < count - 1 and z[low + 1] - z[low] < -capacity * (grid[low + 1] - grid[low]) * scale:
        low += 1
    for i in range(low):
        z[i] = z[low] + capacity * (grid[low] - grid[i]) * scale
    high = low
    while high < count - 1 and z[high + 1] <= z[high]:
        high += 1
    for i in range(high + 1, count):
        z[i] = z[high]


@compiled
def _change_grid(
    old: FloatArray, new: FloatArray, scale: float, capacity: float, row: FloatArray, out: FloatArray
) -> None:
    """A conjugate from one day's prices to the day's before, chords between grid points."""
    j, last = 0, len(old) - 1
    for i in range(len(new)):
        price = new[i] / scale
        if price >= old[last]:
            out[i] = row[last]
        elif price <= old[0]:
            out[i] = row[0] + capacity * (old[0] - price) * scale
        else:
            while old[j + 1] < price:
                j += 1
            part = (price - old[j]) / (old[j + 1] - old[j])
            out[i] = row[j] + part * (row[j + 1] - row[j])


@compiled
def _choose(
    year: Year, step: int, x: int, z: FloatArray, possible: IntArray, out: FloatArray
) -> None:
    """The better of the states that may follow, price by price."""
    for i in range(len(out)):
        out[i] = HOPELESS
    for option in range(2):
        y = year.following[x, option]
        if y < 0 or possible[y] == 0:
            continue
        paid = year.start_cost[step] if year.starts[x, option] == 1 else 0.0
        for i in range(len(out)):
            out[i] = max(out[i], z[y, i] - paid)


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
    row, possible = np.empty(prices), np.zeros(states, np.int64)
    for h in range(stage.shape[0] - 1, -1, -1):
        step = first + h
        grid, scale = year.grid[year.day[step]], year.scale[step]
        if kept_values.shape[0] > 0:
            for x in range(states):
                for i in range(prices):
                    kept_values[h, x, i] = here[x, i]
        for y in range(states):
            on = year.running[y]
            possible[y] = alive[h, on]
            if possible[y] == 1:
                for i in range(prices):
                    z[y, i] = here[y, i] - stage[h, on, i]
                _clamp(z[y], grid, scale, year.kept * year.capacity)
        for x in range(states):
            if year.first_of_day[step] == 1:
                _choose(year, step, x, z, possible, row)
                new = year.grid[year.day[step - 1] if step > 0 else 0]
                _change_grid(grid, new, scale * year.kept, year.capacity, row, before[x])
            else:
                _choose(year, step, x, z, possible, before[x])
        here, before = before, here
    return here

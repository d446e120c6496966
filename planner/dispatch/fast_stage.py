"""What one step costs at every price of stored heat, with import free or capped.

`Year` is a year made ready for the sweeps; the conjugate of a step is its least cost less the value
of the heat that it stores.
"""

from typing import NamedTuple

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.fast_compile import compiled
from planner.dispatch.fast_curves import ROOM, Curves, Programme, curve, load_step, new_programme
from planner.dispatch.fast_shape import CHARGE, DISCHARGE, IMPORT, Steps
from planner.dispatch.fast_simplex import solve, value

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
    """Least cost less the value of the heat stored, at every price of the grid.

    Parameters
    ----------
    corners : array, shape (room, 3)
        Curve of a step over heat into the store.
    count : int
        Corners that it has.
    grid : array, shape (prices,)
        Prices of stored heat at the day's end.
    scale : float [-]
        Price at the step's end over that at its day's end.
    out : array, shape (prices,)
        Filled.
    """
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
def cheapest_import(
    corners: FloatArray, count: int, cap: float, price: float
) -> tuple[float, float]:
    """Least cost with import at a price and below a cap, and that import.

    Parameters
    ----------
    corners : array, shape (room, 3)
        Curve of a step over import.
    count : int
        Corners that it has.
    cap : float [MW]
        Most import.
    price : float [currency/MW]
        Of import.

    Returns
    -------
    tuple of float [currency] and float [MW]
        Cost with import paid, and import.
    """
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
    """Least import with which each step is possible at all, whatever the store does.

    Parameters
    ----------
    steps : Steps
        Programmes.
    curves : Curves
        With import free.

    Returns
    -------
    array, shape (steps, 2) [MW]
        Off and on.
    """
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
    """Conjugates and largest imports of all steps with import free.

    Parameters
    ----------
    steps : Steps
        Programmes.
    curves : Curves
        With import free.
    grid : array, shape (days, prices)
        Prices of stored heat at the end of each day.
    day : array of int, shape (steps,)
        Day of each step.
    scale : array, shape (steps,)
        Price at a step's end over that at its day's end.

    Returns
    -------
    tuple of array, shape (steps, 2, prices) and array, shape (steps, 2) [MW]
        Conjugates, and largest imports.
    """
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

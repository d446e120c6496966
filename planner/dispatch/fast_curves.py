"""A step's least cost as a convex curve: over heat into the store, or over import.

Without a store, import is what couples the steps of a month; with one, the store's heat couples
all of them, and import is held below a cap inside the step.
"""

from typing import NamedTuple

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch import fast_parametric, fast_simplex
from planner.dispatch.fast_compile import compiled
from planner.dispatch.fast_shape import CHARGE, DISCHARGE, IMPORT, Steps

#: Corners of a curve that there is room for.
ROOM = 40


class Curves(NamedTuple):
    """Curves of all steps, off and on.

    Parameters
    ----------
    corners : array, shape (steps, 2, room, 3)
        Moving quantity [MW], cost without it where it is import, and import [MW], at each corner.
    count : array of int, shape (steps, 2)
        How many corners; 0 where the state is impossible, -1 where the method failed.
    """

    corners: FloatArray
    count: IntArray  # type: ignore[assignment]  # a field here, not the tuple's method


class Programme(NamedTuple):
    """Work space for one step's programme."""

    work: fast_simplex.Tableau
    matrix: FloatArray
    cost: FloatArray
    upper: FloatArray
    rhs: FloatArray


@compiled
def new_programme(steps: Steps, on: int) -> Programme:
    """Work space for the off or the on state, the parts that never change filled in.

    Parameters
    ----------
    steps : Steps
        Programmes of all steps.
    on : int
        0 for the off state, 1 for the on state.

    Returns
    -------
    Programme
        For `load_step`.
    """
    rows, columns = steps.off_rows, steps.off_columns
    if on == 1:
        rows += 1
        columns = steps.matrix.shape[1] + steps.corner_cost.shape[1]
    made = Programme(
        fast_simplex.new_tableau(rows, columns),
        np.zeros((rows, columns)),
        np.zeros(columns),
        np.full(columns, np.inf),
        np.zeros(rows),
    )
    fixed = min(columns, steps.matrix.shape[1])
    for j in range(fixed):
        made.upper[j] = steps.upper[j]
        for i in range(rows):
            made.matrix[i, j] = steps.matrix[i, j]
    return made


@compiled
def load_step(made: Programme, steps: Steps, step: int, cap: float, surcharge: float) -> None:
    """Fill in a step, with import capped and surcharged; the store stands still.

    Parameters
    ----------
    made : Programme
        Changed.
    steps : Steps
        Programmes of all steps.
    step : int
        Which.
    cap : float [MW]
        Most import.
    surcharge : float [currency/MW]
        Added to the price of import.
    """
    rows, columns = made.matrix.shape
    fixed = min(columns, steps.matrix.shape[1])
    for j in range(fixed):
        made.cost[j] = steps.cost[step, j]
    for c in range(columns - fixed):
        made.cost[fixed + c] = steps.corner_cost[step, c]
        for i in range(rows):
            made.matrix[i, fixed + c] = steps.corner_entries[step, c, i]
    for i in range(rows):
        made.rhs[i] = steps.demand[step, i]
    made.upper[IMPORT] = min(cap, steps.upper[IMPORT])
    made.cost[IMPORT] += surcharge
    made.upper[CHARGE] = made.upper[DISCHARGE] = 0.0


@compiled
def _solve(made: Programme) -> int:
    """Minimise the loaded step."""
    return fast_simplex.solve(made.work, made.matrix, made.cost, made.upper, made.rhs)


@compiled
def _column(made: Programme, column: int) -> float:
    """Value of a column after solving."""
    rows, columns = made.matrix.shape
    values = np.empty(columns)
    fast_simplex.solution(made.work, rows, columns, values)
    return values[column]


@compiled
def _begin_with_store(made: Programme, steps: Steps) -> tuple[int, float]:
    """Solve with the store standing still, or moving where nothing else is possible."""
    status = _solve(made)
    if status != 0:
        return status, 0.0
    made.upper[CHARGE], made.upper[DISCHARGE] = steps.upper[CHARGE], steps.upper[DISCHARGE]
    status = _solve(made)
    start = 0.0
    if status == 1:
        start = _column(made, CHARGE) - _column(made, DISCHARGE)
        made.rhs[steps.moving_row] += start
        made.upper[CHARGE] = made.upper[DISCHARGE] = 0.0
        # A solution existed at this very point, so an empty programme here is rounding.
        status = _solve(made)
        if status == 0:
            status = fast_simplex.FAILED
    return status, start


@compiled
def _begin_with_import(made: Programme) -> tuple[int, float]:
    """Solve with the cheapest import, then without any beside that one."""
    status = _solve(made)
    start = 0.0
    if status == 1:
        start = _column(made, IMPORT)
        made.rhs[0] -= start
        made.upper[IMPORT] = 0.0
        status = _solve(made)
        if status == 0:
            status = fast_simplex.FAILED
    return status, start


@compiled
def curve(
    made: Programme,
    steps: Steps,
    step: int,
    cap: float,
    surcharge: float,
    half: FloatArray,
    corners: FloatArray,
) -> int:
    """One step's curve.

    Parameters
    ----------
    made : Programme
        Of the state.
    steps : Steps
        The year.
    step : int
        Which.
    cap, surcharge : float
        Limit on import [MW] and addition to its price [currency/MW]; with a store only.
    half : array, shape (room, 3)
        Work space.
    corners : array, shape (room, 3)
        Filled in rising order.

    Returns
    -------
    int
        How many corners; 0 if impossible, -1 if the method failed.
    """
    rows, columns = made.matrix.shape
    load_step(made, steps, step, cap, surcharge)
    stored = steps.moving_row > 0
    status, start = _begin_with_store(made, steps) if stored else _begin_with_import(made)
    if status != 1:
        return status
    turn = 1.0 if stored else -1.0
    kept_level, kept_body = made.work.level.copy(), made.work.body.copy()
    kept_reduced, kept_basis = made.work.reduced.copy(), made.work.basis.copy()
    kept_upper = made.work.at_upper.copy()
    down = fast_parametric.sweep(
        made.work, rows, columns, steps.moving_row, turn * (steps.lowest - start), IMPORT, half
    )
    made.work.level[:], made.work.body[:, :] = kept_level, kept_body
    made.work.reduced[:], made.work.basis[:] = kept_reduced, kept_basis
    made.work.at_upper[:] = kept_upper
    if down < 0 or down > corners.shape[0]:
        return fast_simplex.FAILED
    for k in range(down):
        corners[k] = half[down - 1 - k]
    up = fast_parametric.sweep(
        made.work, rows, columns, steps.moving_row, turn * (steps.highest - start), IMPORT, half
    )
    if up < 0 or down + up - 1 > corners.shape[0]:
        return fast_simplex.FAILED
    for k in range(1, up):
        corners[down - 1 + k] = half[k]
    for k in range(down + up - 1):
        corners[k, 0] = start + turn * corners[k, 0]
    return down + up - 1


@compiled
def all_curves(steps: Steps) -> Curves:
    """Curves of all steps with import free.

    Parameters
    ----------
    steps : Steps
        The year.

    Returns
    -------
    Curves
        Off and on.
    """
    count = steps.demand.shape[0]
    found = Curves(np.zeros((count, 2, ROOM, 3)), np.zeros((count, 2), np.int64))
    half = np.empty((ROOM, 3))
    for on in range(2):
        made = new_programme(steps, on)
        for step in range(count):
            if steps.possible[step, on] == 1:
                found.count[step, on] = curve(
                    made, steps, step, np.inf, 0.0, half, found.corners[step, on]
                )
    return found

"""The optimum of a tiny programme followed as one right-hand side moves, corner by corner."""

import numpy as np

from planner.arrays import FloatArray
from planner.dispatch.fast_compile import compiled
from planner.dispatch.fast_simplex import (
    FAILED,
    MOST_PIVOTS,
    TOLERANCE,
    Tableau,
    pivot,
    value,
)


@compiled
def _column_value(work: Tableau, rows: int, column: int) -> float:
    """Value of one column."""
    for i in range(rows):
        if work.basis[i] == column:
            return work.level[i]
    return work.upper[column] if work.at_upper[column] == 1 else 0.0


@compiled
def _first_bound(work: Tableau, rows: int, moving: int, direction: float) -> tuple[int, float]:
    """Row whose column meets a bound first as a right-hand side moves, and after how much."""
    row, room = -1, np.inf
    for i in range(rows):
        rate = direction * work.body[i, moving]
        if rate < -TOLERANCE:
            here = max(work.level[i], 0.0) / -rate
        elif rate > TOLERANCE:
            here = max(work.upper[work.basis[i]] - work.level[i], 0.0) / rate
        else:
            continue
        if here < room:
            row, room = i, here
    return row, room


@compiled
def _dual_entering(work: Tableau, wide: int, row: int, leaves_at_upper: bool) -> int:
    """Column that takes a leaving one's place at the least cost, or -1 where nothing can."""
    best, least, strongest = -1, np.inf, 0.0
    for j in range(wide):
        if work.upper[j] <= 0.0 or j == work.basis[row]:
            continue
        entry = work.body[row, j] if leaves_at_upper else -work.body[row, j]
        if work.at_upper[j] == 1:
            entry = -entry
        if entry <= TOLERANCE:
            continue
        ratio = abs(work.reduced[j]) / entry
        if ratio < least - TOLERANCE or (ratio < least + TOLERANCE and entry > strongest):
            best, least, strongest = j, min(ratio, least), entry
    return best


@compiled
def _exchange(work: Tableau, rows: int, wide: int, row: int, leaves_at_upper: bool) -> bool:
    """One step of the dual method; False where the range of solutions ends."""
    entering = _dual_entering(work, wide, row, leaves_at_upper)
    if entering < 0:
        return False
    start = work.upper[entering] if work.at_upper[entering] == 1 else 0.0
    work.at_upper[work.basis[row]] = 1 if leaves_at_upper else 0
    work.at_upper[entering] = 0
    pivot(work, rows, wide, row, entering)
    work.level[row] = start
    return True


@compiled
def sweep(
    work: Tableau,
    rows: int,
    columns: int,
    moving_row: int,
    travel: float,
    watched: int,
    corners: FloatArray,
) -> int:
    """Follow the optimum as one right-hand side moves.

    Parameters
    ----------
    work : Tableau
        Solved.
    rows, columns : int
        Size of the programme.
    moving_row : int
        Whose right-hand side moves.
    travel : float
        How far, up or down.
    watched : int
        Column whose value is noted at each corner.
    corners : array, shape (room, 3)
        Filled with distance moved (signed), cost and the watched column's value where the slope
        changes, the starting point included.

    Returns
    -------
    int
        How many corners, or -1 if the method failed.
    """
    wide, moving = columns + rows, columns + moving_row
    direction = work.sign[moving_row] * (1.0 if travel >= 0.0 else -1.0)
    length, gone, cost, count = abs(travel), 0.0, value(work, rows, columns), 1
    corners[0, 0], corners[0, 1] = 0.0, cost
    corners[0, 2] = _column_value(work, rows, watched)
    for _ in range(MOST_PIVOTS):
        row, room = _first_bound(work, rows, moving, direction)
        arrives = room >= length - gone
        step = length - gone if arrives else room
        rising = row >= 0 and direction * work.body[row, moving] > 0.0
        cost -= work.reduced[moving] * direction * step
        for i in range(rows):
            work.level[i] += direction * step * work.body[i, moving]
        gone += step
        if step > TOLERANCE:
            if count == corners.shape[0]:
                return FAILED
            corners[count, 0] = gone if travel >= 0.0 else -gone
            corners[count, 1] = cost
            corners[count, 2] = _column_value(work, rows, watched)
            count += 1
        if arrives or not _exchange(work, rows, wide, row, rising):
            return count
    return FAILED

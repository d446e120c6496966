"""A step's dispatch as a tiny linear programme, solved over a whole range of one right-hand side.

A step has five or six balances and about fifteen columns, so that a dense tableau of the bounded
simplex method fits in the processor's nearest cache, and the next corner of the optimum over a
right-hand side is one dual pivot away. All columns lie between zero and their upper bound.
"""

from typing import NamedTuple

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.fast_compile import compiled

#: Reduced costs, pivots and slacks below this are taken for zero (the programme is in MW).
TOLERANCE = 1e-9

#: What is left of a balance, above which no solution exists [MW].
OPEN_MW = 1e-7

#: Cost of leaving a balance open while a first solution is sought [currency/MW].
PENALTY = 1e7

#: More pivots than this are a cycle.
MOST_PIVOTS = 500

FAILED = -1


class Tableau(NamedTuple):
    """Work space of one tiny programme; columns of penalties stand behind its own.

    Parameters
    ----------
    body : array, shape (rows, columns + rows)
        Current tableau.
    reduced : array, shape (columns + rows,)
        Reduced costs.
    cost, upper : arrays, shape (columns + rows,)
        Cost and upper bound of each column.
    at_upper : array of int, shape (columns + rows,)
        1 where a column outside the basis stands at its upper bound.
    basis : array of int, shape (rows,)
        Column of each row.
    level : array, shape (rows,)
        Value of each row's column.
    sign : array, shape (rows,)
        -1 where a row was turned to make its right-hand side positive.
    """

    body: FloatArray
    reduced: FloatArray
    cost: FloatArray
    upper: FloatArray
    at_upper: IntArray
    basis: IntArray
    level: FloatArray
    sign: FloatArray


@compiled
def new_tableau(rows: int, columns: int) -> Tableau:
    """Work space for programmes up to a size.

    Parameters
    ----------
    rows, columns : int
        Size of the programme.

    Returns
    -------
    Tableau
        Empty.
    """
    wide = columns + rows
    return Tableau(
        np.zeros((rows, wide)),
        np.zeros(wide),
        np.zeros(wide),
        np.zeros(wide),
        np.zeros(wide, np.int64),
        np.zeros(rows, np.int64),
        np.zeros(rows),
        np.ones(rows),
    )


@compiled
def _fill(
    work: Tableau, matrix: FloatArray, cost: FloatArray, upper: FloatArray, rhs: FloatArray
) -> None:
    """Set up a programme with every balance open at a penalty."""
    rows, columns = matrix.shape
    for j in range(columns):
        work.cost[j] = cost[j]
        work.upper[j] = upper[j]
        work.at_upper[j] = 0
        work.reduced[j] = cost[j]
    for i in range(rows):
        sign = -1.0 if rhs[i] < 0.0 else 1.0
        work.sign[i] = sign
        work.level[i] = sign * rhs[i]
        work.basis[i] = columns + i
        work.cost[columns + i] = PENALTY
        work.upper[columns + i] = np.inf
        work.at_upper[columns + i] = 0
        work.reduced[columns + i] = 0.0
        for k in range(rows):
            work.body[i, columns + k] = 1.0 if k == i else 0.0
        for j in range(columns):
            work.body[i, j] = sign * matrix[i, j]
            work.reduced[j] -= PENALTY * work.body[i, j]


@compiled
def pivot(work: Tableau, rows: int, wide: int, row: int, entering: int) -> None:
    """Bring a column into the basis in place of a row's.

    Parameters
    ----------
    work : Tableau
        Changed.
    rows, wide : int
        Its rows, and its columns with those of penalties.
    row, entering : int
        Row whose column leaves, and the column that takes its place.
    """
    body, reduced = work.body, work.reduced
    scale = 1.0 / body[row, entering]
    for j in range(wide):
        body[row, j] *= scale
    for i in range(rows):
        if i != row:
            factor = body[i, entering]
            if factor != 0.0:
                for j in range(wide):
                    body[i, j] -= factor * body[row, j]
    factor = reduced[entering]
    for j in range(wide):
        reduced[j] -= factor * body[row, j]
    work.basis[row] = entering


@compiled
def _best_entering(work: Tableau, wide: int, tolerance: float, first_found: bool) -> int:
    """Column whose move lowers the cost fastest, or -1; the first found where cycles threaten."""
    best, fastest = -1, tolerance
    for j in range(wide):
        if work.upper[j] <= 0.0:
            continue
        gain = work.reduced[j] if work.at_upper[j] == 1 else -work.reduced[j]
        if gain > fastest:
            if first_found:
                return j
            fastest, best = gain, j
    return best


@compiled
def _blocking_row(work: Tableau, rows: int, entering: int, sense: float) -> tuple[int, float]:
    """Row that stops an entering column first, and how far it gets; row -1 for its own bound."""
    row, step, strongest = -1, work.upper[entering], 0.0
    for i in range(rows):
        fall = sense * work.body[i, entering]
        if fall > TOLERANCE:
            room = max(work.level[i], 0.0) / fall
        elif fall < -TOLERANCE:
            room = max(work.upper[work.basis[i]] - work.level[i], 0.0) / -fall
        else:
            continue
        if room < step - TOLERANCE or (room < step + TOLERANCE and abs(fall) > strongest):
            row, step, strongest = i, min(room, step), abs(fall)
    return row, step


@compiled
def _move(work: Tableau, rows: int, wide: int, entering: int) -> None:
    """One step of the primal method."""
    sense = -1.0 if work.at_upper[entering] == 1 else 1.0
    row, step = _blocking_row(work, rows, entering, sense)
    for i in range(rows):
        work.level[i] -= sense * step * work.body[i, entering]
    if row < 0:
        work.at_upper[entering] = 1 - work.at_upper[entering]
        return
    falling = sense * work.body[row, entering] > 0.0
    work.at_upper[work.basis[row]] = 0 if falling else 1
    pivot(work, rows, wide, row, entering)
    work.level[row] = step if sense > 0.0 else work.upper[entering] - step
    work.at_upper[entering] = 0


@compiled
def _descend(work: Tableau, rows: int, wide: int, tolerance: float) -> bool:
    """Move until no column lowers the cost; False where that never ends."""
    for count in range(MOST_PIVOTS):
        entering = _best_entering(work, wide, tolerance, count > MOST_PIVOTS // 2)
        if entering < 0:
            return True
        _move(work, rows, wide, entering)
    return False


@compiled
def _true_costs(work: Tableau, rows: int, columns: int) -> None:
    """Reduced costs without penalties; balances stay closed from here."""
    wide = columns + rows
    for i in range(rows):
        work.cost[columns + i] = 0.0
        work.upper[columns + i] = 0.0
    for j in range(wide):
        reduced = work.cost[j]
        for i in range(rows):
            reduced -= work.cost[work.basis[i]] * work.body[i, j]
        work.reduced[j] = reduced
    for i in range(rows):
        work.reduced[work.basis[i]] = 0.0


@compiled
def solve(
    work: Tableau, matrix: FloatArray, cost: FloatArray, upper: FloatArray, rhs: FloatArray
) -> int:
    """Minimise.

    Parameters
    ----------
    work : Tableau
        At least as large as the programme.
    matrix : array, shape (rows, columns)
        Coefficients.
    cost, upper : arrays, shape (columns,)
        Costs and upper bounds; lower bounds are zero.
    rhs : array, shape (rows,)
        Right-hand sides, all of them equations.

    Returns
    -------
    int
        1 if solved, 0 if no solution exists, -1 if the method failed.
    """
    rows, columns = matrix.shape
    wide = columns + rows
    _fill(work, matrix, cost, upper, rhs)
    if not _descend(work, rows, wide, PENALTY * 1e-13 + TOLERANCE):
        return FAILED
    for i in range(rows):
        if work.basis[i] >= columns and work.level[i] > OPEN_MW:
            return 0
    _true_costs(work, rows, columns)
    return 1 if _descend(work, rows, wide, TOLERANCE) else FAILED


@compiled
def value(work: Tableau, rows: int, columns: int) -> float:
    """Cost of the current solution.

    Parameters
    ----------
    work : Tableau
        Solved.
    rows, columns : int
        Size of the programme.

    Returns
    -------
    float
        Cost of columns in the basis and at their upper bounds.
    """
    total = 0.0
    for j in range(columns):
        if work.at_upper[j] == 1:
            total += work.cost[j] * work.upper[j]
    for i in range(rows):
        total += work.cost[work.basis[i]] * work.level[i]
    return total


@compiled
def solution(work: Tableau, rows: int, columns: int, values: FloatArray) -> None:
    """Write the value of every column.

    Parameters
    ----------
    work : Tableau
        Solved.
    rows, columns : int
        Size of the programme.
    values : array, shape (columns,)
        Filled.
    """
    for j in range(columns):
        values[j] = work.upper[j] if work.at_upper[j] == 1 else 0.0
    for i in range(rows):
        if work.basis[i] < columns:
            values[work.basis[i]] = work.level[i]

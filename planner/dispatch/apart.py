"""A linear programme taken apart into pieces that share no free column.

With the unit's state fixed, hours hang together only through the month's peaks and the store's
level; where the level is fixed too at the months' borders, the year falls into months. Solved one
by one they take half the time of the whole, and give the same optimum and the same duals.
"""

from dataclasses import dataclass

import highspy
import numpy as np
from scipy import sparse
from scipy.sparse.csgraph import connected_components

from planner.arrays import FloatArray, IntArray
from planner.dispatch.solver import Answer, InfeasibleError, run_linear

#: Pieces are put together until they have about so many columns: a solver's start costs time too.
FEWEST_COLUMNS = 9_000

#: HiGHS's own tolerance on rows.
ROW_TOLERANCE = 1e-7


@dataclass(frozen=True)
class LinearArrays:
    """A linear programme as arrays.

    Parameters
    ----------
    cost, low, high : array, shape (columns,)
        Cost and bounds of each column.
    row_low, row_high : array, shape (rows,)
        Bounds of each row.
    matrix : sparse matrix, shape (rows, columns)
        Coefficients, by columns.
    offset : float [currency]
        Added to the cost.
    """

    cost: FloatArray
    low: FloatArray
    high: FloatArray
    row_low: FloatArray
    row_high: FloatArray
    matrix: sparse.csc_matrix
    offset: float

    def model(self) -> highspy.HighsLp:
        """The programme in HiGHS's own form.

        Returns
        -------
        HighsLp
            All columns continuous.
        """
        model = highspy.HighsLp()
        model.num_row_, model.num_col_ = self.matrix.shape
        model.col_cost_ = self.cost
        model.col_lower_, model.col_upper_ = self.low, self.high
        model.row_lower_, model.row_upper_ = self.row_low, self.row_high
        model.offset_ = self.offset
        model.a_matrix_.format_ = highspy.MatrixFormat.kColwise
        model.a_matrix_.start_ = self.matrix.indptr
        model.a_matrix_.index_ = self.matrix.indices
        model.a_matrix_.value_ = self.matrix.data
        return model


def solve_apart(arrays: LinearArrays) -> Answer:
    """Solve a linear programme piece by piece.

    Parameters
    ----------
    arrays : LinearArrays
        Columns whose bounds meet are fixed and hold nothing together.

    Returns
    -------
    Answer
        The optimum of the whole, with duals.

    Raises
    ------
    InfeasibleError
        If there is no solution.
    SolveError
        If HiGHS fails.
    """
    fixed = arrays.low == arrays.high
    values = np.where(fixed, arrays.low, 0.0)
    brought = np.asarray(arrays.matrix @ values)
    row_low, row_high = arrays.row_low - brought, arrays.row_high - brought
    free = np.flatnonzero(~fixed)
    by_row = sparse.csr_matrix(arrays.matrix[:, free])
    row_piece, column_piece = _pieces(by_row)
    duals = np.zeros(len(row_low))
    objective = arrays.offset + float(arrays.cost @ values)
    _refuse_broken_rows(by_row, row_low, row_high)
    for piece in np.unique(column_piece):
        rows = np.flatnonzero(row_piece == piece)
        columns = np.flatnonzero(column_piece == piece)
        places = free[columns]
        part = LinearArrays(
            cost=arrays.cost[places],
            low=arrays.low[places],
            high=arrays.high[places],
            row_low=row_low[rows],
            row_high=row_high[rows],
            matrix=sparse.csc_matrix(by_row[rows][:, columns]),
            offset=0.0,
        )
        answer = run_linear(part.model())
        values[places], duals[rows] = answer.column_values, answer.row_duals
        objective += answer.objective
    return Answer(column_values=values, objective=objective, bound=objective, row_duals=duals)


def _refuse_broken_rows(by_row: sparse.csr_matrix, low: FloatArray, high: FloatArray) -> None:
    """Raise where fixed columns alone break a row that no free column can mend."""
    alone = np.diff(by_row.indptr) == 0
    broken = alone & ((low > ROW_TOLERANCE) | (high < -ROW_TOLERANCE))
    if broken.any():
        raise InfeasibleError(f"{int(broken.sum())} rows are broken by what was fixed")


def _pieces(matrix: sparse.csr_matrix) -> tuple[IntArray, IntArray]:
    """Number of the piece of each row and of each column, in the order of the columns."""
    rows, columns = matrix.shape
    entries = matrix.tocoo()
    links = sparse.coo_matrix(
        (np.ones(entries.nnz), (entries.row, entries.col + rows)),
        shape=(rows + columns, rows + columns),
    )
    _, label = connected_components(links, directed=False)
    sizes = np.bincount(label[rows:], minlength=int(label.max()) + 1)
    piece = np.cumsum(sizes) // FEWEST_COLUMNS
    return piece[label[:rows]].astype(np.int64), piece[label[rows:]].astype(np.int64)

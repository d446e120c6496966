"""A mixed-integer linear programme assembled from whole arrays and handed to HiGHS.

The dispatch states hundreds of thousands of rows that differ only in their hour. Here a family of
columns or rows is one call with arrays, so that a month is put together in milliseconds; the same
problem written row by row for the reader is in `record`.
"""

import highspy
import numpy as np
from scipy import sparse

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.apart import LinearArrays, solve_apart
from planner.dispatch.solver import INFINITY, NO_ANSWER, Answer, run_whole

Term = tuple[FloatArray | float, IntArray]


class Program:
    """Columns and rows, family by family."""

    def __init__(self) -> None:
        self._low: list[FloatArray] = []
        self._high: list[FloatArray] = []
        self._cost: list[FloatArray] = []
        self._whole: list[BoolArray] = []
        self._further_cost: list[tuple[IntArray, float]] = []
        self._entries: list[tuple[IntArray, IntArray, FloatArray]] = []
        self._row_low: list[FloatArray] = []
        self._row_high: list[FloatArray] = []
        self.columns = 0
        self.rows = 0
        self.offset = 0.0

    def add_columns(
        self,
        count: int,
        *,
        low: FloatArray | float = 0.0,
        high: FloatArray | float = INFINITY,
        cost: FloatArray | float = 0.0,
        whole: bool = False,
    ) -> IntArray:
        """Add a family of columns.

        Parameters
        ----------
        count : int
            How many.
        low, high, cost : float or array, shape (count,)
            Bounds and cost of each.
        whole : bool
            Whether they must be whole numbers.

        Returns
        -------
        array of int, shape (count,)
            Their numbers.
        """
        for store, value in ((self._low, low), (self._high, high), (self._cost, cost)):
            store.append(np.broadcast_to(np.asarray(value, dtype=np.float64), (count,)))
        self._whole.append(np.full(count, whole))
        self.columns += count
        return np.arange(self.columns - count, self.columns, dtype=np.int64)

    def add_to_cost(self, columns: IntArray, cost: float) -> None:
        """Add to the cost of columns that stand already.

        Parameters
        ----------
        columns : array of int
            Column numbers, each once.
        cost : float
            Added to the cost of each.
        """
        self._further_cost.append((columns, cost))

    def add_rows(
        self,
        terms: list[Term],
        *,
        low: FloatArray | float = -INFINITY,
        high: FloatArray | float = INFINITY,
    ) -> IntArray:
        """Add a family of rows, each the sum of one entry of every term.

        Parameters
        ----------
        terms : list of (coefficient, columns)
            Coefficients (float or array) and column numbers; all columns have the same length.
        low, high : float or array, shape (rows,)
            Bounds of each row.

        Returns
        -------
        array of int, shape (rows,)
            Their numbers.
        """
        count = len(terms[0][1])
        numbers = np.arange(self.rows, self.rows + count, dtype=np.int64)
        for coefficient, columns in terms:
            factors = np.broadcast_to(np.asarray(coefficient, dtype=np.float64), (count,))
            self._entries.append((numbers, columns, factors))
        for store, value in ((self._row_low, low), (self._row_high, high)):
            store.append(np.broadcast_to(np.asarray(value, dtype=np.float64), (count,)))
        self.rows += count
        return numbers

    def add_to_rows(
        self, rows: IntArray, coefficient: FloatArray | float, columns: IntArray
    ) -> None:
        """Add further entries to rows that stand already.

        Parameters
        ----------
        rows : array of int
            Row numbers, repeated where a row gets several entries.
        coefficient : float or array
            One for each entry.
        columns : array of int
            One for each entry.
        """
        factors = np.broadcast_to(np.asarray(coefficient, dtype=np.float64), (len(rows),))
        self._entries.append((rows, columns, factors))

    def solve(self, *, gap_frac: float, time_limit_s: float, first: Answer = NO_ANSWER) -> Answer:
        """Solve with whole numbers, and read HiGHS's own bound.

        Parameters
        ----------
        gap_frac : float [-]
            Relative gap at which a solution is good enough.
        time_limit_s : float [s]
            After this the best solution so far is taken, with its honest bound.
        first : Answer
            A solution to begin with, if one is known.

        Returns
        -------
        Answer
            Best solution, if there was time for one, and bound.

        Raises
        ------
        InfeasibleError
            If there is no solution.
        SolveError
            If HiGHS fails.
        """
        model = self._model(np.concatenate(self._whole))
        return run_whole(model, gap_frac=gap_frac, time_limit_s=time_limit_s, first=first)

    def solve_relaxed(self, *, fixed: tuple[IntArray, FloatArray] | None = None) -> Answer:
        """Solve as a linear programme: no column need be whole.

        Parameters
        ----------
        fixed : tuple of columns and values, optional
            Columns that are fixed.

        Returns
        -------
        Answer
            The optimum, with duals.

        Raises
        ------
        InfeasibleError
            If there is no solution.
        SolveError
            If HiGHS fails.
        """
        return solve_apart(self._arrays(fixed))

    def _arrays(self, fixed: tuple[IntArray, FloatArray] | None) -> LinearArrays:
        """The programme as arrays, some columns fixed."""
        low, high = np.concatenate(self._low), np.concatenate(self._high)
        if fixed is not None:
            fixed_columns, values = fixed
            low[fixed_columns] = high[fixed_columns] = values
        rows, columns, factors = (np.concatenate(part) for part in zip(*self._entries, strict=True))
        cost = np.concatenate(self._cost)
        for dearer, further in self._further_cost:
            cost[dearer] += further
        return LinearArrays(
            cost=cost,
            low=low,
            high=high,
            row_low=np.concatenate(self._row_low),
            row_high=np.concatenate(self._row_high),
            matrix=sparse.csc_matrix((factors, (rows, columns)), shape=(self.rows, self.columns)),
            offset=self.offset,
        )

    def _model(self, whole: BoolArray) -> highspy.HighsLp:
        """The programme in HiGHS's own form, with whole numbers."""
        model = self._arrays(None).model()
        kinds = (highspy.HighsVarType.kContinuous, highspy.HighsVarType.kInteger)
        model.integrality_ = [kinds[int(is_whole)] for is_whole in whole]
        return model

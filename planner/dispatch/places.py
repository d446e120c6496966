"""Where each quantity and each balance of a year stands among a programme's columns and rows."""

from dataclasses import dataclass, field

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.program import Program, Term
from planner.dispatch.solver import Answer


@dataclass
class Columns:
    """Column numbers of each quantity, by step."""

    grid_import: IntArray
    grid_export: IntArray
    on: IntArray | None = None
    start: IntArray | None = None
    path_on: dict[str, IntArray] = field(default_factory=dict)
    path_segments: dict[str, list[IntArray]] = field(default_factory=dict)
    used: dict[str, IntArray] = field(default_factory=dict)
    heaters: list[tuple[str, IntArray]] = field(default_factory=list)
    chillers: list[IntArray] = field(default_factory=list)
    charge: IntArray | None = None
    discharge: IntArray | None = None
    level: IntArray | None = None
    peaks: list[tuple[int, IntArray]] = field(default_factory=list)
    outside: dict[str, IntArray] = field(default_factory=dict)

    def from_outside(self, carrier: str) -> list[Term]:
        """Supply from outside, where it is allowed."""
        return [(1.0, self.outside[carrier])] if carrier in self.outside else []


@dataclass
class Rows:
    """Row numbers of the balances whose duals are prices."""

    power: IntArray
    heat: dict[str, IntArray]
    level: IntArray | None = None
    peaks: list[tuple[IntArray, IntArray]] = field(default_factory=list)


@dataclass(frozen=True)
class WindowProgram:
    """A programme with the places of its quantities.

    Parameters
    ----------
    program : Program
        Ready to solve.
    columns : Columns
        Where each quantity stands.
    rows : Rows
        Where each balance stands.
    kept : float [-]
        Share of the store's level that a step keeps.
    """

    program: Program
    columns: Columns
    rows: Rows
    kept: float

    def level_values(self, answer: Answer, cuts: IntArray) -> FloatArray:
        """Value of stored heat at borders of the window.

        Parameters
        ----------
        answer : Answer
            With duals.
        cuts : array of int
            Steps that begin a piece, the window's end included.

        Returns
        -------
        array, shape (borders,) [currency/kWh]
            The end has the value of the beginning; all zero without a store.
        """
        if self.rows.level is None:
            return np.zeros(len(cuts))
        # A further kWh at a step's end is a right-hand side of `kept` in the step after it, and
        # what that takes off the cost is its value.
        duals = answer.row_duals[self.rows.level]
        return np.asarray(-self.kept * duals[np.append(cuts[:-1], 0)], dtype=np.float64)

    def segments_kW(self, values: FloatArray, shape: tuple[int, ...]) -> FloatArray:
        """Power in each segment, all paths together.

        Parameters
        ----------
        values : array, shape (columns,)
            Of a solution.
        shape : tuple of int
            Steps and segments.

        Returns
        -------
        array, shape (steps, segments) [kW]
            Above the minimum power.
        """
        filled_kW = np.zeros(shape)
        for copy in self.columns.path_segments.values():
            for k, part in enumerate(copy):
                filled_kW[:, k] += values[part]
        return filled_kW

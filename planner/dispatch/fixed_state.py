"""The year with the unit's state fixed: a linear programme, whose solution can be run."""

from dataclasses import dataclass

import numpy as np

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.commitment import starts_of
from planner.dispatch.months import borders, months_are_apart
from planner.dispatch.places import WindowProgram
from planner.dispatch.segment_order import SegmentOrder, mended_order, no_order
from planner.dispatch.solver import Answer
from planner.dispatch.window import Window
from planner.dispatch.year_program import build
from planner.errors import SolveError

#: Laying down the order of segments in some steps may break it in others; it settles in a few.
MOST_ROUNDS = 12


@dataclass(frozen=True)
class FixedYear:
    """A solved year.

    Parameters
    ----------
    window : Window
        All steps.
    on : array of bool, shape (steps,)
        State of the unit.
    order : SegmentOrder or None
        Segments whose order had to be laid down.
    built : WindowProgram
        The programme and the places of its quantities.
    answer : Answer
        Values, cost and duals.
    """

    window: Window
    on: BoolArray
    order: SegmentOrder | None
    built: WindowProgram
    answer: Answer

    @property
    def cost(self) -> float:
        """Cost of the year [currency]."""
        return self.answer.objective

    @property
    def levels_kWh(self) -> FloatArray | None:
        """Level of the store at the end of each step; None without a store."""
        places = self.built.columns.level
        return None if places is None else self.answer.column_values[places]

    def level_values(self, cuts: IntArray) -> FloatArray:
        """Value of stored heat at borders of the year.

        Parameters
        ----------
        cuts : array of int
            Steps that begin a piece, the year's end included.

        Returns
        -------
        array, shape (borders,) [currency/kWh]
            The year's end has the value of its beginning.
        """
        return self.built.level_values(self.answer, cuts)


def solve_fixed(window: Window, on: BoolArray, levels_kWh: FloatArray | None = None) -> FixedYear:
    """Solve a year with the unit's state fixed.

    Parameters
    ----------
    window : Window
        Steps that begin and end with the same level of the store.
    on : array of bool, shape (steps,)
        State of the unit; ignored where there is none.
    levels_kWh : array, shape (months,), optional [kWh]
        Level of the store at the end of each month, to be kept; the months are then solved apart,
        in half the time.

    Returns
    -------
    FixedYear
        With segments filled in order.

    Raises
    ------
    InfeasibleError
        If the site cannot be served with this state.
    SolveError
        If HiGHS fails.
    """
    if window.unit is None:
        built = build(window)
        return FixedYear(window, on, None, built, built.program.solve_relaxed())
    if not months_are_apart(window):
        levels_kWh = None
    order: SegmentOrder | None = None
    for _ in range(MOST_ROUNDS):
        built = build(window, order)
        answer = _solved(built, on, borders(window)[1:] - 1, levels_kWh)
        filled_kW = built.segments_kW(answer.column_values, window.unit.segment_power_kW.shape)
        last = order or no_order(window.unit)
        further = mended_order(window.unit, window.paths, filled_kW, on, last)
        if further is None:
            return FixedYear(window, on, order, built, answer)
        order = further
    raise SolveError("the order of the unit's segments did not settle")


def _solved(
    built: WindowProgram, on: BoolArray, ends: IntArray, levels_kWh: FloatArray | None
) -> Answer:
    """The programme with the state fixed, and the store's levels at months' ends where given."""
    if built.columns.on is None or built.columns.start is None:
        raise ValueError("a year with a unit has columns for its state")
    columns = np.concatenate([built.columns.on, built.columns.start])
    state = np.concatenate([on, starts_of(on)]).astype(np.float64)
    if levels_kWh is not None and built.columns.level is not None:
        columns = np.concatenate([columns, built.columns.level[ends]])
        state = np.concatenate([state, levels_kWh])
    return built.program.solve_relaxed(fixed=(columns, state))

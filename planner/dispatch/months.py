"""Months solved apart: a state to try, and a bound that holds for the year.

Cut at the borders of billing months, a year falls into pieces that share only the unit's state and
the store's level. With both left free at every border, and the level priced there alike on either
side, the pieces' bounds add up to a bound on the year, whatever the prices of the level. A year of
one piece keeps its level from end to beginning and is solved exactly.
"""

import time
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from itertools import pairwise

import numpy as np
from loky import ProcessPoolExecutor

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.commitment import mended
from planner.dispatch.hull_program import HullProgram, build_hull
from planner.dispatch.solver import NO_ANSWER, Answer
from planner.dispatch.window import Window, part_of
from planner.errors import SolveError

#: Steps of a piece where no charge cuts the year.
STEPS_WITHOUT_PERIODS = 730

#: Steps run whose state is above this.
HALF_ON = 0.5


@dataclass(frozen=True)
class MonthsAnswer:
    """All months solved.

    Parameters
    ----------
    bound : float [currency]
        Proven lower bound on the year's cost.
    on : array of bool, shape (steps,)
        State of the unit, month after month.
    in_time : bool
        Whether every month came to its gap before its time was over.
    """

    bound: float
    on: BoolArray
    in_time: bool


@dataclass(frozen=True)
class _Piece:
    """What one process needs to solve a month."""

    window: Window
    border_values: tuple[float, float] | None
    gap_frac: float


def borders(year: Window) -> IntArray:
    """Steps at which a new piece begins, the year's end included.

    Parameters
    ----------
    year : Window
        All steps.

    Returns
    -------
    array of int
        From 0 to the number of steps.
    """
    charges = year.prices.demand_charges
    if not charges:
        inner = np.arange(STEPS_WITHOUT_PERIODS, year.steps, STEPS_WITHOUT_PERIODS)
    else:
        changed = np.any([np.diff(charge.period) != 0 for charge in charges], axis=0)
        inner = np.flatnonzero(changed) + 1
    return np.concatenate([[0], inner, [year.steps]]).astype(np.int64)


def months_are_apart(year: Window) -> bool:
    """Whether no billing period comes in two of the pieces.

    Parameters
    ----------
    year : Window
        All steps.

    Returns
    -------
    bool
        False where the last hour of a shifted local year falls into January again: its peak then
        holds two pieces together.
    """
    for charge in year.prices.demand_charges:
        pieces = [charge.period[first:after] for first, after in pairwise(borders(year))]
        if sum(len(np.unique(piece)) for piece in pieces) > len(np.unique(charge.period)):
            return False
    return True


def solve_months(
    year: Window,
    level_values: FloatArray,
    *,
    gap_frac: float,
    time_limit_s: float,
    processes: int = 1,
    progress: Callable[[float], None] = lambda _: None,
) -> MonthsAnswer:
    """Solve every piece of a year.

    Parameters
    ----------
    year : Window
        All steps, with a unit.
    level_values : array, shape (borders,) [currency/kWh]
        Value of stored heat at each border; the year's end has the value of its beginning.
    gap_frac : float [-]
        Gap at which a piece is good enough.
    time_limit_s : float [s]
        For all pieces together.
    processes : int
        Pieces solved at once.
    progress : callable
        Told the share that is done.

    Returns
    -------
    MonthsAnswer
        Bound and state.
    """
    cuts = borders(year)
    pieces = list(_pieces(year, cuts, level_values, gap_frac))
    on = np.zeros(year.steps, dtype=bool)
    bound, in_time = 0.0, True
    for number, answer in _answers(pieces, time_limit_s, processes):
        on[cuts[number] : cuts[number + 1]] = answer.on
        bound += answer.bound
        in_time &= answer.in_time
        progress((number + 1) / len(pieces))
    return MonthsAnswer(bound, on, in_time)


def _pieces(
    year: Window, cuts: IntArray, level_values: FloatArray, gap_frac: float
) -> Iterator[_Piece]:
    """The year's pieces, in order."""
    seen: set[int] = set()
    for number, (first, after) in enumerate(pairwise(cuts)):
        window = _without_seen_periods(part_of(year, int(first), int(after - first)), seen)
        values = float(level_values[number]), float(level_values[number + 1])
        whole_year = window.steps == year.steps
        yield _Piece(window, None if whole_year else values, gap_frac)


def _answers(
    pieces: list[_Piece], time_limit_s: float, processes: int
) -> Iterator[tuple[int, MonthsAnswer]]:
    """Answers in the order of the pieces; alone, each leaves the time it did not need."""
    if processes > 1:
        limit_s = time_limit_s * processes / len(pieces)
        with ProcessPoolExecutor(processes) as pool:
            yield from enumerate(pool.map(_solve_piece, pieces, [limit_s] * len(pieces)))
        return
    deadline = time.perf_counter() + time_limit_s
    for number, piece in enumerate(pieces):
        left_s = max(deadline - time.perf_counter(), 0.0)
        yield number, _solve_piece(piece, left_s / (len(pieces) - number))


def _solve_piece(piece: _Piece, time_limit_s: float) -> MonthsAnswer:
    """One month, begun from the best of some plain states."""
    started = time.perf_counter()
    hull = build_hull(piece.window, border_values=piece.border_values)
    relaxed = hull.program.solve_relaxed()
    leaning = relaxed.column_values[hull.on]
    first = _best_plain(piece.window, hull, leaning)
    if _short(first, relaxed.bound, piece.gap_frac):
        left_s = max(time_limit_s - (time.perf_counter() - started), 0.1)
        found = hull.program.solve(gap_frac=piece.gap_frac, time_limit_s=left_s, first=first)
        first = found if found.objective < first.objective else first
        bound = max(found.bound, relaxed.bound)
    else:
        bound = relaxed.bound
    on = first.column_values[hull.on] if first.found else leaning
    return MonthsAnswer(bound, on > HALF_ON, in_time=not _short(first, bound, piece.gap_frac))


def _short(answer: Answer, bound: float, gap_frac: float) -> bool:
    """Whether the gap is still open."""
    return not answer.found or answer.objective - bound > gap_frac * abs(answer.objective)


def _best_plain(window: Window, hull: HullProgram, leaning: FloatArray) -> Answer:
    """The cheapest of: what the relaxation leans to, always on, always off."""
    best = NO_ANSWER
    if window.unit is None:
        return best
    always = window.unit.available
    for state in (leaning > HALF_ON, always, np.zeros_like(always)):
        try:
            on = mended(state, window).astype(np.float64)
            tried = hull.program.solve_relaxed(fixed=(hull.on, on))
        except SolveError:  # this state cannot serve the site; another may
            continue
        best = tried if tried.objective < best.objective else best
    return best


def _without_seen_periods(piece: Window, seen: set[int]) -> Window:
    """A piece whose billing periods were charged in an earlier piece pays no demand again.

    Where the local year is shifted against the standard one, the last hour falls into January
    again; leaving its demand out keeps the bound below the truth.
    """
    charges = []
    for charge in piece.prices.demand_charges:
        periods = np.unique(piece.cut(charge.period))
        again = np.isin(charge.period, [period for period in periods if int(period) in seen])
        charges.append(replace(charge, counted=charge.counted & ~again) if again.any() else charge)
    for charge in piece.prices.demand_charges:
        seen.update(int(period) for period in np.unique(piece.cut(charge.period)))
    return replace(piece, prices=replace(piece.prices, demand_charges=tuple(charges)))

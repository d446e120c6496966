"""Months solved apart: commitments to try, and a bound that holds for the year.

Cut at the borders of billing months, a year falls into pieces that share only the unit's state and
the store's level. With both left free at every border, and the level priced there alike on either
side, the pieces' bounds add up to a bound on the year, whatever the prices of the level.
"""

from dataclasses import dataclass, replace

import numpy as np

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.window import Window, part_of
from planner.dispatch.year_program import build

#: Steps of a piece where no charge cuts the year.
STEPS_WITHOUT_PERIODS = 730


@dataclass(frozen=True)
class MonthsAnswer:
    """All months solved.

    Parameters
    ----------
    bound : float [currency]
        Proven lower bound on the year's cost.
    on : array of bool, shape (steps,)
        State of the unit, month after month.
    """

    bound: float
    on: BoolArray


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


def solve_months(
    year: Window, level_values: FloatArray, *, gap_frac: float, time_limit_s: float
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

    Returns
    -------
    MonthsAnswer
        Bound and state.
    """
    cuts = borders(year)
    on = np.zeros(year.steps, dtype=bool)
    bound = 0.0
    seen: set[int] = set()
    for number, (first, after) in enumerate(zip(cuts[:-1], cuts[1:], strict=True)):
        piece = _without_seen_periods(part_of(year, int(first), int(after - first)), seen)
        built = build(
            piece,
            start_value=float(level_values[number]),
            end_value=float(level_values[number + 1]),
        )
        share = (after - first) / year.steps
        answer = built.program.solve(gap_frac=gap_frac, time_limit_s=time_limit_s * share)
        bound += answer.bound
        if built.columns.on is not None:
            on[first:after] = answer.values[built.columns.on] > 0.5  # noqa: PLR2004 - a whole number
    return MonthsAnswer(bound, on)


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

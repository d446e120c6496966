"""Segments of a unit's power are filled in order, whatever their heat is worth.

A linear programme fills the segment that earns most. Where a later segment yields more heat for its
fuel, it may take that one first, which no machine can do. Such steps are found after the solve, the
order is laid down for them, and the year is solved again: what comes out can be run.
"""

from dataclasses import dataclass

import numpy as np

from planner.arrays import BoolArray, FloatArray
from planner.plant.envelope import ExhaustPath, UnitEnvelope

#: A segment is full or empty within this share of its width.
TOLERANCE_FRAC = 1e-7


@dataclass(frozen=True)
class SegmentOrder:
    """What was laid down.

    Parameters
    ----------
    full, empty : array of bool, shape (steps, segments)
        Segments that must be full while the unit is on, and those that must be empty.
    """

    full: BoolArray
    empty: BoolArray


def no_order(unit: UnitEnvelope) -> SegmentOrder:
    """Nothing laid down yet.

    Parameters
    ----------
    unit : UnitEnvelope
        Cut to the window.

    Returns
    -------
    SegmentOrder
        All false.
    """
    shape = unit.segment_power_kW.shape
    return SegmentOrder(np.zeros(shape, dtype=bool), np.zeros(shape, dtype=bool))


def mended_order(
    unit: UnitEnvelope,
    paths: tuple[ExhaustPath, ...],
    filled_kW: FloatArray,
    on: BoolArray,
    order: SegmentOrder,
) -> SegmentOrder | None:
    """Lay down the order where a solution breaks it.

    Parameters
    ----------
    unit : UnitEnvelope
        Cut to the window.
    paths : tuple of ExhaustPath
        Paths in use, cut to the window.
    filled_kW : array, shape (steps, segments) [kW]
        Power in each segment.
    on : array of bool, shape (steps,)
        State.
    order : SegmentOrder
        What was laid down before.

    Returns
    -------
    SegmentOrder or None
        More than before; None where nothing is broken.
    """
    width_kW = unit.segment_power_kW
    slack_kW = TOLERANCE_FRAC * unit.maximum_power_kW.max()
    full, empty = order.full.copy(), order.empty.copy()
    broken = np.zeros(len(on), dtype=bool)
    for k in range(width_kW.shape[1] - 1):
        room_kW = width_kW[:, k] - filled_kW[:, k]
        above_kW = filled_kW[:, k + 1 :].sum(axis=1)
        out_of_order = on & (room_kW > slack_kW) & (above_kW > slack_kW)
        out_of_order &= _differ(unit, paths, k)
        fills = out_of_order & (above_kW >= room_kW)
        full[fills, k] = True
        empty[out_of_order & ~fills, k + 1 :] = True
        broken |= out_of_order
    return SegmentOrder(full, empty & ~full) if broken.any() else None


def _differ(unit: UnitEnvelope, paths: tuple[ExhaustPath, ...], k: int) -> BoolArray:
    """Steps in which a later segment differs from this one in fuel or heat."""
    slopes = [unit.fuel_slope_lhv, *(s for path in paths for s in path.yield_slope.values())]
    return np.any([(s[:, k + 1 :] != s[:, [k]]).any(axis=1) for s in slopes], axis=0)

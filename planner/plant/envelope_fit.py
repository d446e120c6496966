"""A machine's year as piecewise-linear functions of net power, exact where the pieces meet."""

from itertools import pairwise

import numpy as np

from planner.arrays import BoolArray, FloatArray
from planner.plant.envelope import ExhaustPath, UnitEnvelope
from planner.plant.running import RunningPoint
from planner.plant.unit_year import UnitYear

#: Powers between minimum and maximum at which the pieces meet, as shares of the span.
NODES = (0.0, 0.5, 1.0)


def unit_envelope(
    year: UnitYear, costs: tuple[float, float, float]
) -> tuple[UnitEnvelope, RunningPoint, RunningPoint]:
    """The machine as piecewise-linear functions of net power, exact where the pieces meet.

    Parameters
    ----------
    year : UnitYear
        Exact model.
    costs : tuple of float [currency]
        By run hour, by kWh and by start, without fuel.

    Returns
    -------
    tuple of UnitEnvelope, RunningPoint and RunningPoint
        For the dispatch; the clean machine's full load, from which exact points are sought; and
        the aged machine at its minimum load.
    """
    full = year.full_load()
    aged_full = year.aged(full)
    maximum_kW = year.net_kW(aged_full)
    minimum_kW = year.minimum_load_frac * maximum_kW
    nodes_kW = [minimum_kW + share * (maximum_kW - minimum_kW) for share in NODES]
    points = [*(year.exact(node, full) for node in nodes_kW[:-1]), aged_full]
    fuels = [year.fuel_lhv_kW(point) for point in points]
    yields = [year.paths.yields_kW(point, year.machine.hours) for point in points]
    widths = np.column_stack([b - a for a, b in pairwise(nodes_kW)])
    per_hour, per_kWh, per_start = costs
    envelope = UnitEnvelope(
        name=year.unit.name,
        available=year.available & (maximum_kW > 0.0),
        minimum_power_kW=minimum_kW,
        maximum_power_kW=maximum_kW,
        segment_power_kW=widths,
        fuel_at_minimum_lhv_kW=fuels[0],
        fuel_slope_lhv=convex_slopes(_slopes(fuels, widths), widths),
        paths=tuple(_path(name, yields, widths) for name in year.paths.names),
        start_fuel_lhv_kWh=year.unit.start_fuel_lhv_kWh,
        minimum_up_h=year.unit.minimum_up_h,
        minimum_down_h=year.unit.minimum_down_h,
        cost_per_run_hour=per_hour,
        cost_per_kWh=per_kWh,
        cost_per_start=per_start,
    )
    return envelope, full, points[0]


def _path(
    name: str, yields: list[dict[str, dict[str, FloatArray]]], widths: FloatArray
) -> ExhaustPath:
    """A path's heat at minimum power and its slopes."""
    grades = yields[0][name]
    return ExhaustPath(
        name=name,
        yield_at_minimum_kW=dict(grades),
        yield_slope={
            grade: _slopes([at_node[name][grade] for at_node in yields], widths) for grade in grades
        },
    )


def _slopes(at_nodes: list[FloatArray], widths: FloatArray) -> FloatArray:
    """Rise over width of each piece, shape (steps, segments)."""
    rises = np.column_stack([b - a for a, b in pairwise(at_nodes)])
    return np.divide(rises, widths, out=np.zeros_like(rises), where=widths > 0.0)


def convex_slopes(slopes: FloatArray, widths: FloatArray) -> FloatArray:
    """Slopes that never fall: where the exact ones do, their mean by width takes their place.

    Parameters
    ----------
    slopes : array, shape (steps, segments)
        Exact.
    widths : array, shape (steps, segments) [kW]
        Of the pieces.

    Returns
    -------
    array, shape (steps, segments)
        The end points stay exact.

    Examples
    --------
    >>> convex_slopes(np.array([[2.0, 3.0], [3.0, 2.0]]), np.ones((2, 2)))
    array([[2. , 3. ], [2.5, 2.5]])
    """
    total = np.maximum(widths.sum(axis=1), 1e-12)
    mean = (slopes * widths).sum(axis=1) / total
    falls: BoolArray = np.asarray((np.diff(slopes, axis=1) < 0.0).any(axis=1))
    return np.where(falls[:, None], mean[:, None], slopes)

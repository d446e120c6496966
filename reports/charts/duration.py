"""Duration curves: demands in order of size, and what the plant carries of them."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from reports.charts.drawing import Drawing, text_width_mm
from reports.charts.palette import GREY, INK, letters_on
from reports.charts.scales import Scale, bottom_axis, left_axis, rounded_range

Array = npt.NDArray[np.float64]

WIDTH, HEIGHT = 126.0, 50.0
LEFT, RIGHT, TOP, FOOT = 9.0, 124.0, 6.0, 40.0
POINTS = 400

#: Lines nearer than this share one label's height, so one of the labels moves.
LABEL_GAP_MM = 3.4


@dataclass(frozen=True)
class Curve:
    """One demand of the year.

    Parameters
    ----------
    name : str
        For its label.
    values_kW : array, shape (steps,) [kW]
        In any order.
    colour : str
        Of line and label.
    """

    name: str
    values_kW: Array
    colour: str


def draw_durations(curves: Sequence[Curve], step_h: float) -> str:
    """Draw several demands, each in order of its own size.

    Parameters
    ----------
    curves : sequence of Curve
        At least one.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    str
        SVG.
    """
    top_MW = max(float(curve.values_kW.max()) for curve in curves) / 1e3
    drawing, x, y = _frame(top_MW, len(curves[0].values_kW) * step_h)
    taken: list[float] = []
    for curve in curves:
        ordered = np.sort(curve.values_kW)[::-1] / 1e3
        drawing.polyline(_points(ordered, x, y, step_h), stroke=curve.colour, width_pt=1.2)
    for curve in sorted(curves, key=lambda curve: -float(np.quantile(curve.values_kW, 0.55))):
        place_h = 0.45 * x.high
        value = float(np.quantile(curve.values_kW, 0.55)) / 1e3
        height = y(value) - 1.4
        while any(abs(height - other) < LABEL_GAP_MM for other in taken):
            height -= 0.5
        taken.append(height)
        drawing.label(x(place_h), height, curve.name, bold=True)
    return drawing.svg()


def draw_shares(demand_kW: Array, parts: Sequence[Curve], step_h: float) -> str:
    """Draw one demand in order of size, filled by what carries it in the same steps.

    Parameters
    ----------
    demand_kW : array, shape (steps,) [kW]
        The demand.
    parts : sequence of Curve
        What carries it, from below upwards; smoothed over neighbours in the order of size.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    str
        SVG.
    """
    order = np.argsort(-demand_kW, kind="stable")
    drawing, x, y = _frame(float(demand_kW.max()) / 1e3, len(demand_kW) * step_h)
    places = _places(len(order))
    lower = np.zeros(len(places))
    bands = []
    for part in parts:
        upper = lower + _smoothed(part.values_kW[order])[places] / 1e3
        edge = [(x((p + 0.5) * step_h), y(v)) for p, v in zip(places, upper, strict=True)]
        under = [(x((p + 0.5) * step_h), y(v)) for p, v in zip(places, lower, strict=True)]
        drawing.area(edge, under, part.colour)
        bands.append((part, lower, upper))
        lower = upper
    drawing.polyline(_points(demand_kW[order] / 1e3, x, y, step_h), stroke=INK, width_pt=1.1)
    thin = [part for part, low, high in bands if not _named(drawing, part, low, high, places, x, y, step_h)]
    drawing.swatches(40.0, 2.6, [(part.colour, part.name) for part in thin])
    return drawing.svg()


def _frame(top_MW: float, hours: float) -> tuple[Drawing, Scale, Scale]:
    """Axes of both figures."""
    drawing = Drawing(WIDTH, HEIGHT)
    x, y = Scale(0.0, hours, LEFT, RIGHT), Scale(0.0, rounded_range(0.0, top_MW, 5)[1], FOOT, TOP)
    drawing.text(0.0, 2.6, "MW", fill=GREY)
    left_axis(drawing, y, LEFT)
    bottom_axis(drawing, x, FOOT, most=5)
    drawing.text((LEFT + RIGHT) / 2, FOOT + 7.4, "Hours a year in which demand is at least this high", fill=GREY, anchor="middle")
    return drawing, x, y


def _places(steps: int) -> npt.NDArray[np.int64]:
    """Steps that are drawn: all of the steep beginning, few of the long rest."""
    head = np.arange(0, steps // 36, max(steps // 1500, 1))
    return np.unique(np.r_[head, np.linspace(steps // 36, steps - 1, POINTS).astype(np.int64)])


def _points(ordered_MW: Array, x: Scale, y: Scale, step_h: float) -> list[tuple[float, float]]:
    """Points of a falling line."""
    return [(x((place + 0.5) * step_h), y(float(ordered_MW[place]))) for place in _places(len(ordered_MW))]


def _smoothed(values: Array) -> Array:
    """Mean over the neighbours in the order of size: a hundredth of the year."""
    window = max(len(values) // 100, 1)
    padded = np.pad(values, (window // 2, window - 1 - window // 2), mode="edge")
    sums = np.cumsum(np.r_[0.0, padded])
    return (sums[window:] - sums[:-window]) / window


def _named(drawing: Drawing, part: Curve, low: Array, high: Array, places: npt.NDArray[np.int64], x: Scale, y: Scale, step_h: float) -> bool:
    """Write a band's name into it, if it is anywhere thick enough for that."""
    lefts = np.array([x((place + 0.5) * step_h) for place in places])
    tall = np.array([y(a) - y(b) for a, b in zip(low, high, strict=True)])
    width = text_width_mm(part.name) + 2.0
    for place in range(len(places)):
        inside = (lefts >= lefts[place]) & (lefts <= lefts[place] + width)
        if lefts[place] + width > RIGHT or lefts[place] < LEFT + 2.0:
            continue
        floor, ceiling = y(float(low[inside].max())), y(float(high[inside].min()))
        if tall[inside].min() >= 3.0 and floor - ceiling >= 3.0:  # noqa: PLR2004 - a label's height
            drawing.text(lefts[place] + 1.0, (floor + ceiling) / 2 + 0.9, part.name, fill=letters_on(part.colour), bold=True)
            return True
    return False

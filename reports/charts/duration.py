"""Duration curves: demands in order of size, and what the plant carries of them."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from reports.charts.drawing import Drawing, text_width_mm
from reports.charts.palette import GREY, INK, letters_on
from reports.charts.scales import Scale, bottom_axis, left_axis, rounded_range

Array = npt.NDArray[np.float64]

WIDTH, HEIGHT = 126.0, 44.0
LEFT, RIGHT, TOP, FOOT = 9.0, 124.0, 6.0, 34.5
POINTS = 400

#: Height that a band needs to carry its name.
LABEL_MM = 3.0


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


@dataclass(frozen=True)
class _Plot:
    """A picture with its axes: hours to the right, megawatts upwards."""

    drawing: Drawing
    x: Scale
    y: Scale
    step_h: float

    def at(self, place: int, value_MW: float) -> tuple[float, float]:
        """Point of the step at this place in the order of size."""
        return self.x((place + 0.5) * self.step_h), self.y(float(value_MW))


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
    plot = _plot(top_MW, len(curves[0].values_kW), step_h)
    ordered_MW = [np.sort(curve.values_kW)[::-1] / 1e3 for curve in curves]
    for curve, values in zip(curves, ordered_MW, strict=True):
        plot.drawing.polyline(_points(plot, values), stroke=curve.colour, width_pt=1.2)
    taken: list[tuple[float, float, float]] = []
    for place, curve in enumerate(curves):
        others = [values for other, values in enumerate(ordered_MW) if other != place]
        left, height = _clear_place(plot, ordered_MW[place], others, curve.name, taken)
        taken.append((left, left + text_width_mm(curve.name), height))
        plot.drawing.text(left, height, curve.name, fill=curve.colour, bold=True)
    return plot.drawing.svg()


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
    plot = _plot(float(demand_kW.max()) / 1e3, len(demand_kW), step_h)
    places = _places(len(order))
    lower = np.zeros(len(places))
    bands = []
    for part in parts:
        upper = lower + _smoothed(part.values_kW[order])[places] / 1e3
        edges = [
            [plot.at(place, value) for place, value in zip(places, edge, strict=True)]
            for edge in (upper, lower)
        ]
        plot.drawing.area(edges[0], edges[1], part.colour)
        bands.append((part, edges[0], edges[1]))
        lower = upper
    plot.drawing.polyline(_points(plot, demand_kW[order] / 1e3), stroke=INK, width_pt=1.1)
    thin = [part for part, over, under in bands if not _named(plot.drawing, part, over, under)]
    plot.drawing.swatches(40.0, 2.6, [(part.colour, part.name) for part in thin])
    return plot.drawing.svg()


def _clear_place(
    plot: _Plot,
    values: Array,
    others: Sequence[Array],
    name: str,
    taken: Sequence[tuple[float, float, float]],
) -> tuple[float, float]:
    """Where a line's name stands over it, farthest from every other line and name."""
    width = text_width_mm(name)
    best = (-1.0, LEFT, TOP)
    for left in np.linspace(LEFT + 6.0, RIGHT - width - 2.0, 40):
        under_hours = (np.linspace(left, left + width, 5) - LEFT) / (RIGHT - LEFT) * plot.x.high
        under = np.minimum((under_hours / plot.step_h).astype(int), len(values) - 1)
        height = plot.y(float(values[under[0]])) - 1.0
        lines = [plot.y(float(other[place])) for other in others for place in under]
        lines += [y - 1.0 for start, end, y in taken if start < left + width and left < end]
        room = min((_distance(height, line) for line in lines), default=9.0)
        if room > best[0] + 0.2 and height - 2.0 > TOP:
            best = (room, float(left), height)
    return best[1], best[2]


def _distance(height: float, line: float) -> float:
    """From letters on a baseline to a line above or below them."""
    return max(line - height, height - 2.0 - line, 0.0)


def _plot(top_MW: float, steps: int, step_h: float) -> _Plot:
    """Axes of both figures."""
    drawing = Drawing(WIDTH, HEIGHT)
    x, y = (
        Scale(0.0, steps * step_h, LEFT, RIGHT),
        Scale(0.0, rounded_range(0.0, top_MW, 5)[1], FOOT, TOP),
    )
    drawing.text(0.0, 2.6, "MW", fill=GREY)
    left_axis(drawing, y, LEFT)
    bottom_axis(drawing, x, FOOT, most=5)
    drawing.text(
        (LEFT + RIGHT) / 2,
        FOOT + 7.4,
        "Hours a year in which demand is at least this high",
        fill=GREY,
        anchor="middle",
    )
    return _Plot(drawing, x, y, step_h)


def _places(steps: int) -> npt.NDArray[np.int64]:
    """Steps that are drawn: all of the steep beginning, few of the long rest."""
    head = np.arange(0, steps // 36, max(steps // 1500, 1))
    return np.unique(np.r_[head, np.linspace(steps // 36, steps - 1, POINTS).astype(np.int64)])


def _points(plot: _Plot, ordered_MW: Array) -> list[tuple[float, float]]:
    """Points of a falling line."""
    return [plot.at(place, ordered_MW[place]) for place in _places(len(ordered_MW))]


def _smoothed(values: Array) -> Array:
    """Mean over the neighbours in the order of size: a hundredth of the year."""
    window = max(len(values) // 100, 1)
    padded = np.pad(values, (window // 2, window - 1 - window // 2), mode="edge")
    sums = np.cumsum(np.r_[0.0, padded])
    return (sums[window:] - sums[:-window]) / window


def _named(
    drawing: Drawing,
    part: Curve,
    upper: Sequence[tuple[float, float]],
    lower: Sequence[tuple[float, float]],
) -> bool:
    """Write a band's name into it, if it is anywhere thick enough for that."""
    lefts = np.array([x for x, _ in upper])
    ceilings = np.array([y for _, y in upper])
    floors = np.array([y for _, y in lower])
    width = text_width_mm(part.name) + 2.0
    for left in lefts[(lefts > LEFT + 2.0) & (lefts + width < RIGHT)]:
        inside = (lefts >= left) & (lefts <= left + width)
        floor, ceiling = float(floors[inside].min()), float(ceilings[inside].max())
        if floor - ceiling >= LABEL_MM:
            middle = (floor + ceiling) / 2 + 0.9
            colour = letters_on(part.colour)
            drawing.text(float(left) + 1.0, middle, part.name, fill=colour, bold=True)
            return True
    return False

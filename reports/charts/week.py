"""One week, step by step: what carries a demand, stacked, and the demand as a line."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt
from numpy.lib.stride_tricks import sliding_window_view

from reports.charts.drawing import Drawing, Point, text_width_mm
from reports.charts.palette import GREY, HAIR, INK, letters_on
from reports.charts.scales import Scale, left_axis, rounded_range

Array = npt.NDArray[np.float64]

WIDTH, LEFT, RIGHT = 126.0, 9.0, 126.0
TOP, PLOT = 6.0, 23.0
LEAST_LABEL_MM = 3.0


@dataclass(frozen=True)
class Band:
    """One part of the stack.

    Parameters
    ----------
    name : str
        For its label.
    values_kW : array, shape (steps,) [kW]
        At least zero.
    colour : str
        Of the area.
    """

    name: str
    values_kW: Array
    colour: str


def draw_week(
    bands: Sequence[Band],
    demand_kW: Array,
    days: Sequence[str],
    *,
    below: Band | None = None,
    what: str,
) -> str:
    """Draw the figure.

    Parameters
    ----------
    bands : sequence of Band
        From zero upwards.
    demand_kW : array, shape (steps,) [kW]
        Drawn as a line.
    days : sequence of str
        Seven names.
    below : Band, optional
        Drawn downwards from zero: what leaves the site.
    what : str
        What the axis counts.

    Returns
    -------
    str
        SVG.
    """
    bands = [band for band in bands if float(band.values_kW.max()) > 0.0]
    stack = np.sum([band.values_kW for band in bands], axis=0) if bands else demand_kW
    lowest = -float(below.values_kW.max()) if below is not None else 0.0
    low, high = rounded_range(
        lowest / 1e3, max(float(stack.max()), float(demand_kW.max()), 1.0) / 1e3, 4
    )
    y, x = Scale(low, high, TOP + PLOT, TOP), Scale(0.0, len(demand_kW), LEFT, RIGHT)
    drawing = Drawing(WIDTH, TOP + PLOT + 4.4)
    drawing.text(0.0, 2.6, f"MW {what}", fill=GREY)
    left_axis(drawing, y, LEFT, most=4)
    drawn = []
    lower = np.zeros(len(demand_kW))
    for band in bands:
        upper = lower + band.values_kW / 1e3
        edges = _steps(upper, x, y), _steps(lower, x, y)
        drawing.area(*edges, band.colour)
        drawn.append((band, *edges))
        lower = upper
    if below is not None and lowest < 0.0:
        drawing.area(_steps(0.0 * lower, x, y), _steps(-below.values_kW / 1e3, x, y), below.colour)
    drawing.polyline(_steps(demand_kW / 1e3, x, y), stroke=INK, width_pt=0.8)
    _day_axis(drawing, y, days)
    unnamed = [band for band, *edges in drawn if not _named(drawing, band, *edges)]
    unnamed += [below] if below is not None and lowest < 0.0 else []
    _key(drawing, [(band.colour, band.name) for band in unnamed])
    return drawing.svg()


def _key(drawing: Drawing, unnamed: Sequence[tuple[str, str]]) -> None:
    """Names at the top right: of the demand's line, and of bands too thin to carry theirs."""
    left = RIGHT - text_width_mm("demand") - 6.6
    drawing.line((left, 1.7), (left + 5.0, 1.7), stroke=INK, width_pt=0.8)
    drawing.text(left + 6.2, 2.6, "demand", fill=GREY)
    for fill, name in reversed(unnamed):
        left -= 3.2 + text_width_mm(name) + 4.0
        drawing.swatches(left, 2.6, [(fill, name)])


def _steps(values: Array, x: Scale, y: Scale) -> list[Point]:
    """A line that keeps each value for its whole step."""
    points = []
    for place, value in enumerate(values):
        points += [(x(place), y(float(value))), (x(place + 1), y(float(value)))]
    return points


def _day_axis(drawing: Drawing, y: Scale, days: Sequence[str]) -> None:
    """Zero line, days and their names."""
    foot = TOP + PLOT
    drawing.line((LEFT, y(0.0)), (RIGHT, y(0.0)), stroke=INK, width_pt=0.6)
    width = (RIGHT - LEFT) / len(days)
    for place, name in enumerate(days):
        left = LEFT + place * width
        if place:
            drawing.line((left, TOP), (left, foot), stroke=HAIR)
        drawing.text(left + width / 2, foot + 3.6, name, fill=GREY, anchor="middle")


def _named(drawing: Drawing, band: Band, upper: list[Point], lower: list[Point]) -> bool:
    """Write a band's name where it is thickest, if it is thick enough there."""
    pitch_mm = upper[1][0] - upper[0][0]
    span = 2 * max(int(np.ceil((text_width_mm(band.name) + 2.0) / pitch_mm)), 1)
    if span >= len(upper):
        return False
    ceilings = sliding_window_view(np.array([y for _, y in upper]), span)[::2].max(axis=1)
    floors = sliding_window_view(np.array([y for _, y in lower]), span)[::2].min(axis=1)
    place = int((floors - ceilings).argmax())
    floor, ceiling = float(floors[place]), float(ceilings[place])
    if floor - ceiling < LEAST_LABEL_MM:
        return False
    drawing.text(
        upper[2 * place][0] + span * pitch_mm / 4,
        (floor + ceiling) / 2 + 0.9,
        band.name,
        fill=letters_on(band.colour),
        anchor="middle",
        bold=True,
    )
    return True

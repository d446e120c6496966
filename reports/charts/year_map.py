"""A year as a map: day by day from left to right, the hours of each day upwards."""

from collections.abc import Sequence

import numpy as np
import numpy.typing as npt

from reports.charts.drawing import Drawing
from reports.charts.palette import GREY, HAIR, INK
from reports.charts.raster import coloured_png_base64
from reports.charts.scales import month_axis, rounded_range

Array = npt.NDArray[np.float64]

WIDTH, LEFT = 126.0, 9.0
TOP, HEIGHT = 6.0, 27.0
STRIP_GAP, STRIP = 2.2, 6.5
HOURS = (0, 6, 12, 18, 24)
SCALE_LEFT, SCALE_WIDTH = 80.0, 26.0


def draw_year_map(
    values_kW: Array,
    *,
    steps_a_day: int,
    stops: Sequence[str],
    name: str,
    strip_hours: Array | None = None,
    strip_name: str = "",
    strip_colour: str = INK,
) -> str:
    """Draw the figure.

    Parameters
    ----------
    values_kW : array, shape (steps,) [kW]
        A whole year on the site's standard clock.
    steps_a_day : int
        Steps in a day.
    stops : sequence of str
        Colours from nothing to the largest value.
    name : str
        What the colours mean, for the scale.
    strip_hours : array, shape (days,), optional [h]
        Drawn as a strip below.
    strip_name, strip_colour : str
        Its words and colour.

    Returns
    -------
    str
        SVG.
    """
    map_ = values_kW.reshape(-1, steps_a_day).T[::-1]
    largest = float(values_kW.max())
    unit, divisor = ("MW", 1e3) if largest >= 1e3 else ("kW", 1.0)  # noqa: PLR2004 - a megawatt
    top = rounded_range(0.0, largest / divisor, 5)[1]
    width = WIDTH - LEFT
    foot = TOP + HEIGHT + (STRIP_GAP + STRIP if strip_hours is not None else 0.0)
    drawing = Drawing(WIDTH, foot + (8.4 if strip_hours is not None else 4.6))
    drawing.image(LEFT, TOP, width, HEIGHT, coloured_png_base64(map_ / divisor / top, stops))
    drawing.text(0.0, 3.2, "Hour of day", fill=GREY)
    for hour in HOURS:
        y = TOP + HEIGHT - hour / 24.0 * HEIGHT
        drawing.line((LEFT - 1.0, y), (LEFT, y), stroke=INK, width_pt=0.4)
        drawing.text(LEFT - 1.8, y + 0.85, str(hour), fill=GREY, anchor="end")
    _colour_scale(drawing, stops, f"{top:g}\u202f{unit} {name}")
    if strip_hours is not None:
        _strip(drawing, strip_hours, TOP + HEIGHT + STRIP_GAP, strip_colour)
        drawing.text(LEFT, foot + 7.4, strip_name, fill=strip_colour)
    month_axis(drawing, LEFT, width, foot)
    return drawing.svg()


def _colour_scale(drawing: Drawing, stops: Sequence[str], words: str) -> None:
    """From nothing to the largest value, right of the head; its words end at the figure's edge."""
    left = WIDTH - SCALE_WIDTH - 2.0 - 0.5 * 7.0 * 0.353 * len(words)
    shades = np.linspace(0.0, 1.0, 60)[None, :]
    drawing.image(left, 1.2, SCALE_WIDTH, 2.1, coloured_png_base64(shades, stops))
    drawing.text(left - 1.2, 3.1, "0", fill=GREY, anchor="end")
    drawing.text(left + SCALE_WIDTH + 1.2, 3.1, words, fill=GREY)


def _strip(drawing: Drawing, hours: Array, top: float, colour: str) -> None:
    """Hours of each day as a filled step line."""
    width, foot = WIDTH - LEFT, top + STRIP
    data = f"M{LEFT} {foot:.2f}"
    for day, value in enumerate(hours):
        right = LEFT + (day + 1) * width / len(hours)
        data += f"V{foot - value / 24.0 * STRIP:.2f}H{right:.2f}"
    drawing.path(f"{data}V{foot:.2f}Z", fill=colour)
    drawing.line((LEFT, top), (WIDTH, top), stroke=HAIR)
    drawing.text(LEFT - 1.8, top + 1.7, "24", fill=GREY, anchor="end")
    drawing.text(LEFT - 1.8, foot, "0", fill=GREY, anchor="end")

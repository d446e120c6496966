"""Twelve months as stacked bars, each band named once."""

from collections.abc import Sequence

from reports.charts.drawing import Drawing
from reports.charts.palette import GREY, INK
from reports.charts.scales import MONTHS, Scale, left_axis, rounded_range

WIDTH, HEIGHT = 126.0, 35.0
LEFT, TOP, FOOT = 9.0, 6.0, 30.5

Band = tuple[str, str, Sequence[float]]


def draw_months(bands: Sequence[Band]) -> str:
    """Draw the figure.

    Parameters
    ----------
    bands : sequence of (name, colour, twelve energies [kWh])
        From below upwards.

    Returns
    -------
    str
        SVG.
    """
    totals = [sum(values[month] for _, _, values in bands) for month in range(12)]
    divisor, unit = (1e6, "GWh") if max(totals) >= 1e6 else (1e3, "MWh")  # noqa: PLR2004 - a GWh
    y = Scale(0.0, rounded_range(0.0, max(totals) / divisor, 4)[1], FOOT, TOP)
    drawing = Drawing(WIDTH, HEIGHT)
    drawing.text(0.0, 2.6, f"{unit} a month", fill=GREY)
    drawing.swatches(30.0, 2.6, [(colour, name) for name, colour, _ in bands])
    left_axis(drawing, y, LEFT, most=4)
    width = (WIDTH - LEFT) / 12.0
    for month in range(12):
        left, below = LEFT + month * width, 0.0
        for _, colour, values in bands:
            above = below + values[month] / divisor
            drawing.rect(left + 0.8, y(above), width - 1.6, y(below) - y(above), colour)
            below = above
        drawing.text(left + width / 2, FOOT + 3.6, MONTHS[month], fill=GREY, anchor="middle")
    drawing.line((LEFT, FOOT), (WIDTH, FOOT), stroke=INK, width_pt=0.5)
    return drawing.svg()

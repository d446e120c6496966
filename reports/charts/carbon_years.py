"""CO2 saved year by year, with the year in which it stops."""

from collections.abc import Sequence
from typing import Any

from reports.charts.drawing import Drawing
from reports.charts.palette import EXPORT, GREY, INK, LOSING
from reports.charts.scales import Scale, left_axis, rounded_range
from reports.numbers import number

WIDTH, HEIGHT = 126.0, 42.0
LEFT, RIGHT, TOP, FOOT = 12.0, 124.0, 6.0, 36.0


def draw_carbon_years(years: Sequence[dict[str, Any]], stops_year: int | None) -> str:
    """Draw the figure.

    Parameters
    ----------
    years : sequence of dict
        Records of carbon by calendar year [t].
    stops_year : int or None
        First year in which nothing is saved.

    Returns
    -------
    str
        SVG.
    """
    saved = [float(year["saved_t"]) for year in years]
    y = Scale(*rounded_range(min(saved), max(saved)), FOOT, TOP)
    x = Scale(-0.5, len(years) - 0.5, LEFT, RIGHT)
    width = (RIGHT - LEFT) / len(years)
    drawing = Drawing(WIDTH, HEIGHT)
    drawing.text(0.0, 2.6, "t CO₂ saved in the year", fill=GREY)
    left_axis(drawing, y, LEFT, grid_to=RIGHT)
    for place, amount in enumerate(saved):
        colour = EXPORT if amount > 0.0 else LOSING
        drawing.rect(x(place) - 0.32 * width, y(amount), 0.64 * width, y(0.0) - y(amount), colour)
        if place % 5 == 0:
            factor = f"grid {number(float(years[place]['grid_kg_per_kWh']), 3)}"
            drawing.text(
                x(place), FOOT + 2.8, str(years[place]["calendar_year"]), fill=GREY, anchor="middle"
            )
            drawing.text(x(place), FOOT + 5.6, factor, fill=GREY, anchor="middle")
    drawing.line((LEFT, y(0.0)), (RIGHT, y(0.0)), stroke=INK, width_pt=1.3)
    numbers = [int(year["calendar_year"]) for year in years]
    if stops_year in numbers and numbers.index(stops_year) > 0:
        place = numbers.index(stops_year)
        drawing.line(
            (x(place - 0.5), TOP), (x(place - 0.5), FOOT), stroke=INK, width_pt=0.6, dashes="1 .7"
        )
        anchor, shift = ("start", 1.2) if place < 0.6 * len(years) else ("end", -1.2)
        drawing.label(
            x(place - 0.5) + shift,
            TOP + 2.4,
            f"saves nothing from {stops_year} on",
            anchor=anchor,
            bold=True,
        )
    return drawing.svg()

"""Cash flow: each year's amount as a bar, the balance as lines."""

from collections.abc import Sequence
from typing import Any

from reports.charts.drawing import Drawing
from reports.charts.palette import GAINING, GREY, INK, LOSING
from reports.charts.scales import Scale, left_axis, rounded_range
from reports.numbers import money_scale

WIDTH, HEIGHT = 126.0, 48.0
LEFT, RIGHT, TOP, FOOT = 11.0, 108.0, 6.0, 42.5
BALANCE = "#8A8F98"


def draw_cash(years: Sequence[dict[str, Any]], currency: str) -> str:
    """Draw the figure.

    Parameters
    ----------
    years : sequence of dict
        Records of the cash flow, year 0 first.
    currency : str
        Of the axis.

    Returns
    -------
    str
        SVG.
    """
    keys = ("net", "cumulative", "cumulative_discounted")
    values = [float(year[key]) for year in years for key in keys]
    divisor, word = money_scale(max(abs(value) for value in values))
    low, high = rounded_range(min(values) / divisor, max(values) / divisor)
    y = Scale(low, high, FOOT, TOP)
    x = Scale(-0.5, len(years) - 0.5, LEFT, RIGHT)
    drawing = Drawing(WIDTH, HEIGHT)
    drawing.text(0.0, 2.6, f"{currency} {word}, real", fill=GREY)
    left_axis(drawing, y, LEFT, grid_to=RIGHT)
    for place, year in enumerate(years):
        amount = float(year["net"]) / divisor
        colour = GAINING if amount >= 0.0 else LOSING
        drawing.rect(x(place) - 1.3, y(amount), 2.6, y(0.0) - y(amount), colour)
    drawing.line((LEFT, y(0.0)), (RIGHT, y(0.0)), stroke=INK, width_pt=1.3)
    ends = []
    for key, name, colour in (
        ("cumulative", "Balance", BALANCE),
        ("cumulative_discounted", "Balance, discounted", INK),
    ):
        line = [(x(place), y(float(year[key]) / divisor)) for place, year in enumerate(years)]
        drawing.polyline(line, stroke=colour, width_pt=1.2)
        ends.append((line[-1][1], name))
    _names(drawing, ends)
    for place, year in enumerate(years):
        if place % 5 == 0:
            drawing.text(
                x(place), FOOT + 4.0, str(year["calendar_year"]), fill=GREY, anchor="middle"
            )
    return drawing.svg()


def _names(drawing: Drawing, ends: list[tuple[float, str]]) -> None:
    """Names at the right ends of the lines, kept apart; long ones on two lines."""
    (first, name), (second, other) = ends
    if abs(first - second) < 7.0:  # noqa: PLR2004 - three lines of letters
        upper_first = first <= second
        middle = (first + second) / 2
        first, second = (
            (middle - 3.0, middle + 4.0) if upper_first else (middle + 4.0, middle - 3.0)
        )
    for y, words in ((first, name), (second, other)):
        head, _, rest = words.partition(", ")
        drawing.text(RIGHT + 1.6, y + 0.9, f"{head}{',' if rest else ''}", bold=True)
        if rest:
            drawing.text(RIGHT + 1.6, y + 3.7, rest, bold=True)

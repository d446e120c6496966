"""Composite curves of the heat recovery: the exhaust above, what it heats below."""

from collections.abc import Sequence

from reports.charts.drawing import Drawing
from reports.charts.palette import GREY, HEAT_HIGH, POWER
from reports.charts.scales import Scale, bottom_axis, left_axis, rounded_range
from reports.numbers import number

WIDTH, HEIGHT = 126.0, 54.0
LEFT, RIGHT, TOP, FOOT = 11.0, 124.0, 6.0, 44.0

Curve = Sequence[Sequence[float]]


def draw_composite(gas: Curve, sink: Curve, taken_by: str) -> str:
    """Draw the figure.

    Parameters
    ----------
    gas, sink : sequence of (heat [kW], temperature [degC])
        The exhaust as it gives up heat, and what takes it up against the same heat.
    taken_by : str
        What takes it up, in words.

    Returns
    -------
    str
        SVG.
    """
    heats = [point[0] / 1e3 for point in [*gas, *sink]]
    temperatures = [point[1] for point in [*gas, *sink]]
    x = Scale(0.0, max(*heats, 1e-3) * 1.04, LEFT, RIGHT)
    y = Scale(0.0, rounded_range(0.0, max(temperatures))[1], FOOT, TOP)
    drawing = Drawing(WIDTH, HEIGHT)
    drawing.text(0.0, 2.6, "°C", fill=GREY)
    left_axis(drawing, y, LEFT, grid_to=RIGHT)
    bottom_axis(drawing, x, FOOT, most=7)
    drawing.text(
        (LEFT + RIGHT) / 2,
        FOOT + 7.4,
        "Heat given up by the exhaust, MW",
        fill=GREY,
        anchor="middle",
    )
    for curve, colour, name, lift in (
        (gas, HEAT_HIGH, "exhaust", -2.0),
        (sink, POWER, taken_by, 4.0),
    ):
        if not curve:
            continue
        points = [(x(heat / 1e3), y(temperature)) for heat, temperature in curve]
        drawing.polyline(points, stroke=colour, width_pt=1.4)
        middle = points[len(points) // 2] if len(points) > 2 else points[0]  # noqa: PLR2004 - ends only
        drawing.label(min(middle[0] + 2.0, RIGHT - 30.0), middle[1] + lift, name, bold=True)
    if gas:
        end = gas[-1]
        drawing.label(x(end[0] / 1e3), y(end[1]) - 2.0, f"{number(end[1])}\u202f°C", anchor="end")
    return drawing.svg()

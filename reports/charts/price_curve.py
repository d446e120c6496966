"""NPV against the gas commodity price, with the price at which the option stops paying."""

from collections.abc import Sequence

from reports.charts.drawing import Drawing
from reports.charts.palette import GREY, INK, LOSING, POWER
from reports.charts.scales import Scale, bottom_axis, left_axis, round_step, rounded_range
from reports.numbers import money_scale, signed_percent

WIDTH, HEIGHT = 126.0, 52.0
LEFT, RIGHT, TOP, FOOT = 11.0, 124.0, 6.0, 42.0


def draw_price_curve(
    points: Sequence[tuple[float, float]],
    *,
    zero_frac: float | None,
    currency: str,
) -> str:
    """Draw the figure.

    Parameters
    ----------
    points : sequence of (change, NPV)
        Dispatched anew at each change of the price; in rising order.
    zero_frac : float or None [-]
        Change at which NPV is zero.
    currency : str
        Of the axis.

    Returns
    -------
    str
        SVG.
    """
    divisor, word = money_scale(max(abs(npv) for _, npv in points))
    low, high = _range_around_zero(
        min(v for _, v in points) / divisor, max(v for _, v in points) / divisor
    )
    changes = [change * 100.0 for change, _ in points]
    ends = [*changes, *([] if zero_frac is None else [zero_frac * 100.0])]
    span = (max(ends) - min(ends)) or 1.0
    x = Scale(min(ends) - 0.04 * span, max(ends) + 0.04 * span, LEFT, RIGHT)
    y = Scale(low, high, FOOT, TOP)
    drawing = Drawing(WIDTH, HEIGHT)
    drawing.text(0.0, 2.6, f"NPV, {currency} {word}", fill=GREY)
    left_axis(drawing, y, LEFT, grid_to=RIGHT)
    bottom_axis(drawing, x, FOOT, most=9)
    drawing.text(
        (LEFT + RIGHT) / 2,
        FOOT + 7.4,
        "Change of the gas commodity price, %",
        fill=GREY,
        anchor="middle",
    )
    drawing.line((LEFT, y(0.0)), (RIGHT, y(0.0)), stroke=INK, width_pt=1.3)
    line = [
        (x(change), y(npv / divisor))
        for change, npv in zip(changes, [v for _, v in points], strict=True)
    ]
    if zero_frac is not None:
        line = sorted([*line, (x(zero_frac * 100.0), y(0.0))])
    drawing.polyline(line, stroke=POWER, width_pt=1.2)
    for change, npv in points:
        planned = change == 0.0
        drawing.dot(
            x(change * 100.0), y(npv / divisor), 1.1 if planned else 0.8, INK if planned else POWER
        )
        if planned:
            drawing.label(x(0.0) + 1.8, y(npv / divisor) - 1.4, "as planned", bold=True)
    if zero_frac is not None:
        _zero(
            drawing,
            x(zero_frac * 100.0),
            y(0.0),
            signed_percent(zero_frac),
            right=zero_frac < max(ends) / 200.0,
        )
    return drawing.svg()


def _range_around_zero(low: float, high: float) -> tuple[float, float]:
    """A round range that leaves room for words on both sides of zero."""
    low, high = rounded_range(low, high)
    step = round_step(high - low, 6)
    return min(low, -step), max(high, step)


def _zero(drawing: Drawing, x: float, y: float, change: str, *, right: bool) -> None:
    """The crossing and its name, beside it where the curve leaves room."""
    drawing.dot(x, y, 1.3, LOSING)
    words = f"NPV is zero at {change}"
    drawing.label(
        x + 2.0 if right else x - 2.0,
        y + 4.0 if not right else y - 2.0,
        words,
        anchor="start" if right else "end",
        bold=True,
    )

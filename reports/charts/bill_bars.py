"""Yearly bills of today and of every option, cut into what is paid for."""

from collections.abc import Sequence

from reports.charts.drawing import NAME_PT, Drawing, text_width_mm
from reports.charts.palette import (
    EXPORT,
    FUEL,
    GREY,
    HEAT_LOW,
    HEATERS,
    IMPORT,
    INK,
    letters_on,
)
from reports.charts.scales import Scale
from reports.numbers import money_scale, significant
from reports.wording import shortened

WIDTH, LEFT, TOP, STEP, BAR = 126.0, 0.0, 8.0, 11.5, 4.6
COLOURS = {"power": IMPORT, "gas": FUEL, "carbon": HEATERS, "upkeep": HEAT_LOW, "export": EXPORT}
NAMES = {"power": "Power", "gas": "Gas", "carbon": "Carbon", "upkeep": "Upkeep", "export": "Export"}

#: Letters of a name that fit over its bar.
LONGEST_NAME = 56

Row = tuple[str, dict[str, float]]


def draw_bill_bars(rows: Sequence[Row], currency: str) -> str:
    """Draw the figure.

    Parameters
    ----------
    rows : sequence of (name, amounts by section)
        What export earns is negative and drawn left of zero.
    currency : str
        Of the labels.

    Returns
    -------
    str
        SVG.
    """
    paid = [sum(v for v in amounts.values() if v > 0.0) for _, amounts in rows]
    earned = [sum(-v for v in amounts.values() if v < 0.0) for _, amounts in rows]
    divisor, word = money_scale(max(paid))
    x = Scale(-max(earned) / divisor, max(paid) / divisor, LEFT, WIDTH - 16.0)
    drawing = Drawing(WIDTH, TOP + len(rows) * STEP - 2.0)
    used = [key for key in NAMES if any(abs(a.get(key, 0.0)) > 0.0 for _, a in rows)]
    drawing.text(0.0, 2.6, f"{currency} {word} a year", fill=GREY)
    drawing.swatches(34.0, 2.6, [(COLOURS[key], NAMES[key]) for key in used])
    for place, (name, amounts) in enumerate(rows):
        _row(drawing, x, TOP + place * STEP, name, {k: v / divisor for k, v in amounts.items()})
    drawing.line(
        (x(0.0), TOP - 1.0), (x(0.0), TOP + len(rows) * STEP - 2.6), stroke=INK, width_pt=0.6
    )
    return drawing.svg()


def _row(drawing: Drawing, x: Scale, y: float, name: str, amounts: dict[str, float]) -> None:
    """One bill: its name above, its bands, its total at the end."""
    drawing.text(x(0.0) + 0.6, y + 1.6, shortened(name, LONGEST_NAME), size_pt=NAME_PT, bold=True)
    right = left = 0.0
    for key in NAMES:
        amount = amounts.get(key, 0.0)
        start = right if amount >= 0.0 else left
        drawing.rect(x(start), y + 2.8, x(start + amount) - x(start), BAR, COLOURS[key])
        words = significant(amount)
        if abs(x(amount) - x(0.0)) > text_width_mm(words) + 2.0:
            middle = x(start + amount / 2)
            drawing.text(middle, y + 6.0, words, fill=letters_on(COLOURS[key]), anchor="middle")
        right, left = (right + amount, left) if amount >= 0.0 else (right, left + amount)
    drawing.text(
        x(right) + 1.6,
        y + 6.1,
        significant(right + left),
        size_pt=NAME_PT,
        bold=True,
    )

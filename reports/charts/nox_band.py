"""NOx of the unit as a band beside its limit."""

from typing import Any

from reports.charts.drawing import NAME_PT, Drawing, text_width_mm
from reports.charts.palette import FAINT, GREY, INK, POWER
from reports.charts.scales import Scale, mark_text
from reports.numbers import number

WIDTH, HEIGHT = 126.0, 27.0
LEFT, RIGHT, TOP, FOOT = 3.0, 118.0, 6.0, 22.0
BAND_FILL = "#9DB8D6"
LIMIT = "#B5401A"

#: Room that the guarantee's words need before the limit's line.
GUARANTEE_WORDS_MM = 28.0


def draw_nox_band(nox: dict[str, Any]) -> str:
    """Draw the figure.

    Parameters
    ----------
    nox : dict
        Record of NOx [mg/Nm3].

    Returns
    -------
    str
        SVG.
    """
    low, centre, high = (
        float(nox[f"band_{edge}_mg_per_Nm3"]) for edge in ("low", "centre", "high")
    )
    limit, guarantee = float(nox["limit_mg_per_Nm3"]), float(nox["guarantee_mg_per_Nm3"])
    x = Scale(0.0, 1.15 * max(high, limit, guarantee), LEFT, RIGHT)
    drawing = Drawing(WIDTH, HEIGHT)
    drawing.text(0.0, 2.6, "mg/Nm³, dry, 15\u202f% O₂, as NO₂", fill=GREY)
    marks = x.marks(7)
    for value in marks:
        drawing.line((x(value), TOP), (x(value), FOOT), stroke=FAINT)
        drawing.text(
            x(value), FOOT + 3.6, mark_text(value, marks[1] - marks[0]), fill=GREY, anchor="middle"
        )
    drawing.rect(x(low), 11.0, x(high) - x(low), 5.0, BAND_FILL)
    drawing.line((x(centre), 11.0), (x(centre), 16.0), stroke=POWER, width_pt=1.6)
    drawing.line((x(limit), TOP), (x(limit), FOOT), stroke=LIMIT, width_pt=1.6)
    drawing.text(
        x(low) + 0.8,
        9.6,
        f"band {number(low)} to {number(high)}, centre {number(centre)}",
        size_pt=NAME_PT,
    )
    words = f"limit {number(limit)}"
    _beside(
        drawing, x(limit), TOP + 1.6, words, right=x(limit) + text_width_mm(words, NAME_PT) < WIDTH
    )
    drawing.dot(x(guarantee), 18.6, 0.9, INK)
    _beside(
        drawing,
        x(guarantee),
        19.6,
        f"guarantee {number(guarantee, 1)}",
        right=not 0.0 < x(limit) - x(guarantee) < GUARANTEE_WORDS_MM,
    )
    return drawing.svg()


def _beside(drawing: Drawing, x: float, y: float, words: str, *, right: bool) -> None:
    """Words at one side of a mark."""
    drawing.text(
        x + 1.8 if right else x - 1.8, y, words, anchor="start" if right else "end", bold=True
    )

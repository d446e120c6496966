"""How sure: NPV when one assumption moves at a time, zero as the heaviest line."""

from collections.abc import Sequence
from dataclasses import dataclass

from reports.charts.drawing import NAME_PT, Drawing, text_width_mm
from reports.charts.palette import (
    FAINT,
    GAINING,
    GREY,
    HAIR,
    INK,
    LOSING,
    LOSING_PALE,
    WHITE,
)
from reports.charts.scales import Scale, mark_text, round_step
from reports.numbers import money_scale, signed_percent, significant

WIDTH = 126.0
LEFT, RIGHT = 34.0, 122.0
TOP, STEP, BAR = 9.0, 5.9, 3.4


@dataclass(frozen=True)
class Bar:
    """NPV at a lower and a higher value of one assumption.

    Parameters
    ----------
    name : str
        Assumption.
    low_frac, high_frac : float [-]
        How far it moves.
    low_npv, high_npv : float or None [currency]
        NPV there; None where no answer was found.
    """

    name: str
    low_frac: float
    high_frac: float
    low_npv: float | None
    high_npv: float | None

    def ends(self) -> list[tuple[float, str]]:
        """NPV and label of each end that has an answer."""
        pairs = ((self.low_npv, self.low_frac), (self.high_npv, self.high_frac))
        return [(npv, signed_percent(change)) for npv, change in pairs if npv is not None]


def draw_outcome(
    bars: Sequence[Bar], *, planned_npv: float, combined_npv: float | None, currency: str
) -> str:
    """Draw the figure.

    Parameters
    ----------
    bars : sequence of Bar
        The widest first.
    planned_npv : float [currency]
        NPV as planned.
    combined_npv : float or None [currency]
        NPV of the combined bad variant; None where no answer was found.
    currency : str
        Of the axis.

    Returns
    -------
    str
        SVG.
    """
    values = [npv for bar in bars for npv, _ in bar.ends()] + [planned_npv, 0.0]
    values += [] if combined_npv is None else [combined_npv]
    margin = 0.09 * (max(values) - min(values) or 1.0)
    x = Scale(min(values) - margin, max(values) + margin, LEFT + 6.0, RIGHT)
    divisor, word = money_scale(max(abs(x.low), abs(x.high)))
    foot = TOP + (len(bars) + 1) * STEP + 1.6
    drawing = Drawing(WIDTH, foot + 5.2)
    _value_axis(drawing, x, divisor, foot, f"{currency} {word}")
    labels: list[tuple[float, float, str, str]] = []
    for row, bar in enumerate(bars):
        labels += _one_bar(drawing, x, bar, planned_npv, TOP + row * STEP)
    labels += _combined(drawing, x, TOP + len(bars) * STEP + 1.6, combined_npv, planned_npv)
    drawing.line((x(0.0), 5.0), (x(0.0), foot), stroke=INK, width_pt=1.3)
    for place, y, words, anchor in labels:
        drawing.label(place, y, words, anchor=anchor)
    drawing.line((x(planned_npv), 5.0), (x(planned_npv), foot), stroke=WHITE, width_pt=1.1)
    drawing.line(
        (x(planned_npv), 5.0), (x(planned_npv), foot), stroke=INK, width_pt=0.6, dashes="1 .7"
    )
    _feet(drawing, x, planned_npv, divisor, foot + 3.2)
    return drawing.svg()


def _value_axis(drawing: Drawing, x: Scale, divisor: float, foot: float, unit: str) -> None:
    """Values at the top, hairlines down."""
    drawing.text(0.0, 3.4, f"NPV, {unit}", fill=GREY)
    step = round_step((x.high - x.low) / divisor, 7)
    for value in Scale(x.low / divisor, x.high / divisor, 0.0, 1.0).marks(7):
        place = x(value * divisor)
        drawing.line((place, 5.0), (place, foot), stroke=FAINT)
        drawing.text(place, 3.4, mark_text(value, step), fill=GREY, anchor="middle")


def _one_bar(
    drawing: Drawing, x: Scale, bar: Bar, planned: float, y: float
) -> list[tuple[float, float, str, str]]:
    """Both halves of a bar; answers the labels of its ends."""
    drawing.text(0.0, y + 1.0, bar.name, size_pt=NAME_PT)
    labels = []
    for npv, words in bar.ends():
        loses = npv < planned
        drawing.rect(
            x(planned), y - BAR / 2, x(npv) - x(planned), BAR, LOSING if loses else GAINING
        )
        place, anchor = (x(npv) - 1.0, "end") if loses else (x(npv) + 1.0, "start")
        labels.append((place, y + 0.9, words, anchor))
    if not bar.ends():
        labels.append((x(planned) + 1.0, y + 0.9, "no schedule found", "start"))
    return labels


def _combined(
    drawing: Drawing, x: Scale, y: float, npv: float | None, planned: float
) -> list[tuple[float, float, str, str]]:
    """The combined bad variant, below a line of its own."""
    drawing.line((0.0, y - STEP / 2 - 0.4), (RIGHT, y - STEP / 2 - 0.4), stroke=HAIR)
    drawing.text(0.0, y + 1.0, "All bad at once", size_pt=NAME_PT, bold=True)
    if npv is None:
        return [(x(planned) + 1.0, y + 0.9, "no schedule found", "start")]
    turn = min(max(0.0, npv), planned) if planned > 0.0 else planned
    drawing.rect(x(turn), y - BAR / 2, x(planned) - x(turn), BAR, LOSING_PALE)
    drawing.rect(x(npv), y - BAR / 2, x(turn) - x(npv), BAR, LOSING)
    divisor, _ = money_scale(max(abs(x.low), abs(x.high)))
    return [(x(npv) - 1.0, y + 0.9, significant(npv / divisor, 2), "end")]


def _feet(drawing: Drawing, x: Scale, planned: float, divisor: float, y: float) -> None:
    """Names of the two lines, kept apart."""
    words = f"as planned {significant(planned / divisor, 2)}"
    zero, place = x(0.0), x(planned)
    needed = (text_width_mm("breaks even") + text_width_mm(words)) / 2 + 3.0
    if abs(place - zero) < needed:
        middle = (place + zero) / 2
        shift = needed / 2 if place >= zero else -needed / 2
        zero, place = middle - shift, middle + shift
    drawing.text(zero, y, "breaks even", anchor="middle", bold=True)
    drawing.text(place, y, words, anchor="middle", bold=True)

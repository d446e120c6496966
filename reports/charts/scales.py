"""Scales with round marks, and the axes that show them."""

import math
from dataclasses import dataclass

from reports.charts.drawing import Drawing
from reports.charts.palette import FAINT, GREY, INK
from reports.numbers import number

#: A step is one of these times a power of ten.
ROUND_STEPS = (1.0, 2.0, 2.5, 5.0, 10.0)

DAYS_BEFORE_MONTH = (0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334, 365)
MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")


@dataclass(frozen=True)
class Scale:
    """A straight scale from values to millimetres.

    Parameters
    ----------
    low, high : float
        Values at the ends.
    start_mm, end_mm : float [mm]
        Places of the ends.
    """

    low: float
    high: float
    start_mm: float
    end_mm: float

    def __call__(self, value: float) -> float:
        """Place of a value."""
        share = (value - self.low) / (self.high - self.low)
        return self.start_mm + share * (self.end_mm - self.start_mm)

    def marks(self, most: int = 6) -> list[float]:
        """Round values within the scale, at most so many and one more."""
        step = round_step(self.high - self.low, most)
        first = math.ceil(self.low / step - 1e-9)
        last = math.floor(self.high / step + 1e-9)
        return [step * place for place in range(first, last + 1)]


def round_step(span: float, most: int) -> float:
    """Smallest round step with at most so many parts in a span.

    Examples
    --------
    >>> round_step(13.0, 6), round_step(0.9, 5)
    (2.5, 0.2)
    """
    raw = span / most
    power = 10.0 ** math.floor(math.log10(raw))
    step = next(part for part in ROUND_STEPS if part * power >= raw * (1.0 - 1e-9))
    return step * power


def rounded_range(low: float, high: float, most: int = 6) -> tuple[float, float]:
    """A range with round ends that holds both values and zero."""
    low, high = min(low, 0.0), max(high, 0.0)
    if high == low:
        high = low + 1.0
    step = round_step(high - low, most)
    return step * math.floor(low / step + 1e-9), step * math.ceil(high / step - 1e-9)


def mark_text(value: float, step: float) -> str:
    """A mark with as many places as its step needs."""
    decimals = 0
    while decimals < 4 and abs(step * 10**decimals - round(step * 10**decimals)) > 1e-6:  # noqa: PLR2004 - no scale here is finer
        decimals += 1
    return number(value, decimals)


def left_axis(
    drawing: Drawing, scale: Scale, x: float, *, grid_to: float | None = None, most: int = 5
) -> None:
    """Marks and values at the left of a figure; hairlines across it where values must be read."""
    marks = scale.marks(most)
    step = marks[1] - marks[0] if len(marks) > 1 else 1.0
    for value in marks:
        y = scale(value)
        if grid_to is not None:
            drawing.line((x, y), (grid_to, y), stroke=FAINT)
        drawing.line((x - 1.0, y), (x, y), stroke=INK, width_pt=0.4)
        drawing.text(x - 1.8, y + 0.85, mark_text(value, step), fill=GREY, anchor="end")


def bottom_axis(drawing: Drawing, scale: Scale, y: float, *, most: int = 6) -> None:
    """Line, marks and values below a figure."""
    drawing.line((scale.start_mm, y), (scale.end_mm, y), stroke=INK, width_pt=0.5)
    marks = scale.marks(most)
    step = marks[1] - marks[0] if len(marks) > 1 else 1.0
    for value in marks:
        x = scale(value)
        drawing.line((x, y), (x, y + 1.0), stroke=INK, width_pt=0.4)
        drawing.text(x, y + 3.7, mark_text(value, step), fill=GREY, anchor="middle")


def month_axis(drawing: Drawing, x: float, width: float, y: float) -> None:
    """Months of a year below a figure."""
    drawing.line((x, y), (x + width, y), stroke=INK, width_pt=0.5)
    for place, name in enumerate(MONTHS):
        start = x + DAYS_BEFORE_MONTH[place] / 365.0 * width
        drawing.line((start, y), (start, y + 1.0), stroke=INK, width_pt=0.4)
        drawing.text(start + width / 24.0, y + 3.4, name, fill=GREY, anchor="middle")

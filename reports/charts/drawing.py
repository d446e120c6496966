"""`Drawing`: a small SVG writer in millimetres, with the report's letters and lines."""

from collections.abc import Sequence
from html import escape

from reports.charts.palette import GREY, HAIR, INK, WHITE

#: One typographic point in millimetres.
PT_MM = 25.4 / 72.0

#: Mean advance of the sans letters over their size, for placing labels; measured on running text.
LETTER_WIDTH = 0.53

FONT = "Report Sans, Report Serif"
LABEL_PT = 7.0
NAME_PT = 8.0

Point = tuple[float, float]


def text_width_mm(text: str, size_pt: float = LABEL_PT) -> float:
    """Width of a label, near enough to keep labels apart."""
    return len(text) * LETTER_WIDTH * size_pt * PT_MM


class Drawing:
    """An SVG picture that grows by lines, letters and areas.

    Parameters
    ----------
    width_mm, height_mm : float [mm]
        Size on paper; one user unit is one millimetre.
    """

    def __init__(self, width_mm: float, height_mm: float) -> None:
        self.width_mm = width_mm
        self.height_mm = height_mm
        self._parts: list[str] = []

    def text(
        self,
        x: float,
        y: float,
        words: str,
        *,
        size_pt: float = LABEL_PT,
        fill: str = INK,
        anchor: str = "start",
        bold: bool = False,
    ) -> None:
        """Letters with their baseline at y."""
        weight = 600 if bold else 400
        self._parts.append(
            f'<text x="{x:.2f}" y="{y:.2f}" font-family="{FONT}" font-size="{size_pt * PT_MM:.3f}" '
            f'fill="{fill}" text-anchor="{anchor}" font-weight="{weight}">{escape(words)}</text>'
        )

    def label(
        self, x: float, y: float, words: str, *, anchor: str = "start", bold: bool = False
    ) -> None:
        """Letters on a white ground, so that lines behind them do not cut through."""
        width = text_width_mm(words) + 1.0
        left = {"start": x - 0.5, "middle": x - width / 2, "end": x - width + 0.5}[anchor]
        self.rect(left, y - 2.1, width, 2.8, WHITE)
        self.text(x, y, words, anchor=anchor, bold=bold)

    def line(
        self,
        start: Point,
        end: Point,
        *,
        stroke: str = HAIR,
        width_pt: float = 0.3,
        dashes: str | None = None,
    ) -> None:
        """A straight line."""
        dashed = f' stroke-dasharray="{dashes}"' if dashes else ""
        self._parts.append(
            f'<line x1="{start[0]:.2f}" y1="{start[1]:.2f}" x2="{end[0]:.2f}" y2="{end[1]:.2f}" '
            f'stroke="{stroke}" stroke-width="{width_pt * PT_MM:.3f}"{dashed}/>'
        )

    def rect(self, x: float, y: float, width: float, height: float, fill: str) -> None:
        """A filled rectangle; negative sizes grow the other way."""
        x, width = (x, width) if width >= 0 else (x + width, -width)
        y, height = (y, height) if height >= 0 else (y + height, -height)
        self._parts.append(
            f'<rect x="{x:.2f}" y="{y:.2f}" width="{width:.2f}" height="{height:.2f}" '
            f'fill="{fill}"/>'
        )

    def path(
        self, data: str, *, fill: str = "none", stroke: str = "none", width_pt: float = 0.8
    ) -> None:
        """Any outline."""
        self._parts.append(
            f'<path d="{data}" fill="{fill}" stroke="{stroke}" '
            f'stroke-width="{width_pt * PT_MM:.3f}" stroke-linejoin="round"/>'
        )

    def polyline(
        self, points: Sequence[Point], *, stroke: str = INK, width_pt: float = 1.0
    ) -> None:
        """A line through points."""
        self.path(_through(points), stroke=stroke, width_pt=width_pt)

    def area(self, upper: Sequence[Point], lower: Sequence[Point], fill: str) -> None:
        """What lies between two lines that run the same way."""
        self.path(f"{_through([*upper, *reversed(lower)])}Z", fill=fill)

    def dot(self, x: float, y: float, radius_mm: float = 0.8, fill: str = INK) -> None:
        """A filled dot."""
        self._parts.append(f'<circle cx="{x:.2f}" cy="{y:.2f}" r="{radius_mm}" fill="{fill}"/>')

    def image(self, x: float, y: float, width: float, height: float, png_base64: str) -> None:
        """A picture of cells, each drawn with sharp edges."""
        self._parts.append(
            f'<image x="{x:.2f}" y="{y:.2f}" width="{width:.2f}" height="{height:.2f}" '
            'preserveAspectRatio="none" style="image-rendering:pixelated" '
            f'xlink:href="data:image/png;base64,{png_base64}"/>'
        )

    def swatches(self, x: float, y: float, entries: Sequence[tuple[str, str]]) -> None:
        """Colour and name, one beside the other, for bands too thin to carry their names."""
        for fill, name in entries:
            self.rect(x, y - 1.9, 2.4, 2.1, fill)
            self.text(x + 3.2, y, name, fill=GREY)
            x += 3.2 + text_width_mm(name) + 4.0

    def svg(self) -> str:
        """The whole picture."""
        head = (
            '<svg xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink" '
            f'width="{self.width_mm:g}mm" height="{self.height_mm:.2f}mm" '
            f'viewBox="0 0 {self.width_mm:g} {self.height_mm:.2f}">'
        )
        return "\n".join([head, *self._parts, "</svg>"])


def _through(points: Sequence[Point]) -> str:
    """Path data of a line through points."""
    return "M" + "L".join(f"{x:.2f} {y:.2f}" for x, y in points)

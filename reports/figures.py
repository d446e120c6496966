"""`Figures`: numbers the report's figures in the order they are made."""

from base64 import b64encode
from dataclasses import dataclass


@dataclass(frozen=True)
class Figure:
    """A figure with all that stands beside it.

    Parameters
    ----------
    number : int
        Counted through the report.
    title : str
        States what was found.
    see : str
        Sentence that tells what to look at.
    alt : str
        The same for those who cannot see it.
    url : str
        The picture itself, as a data URL.
    """

    number: int
    title: str
    see: str
    alt: str
    url: str


class Figures:
    """Counts figures."""

    def __init__(self) -> None:
        self._count = 0

    def add(self, svg: str, *, title: str, see: str, alt: str) -> Figure:
        """Number a picture.

        Parameters
        ----------
        svg : str
            The picture.
        title, see, alt : str
            As in `Figure`.

        Returns
        -------
        Figure
            With the next number.
        """
        self._count += 1
        return Figure(self._count, title, see, alt, svg_url(svg))


def svg_url(svg: str) -> str:
    """A picture as an address that opens no file."""
    return "data:image/svg+xml;base64," + b64encode(svg.encode("utf-8")).decode("ascii")

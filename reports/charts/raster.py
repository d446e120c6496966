"""Maps of cells as small PNG pictures, for the parts of a figure with thousands of cells."""

import base64
import struct
import zlib
from collections.abc import Sequence

import numpy as np
import numpy.typing as npt

Array = npt.NDArray[np.float64]

PNG_HEAD = b"\x89PNG\r\n\x1a\n"
EIGHT_BIT_RGB = (8, 2, 0, 0, 0)


def coloured_png_base64(shares: Array, stops: Sequence[str]) -> str:
    """A picture with one pixel a cell.

    Parameters
    ----------
    shares : array, shape (rows, columns) [-]
        Place of each cell between the first colour, 0, and the last, 1.
    stops : sequence of str
        Colours at even distances, as #RRGGBB.

    Returns
    -------
    str
        PNG in base64; the same cells give the same text.
    """
    table = np.array([[int(stop[i : i + 2], 16) for i in (1, 3, 5)] for stop in stops], dtype=float)
    place = np.clip(shares, 0.0, 1.0) * (len(stops) - 1)
    below = np.minimum(place.astype(int), len(stops) - 2)
    part = (place - below)[..., None]
    colours = (table[below] * (1.0 - part) + table[below + 1] * part).round().astype(np.uint8)
    rows, columns = shares.shape
    raw = b"".join(b"\0" + colours[row].tobytes() for row in range(rows))
    size = struct.pack(">IIBBBBB", columns, rows, *EIGHT_BIT_RGB)
    parts = (_chunk(b"IHDR", size), _chunk(b"IDAT", zlib.compress(raw, 9)), _chunk(b"IEND", b""))
    return base64.b64encode(PNG_HEAD + b"".join(parts)).decode("ascii")


def _chunk(kind: bytes, content: bytes) -> bytes:
    """Length, kind, content and check sum of one part of a PNG file."""
    check = zlib.crc32(kind + content)
    return struct.pack(">I", len(content)) + kind + content + struct.pack(">I", check)

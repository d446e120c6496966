"""Delimited text into columns of strings: the checks that every table shares."""

import csv
import difflib
import io
from dataclasses import dataclass
from pathlib import Path

import numpy as np
import pandas as pd

from load_profiles.arrays import FloatArray, IntArray
from load_profiles.declarations import Layout
from load_profiles.faults import Fault, ProfileError
from load_profiles.row_faults import row_faults, shown

#: Larger files are refused before they are read; a year of minutes is 20 MB.
LARGEST_FILE_BYTES = 50_000_000

#: Cells that stand for a value that is not there.
NO_VALUE = frozenset({"", "-", "na", "n/a", "#n/a", "nan", "null", "none"})

_DELIMITERS = {",": "comma", ";": "semicolon", "\t": "tab", "|": "pipe"}
_MAGIC = (b"PK\x03\x04", b"\xd0\xcf\x11\xe0", b"%PDF", b"\x89PNG", b"\xff\xd8\xff", b"\x1f\x8b")


@dataclass(frozen=True)
class TextTable:
    """Cells of one delimited text file, still as written.

    Parameters
    ----------
    file : str
        File name for messages.
    rows : array of int, shape (rows,)
        Line number of each row in the file, from 1.
    columns : dict of str to list of str
        Cells by header, without blanks around them.
    decimal : str
        Decimal mark.
    """

    file: str
    rows: IntArray
    columns: dict[str, list[str]]
    decimal: str

    def numbers(self, column: str, faults: list[Fault]) -> FloatArray:
        """A column as numbers, NaN where no value stands; text becomes a fault.

        Parameters
        ----------
        column : str
            Header.
        faults : list of Fault
            Faults found are added here.

        Returns
        -------
        array, shape (rows,)
            Finite numbers and NaN.
        """
        cells = self.columns[column]
        empty = np.array([cell.lower() in NO_VALUE for cell in cells], dtype=bool)
        if self.decimal == ",":  # a point is then no decimal mark, and must not become one
            plain = ["?" if "." in cell else cell.replace(",", ".") for cell in cells]
        else:
            plain = cells
        parsed = pd.to_numeric(pd.Series(plain, dtype=object), errors="coerce")
        values = np.where(empty, np.nan, parsed.to_numpy(dtype=float))
        wrong = np.flatnonzero(~empty & ~np.isfinite(values))
        came = [f'{column} "{cells[place]}"' for place in wrong]
        must = f'must be a number with "{self.decimal}" as decimal mark and no thousands mark'
        faults += row_faults(self.file, self.rows[wrong].tolist(), came, must)
        return np.asarray(np.where(np.isfinite(values), values, np.nan))


def read_text_table(folder: Path, layout: Layout, columns: dict[str, str]) -> TextTable:
    """Read the declared columns of a delimited text file.

    Parameters
    ----------
    folder : Path
        Folder of the study file.
    layout : Layout
        How the file is written.
    columns : dict of str to str
        Header wanted, and the key of the study file that names it, for messages.

    Returns
    -------
    TextTable
        Blank lines left out.

    Raises
    ------
    ProfileError
        With every fault of the file's form.
    """
    records = _records(_text(folder / layout.file, layout.file), layout)
    if not records:
        raise _refusal(layout.file, "no header row", f"must have one after {layout.skip_rows} rows")
    (header_row, header), body = records[0], records[1:]
    header = [cell.strip() for cell in header]
    faults = _header_faults(layout, header_row, header, columns)
    if faults:
        raise ProfileError(tuple(faults))
    if not body:
        raise _refusal(layout.file, "a header and nothing below it", "must hold rows of data")
    faults = _width_faults(layout.file, body, len(header))
    if faults:
        raise ProfileError(tuple(faults))
    places = {name: header.index(name) for name in columns}
    return TextTable(
        file=layout.file,
        rows=np.array([row for row, _ in body], dtype=np.int64),
        columns={
            name: [record[place].strip() for _, record in body] for name, place in places.items()
        },
        decimal=layout.decimal,
    )


def _refusal(file: str, came: str, must: str) -> ProfileError:
    """A file that cannot be read at all."""
    return ProfileError((Fault(file, came, must),))


def _text(path: Path, file: str) -> str:
    """The file's text, or what stands in its place."""
    raw = _bytes(path, file)
    if not raw.strip():
        raise _refusal(file, "an empty file", "must hold a header and rows of data")
    if raw.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise _refusal(file, "UTF-16 text", "must be UTF-8; save it as CSV UTF-8")
    if b"\x00" in raw[:65536] or raw.startswith(_MAGIC):
        raise _refusal(file, "a binary file", "must be delimited text; export it as CSV")
    try:
        return raw.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        row = raw.count(b"\n", 0, error.start) + 1
        came = f"byte 0x{raw[error.start]:02X}"
        raise _refusal(f"{file} row {row}", came, "is not UTF-8; save it as CSV UTF-8") from None


def _bytes(path: Path, file: str) -> bytes:
    """The file's content, unless it is no file or far too large."""
    if path.is_dir():
        raise _refusal(file, "a folder", "must be a file")
    try:
        size = path.stat().st_size
        if size > LARGEST_FILE_BYTES:
            most = f"must not exceed {LARGEST_FILE_BYTES // 1_000_000} MB"
            raise _refusal(file, f"{size / 1e6:.0f} MB", f"{most}; is it the right file?")
        return path.read_bytes()
    except FileNotFoundError:
        must = f"must be in the folder {path.parent.name}, beside the study file"
        raise _refusal(file, "no such file", must) from None
    except OSError as error:
        raise _refusal(file, error.strerror or str(error), "must be readable") from None


def _records(text: str, layout: Layout) -> list[tuple[int, list[str]]]:
    """Line number and cells of each row that is not blank, from the header on."""
    above = layout.skip_rows
    table = "".join(io.StringIO(text, newline="").readlines()[above:])  # prose may hold a quote
    reader = csv.reader(io.StringIO(table, newline=""), delimiter=layout.delimiter)
    try:
        return [
            (above + reader.line_num, record) for record in reader if any(map(str.strip, record))
        ]
    except csv.Error as error:
        raise _refusal(
            f"{layout.file} row {above + reader.line_num}", str(error), "is no CSV"
        ) from None


def _header_faults(
    layout: Layout, row: int, header: list[str], columns: dict[str, str]
) -> list[Fault]:
    """Headers that are not there or stand twice."""
    path = f"{layout.file} row {row}"
    if len(header) == 1 and len(columns) > 1:
        others = [mark for mark in _DELIMITERS if mark != layout.delimiter and mark in header[0]]
        declared = _DELIMITERS[layout.delimiter]
        hint = f"; is the delimiter a {_DELIMITERS[others[0]]}?" if others else ""
        must = f"must hold {len(columns)} or more columns parted by a {declared}{hint}"
        return [Fault(path, f'one column "{shown(header[0])}"', must)]
    faults = []
    for name, key in columns.items():
        if header.count(name) > 1:
            faults.append(Fault(path, f'"{name}" twice', f"{key} must name one column"))
        elif name not in header:
            near = difflib.get_close_matches(name, header, n=1, cutoff=0.4)
            listed = shown(", ".join(filter(None, header)))
            advice = f'nearest is "{shown(near[0])}"' if near else f"the columns are: {listed}"
            must = f'has no column "{name}" that {key} names; {advice}'
            faults.append(Fault(path, "header", must))
    return faults


def _width_faults(file: str, body: list[tuple[int, list[str]]], width: int) -> list[Fault]:
    """Rows with fewer or more cells than the header."""
    wrong = [(row, len(record)) for row, record in body if len(record) != width]
    came = [f"{cells} column{'s' if cells > 1 else ''}" for _, cells in wrong]
    return row_faults(
        file, [row for row, _ in wrong], came, f"must have {width}, as the header has"
    )

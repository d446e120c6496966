"""Faults of many rows of one file, the first few by name and the rest counted."""

from collections.abc import Sequence

from load_profiles.faults import Fault

#: Rows that are named one by one before the rest is counted.
NAMED_ROWS = 5


def shown(text: str, *, longest: int = 80) -> str:
    r"""A text from a file as a message can hold it.

    Parameters
    ----------
    text : str
        Anything that stands in a file.
    longest : int
        Characters kept.

    Returns
    -------
    str
        One line, without control characters, cut where it is too long.

    Examples
    --------
    >>> shown("two\nlines\x1b")
    'two lines?'
    """
    line = "".join(mark if mark.isprintable() else "?" for mark in " ".join(text.split()))
    return line if len(line) <= longest else line[: longest - 1] + "…"


def row_faults(file: str, rows: Sequence[int], came: Sequence[str], must: str) -> list[Fault]:
    """Faults of the same kind in several rows.

    Parameters
    ----------
    file : str
        File name.
    rows : sequence of int
        Line numbers in the file, from 1.
    came : sequence of str
        What stands there.
    must : str
        What it must be.

    Returns
    -------
    list of Fault
        One a row up to `NAMED_ROWS`, then one with the number of the others.
    """
    named = zip(rows[:NAMED_ROWS], came[:NAMED_ROWS], strict=True)
    faults = [Fault(f"{file} row {row}", shown(text), must) for row, text in named]
    if len(rows) > NAMED_ROWS:
        others = f"{len(rows) - NAMED_ROWS} more rows like these, to row {rows[-1]}"
        faults.append(Fault(file, others, must))
    return faults

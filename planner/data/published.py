"""Published values: rows of the CSV files beside this module, by key."""

import csv
from functools import cache
from importlib.resources import files


@cache
def published_rows(file: str) -> dict[str, dict[str, str]]:
    """Rows of a data file by their keys.

    Parameters
    ----------
    file : str
        Name of a CSV file under `planner/data`, with a column `key`.

    Returns
    -------
    dict of str to dict
        Each row as it stands, in its published unit.
    """
    text = (files("planner.data") / file).read_text(encoding="utf-8")
    return {row["key"]: row for row in csv.DictReader(text.splitlines())}

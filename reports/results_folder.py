"""A results folder read and checked: the one thing that every section and figure is made from."""

import json
import re
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import numpy as np
import pandas as pd
from jsonschema import Draft202012Validator

from reports.errors import ReportError
from reports.hourly_columns import LOCAL_START, NUMBERS

#: Newest format of `results.json` that can be read.
FORMAT = 1

#: A results file is under a megabyte; anything above this is something else.
MOST_BYTES = 40_000_000

#: Faults told at once; more would hide the first.
MOST_FAULTS = 20

SCHEMA_FILE = Path(__file__).parent / "results.schema.json"
SAFE_KEY = re.compile(r"[A-Za-z0-9_-]{1,120}")
LEAP_YEAR_HOURS = (8760.0, 8784.0)

Facts = dict[str, Any]


@dataclass(frozen=True)
class ResultsFolder:
    """Everything a report may use.

    Parameters
    ----------
    path : Path
        The folder.
    facts : dict
        Content of `results.json`, valid against its schema.
    hourly : dict of key to DataFrame
        Flows of each option and of "separate", indexed by the local clock without its offset.
    """

    path: Path
    facts: Facts
    hourly: dict[str, pd.DataFrame]

    @property
    def heading(self) -> Facts:
        """Names, places and the frame of money."""
        return self.facts["heading"]

    @property
    def currency(self) -> str:
        """Currency of every amount."""
        return str(self.heading["currency"])

    @property
    def step_h(self) -> float:
        """Length of a step [h]."""
        return float(self.facts["demand"]["step_h"])

    @property
    def steps_a_day(self) -> int:
        """Steps in a day of 24 hours."""
        return round(24.0 / self.step_h)

    @property
    def is_advised(self) -> bool:
        """Whether any option is worth building."""
        return self.facts["verdict"]["recommended"] is not None

    @property
    def subject(self) -> Facts:
        """The option that the report follows: the advised one, else the best of them."""
        return self.option(self.facts["verdict"]["recommended"] or self.facts["verdict"]["best"])

    @property
    def others(self) -> list[Facts]:
        """Every other option."""
        return [option for option in self.facts["options"] if option is not self.subject]

    def option(self, key: str) -> Facts:
        """One option by its key."""
        return next(option for option in self.facts["options"] if option["key"] == key)


def read_results(folder: Path) -> ResultsFolder:
    """Read a results folder.

    Parameters
    ----------
    folder : Path
        As a plan writes it.

    Returns
    -------
    ResultsFolder
        Valid and complete.

    Raises
    ------
    ReportError
        With all faults of the stage that failed: the file, its records, the hourly files.
    """
    if not folder.is_dir():
        came = "a file" if folder.exists() else "nothing there"
        raise ReportError(f"{folder} = {came}: must be a results folder, as a plan writes it")
    facts = _read_json(folder / "results.json")
    _check_format(facts, folder / "results.json")
    _refuse(_schema_faults(facts))
    _refuse(list(_reference_faults(facts)))
    keys = ["separate", *(option["key"] for option in facts["options"])]
    faults: list[str] = []
    hourly = {key: _read_hourly(folder / f"hourly_{key}.csv", facts, faults) for key in keys}
    _refuse(faults)
    return ResultsFolder(folder, facts, hourly)


def _refuse(faults: list[str]) -> None:
    """Raise all faults together, if there are any."""
    if len(faults) > MOST_FAULTS:
        faults = [*faults[:MOST_FAULTS], f"and {len(faults) - MOST_FAULTS} more"]
    if faults:
        raise ReportError(*faults)


def _read_json(path: Path) -> Any:
    """Content of a JSON file; NaN and infinity are no JSON."""
    if not path.is_file():
        raise ReportError(f"{path} = nothing there: plan the study again to make it")
    if path.stat().st_size > MOST_BYTES:
        raise ReportError(f"{path} = {path.stat().st_size} bytes: no results file is that large")
    try:
        return json.loads(path.read_text(encoding="utf-8"), parse_constant=_no_constant)
    except (UnicodeDecodeError, ValueError, RecursionError) as error:
        came = "no text" if isinstance(error, UnicodeDecodeError) else str(error)
        raise ReportError(f"{path} = {came}: must be JSON; plan the study again") from None


def _no_constant(name: str) -> float:
    """Refuse what a calculation must not leave behind."""
    raise ValueError(f"{name} where a number belongs")


def _check_format(facts: Any, path: Path) -> None:
    """Refuse a file of another time before its records are looked at."""
    came = facts.get("format") if isinstance(facts, dict) else None
    if isinstance(came, int) and came > FORMAT:
        raise ReportError(
            f"{path}: format = {came}: this program reads up to format {FORMAT}; "
            "install the newer one that wrote these results, or plan the study again"
        )


def _schema_faults(facts: Any) -> list[str]:
    """Every place where the records break their schema."""
    validator = Draft202012Validator(json.loads(SCHEMA_FILE.read_text(encoding="utf-8")))
    return [
        f"results.json: {_place(error.absolute_path)}: {error.message[:200]}"
        for error in sorted(validator.iter_errors(facts), key=lambda error: str(error.path))
    ]


def _place(path: Any) -> str:
    """Path into the file, as one would type it."""
    text = "".join(f"[{part}]" if isinstance(part, int) else f".{part}" for part in path)
    return text.lstrip(".") or "the whole file"


def _reference_faults(facts: Facts) -> Iterator[str]:
    """What a schema cannot say: keys that name files and each other."""
    keys = [option["key"] for option in facts["options"]]
    for key in keys:
        if not SAFE_KEY.fullmatch(key):
            yield f"results.json: options.key = {key!r}: must be letters, digits, - and _"
    if len(set(keys)) < len(keys) or "separate" in keys:
        yield f"results.json: options.key = {', '.join(keys)}: each must be there once"
    for field in ("best", "recommended"):
        named = facts["verdict"][field]
        if named is not None and named not in keys:
            yield f"results.json: verdict.{field} = {named!r}: must be the key of an option"
    if not 0.0 < facts["demand"]["step_h"] <= 1.0:
        yield f"results.json: demand.step_h = {facts['demand']['step_h']}: must be at most an hour"


def _read_hourly(path: Path, facts: Facts, faults: list[str]) -> pd.DataFrame:
    """Flows of one year; faults are added to the list."""
    if not path.is_file():
        faults.append(f"{path} = nothing there: plan the study again to make it")
        return pd.DataFrame()
    try:
        frame = pd.read_csv(path)
    except (ValueError, UnicodeDecodeError) as error:
        faults.append(f"{path} = {error}: must be a table of comma-separated values")
        return pd.DataFrame()
    missing = [name for name in (LOCAL_START, *NUMBERS) if name not in frame]
    if missing:
        faults.append(f"{path} = without {', '.join(missing)}: must have these columns")
        return pd.DataFrame()
    faults += list(_hourly_faults(path, frame, float(facts["demand"]["step_h"])))
    return _on_local_clock(path, frame, faults)


def _hourly_faults(path: Path, frame: pd.DataFrame, step_h: float) -> Iterator[str]:
    """Length of the year and numbers in every cell."""
    if not any(round(hours / step_h) == len(frame) for hours in LEAP_YEAR_HOURS):
        yield f"{path} = {len(frame)} rows: must be a whole year in steps of {step_h:g} h"
    for name in NUMBERS:
        values = pd.to_numeric(frame[name], errors="coerce").to_numpy(dtype=np.float64)
        wrong = np.flatnonzero(~np.isfinite(values))
        if wrong.size:
            came = frame[name].iloc[wrong[0]]
            yield f"{path} row {wrong[0] + 2}: {name} = {came}: must be a number"


def _on_local_clock(path: Path, frame: pd.DataFrame, faults: list[str]) -> pd.DataFrame:
    """Frame indexed by what the clock on the wall showed."""
    stamps = frame[LOCAL_START].astype(str).str.slice(0, 19)
    clock = pd.to_datetime(stamps, errors="coerce", format="ISO8601")
    if clock.isna().any():
        row = int(np.flatnonzero(clock.isna().to_numpy())[0])
        came = frame[LOCAL_START].iloc[row]
        faults.append(f"{path} row {row + 2}: {LOCAL_START} = {came}: must be an ISO 8601 stamp")
    return frame[list(NUMBERS)].set_axis(pd.DatetimeIndex(clock), axis="index")

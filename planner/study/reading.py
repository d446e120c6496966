"""A study file read strictly: every fault of the file at once, each with its path."""

import json
import tomllib
from dataclasses import dataclass
from datetime import date, datetime, time
from pathlib import Path
from typing import Any

from pydantic import ValidationError

from load_profiles import Fault
from planner.errors import StudyError
from planner.study.checks import study_faults
from planner.study.complaints import faults_from_validation
from planner.study.study import Study

#: A study file is written by hand; anything larger is some other file.
LARGEST_STUDY_BYTES = 1_000_000

#: Newest file format that this version reads.
NEWEST_FORMAT = 1


@dataclass(frozen=True)
class StudyFile:
    """A study and where it was read from.

    Parameters
    ----------
    study : Study
        Validated, with defaults filled in.
    path : Path
        The study file; the files it names lie relative to its folder.
    """

    study: Study
    path: Path

    @property
    def folder(self) -> Path:
        """Folder of the study file, against which it names its data files."""
        return self.path.parent


def load_study(path: str | Path) -> StudyFile:
    """Read and validate a study file.

    Parameters
    ----------
    path : str or Path
        The `study.toml`, or the folder that holds one.

    Returns
    -------
    StudyFile
        The study and its place.

    Raises
    ------
    StudyError
        With all faults of the file: unreadable, unknown keys, wrong types, values out of range,
        sections that contradict each other.
    """
    file = Path(path)
    if file.is_dir() and (file / "study.toml").is_file():
        file = file / "study.toml"
    document = _parse(_text(file), file)
    _check_format(document, file)

    try:
        # JSON carries arrays and dates into strict validation; TOML's own types would need
        # tuples, which TOML does not have.
        study = Study.model_validate_json(json.dumps(document, default=_iso))
    except ValidationError as error:
        raise StudyError(faults_from_validation(error, document)) from None
    faults = study_faults(study)
    if faults:
        raise StudyError(faults)
    return StudyFile(study, file)


def _text(file: Path) -> str:
    """Content of a plausible study file."""
    if file.is_dir():
        raise _refusal(file, "a folder without study.toml", "name a study file")
    if not file.exists():
        raise _refusal(file, "no such file", "name a study file, or make one with `flueprint new`")
    size = file.stat().st_size
    if size > LARGEST_STUDY_BYTES:
        raise _refusal(file, f"{size / 1e6:.1f} MB", "a study file has less than 1 MB of text")
    try:
        text = file.read_bytes().decode("utf-8-sig")
    except UnicodeDecodeError as error:
        came = f"byte 0x{error.object[error.start]:02x} at {error.start}"
        raise _refusal(file, came, "must be text in UTF-8") from None
    if not text.strip():
        raise _refusal(file, "an empty file", "start from `flueprint new FOLDER --kind hospital`")
    return text


def _parse(text: str, file: Path) -> dict[str, Any]:
    """TOML document of the text."""
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise _refusal(file, str(error), "must be valid TOML 1.0") from None


def _check_format(document: dict[str, Any], file: Path) -> None:
    """Refuse a file whose format does not stand first or is newer than this version."""
    first = next(iter(document), None)
    version = document.get("format")
    if first != "format":
        raise StudyError((Fault("format", "not the first key", "`format = 1` must stand first"),))
    if isinstance(version, int) and version > NEWEST_FORMAT:
        must = f"this version reads formats up to {NEWEST_FORMAT}; install a newer flueprint"
        raise StudyError((Fault(f"{file.name}: format", str(version), must),))


def _refusal(file: Path, came: str, must: str) -> StudyError:
    """A study file that cannot be read at all."""
    return StudyError((Fault(str(file), came, must),))


def _iso(value: object) -> str:
    """TOML dates as ISO text, the only values that JSON does not know."""
    if isinstance(value, date | datetime | time):
        return value.isoformat()
    raise TypeError(f"a {type(value).__name__} cannot stand in a study file")

"""What a results folder must be, and how one that is not is refused."""

import copy
import json
import shutil
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

from planner.results.hourly_columns import HOURLY_COLUMNS
from planner.schemas import results_schema
from reports.errors import ReportError
from reports.hourly_columns import LOCAL_START, NUMBERS
from reports.pdf import write_report
from reports.results_folder import SCHEMA_FILE, read_results
from tests.reports.invented_results import rewrite


@pytest.fixture
def broken(hospital_folder: Path, tmp_path: Path) -> Path:
    """A copy that a test may spoil."""
    ignored = shutil.ignore_patterns("report.pdf")
    return Path(shutil.copytree(hospital_folder, tmp_path / "results", ignore=ignored))


def test_schema_is_the_planner_s() -> None:
    """The schema beside the reader is the one that the planner's records give today."""
    assert json.loads(SCHEMA_FILE.read_text(encoding="utf-8")) == results_schema()


def test_hourly_columns_are_the_planner_s() -> None:
    """Every column that a figure draws is one that the planner writes."""
    assert {LOCAL_START, *NUMBERS} <= set(HOURLY_COLUMNS)


def test_whole_folder_is_read(hospital_folder: Path) -> None:
    """The advised option is followed, the other one set beside it."""
    results = read_results(hospital_folder)

    assert results.is_advised
    assert results.subject["name"] == "4.0 MW turbine with store"
    assert [option["name"] for option in results.others] == ["2.4 MW turbine"]
    assert {len(frame) for frame in results.hourly.values()} == {8760}


def _newer(facts: dict[str, Any]) -> None:
    facts["format"] = 2


def _unknown_key(facts: dict[str, Any]) -> None:
    facts["heading"]["colour"] = "red"


def _missing_key(facts: dict[str, Any]) -> None:
    del facts["options"][1]["economics"]["npv_real"]


def _word_for_number(facts: dict[str, Any]) -> None:
    facts["options"][0]["economics"]["capital"]["total"] = "ten million"


def _unsafe_key(facts: dict[str, Any]) -> None:
    facts["options"][0]["key"] = "../../etc/passwd"
    facts["verdict"]["best"] = facts["verdict"]["recommended"] = "../../etc/passwd"


def _twins(facts: dict[str, Any]) -> None:
    facts["options"][1]["key"] = facts["options"][0]["key"]


def _stranger(facts: dict[str, Any]) -> None:
    facts["verdict"]["recommended"] = "option_9"


def _step(facts: dict[str, Any]) -> None:
    facts["demand"]["step_h"] = 0.0


@pytest.mark.parametrize(
    ("spoil", "told"),
    [
        (_newer, "format = 2: this program reads up to format 1"),
        (_unknown_key, "heading: Additional properties are not allowed ('colour'"),
        (_missing_key, "options[1].economics: 'npv_real' is a required property"),
        (_word_for_number, "options[0].economics.capital.total: 'ten million' is not of type"),
        (_unsafe_key, "options.key = '../../etc/passwd': must be letters"),
        (_twins, "each must be there once"),
        (_stranger, "verdict.recommended = 'option_9': must be the key of an option"),
        (_step, "demand.step_h = 0.0: must be at most an hour"),
    ],
)
def test_records_that_cannot_be_reported(
    broken: Path, spoil: Callable[[dict[str, Any]], None], told: str
) -> None:
    """Each fault names its place, what came and what to do."""
    facts = json.loads((broken / "results.json").read_text(encoding="utf-8"))
    spoil(facts)
    rewrite(broken, facts)

    with pytest.raises(ReportError) as caught:
        read_results(broken)

    assert told in str(caught.value)


def test_all_faults_of_the_records_together(broken: Path) -> None:
    """Two wrong records are told at once."""
    facts = json.loads((broken / "results.json").read_text(encoding="utf-8"))
    _unknown_key(facts)
    _missing_key(facts)
    rewrite(broken, facts)

    with pytest.raises(ReportError) as caught:
        read_results(broken)

    assert len(caught.value.faults) == 2


@pytest.mark.parametrize(
    ("content", "told"),
    [
        (b"", "must be JSON"),
        (b"\xff\xfe\x00binary", "no text: must be JSON"),
        (b'{"format": 1, "price": NaN}', "NaN where a number belongs"),
        (b"[1, 2]", "the whole file: [1, 2] is not of type 'object'"),
        (b"[" * 200_000, "must be JSON"),
    ],
)
def test_files_that_are_no_results(broken: Path, content: bytes, told: str) -> None:
    """Whatever lies under the name of results is refused in words, never with a traceback."""
    (broken / "results.json").write_bytes(content)

    with pytest.raises(ReportError) as caught:
        read_results(broken)

    assert told in str(caught.value)


def test_missing_hourly_files_are_named_together(broken: Path) -> None:
    """Every hourly file that is not there is named."""
    (broken / "hourly_separate.csv").unlink()
    (broken / "hourly_option_2.csv").unlink()

    with pytest.raises(ReportError) as caught:
        write_report(broken)

    assert [fault.split(" = ")[1][:13] for fault in caught.value.faults] == ["nothing there"] * 2
    assert not (broken / "report.pdf").exists()


def _drop_rows(lines: list[str]) -> list[str]:
    return lines[:5000]


def _drop_column(lines: list[str]) -> list[str]:
    place = lines[0].split(",").index("grid_import_kW")
    return [",".join(c for i, c in enumerate(line.split(",")) if i != place) for line in lines]


def _word_in_cell(lines: list[str]) -> list[str]:
    cells = lines[40].split(",")
    cells[lines[0].split(",").index("unit_power_kW")] = "off"
    return [*lines[:40], ",".join(cells), *lines[41:]]


def _no_stamp(lines: list[str]) -> list[str]:
    cells = lines[7].split(",")
    cells[lines[0].split(",").index("local_start")] = "yesterday"
    return [*lines[:7], ",".join(cells), *lines[8:]]


@pytest.mark.parametrize(
    ("spoil", "told"),
    [
        (_drop_rows, "4999 rows: must be a whole year in steps of 1 h"),
        (_drop_column, "without grid_import_kW: must have these columns"),
        (_word_in_cell, "row 41: unit_power_kW = off: must be a number"),
        (_no_stamp, "row 8: local_start = yesterday: must be an ISO 8601 stamp"),
    ],
)
def test_hourly_files_that_cannot_be_drawn(
    broken: Path, spoil: Callable[[list[str]], list[str]], told: str
) -> None:
    """A spoilt hourly file is told with its row and column."""
    path = broken / "hourly_option_1.csv"
    path.write_text("\n".join(spoil(path.read_text(encoding="utf-8").splitlines())) + "\n", "utf-8")

    with pytest.raises(ReportError) as caught:
        read_results(broken)

    assert told in str(caught.value)


def test_week_outside_the_year_is_refused(broken: Path) -> None:
    """A week that the hourly files do not hold cannot be drawn."""
    facts = json.loads((broken / "results.json").read_text(encoding="utf-8"))
    moved = copy.deepcopy(facts)
    moved["weeks"]["winter_monday"] = "1999-01-04"
    rewrite(broken, moved)

    with pytest.raises(ReportError, match=r"weeks = 1999-01-04: must begin a week"):
        write_report(broken)


def test_places_that_cannot_be_written(hospital_folder: Path, tmp_path: Path) -> None:
    """A folder, and a folder that is not there, are refused before the report is set."""
    with pytest.raises(ReportError, match="a folder: must be the name of a PDF file"):
        write_report(hospital_folder, tmp_path)
    with pytest.raises(ReportError, match="nothing there: must be a folder that exists"):
        write_report(hospital_folder, tmp_path / "nowhere" / "report.pdf")


@pytest.mark.parametrize("name", ["missing", "file.txt"])
def test_what_is_no_folder(tmp_path: Path, name: str) -> None:
    """A file and a name that nothing bears are no results folder."""
    (tmp_path / "file.txt").write_text("hello", encoding="utf-8")

    with pytest.raises(ReportError, match="must be a results folder"):
        read_results(tmp_path / name)

"""Bad input ends with exit code 2, says where, what came and what to do, and writes nothing."""

import json
import re
from pathlib import Path

import pytest

from planner import cli
from planner.study.starter import write_starter


@pytest.fixture
def study(tmp_path: Path) -> Path:
    """A starter study of a hospital in a folder of its own."""
    return write_starter(tmp_path / "site", "hospital")


def _edit(study: Path, key: str, value: str) -> None:
    """Give a new value to the first line that sets a key."""
    text = study.read_text(encoding="utf-8")
    edited, count = re.subn(rf"(?m)^{key} = .*$", f"{key} = {value}", text, count=1)
    assert count == 1, f"the starter no longer sets {key}"
    study.write_text(edited, encoding="utf-8")


def _refused(study: Path, capsys: pytest.CaptureFixture[str]) -> str:
    """What the user reads when planning is refused; nothing may have been written."""
    before = sorted(path.name for path in study.parent.iterdir())

    assert cli.run(["plan", str(study)]) == cli.BAD_INPUT

    assert sorted(path.name for path in study.parent.iterdir()) == before
    streams = capsys.readouterr()
    assert "Traceback" not in streams.err
    return streams.err


def test_missing_data_file(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A meter file that is not there is named."""
    (study.parent / "power.csv").unlink()

    message = _refused(study, capsys)

    assert "power.csv" in message
    assert "no such file" in message


def test_unknown_key(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """An unknown key is answered with the nearest known one."""
    text = study.read_text(encoding="utf-8").replace("altitude_m =", "altitude =", 1)
    study.write_text(text, encoding="utf-8")

    assert "site.altitude" in (message := _refused(study, capsys))
    assert "did you mean `altitude_m`?" in message


def test_number_for_a_date(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A number where a day belongs is answered with an example of a day."""
    _edit(study, "first_day", "12")

    assert "first_day = 12: must be a date such as 2025-08-04" in _refused(study, capsys)


def test_negative_price(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A price that cannot be negative is refused with its path."""
    _edit(study, "commodity_per_hhv_kWh", "-0.03")

    message = _refused(study, capsys)

    assert "gas_tariff.commodity_per_hhv_kWh = -0.03: must be at least 0" in message


def test_percentage_for_a_share(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """An efficiency of 35 is taken for what it is: a percentage."""
    text = study.read_text(encoding="utf-8")
    sheet = text.index("[option.unit.sheet]")
    edited = re.sub(r"(?m)^efficiency_frac = .*$", "efficiency_frac = 35", text[sheet:], count=1)
    study.write_text(text[:sheet] + edited, encoding="utf-8")

    message = _refused(study, capsys)

    assert "option[1].unit.sheet.efficiency_frac = 35: must be less than 0.5" in message
    assert "in percent? write 0.35" in message


def test_part_load_range_upside_down(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A guarantee that begins above full load is refused."""
    _edit(study, "from_load_frac", "1.0")

    assert "the load range is upside down" in _refused(study, capsys)


def test_meter_file_with_too_few_columns(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A meter file that lost a column is refused with the row."""
    meter = study.parent / "power.csv"
    rows = meter.read_text(encoding="utf-8").splitlines()
    rows[100] = rows[100].replace(",", " ").replace(";", " ")
    meter.write_text("\n".join(rows) + "\n", encoding="utf-8")

    message = _refused(study, capsys)

    assert "power.csv" in message
    assert "101" in message


def test_year_with_hours_missing(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A meter file with two fifths of its hours missing is refused with the share."""
    meter = study.parent / "power.csv"
    rows = meter.read_text(encoding="utf-8").splitlines()
    kept = [row for number, row in enumerate(rows) if number < 10 or number % 5 < 3]
    meter.write_text("\n".join(kept) + "\n", encoding="utf-8")

    message = _refused(study, capsys)

    assert "power.csv" in message
    assert "40" in message
    assert "%" in message


def test_demand_that_no_plant_can_meet(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A connection that is too small is told with the hour and the shortfall."""
    _edit(study, "import_limit_kW", "900")

    message = _refused(study, capsys)

    assert "power" in message
    assert re.search(r"\d{4}-\d{2}-\d{2}", message), "the hour must be named"
    assert re.search(r"[\d ,.]+kW", message), "the shortfall must be named"


@pytest.mark.parametrize(
    ("content", "expected"),
    [
        (b"", "an empty file"),
        (b"\x89PNG\r\n\x1a\n\x00\xff", "must be text in UTF-8"),
        (b" " * 50_000_000, "50.0 MB"),
    ],
    ids=["empty", "binary", "huge"],
)
def test_study_that_is_no_study(
    study: Path, content: bytes, expected: str, capsys: pytest.CaptureFixture[str]
) -> None:
    """An empty, binary or huge study file is refused for what it is."""
    study.write_bytes(content)

    assert expected in _refused(study, capsys)


def test_study_that_is_a_folder(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A folder without a study is refused."""
    assert cli.run(["plan", str(tmp_path)]) == cli.BAD_INPUT
    assert "a folder without study.toml" in capsys.readouterr().err


def test_results_of_a_newer_format(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A results folder from a newer version is refused with a sentence."""
    (tmp_path / "results.json").write_text(json.dumps({"format": 99}), encoding="utf-8")

    assert cli.run(["report", str(tmp_path)]) == cli.BAD_INPUT
    assert "newer" in capsys.readouterr().err


def test_place_that_holds_other_things(
    study: Path, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    """A folder that is no results folder is never written into."""
    taken = tmp_path / "taken"
    taken.mkdir()
    (taken / "letter.txt").write_text("mine", encoding="utf-8")

    assert cli.run(["plan", str(study), "--into", str(taken)]) == cli.BAD_INPUT

    assert "a folder of other things" in capsys.readouterr().err
    assert (taken / "letter.txt").read_text(encoding="utf-8") == "mine"


def test_read_only_target(study: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A target that cannot be written is told before the work; not even root can write there."""
    assert cli.run(["plan", str(study), "--into", "/proc/results"]) == cli.BAD_INPUT

    assert "name a folder that you may write" in capsys.readouterr().err


def test_unknown_option_and_command(capsys: pytest.CaptureFixture[str]) -> None:
    """A mistyped command line ends like any other bad input."""
    assert cli.run(["plam"]) == cli.BAD_INPUT
    assert cli.run(["plan", "--sudden"]) == cli.BAD_INPUT
    assert "No such command" in capsys.readouterr().err


def test_starter_never_overwrites(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A folder that holds something is not filled with a starter."""
    (tmp_path / "mine.txt").write_text("mine", encoding="utf-8")

    assert cli.run(["new", str(tmp_path), "--kind", "factory"]) == cli.BAD_INPUT
    assert "name a folder that is new or empty" in capsys.readouterr().err

"""Study files: read strictly, every fault at once, each with its path."""

import re
import tomllib
from pathlib import Path
from typing import Any

import pytest

from planner.errors import StudyError
from planner.study.defaults import defaults_used
from planner.study.reading import load_study

REPO = Path(__file__).parents[2]
SITES = [REPO / "load_profiles" / "demo_sites" / kind for kind in ("hospital", "factory")]
HOSPITAL = SITES[0] / "study.toml"


def _faults(path: Path) -> str:
    """Message of the refusal."""
    with pytest.raises(StudyError) as refusal:
        load_study(path)
    return str(refusal.value)


def _edited(tmp_path: Path, *edits: tuple[str, str]) -> Path:
    """The hospital's study with pieces of its text replaced."""
    text = HOSPITAL.read_text(encoding="utf-8")
    for old, new in edits:
        assert old in text, f"the demo study no longer has {old!r}"
        text = text.replace(old, new, 1)
    study = tmp_path / "study.toml"
    study.write_text(text, encoding="utf-8")
    return study


def _lines(name: str) -> str:
    """The demo study's first line that sets a key."""
    text = HOSPITAL.read_text(encoding="utf-8")
    return next(line for line in text.splitlines() if line.startswith(f"{name} ="))


@pytest.mark.parametrize("site", SITES, ids=lambda site: site.name)
def test_demo_studies_are_read(site: Path) -> None:
    """Both demo studies are valid and keep what they state."""
    source = load_study(site)

    document: dict[str, Any] = tomllib.loads((site / "study.toml").read_text(encoding="utf-8"))
    assert source.study.site.name == document["site"]["name"]
    assert len(source.study.option) == len(document["option"])
    assert source.folder == site


def test_all_faults_of_a_file_come_together(tmp_path: Path) -> None:
    """An unknown key, a wrong type and a percentage are told in one go, each with its path."""
    study = _edited(
        tmp_path,
        (_lines("altitude_m"), "altitude_metres = 120"),
        (_lines("life_years"), 'life_years = "twenty"'),
        (_lines("efficiency_frac"), "efficiency_frac = 84.0"),
    )

    message = _faults(study)

    assert "site.altitude_metres = 120: is not a key here; did you mean `altitude_m`?" in message
    assert "site.altitude_m = nothing: is needed" in message
    assert 'money.life_years = "twenty": must be a whole number' in message
    assert "efficiency_frac = 84.0: must be at most 1.1; in percent? write 0.84" in message


def test_number_where_a_date_belongs(tmp_path: Path) -> None:
    """A number for a day is refused with an example of a date."""
    text = HOSPITAL.read_text(encoding="utf-8")
    line = next(part for part in text.splitlines() if "first_day = 20" in part)
    date_text = line[line.index("first_day = ") + 12 :][:10]
    study = _edited(tmp_path, (f"first_day = {date_text}", "first_day = 12"))

    assert "first_day = 12: must be a date such as 2025-08-04" in _faults(study)


def test_negative_price(tmp_path: Path) -> None:
    """A price that cannot be negative is refused."""
    study = _edited(tmp_path, (_lines("commodity_per_hhv_kWh"), "commodity_per_hhv_kWh = -0.03"))

    assert "gas_tariff.commodity_per_hhv_kWh = -0.03: must be at least 0" in _faults(study)


@pytest.mark.parametrize(
    ("content", "expected"),
    [
        (b"", "an empty file"),
        (b"\x89PNG\r\n\x1a\n\x00\xff", "must be text in UTF-8"),
        (b"format = 1\n[site\n", "must be valid TOML 1.0"),
        (b"[site]\nname = 'x'\n", "`format = 1` must stand first"),
        (b"format = 2\n", "this version reads formats up to 1; install a newer flueprint"),
        (b"x" * 50_000_000, "50.0 MB: a study file has less than 1 MB of text"),
    ],
    ids=["empty", "binary", "broken", "formatless", "newer", "huge"],
)
def test_not_a_study_file(tmp_path: Path, content: bytes, expected: str) -> None:
    """A file that is no study is refused with what it is."""
    study = tmp_path / "study.toml"
    study.write_bytes(content)

    assert expected in _faults(study)


def test_missing_file_and_folder(tmp_path: Path) -> None:
    """A missing file and a folder without a study are told apart."""
    assert "no such file" in _faults(tmp_path / "nothing.toml")
    assert "a folder without study.toml" in _faults(tmp_path)


def test_defaults_are_told(tmp_path: Path) -> None:
    """A field that is left out is listed with the value taken; a field that stands is not."""
    source = load_study(
        _edited(tmp_path, (_lines("discount_rate_real_frac"), "discount_rate_real_frac = 0.05"))
    )

    listed = {default.path: default.value for default in defaults_used(source.study)}
    assert "money.discount_rate_real_frac" not in listed
    assert listed["sensitivity.fuel_price_steps_frac"] == "-0.3, -0.2, -0.1, 0.1, 0.2, 0.3"


def test_fault_inside_an_option_is_told_alone(tmp_path: Path) -> None:
    """A fault inside the only option does not also call the list of options too short."""
    text = HOSPITAL.read_text(encoding="utf-8")
    first, second = (match.start() for match in re.finditer(r"(?m)^\[\[option\]\]", text))
    end = text.index("# --- Money over the years")
    one_option = text[:second] + text[end:]
    assert first < second
    study = tmp_path / "study.toml"
    study.write_text(one_option.replace("pinch_K = 10", "pinch_K = 1", 1), encoding="utf-8")

    assert _faults(study) == "option[1].recovery.pinch_K = 1: must be at least 4.0"

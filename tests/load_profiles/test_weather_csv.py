"""Weather files onto the hours of the year."""

from pathlib import Path
from typing import Any

import numpy as np
import pytest

from load_profiles import ProfileError
from load_profiles.clock import SiteClock
from load_profiles.declarations import WeatherFile
from load_profiles.readers.weather_csv import WeatherYear, read_weather
from tests.load_profiles.known_year import Export, FloatArray

BERLIN = SiteClock("Europe/Berlin", 2025)
COLUMNS = ("time", "ambient_degC", "relative_humidity_percent", "pressure_hPa")
PLAIN = Export(minutes=60, clock="standard", header=COLUMNS)


def columns() -> tuple[FloatArray, FloatArray, FloatArray]:
    """Temperature [degC], humidity [%] and pressure [hPa] of a known year."""
    rng = np.random.default_rng(3)
    return (
        rng.integers(-100, 350, 8760) / 10.0,
        rng.integers(20, 101, 8760) / 1.0,
        rng.integers(9600, 10200, 8760) / 10.0,
    )


def read(folder: Path, *, altitude_m: float = 200.0, **changes: Any) -> WeatherYear:
    """The weather file of the folder."""
    weather = WeatherFile(**{"file": "weather.csv", "clock": "standard", **changes})
    return read_weather(weather, folder=folder, site=BERLIN, altitude_m=altitude_m)


def test_known_weather_returns_exactly(tmp_path: Path) -> None:
    """Temperature as written, humidity as a fraction, pressure in kPa."""
    temperature_degC, humidity, pressure_hPa = columns()
    PLAIN.write(tmp_path / "weather.csv", temperature_degC, humidity, pressure_hPa)

    year = read(tmp_path)

    np.testing.assert_array_equal(year.ambient_degC, temperature_degC)
    np.testing.assert_allclose(year.relative_humidity_frac, humidity / 100.0, rtol=1e-15)
    np.testing.assert_allclose(year.pressure_kPa, pressure_hPa / 10.0, rtol=1e-15)
    assert year.findings == ()


def test_gap_of_six_hours_is_bridged_and_of_seven_refused(tmp_path: Path) -> None:
    """Six lost hours lie on a straight line with a finding; seven are refused."""
    temperature_degC, humidity, pressure_hPa = columns()
    temperature_degC[99], temperature_degC[106] = 0.0, 7.0
    six = temperature_degC.copy()
    six[100:106] = np.nan
    PLAIN.write(tmp_path / "weather.csv", six, humidity, pressure_hPa)

    year = read(tmp_path)

    assert year.ambient_degC[100:106] == pytest.approx([1.0, 2.0, 3.0, 4.0, 5.0, 6.0])
    assert "ambient_degC: 6 h in one gap bridged" in year.findings[0].what
    six[106] = np.nan
    PLAIN.write(tmp_path / "weather.csv", six, humidity, pressure_hPa)
    with pytest.raises(ProfileError) as caught:
        read(tmp_path)
    assert str(caught.value) == (
        "weather.csv = ambient_degC missing for 7 h from 2025-01-05 04:00: gaps must not exceed "
        "6 h; take the hours from a station nearby"
    )


def test_pressure_comes_from_the_altitude_where_there_is_none(tmp_path: Path) -> None:
    """A file without the default pressure column: ICAO's 954.61 hPa at 500 m, and a finding."""
    temperature_degC, humidity, _ = columns()
    export = Export(minutes=60, clock="standard", header=COLUMNS[:3])
    export.write(tmp_path / "weather.csv", temperature_degC, humidity)

    year = read(tmp_path, altitude_m=500.0)

    np.testing.assert_allclose(year.pressure_kPa, 95.461, rtol=1e-5)
    assert "standard atmosphere at 500 m" in year.findings[0].what


def test_declared_pressure_column_must_be_there(tmp_path: Path) -> None:
    """A pressure column that the study names and the file lacks is a fault."""
    temperature_degC, humidity, _ = columns()
    export = Export(minutes=60, clock="standard", header=COLUMNS[:3])
    export.write(tmp_path / "weather.csv", temperature_degC, humidity)

    with pytest.raises(ProfileError, match=r'no column "druck" that weather\.pressure_column'):
        read(tmp_path, pressure_column="druck")


def test_sea_level_pressure_at_altitude_asks_for_a_look(tmp_path: Path) -> None:
    """990 hPa at 1500 m, where ICAO has 845.6 hPa, is likely reduced to sea level."""
    temperature_degC, humidity, pressure_hPa = columns()
    PLAIN.write(tmp_path / "weather.csv", temperature_degC, humidity, pressure_hPa)

    year = read(tmp_path, altitude_m=1500.0)

    assert year.findings[0].severity == "attention"
    assert "reduced to sea level" in year.findings[0].advice


def test_impossible_weather_is_refused_with_its_rows(tmp_path: Path) -> None:
    """70 degC, 130 % and 1 hPa in one file: three faults with their rows."""
    temperature_degC, humidity, pressure_hPa = columns()
    temperature_degC[0], humidity[1], pressure_hPa[2] = 70.0, 130.0, 1.0
    PLAIN.write(tmp_path / "weather.csv", temperature_degC, humidity, pressure_hPa)

    with pytest.raises(ProfileError) as caught:
        read(tmp_path)

    assert str(caught.value).splitlines() == [
        "weather.csv row 2 = ambient_degC 70: must be between -60 and 60",
        "weather.csv row 3 = relative_humidity_percent 130: must be between 0 and 100",
        "weather.csv row 4 = pressure_hPa 1: must be between 500 and 1100",
    ]


def test_humidity_as_a_fraction_is_refused(tmp_path: Path) -> None:
    """Humidity from 0.2 to 1 throughout the year is no percentage."""
    temperature_degC, humidity, pressure_hPa = columns()
    PLAIN.write(tmp_path / "weather.csv", temperature_degC, humidity / 100.0, pressure_hPa)

    with pytest.raises(ProfileError, match="of 1 at most: must be in percent, 0 to 100"):
        read(tmp_path)


@pytest.mark.parametrize(("year", "hours"), [(2025, 8760), (2024, 8784)])
def test_typical_year_is_joined_by_the_calendar(tmp_path: Path, year: int, hours: int) -> None:
    """Months of 1990 and 1994 serve 2025 hour by hour, and 28 February serves a leap day."""
    rows = ["time,ambient_degC,relative_humidity_percent,pressure_hPa"]
    for hour in range(8760):
        stamp = np.datetime64("1994-01-01T00") + np.timedelta64(hour, "h")
        text = str(stamp).replace("T", " ").replace("1994-02", "1990-02")
        rows.append(f"{text}:00,{hour % 1000 / 40:.3f},{50 + hour % 7},1000")
    (tmp_path / "weather.csv").write_text("\n".join(rows), encoding="utf-8")

    read_year = read_weather(
        WeatherFile(file="weather.csv", clock="standard"),
        folder=tmp_path,
        site=SiteClock("Europe/Berlin", year),
        altitude_m=100.0,
    )

    written = np.arange(8760) % 1000 / 40
    leap = np.concatenate((written[:1416], written[1392:1416], written[1416:]))
    assert read_year.ambient_degC.size == hours
    expected = written if year == 2025 else leap
    np.testing.assert_allclose(read_year.ambient_degC, expected, atol=1e-12)
    assert "weather of 1990 to 1994, not of" in read_year.findings[0].what

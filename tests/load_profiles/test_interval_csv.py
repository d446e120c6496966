"""Meter exports of a known year return that year."""

from dataclasses import replace
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from load_profiles.clock import SiteClock
from load_profiles.declarations import IntervalMeter
from load_profiles.readers.interval_csv import read_interval_meter
from tests.load_profiles.known_year import Export, known_power_kW

BERLIN = SiteClock("Europe/Berlin", 2025)


def meter_of(export: Export, **changes: Any) -> IntervalMeter:
    """The declaration that fits an export."""
    keys: dict[str, Any] = {
        "source": "interval_meter",
        "file": "meter.csv",
        "value_column": export.header[1],
        "quantity": "mean_kW",
        "interval_minutes": export.minutes,
        "stamp_format": export.stamp_format,
        "clock": export.clock,
        "stamp_marks": export.marks,
        "delimiter": export.delimiter,
        "decimal": export.decimal,
        "skip_rows": len(export.preamble),
    }
    return IntervalMeter(**{**keys, **changes})


@pytest.mark.parametrize("clock", ["local", "standard", "utc"])
@pytest.mark.parametrize("marks", ["start", "end"])
@pytest.mark.parametrize("minutes", [15, 30, 60])
def test_known_year_returns_exactly(tmp_path: Path, minutes: int, marks: str, clock: str) -> None:
    """Each interval, clock and mark gives back the year as it was written, to the last digit."""
    export = Export(minutes=minutes, marks=marks, clock=clock)
    power_kW = known_power_kW(8760 * 60 // minutes)
    export.write(tmp_path / "meter.csv", power_kW)

    year = read_interval_meter(meter_of(export), folder=tmp_path, site=BERLIN)

    np.testing.assert_array_equal(year.power_kW, power_kW)
    assert year.slot_minutes == minutes
    assert year.findings == ()


@pytest.mark.parametrize(
    ("zone", "offset_h", "year"),
    [
        ("Australia/Sydney", 10.0, 2025),
        ("America/St_Johns", -3.5, 2024),
        ("Asia/Kolkata", 5.5, 2025),
    ],
)
def test_other_zones_and_leap_years_return_exactly(
    tmp_path: Path, zone: str, offset_h: float, year: int
) -> None:
    """Southern summers, half-hour offsets and a leap year are read as in Berlin."""
    export = Export(time_zone=zone, standard_offset_h=offset_h, year=year, minutes=30)
    site = SiteClock(zone, year)
    power_kW = known_power_kW(site.hours * 2)
    export.write(tmp_path / "meter.csv", power_kW)

    read = read_interval_meter(meter_of(export), folder=tmp_path, site=site)

    np.testing.assert_array_equal(read.power_kW, power_kW)


def test_dialect_with_semicolons_and_decimal_commas(tmp_path: Path) -> None:
    """A preamble, semicolons, decimal commas and day-first stamps, as declared."""
    export = Export(
        delimiter=";",
        decimal=",",
        stamp_format="%d.%m.%Y %H:%M",
        header=("Zeit", "Wirkarbeit kWh"),
        preamble=("Lastgang", "", "kWh"),
    )
    energy_kWh = known_power_kW(8760 * 4) / 10.0
    export.write(tmp_path / "meter.csv", energy_kWh)
    meter = meter_of(export, stamp_column="Zeit", quantity="energy_kWh")

    year = read_interval_meter(meter, folder=tmp_path, site=BERLIN)

    np.testing.assert_allclose(year.power_kW, energy_kWh * 4.0, rtol=1e-15)


def test_iso_stamps_carry_their_own_offset(tmp_path: Path) -> None:
    """ISO 8601 with offset tells both passes of the repeated hour apart by itself."""
    export = Export(stamp_format="ISO")
    power_kW = known_power_kW(8760 * 4)
    export.write(tmp_path / "meter.csv", power_kW)

    year = read_interval_meter(meter_of(export), folder=tmp_path, site=BERLIN)

    np.testing.assert_array_equal(year.power_kW, power_kW)


def test_newest_row_first_is_turned_round(tmp_path: Path) -> None:
    """An export with the newest row on top is the same year."""
    export = Export()
    power_kW = known_power_kW(8760 * 4)
    export.write(tmp_path / "meter.csv", power_kW)
    header, *rows = (tmp_path / "meter.csv").read_text("utf-8").splitlines()
    (tmp_path / "meter.csv").write_text("\n".join([header, *rows[::-1]]), encoding="utf-8")

    year = read_interval_meter(meter_of(export), folder=tmp_path, site=BERLIN)

    np.testing.assert_array_equal(year.power_kW, power_kW)


def test_ends_written_as_label_plus_interval(tmp_path: Path) -> None:
    """Ends written as their beginning's label plus the interval are told by the spring change."""
    starts = replace(Export(), marks="start").stamps(8760 * 4)
    ends = []
    for stamp in starts:
        day, clock = stamp.split()
        minutes = int(clock[:2]) * 60 + int(clock[3:]) + 15
        ends.append(str(np.datetime64(day) + np.timedelta64(minutes, "m")).replace("T", " "))
    power_kW = known_power_kW(8760 * 4)
    rows = [f"{end},{value:.1f}" for end, value in zip(ends, power_kW, strict=True)]
    (tmp_path / "meter.csv").write_text("\n".join(["time,power", *rows]), encoding="utf-8")

    year = read_interval_meter(meter_of(Export(marks="end")), folder=tmp_path, site=BERLIN)

    np.testing.assert_array_equal(year.power_kW, power_kW)
    assert "beginning's clock time plus the interval" in year.findings[0].what


def test_repeated_rows_are_merged_or_averaged(tmp_path: Path) -> None:
    """An identical repeat is merged; of 10 and 20 kW at one time the mean is 15 kW."""
    rows = ["time,power", "2025-01-01 00:00,10", "2025-01-01 00:15,12", "2025-01-01 00:15,12"]
    rows += ["2025-01-01 00:30,10", "2025-01-01 00:30,20", "2025-01-01 00:45,11"]
    (tmp_path / "meter.csv").write_text("\n".join(rows), encoding="utf-8")

    year = read_interval_meter(meter_of(Export()), folder=tmp_path, site=BERLIN)

    assert year.power_kW[:4].tolist() == [10.0, 12.0, 15.0, 11.0]
    merged, averaged = year.findings
    assert merged.what == "intervals that stand there again with the same value: 1; merged"
    assert averaged.effect == "0.25 h, in doubt by 2.5 kWh"  # (20 - 10) kW x 0.25 h


def test_half_hour_zone_with_utc_hours_is_split_evenly(tmp_path: Path) -> None:
    """Hours on UTC straddle the hours of +5:30: each gives half to either, and says so."""
    site = SiteClock("Asia/Kolkata", 2025)
    rows = ["time,power", "2025-01-01 00:00,100", "2025-01-01 01:00,200"]
    (tmp_path / "meter.csv").write_text("\n".join(rows), encoding="utf-8")

    year = read_interval_meter(
        meter_of(Export(minutes=60, clock="utc")), folder=tmp_path, site=site
    )

    assert year.slot_minutes == 15
    assert year.power_kW[22:30].tolist() == [100.0] * 4 + [200.0] * 4  # 00:00Z is 05:30 there
    assert "straddle" in year.findings[0].what


@settings(max_examples=10, deadline=None)
@given(
    left_out=st.sets(st.integers(0, 8759), max_size=200),
    emptied=st.sets(st.integers(0, 8759), max_size=200),
)
def test_missing_rows_and_cells_are_missing_and_nothing_else(
    tmp_path_factory: pytest.TempPathFactory, left_out: set[int], emptied: set[int]
) -> None:
    """Whichever rows are lost and cells are empty, exactly these hours have no value."""
    folder = tmp_path_factory.mktemp("export")
    power_kW = known_power_kW(8760)
    power_kW[sorted(emptied)] = np.nan
    # the two passes of the repeated hour stay, since a lost pass cannot be told from the other
    kept = frozenset(left_out - {7152, 7153, 7154})
    export = Export(minutes=60, left_out=kept)
    export.write(folder / "meter.csv", power_kW)
    truth_kW = power_kW.copy()
    truth_kW[sorted(kept)] = np.nan

    year = read_interval_meter(meter_of(export), folder=folder, site=BERLIN)

    np.testing.assert_array_equal(year.power_kW, truth_kW)

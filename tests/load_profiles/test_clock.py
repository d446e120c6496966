"""Local stamps become the instants that they were, in every kind of zone."""

from datetime import UTC, datetime, timedelta

import numpy as np
import pandas as pd
import pytest

from load_profiles import ProfileError
from load_profiles.clock import SiteClock, day_class, to_utc
from tests.load_profiles.known_year import Export

#: Zone and standard offset [h]: IANA time zone database, 2025.
ZONES = [
    ("Europe/Berlin", 1.0),
    ("Europe/Dublin", 0.0),
    ("America/New_York", -5.0),
    ("America/St_Johns", -3.5),
    ("Asia/Kolkata", 5.5),
    ("Asia/Kathmandu", 5.75),
    ("Australia/Sydney", 10.0),
    ("Australia/Lord_Howe", 10.5),
    ("UTC", 0.0),
]


@pytest.mark.parametrize(("zone", "offset_h"), ZONES)
def test_local_stamps_return_to_their_instants(zone: str, offset_h: float) -> None:
    """Quarter-hours of a year, written by the wall clock, become the instants they were."""
    site = SiteClock(zone, 2025)
    export = Export(time_zone=zone, standard_offset_h=offset_h)
    stamps = pd.DatetimeIndex(pd.to_datetime(export.stamps(8760 * 4)))

    read = to_utc(stamps, "local", site)

    assert not read.missing.any()
    assert read.once == ()
    np.testing.assert_array_equal(site.seconds(read.instants), np.arange(8760 * 4) * 900)


@pytest.mark.parametrize(("zone", "offset_h"), ZONES)
def test_year_begins_in_standard_time(zone: str, offset_h: float) -> None:
    """The year begins at 1 January 00:00 of standard time, also in a southern summer."""
    site = SiteClock(zone, 2025)

    assert site.start == datetime(2025, 1, 1, tzinfo=UTC) - timedelta(hours=offset_h)
    assert site.slots(60)[-1] == site.start + timedelta(hours=8759)


def test_leap_year_has_its_day() -> None:
    """2024 has 8784 hours and 2100 has 8760: the Gregorian rule."""
    assert SiteClock("Europe/Berlin", 2024).hours == 8784
    assert SiteClock("Europe/Berlin", 2100).hours == 8760


def test_standard_and_utc_clocks_shift_by_a_constant() -> None:
    """Stamps that keep winter time all year shift by the standard offset, UTC by nothing."""
    site = SiteClock("Asia/Kolkata", 2025)
    stamps = pd.DatetimeIndex(["2025-07-01 05:30"])

    assert to_utc(stamps, "standard", site).instants[0] == pd.Timestamp("2025-07-01 00:00Z")
    assert to_utc(stamps, "utc", site).instants[0] == pd.Timestamp("2025-07-01 05:30Z")


def test_hour_that_spring_skips_is_marked() -> None:
    """02:30 on 30 March 2025 does not exist in Berlin (Directive 2000/84/EC: 02:00 to 03:00)."""
    stamps = pd.DatetimeIndex(["2025-03-30 01:30", "2025-03-30 02:30", "2025-03-30 03:30"])

    read = to_utc(stamps, "local", SiteClock("Europe/Berlin", 2025))

    assert read.missing.tolist() == [False, True, False]


def test_repeated_hour_with_a_hole_is_told_apart_by_the_turn() -> None:
    """With 02:30 lost from the first pass, the only 02:30 after the turn is of the second."""
    stamps = pd.DatetimeIndex(
        [f"2025-10-26 {text}" for text in ("02:00", "02:15", "02:00", "02:15", "02:30", "02:45")]
    )

    read = to_utc(stamps, "local", SiteClock("Europe/Berlin", 2025))

    shown = [f"{instant:%H:%M}" for instant in read.instants]
    assert shown == ["00:00", "00:15", "01:00", "01:15", "01:30", "01:45"]
    assert read.once == ()


def test_repeated_hour_that_comes_once_is_named() -> None:
    """An export that lost the second pass is read as the first, and the day is named."""
    stamps = pd.DatetimeIndex(["2025-10-26 01:00", "2025-10-26 02:00", "2025-10-26 03:00"])

    read = to_utc(stamps, "local", SiteClock("Europe/Berlin", 2025))

    assert [f"{instant:%d %H}" for instant in read.instants] == ["25 23", "26 00", "26 02"]
    assert read.once == ("2025-10-26",)


def test_unknown_zone_is_refused() -> None:
    """A zone that the database does not have is a fault of the study."""
    with pytest.raises(ProfileError, match=r"site\.time_zone = Europe/Atlantis: must be an IANA"):
        SiteClock("Europe/Atlantis", 2025)


def test_day_classes_of_a_week() -> None:
    """1 January 2025 was a Wednesday: three weekdays, Saturday, Sunday, then Monday."""
    days = pd.date_range("2025-01-01", periods=6, freq="D")

    assert day_class(days).tolist() == [0, 0, 0, 1, 2, 0]

"""Filling by stated rules: what is known stays, what is filled is counted."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from load_profiles import ProfileError
from load_profiles.arrays import FloatArray
from load_profiles.clock import SiteClock
from load_profiles.gaps import FilledYear, bridge, fill_year
from load_profiles.runs import runs_of, within_runs
from tests.load_profiles.known_year import known_power_kW

BERLIN = SiteClock("Europe/Berlin", 2025)


def filled(values_kW: FloatArray, *, permitted: float = 0.1) -> FilledYear:
    """An hourly year filled as a study would."""
    return fill_year(
        values_kW, site=BERLIN, slot_minutes=60, where="meter.csv", permitted_fill_frac=permitted
    )


def weekly_kW() -> FloatArray:
    """A load that is the same at the same wall-clock hour of days of a class."""
    wall = BERLIN.wall(BERLIN.slots(60))
    rank = np.where(wall.day_of_week < 5, 0, wall.day_of_week - 4)
    return np.asarray(100.0 + 40.0 * rank + wall.hour, dtype=float)


def test_short_gap_lies_on_the_line() -> None:
    """Between 10 and 40 kW two missing hours are 20 and 30 kW: 50 kWh."""
    power_kW = known_power_kW(8760)
    power_kW[100:104] = [10.0, np.nan, np.nan, 40.0]

    year = filled(power_kW)

    assert year.values_kW[101:103] == pytest.approx([20.0, 30.0])
    assert np.flatnonzero(year.filled).tolist() == [101, 102]
    assert str(year.findings[0]) == (
        "meter.csv: one gap filled by a straight line (gaps up to 3 h): 2 h from 2025-01-05 05:00; "
        "2 h and 50 kWh are not metered"
    )


@pytest.mark.parametrize("start", [0, 2030, 4000, 7140, 8700])
def test_long_gap_takes_like_days(start: int) -> None:
    """Of a load that is the same on like days, any two lost days come back exactly."""
    truth_kW = weekly_kW()
    power_kW = truth_kW.copy()
    power_kW[start : start + 48] = np.nan

    year = filled(power_kW)

    np.testing.assert_allclose(year.values_kW, truth_kW, rtol=1e-12)
    assert year.filled.sum() == 48


def test_gap_of_two_months_takes_like_days_of_the_year() -> None:
    """Where no like day lies within three weeks, like days of the whole year are taken."""
    truth_kW = weekly_kW()
    power_kW = truth_kW.copy()
    power_kW[3000:4440] = np.nan

    year = filled(power_kW, permitted=0.2)

    np.testing.assert_allclose(year.values_kW, truth_kW, rtol=1e-12)


def test_too_much_missing_is_refused() -> None:
    """40 % of the hours missing, 10 % permitted: refused with both and the longest gap."""
    power_kW = known_power_kW(8760)
    power_kW[:3504] = np.nan

    with pytest.raises(ProfileError) as caught:
        filled(power_kW)

    assert str(caught.value) == (
        "meter.csv = 40.0% of the year missing (3504 h; longest gap 3504 h from 2025-01-01 "
        "00:00): must not exceed demand.permitted_fill_frac = 0.1; ask for the rest"
    )


def test_stuck_day_is_set_aside() -> None:
    """24 h of the same 123.4 kW are set aside and filled; 23 h are left alone."""
    power_kW = known_power_kW(8760)
    power_kW[1000:1024] = 123.4
    power_kW[2000:2023] = 123.4

    year = filled(power_kW)

    assert np.flatnonzero(year.filled).tolist() == list(range(1000, 1024))
    assert "the same 123.4 kW for 24 h from 2025-02-11 16:00: stuck" in year.findings[0].what
    assert "24 h with 2,962 kWh set aside" in year.findings[0].effect  # 24 x 123.4 = 2961.6


def test_zero_may_last() -> None:
    """A summer stop at zero is no stuck meter."""
    power_kW = known_power_kW(8760)
    power_kW[4000:4500] = 0.0

    year = filled(power_kW)

    assert not year.filled.any()
    assert year.findings == ()


def test_spike_is_set_aside() -> None:
    """One hour of 10 MW in a load below 1.4 MW is set aside and bridged."""
    power_kW = known_power_kW(8760)
    power_kW[5000] = 10_000.0

    year = filled(power_kW)

    assert year.values_kW[5000] == pytest.approx((power_kW[4999] + power_kW[5001]) / 2.0)
    assert "with 10,000 kW" in year.findings[0].what


@settings(max_examples=20, deadline=None)
@given(gaps=st.lists(st.tuples(st.integers(0, 8700), st.integers(1, 60)), max_size=8))
def test_known_hours_stay_and_no_hour_is_lost(gaps: list[tuple[int, int]]) -> None:
    """Wherever the gaps lie, metered hours stay as they are and filled ones are within range."""
    power_kW = known_power_kW(8760)
    for start, length in gaps:
        power_kW[start : start + length] = np.nan
    known = ~np.isnan(power_kW)

    year = filled(power_kW)

    np.testing.assert_array_equal(year.values_kW[known], power_kW[known])
    np.testing.assert_array_equal(year.filled, ~known)
    assert year.values_kW.min() >= np.nanmin(power_kW)
    assert year.values_kW.max() <= np.nanmax(power_kW)


@given(mask=st.lists(st.booleans(), min_size=1, max_size=60), shortest=st.integers(1, 5))
def test_runs_rebuild_their_mask(mask: list[bool], shortest: int) -> None:
    """Runs laid down again give the mask; those kept are the long ones."""
    marks = np.array(mask)
    again = np.zeros_like(marks)
    long_ones = np.zeros_like(marks)
    for start, length in zip(*runs_of(marks), strict=True):
        again[start : start + length] = True
        long_ones[start : start + length] = length >= shortest

    np.testing.assert_array_equal(again, marks)
    np.testing.assert_array_equal(within_runs(marks, shortest=shortest), long_ones)


def test_bridge_leaves_long_gaps_open() -> None:
    """Of a gap of one and a gap of three, at most two permitted, only the first is bridged."""
    values = np.array([1.0, np.nan, 3.0, np.nan, np.nan, np.nan, 7.0])

    bridged, mask = bridge(values, longest=2)

    np.testing.assert_array_equal(bridged, [1.0, 2.0, 3.0, np.nan, np.nan, np.nan, 7.0])
    assert mask.tolist() == [False, True, False, False, False, False, False]

"""Windows of a tariff on the local calendar."""

import pytest

from planner.market.windows import calendar_of, steps_in
from planner.study.sections import Window
from tests.planner.market.small_study import small_year


def test_night_window_spans_midnight() -> None:
    """A window from 22 to 6 covers the eight hours before 6 and from 22, on each day."""
    friday = calendar_of(Window(weekdays=("fri",), from_hour=22, to_hour=6))

    assert friday[0, 4].nonzero()[0].tolist() == [0, 1, 2, 3, 4, 5, 22, 23]
    assert friday.sum() == 12 * 8


def test_windows_follow_daylight_saving() -> None:
    """The hour from 2 to 3 is missing once and comes twice: 23-hour and 25-hour days."""
    year = small_year()
    second_hour = steps_in(Window(from_hour=2, to_hour=3), year.local_time)
    in_march = second_hour & (year.local_time.month == 3)
    in_october = second_hour & (year.local_time.month == 10)

    assert in_march.sum() == 30  # the clock jumps from 2 to 3 on 30 March 2025
    assert in_october.sum() == 32  # and goes back from 3 to 2 on 26 October 2025


@pytest.mark.parametrize(("zone", "offset_h"), [("Asia/Kolkata", 5.5), ("Australia/Adelaide", 9.5)])
def test_half_hour_zones_keep_their_windows(zone: str, offset_h: float) -> None:
    """In zones of half hours a step begins on the local hour: 365 steps from 18 to 19."""
    year = small_year(time_zone=zone, utc_offset_h=offset_h)

    evening = steps_in(Window(from_hour=18, to_hour=19), year.local_time)

    assert evening.sum() == 365
    assert set(year.local_time.minute) == {0}

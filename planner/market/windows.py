"""Windows of a tariff on the local calendar: which month, weekday and hour each one covers."""

import numpy as np
import pandas as pd

from planner.arrays import BoolArray
from planner.study.sections import ALL_WEEKDAYS, Window

#: Months, days and hours of the calendar that windows are drawn on.
CALENDAR_SHAPE = (12, 7, 24)


def calendar_of(window: Window) -> BoolArray:
    """Cells of the calendar that a window covers.

    Parameters
    ----------
    window : Window
        Months, weekdays and hours.

    Returns
    -------
    array of bool, shape (12, 7, 24)
        By month from January, weekday from Monday, and hour of the local clock.

    Notes
    -----
    A window that ends at or before the hour at which it begins runs over midnight. Its months and
    weekdays are those of each hour itself: "Friday 22 to 6" means Friday 0 to 6 and 22 to 24.

    Examples
    --------
    >>> night = Window(from_hour=22, to_hour=6)
    >>> int(calendar_of(night).sum()) // (12 * 7)
    8
    """
    covered = np.zeros(CALENDAR_SHAPE, dtype=np.bool_)
    months = [month - 1 for month in window.months]
    weekdays = [ALL_WEEKDAYS.index(day) for day in window.weekdays]
    covered[np.ix_(months, weekdays, _hours(window))] = True
    return covered


def steps_in(window: Window, local_time: pd.DatetimeIndex) -> BoolArray:
    """Steps that begin inside a window.

    Parameters
    ----------
    window : Window
        Months, weekdays and hours of the local clock.
    local_time : DatetimeIndex, shape (steps,)
        Beginning of each step on the local clock, daylight saving included.

    Returns
    -------
    array of bool, shape (steps,)
        True inside the window.
    """
    return calendar_of(window)[local_time.month - 1, local_time.day_of_week, local_time.hour]


def _hours(window: Window) -> list[int]:
    """Hours of the day that a window covers."""
    if window.from_hour < window.to_hour:
        return list(range(window.from_hour, window.to_hour))
    return [*range(window.to_hour), *range(window.from_hour, 24)]

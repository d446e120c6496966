"""The steps of a site's year and what its people's clock shows in them."""

from dataclasses import dataclass
from datetime import date, datetime, timedelta, timezone
from functools import cached_property
from zoneinfo import ZoneInfo

import numpy as np
import pandas as pd

from load_profiles.arrays import BoolArray, FloatArray, IntArray

SUNDAY = 6


@dataclass(frozen=True)
class StepClock:
    """One calendar year of a site in steps of its own standard time.

    Parameters
    ----------
    time_zone : str
        IANA name.
    year : int
        Calendar year in standard time.
    step_minutes : int [min]
        Length of a step.
    holidays : tuple of date
        Days on which people work as on a Sunday.
    """

    time_zone: str
    year: int
    step_minutes: int
    holidays: tuple[date, ...] = ()

    @cached_property
    def standard_offset(self) -> timedelta:
        """Standard time less UTC, as on 1 January; both demo zones are in the north."""
        offset = datetime(self.year, 1, 1, 12, tzinfo=ZoneInfo(self.time_zone)).utcoffset()
        return offset or timedelta(0)

    @cached_property
    def utc(self) -> pd.DatetimeIndex:
        """UTC instants that begin the steps."""
        standard = timezone(self.standard_offset)
        first = pd.Timestamp(self.year, 1, 1, tz=standard)
        end = pd.Timestamp(self.year + 1, 1, 1, tz=standard)
        index = pd.date_range(first, end, freq=f"{self.step_minutes}min", inclusive="left")
        return index.tz_convert("UTC")

    @cached_property
    def local(self) -> pd.DatetimeIndex:
        """The same instants on the site's clock, daylight saving included."""
        return self.utc.tz_convert(self.time_zone)

    @property
    def steps(self) -> int:
        """Steps of the year."""
        return len(self.utc)

    @property
    def steps_per_hour(self) -> int:
        """Steps of an hour."""
        return 60 // self.step_minutes

    @cached_property
    def standard_hour(self) -> FloatArray:
        """Middle of each step, hours since midnight in standard time (the sun's clock) [h]."""
        middle_h = (np.arange(self.steps) + 0.5) * self.step_minutes / 60.0
        return np.asarray(middle_h % 24.0)

    @cached_property
    def day_of_year(self) -> FloatArray:
        """Middle of each step, days since the year began."""
        return np.asarray((np.arange(self.steps) + 0.5) * self.step_minutes / 1440.0)

    @cached_property
    def local_hour(self) -> FloatArray:
        """Middle of each step, hours since midnight on the site's clock [h]."""
        local = self.local
        return np.asarray(local.hour + (local.minute + self.step_minutes / 2.0) / 60.0, dtype=float)

    @cached_property
    def weekday(self) -> IntArray:
        """Day of the week on the site's clock, 0 for Monday; holidays count as Sundays."""
        return np.where(self.on_days(self.holidays), SUNDAY, np.asarray(self.local.day_of_week))

    def on_days(self, days: tuple[date, ...]) -> BoolArray:
        """Steps of some local days.

        Parameters
        ----------
        days : tuple of date
            Local calendar days.

        Returns
        -------
        array of bool, shape (steps,)
            True in the steps of those days.
        """
        return np.isin(np.asarray(self.local.date), np.asarray(days, dtype=object))

    def between(self, first_day: date, last_day: date) -> BoolArray:
        """Steps of a run of local days.

        Parameters
        ----------
        first_day, last_day : date
            Local calendar days, both included.

        Returns
        -------
        array of bool, shape (steps,)
            True from the first midnight to the last.
        """
        days = np.asarray(self.local.date)
        return np.asarray((days >= first_day) & (days <= last_day))

    def hourly_mean(self, values: FloatArray) -> FloatArray:
        """Mean of each standard hour.

        Parameters
        ----------
        values : array, shape (steps,)
            Any quantity.

        Returns
        -------
        array, shape (hours,)
            Its hourly means.
        """
        return np.asarray(values.reshape(-1, self.steps_per_hour).mean(axis=1))


def bump(hour: FloatArray, *, centre_h: float, width_h: float) -> FloatArray:
    """A smooth daily peak of height 1.

    Parameters
    ----------
    hour : array, shape (steps,) [h]
        Hours since midnight.
    centre_h : float [h]
        Hour of the peak.
    width_h : float [h]
        Distance from the peak at which it has fallen to 0.61.

    Returns
    -------
    array, shape (steps,) [-]
        Values in [0, 1], continuous across midnight.
    """
    away_h = (hour - centre_h + 12.0) % 24.0 - 12.0
    return np.asarray(np.exp(-0.5 * (away_h / width_h) ** 2))


def plateau(
    hour: FloatArray, *, from_h: FloatArray | float, to_h: float, edge_h: float
) -> FloatArray:
    """A smooth working day of height 1.

    Parameters
    ----------
    hour : array, shape (steps,) [h]
        Hours since midnight.
    from_h, to_h : float or array, shape (steps,) [h]
        Hours at which half of the height is reached, rising and falling.
    edge_h : float [h]
        Time constant of the edges.

    Returns
    -------
    array, shape (steps,) [-]
        Values in (0, 1).
    """
    rising = 1.0 / (1.0 + np.exp(-(hour - from_h) / edge_h))
    falling = 1.0 / (1.0 + np.exp((hour - to_h) / edge_h))
    return np.asarray(rising * falling)

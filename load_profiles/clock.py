"""The site's clocks: local stamps into UTC instants, and the year's own steps.

A year runs from 1 January 00:00 to 31 December 24:00 of the site's *standard* time, whatever
the wall clock does in summer; its steps are kept as UTC instants. So a zone of +5:30 keeps its
hours, and no step is lost or doubled at a change of the clock.
"""

import calendar
from dataclasses import dataclass
from functools import cached_property
from typing import Literal
from zoneinfo import ZoneInfo

import numpy as np
import pandas as pd

from load_profiles.arrays import BoolArray, IntArray
from load_profiles.faults import Fault, ProfileError

Clock = Literal["local", "standard", "utc"]

#: Classes of days that demand tells apart; index of `SiteClock.day_class`.
DAY_CLASSES = ("weekday", "saturday", "sunday")


@dataclass(frozen=True)
class SiteClock:
    """The clock of one site in one year.

    Parameters
    ----------
    time_zone : str
        IANA name.
    year : int
        Calendar year in the site's standard time.

    Raises
    ------
    ProfileError
        If the zone is unknown.

    Examples
    --------
    >>> SiteClock("Asia/Kolkata", 2025).start
    Timestamp('2024-12-31 18:30:00+0000', tz='UTC')
    """

    time_zone: str
    year: int

    def __post_init__(self) -> None:
        try:
            ZoneInfo(self.time_zone)
        except (KeyError, ValueError, OSError):
            must = "must be an IANA name such as Europe/Berlin"
            raise ProfileError((Fault("site.time_zone", self.time_zone, must),)) from None

    @cached_property
    def standard_offset(self) -> pd.Timedelta:
        """Standard time less UTC: the smallest offset of the year, which is winter's."""
        days = pd.date_range(f"{self.year}-01-01", periods=365, freq="D", tz="UTC")
        wall = days.tz_convert(self.time_zone).tz_localize(None)
        return (wall - days.tz_localize(None)).min()

    @cached_property
    def start(self) -> pd.Timestamp:
        """Instant at which the year begins."""
        return pd.Timestamp(year=self.year, month=1, day=1, tz="UTC") - self.standard_offset

    @property
    def hours(self) -> int:
        """Hours of the year."""
        return 8784 if calendar.isleap(self.year) else 8760

    def slots(self, minutes: int, *, before_h: int = 0, after_h: int = 0) -> pd.DatetimeIndex:
        """UTC instants that begin the year's slots of so many minutes, with hours around it."""
        first = self.start - pd.Timedelta(hours=before_h)
        count = (self.hours + before_h + after_h) * 60 // minutes
        return pd.date_range(first, periods=count, freq=pd.Timedelta(minutes=minutes))

    def wall(self, instants: pd.DatetimeIndex) -> pd.DatetimeIndex:
        """Instants as the wall clock shows them, daylight saving included, without a zone."""
        return instants.tz_convert(self.time_zone).tz_localize(None)

    def standard(self, instants: pd.DatetimeIndex) -> pd.DatetimeIndex:
        """Instants in standard time all year, without a zone."""
        return instants.tz_localize(None) + self.standard_offset

    def seconds(self, instants: pd.DatetimeIndex) -> IntArray:
        """Whole seconds from the beginning of the year."""
        return np.asarray((instants - self.start) // pd.Timedelta(seconds=1), dtype=np.int64)


def day_class(wall: pd.DatetimeIndex) -> IntArray:
    """Index into `DAY_CLASSES` of each wall-clock time.

    Parameters
    ----------
    wall : DatetimeIndex, shape (slots,)
        Wall-clock times.

    Returns
    -------
    array of int, shape (slots,)
        0 on Monday to Friday, 1 on Saturday, 2 on Sunday.
    """
    return np.maximum(np.asarray(wall.day_of_week, dtype=np.int64) - 4, 0)


@dataclass(frozen=True)
class Localised:
    """Stamps as instants.

    Parameters
    ----------
    instants : DatetimeIndex
        UTC; not a time where the stamp does not exist on the clock.
    missing : array of bool
        True for stamps that the clock skips in spring.
    once, twice : tuple of str
        Days whose repeated hour the stamps show only once, and those with both passes.
    """

    instants: pd.DatetimeIndex
    missing: BoolArray
    once: tuple[str, ...] = ()
    twice: tuple[str, ...] = ()


def to_utc(stamps: pd.DatetimeIndex, clock: Clock, site: SiteClock) -> Localised:
    """Stamps without a zone as UTC instants.

    Parameters
    ----------
    stamps : DatetimeIndex, shape (rows,)
        As written, in rising order of the true time; the repeated hour is told apart by it.
    clock : {"local", "standard", "utc"}
        The clock they were written by.
    site : SiteClock
        Zone and year.

    Returns
    -------
    Localised
        Instants, and what the change of the clock left open.
    """
    if clock == "utc":
        instants = stamps.tz_localize("UTC")
    elif clock == "standard":
        instants = (stamps - site.standard_offset).tz_localize("UTC")
    else:
        return _local_to_utc(stamps, site.time_zone)
    return Localised(instants, np.zeros(len(stamps), dtype=bool))


def _local_to_utc(stamps: pd.DatetimeIndex, time_zone: str) -> Localised:
    """Wall-clock stamps as instants; the hour that comes twice is told apart by the order."""
    every = np.ones(len(stamps), dtype=bool)
    first = stamps.tz_localize(time_zone, ambiguous=every, nonexistent="NaT").tz_convert("UTC")
    second = stamps.tz_localize(time_zone, ambiguous=~every, nonexistent="NaT").tz_convert("UTC")
    missing = np.asarray(first.isna())
    repeated = ~missing & np.asarray(first != second)
    later = np.zeros(len(stamps), dtype=bool)
    later[repeated] = _second_pass(stamps[repeated])
    both = stamps[later].normalize().unique()
    once = stamps[repeated].normalize().unique().difference(both)
    instants = pd.DatetimeIndex(first.where(~later, second))
    return Localised(instants, missing, _written(once), _written(both))


def _second_pass(stamps: pd.DatetimeIndex) -> BoolArray:
    """Which stamps of repeated hours come after the clock was turned back."""
    days = stamps.normalize()
    turned_back = np.zeros(len(stamps), dtype=bool)
    turned_back[1:] = (stamps[1:] <= stamps[:-1]) & (days[1:] == days[:-1])
    passes = pd.Series(turned_back).groupby(np.asarray(days)).cummax()
    return np.asarray(passes, dtype=np.bool_)


def _written(days: pd.DatetimeIndex) -> tuple[str, ...]:
    """Days as a reader knows them."""
    return tuple(str(day.date()) for day in days)

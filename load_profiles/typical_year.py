"""Weather of a typical year, joined to the metered year by the calendar."""

import numpy as np
import pandas as pd

from load_profiles.arrays import FloatArray, IntArray
from load_profiles.clock import SiteClock
from load_profiles.findings import Finding

#: Rows of other years that cover so much of the calendar are a typical year.
TYPICAL_YEAR_FRAC = 0.95

#: Hours from the beginning of a year to the end of 28 February.
_TO_LEAP_DAY_h = (31 + 28) * 24


def hours_of_year(
    seconds: IntArray, site: SiteClock, file: str
) -> tuple[IntArray, tuple[Finding, ...]]:
    """Hour of the year that each row belongs to.

    Parameters
    ----------
    seconds : array of int, shape (rows,) [s]
        From the beginning of the site's year; far outside it where the rows are of other years.
    site : SiteClock
        Zone and year.
    file : str
        For the finding.

    Returns
    -------
    array of int, shape (rows,)
        Hour of the year; outside 0 to `site.hours` where a row does not belong to it.
    tuple of Finding
        That the rows are of other years and were joined by month, day and hour of standard
        time; empty where they are of the site's year.
    """
    hour = seconds // 3600
    inside = (hour >= 0) & (hour < site.hours)
    if seconds.size == 0 or inside.sum() > seconds.size / 2:
        return hour, ()
    rows = site.standard(pd.DatetimeIndex(site.start + pd.to_timedelta(hour, unit="h")))
    calendar = pd.Index(rows.strftime("%m-%d %H"))
    year = pd.Index(site.standard(site.slots(60)).strftime("%m-%d %H"))
    if np.asarray(year.isin(calendar)).mean() < TYPICAL_YEAR_FRAC:
        return hour, ()
    what = (
        f"weather of {rows.year.min()} to {rows.year.max()}, not of {site.year}; joined by month, "
        "day and hour of standard time, weekdays stay those of the meters"
    )
    effect = "single days of weather and of metered demand do not belong together"
    advice = "Take the weather of the metered year where it can be had."
    place = np.asarray(year.get_indexer(calendar), dtype=np.int64)
    return place, (Finding(file, what, effect, advice, "attention"),)


def with_leap_day(hourly: FloatArray, site: SiteClock) -> FloatArray:
    """A typical year's values with 28 February repeated where a leap day has none.

    Parameters
    ----------
    hourly : array, shape (hours,)
        NaN where missing.
    site : SiteClock
        Zone and year.

    Returns
    -------
    array, shape (hours,)
        Unchanged in other years.
    """
    leap = slice(_TO_LEAP_DAY_h, _TO_LEAP_DAY_h + 24)
    if site.hours % 8760 == 0 or not np.isnan(hourly[leap]).all():
        return hourly
    completed = hourly.copy()
    completed[leap] = hourly[_TO_LEAP_DAY_h - 24 : _TO_LEAP_DAY_h]
    return completed

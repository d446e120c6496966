"""A meter in local time over both changes of the clock.

Given   Berlin, 2025: summer time from 30 March 01:00 UTC to 26 October 01:00 UTC.
Find    hours of these two days, and the instants of the stamps around the changes.
Source  Directive 2000/84/EC, article 3: last Sundays of March and October, 01:00 UTC.
By hand 30 March runs from 23:00Z (29th) to 22:00Z: 23 h; 26 October from 22:00Z (25th) to
        23:00Z: 25 h. 01:30 is 00:30Z and 03:00 is 01:00Z in March; in October 02:30 is first
        00:30Z, then 01:30Z.
Differs nothing.
"""

import pandas as pd

from load_profiles.clock import SiteClock, to_utc


def test_clock_change() -> None:
    """Lengths of both days and the instants of four stamps, as worked above."""
    site = SiteClock("Europe/Berlin", 2025)
    days = pd.Series(site.wall(site.slots(60)).date).value_counts()
    spring = to_utc(pd.DatetimeIndex(["2025-03-30 01:30", "2025-03-30 03:00"]), "local", site)
    autumn = to_utc(pd.DatetimeIndex(["2025-10-26 02:30", "2025-10-26 02:30"]), "local", site)

    assert days[pd.Timestamp("2025-03-30").date()] == 23
    assert days[pd.Timestamp("2025-10-26").date()] == 25
    assert [f"{instant:%H:%M}" for instant in spring.instants] == ["00:30", "01:00"]
    assert [f"{instant:%H:%M}" for instant in autumn.instants] == ["00:30", "01:30"]

"""Raw meter, bill and weather files in, one clean year out (`SiteYear`).

In the order in which data pass through them:

- `declarations`: what a study says of each raw file.
- `readers`: one file format a module; text into checked numbers on the year's clock.
- `clock`: local stamps into UTC instants and the year's own steps.
- `suspects`, `gaps`: what cannot be true, what is missing, and how it is filled.
- `resampling`: intervals into steps, and what the steps hide.
- `bills`, `degree_days`, `cooling`, `day_shapes`: an hourly year where there is no meter.
- `site_reading`: all of these for one site; hands on a `SiteYear`.

The names that need pandas load on first use, so that a command line that only checks a
study starts at once.
"""

import importlib
from typing import TYPE_CHECKING, Any

from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding

if TYPE_CHECKING:
    from load_profiles.site_reading import read_site_year
    from load_profiles.site_year import CARRIERS, SiteYear

__all__ = ["CARRIERS", "Fault", "Finding", "ProfileError", "SiteYear", "read_site_year"]

#: Module of each name that loads on first use.
_LATE = {
    "CARRIERS": "load_profiles.site_year",
    "SiteYear": "load_profiles.site_year",
    "read_site_year": "load_profiles.site_reading",
}


def __getattr__(name: str) -> Any:
    """Load the module of a late name."""
    if name not in _LATE:
        raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
    return getattr(importlib.import_module(_LATE[name]), name)

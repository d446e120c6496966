"""`SiteYear`: one clean year of a site's demands and weather, the one thing handed on."""

from dataclasses import dataclass
from typing import Literal

import pandas as pd

from load_profiles.findings import Finding

Carrier = Literal["power", "steam", "hot_water", "hot_gas", "cooling"]

#: Demand columns of `SiteYear.hourly`, in the order in which the plant serves them.
CARRIERS: tuple[Carrier, ...] = ("power", "steam", "hot_water", "hot_gas", "cooling")

#: Weather columns of `SiteYear.hourly`.
WEATHER_COLUMNS = ("ambient_degC", "relative_humidity_frac", "pressure_kPa")

#: How a step's demand came to be known, from the best evidence to the weakest.
ORIGINS = ("measured", "filled", "billed", "synthesised")


@dataclass(frozen=True)
class SiteYear:
    """One calendar year of a site, every step present, nothing negative.

    Parameters
    ----------
    hourly : DataFrame, one row a step
        UTC instants that begin the site's own standard-time steps. Columns `power_kW`,
        `steam_kW`, `hot_water_kW`, `hot_gas_kW`, `cooling_kW` (mean over the step; zero where the
        site has no such demand), `ambient_degC`, `relative_humidity_frac`, `pressure_kPa`.
        `power_kW` is the metered import and therefore includes today's electric chillers.
    origins : DataFrame, one row a step
        For each demand column with a demand: one of `ORIGINS`.
    step_h : float [h]
        Length of a step: 1, 0.5 or 0.25.
    time_zone : str
        IANA name of the site's clock, for tariffs and reports only.
    within_step_excess_kW : Series, index month 1..12 [kW]
        What the highest shorter interval of the month's power adds to the mean of its step; added
        to the net import when demand is charged on shorter intervals.
    findings : tuple of Finding
        Every repair and every doubt.
    """

    hourly: pd.DataFrame
    origins: pd.DataFrame
    step_h: float
    time_zone: str
    within_step_excess_kW: pd.Series
    findings: tuple[Finding, ...] = ()

    @property
    def local_time(self) -> pd.DatetimeIndex:
        """Beginning of each step on the site's clock, daylight saving included."""
        index = self.hourly.index
        if not isinstance(index, pd.DatetimeIndex):
            raise TypeError("SiteYear.hourly must be indexed by UTC instants")
        return index.tz_convert(self.time_zone)

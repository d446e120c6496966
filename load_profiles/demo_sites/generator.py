"""The truth about each invented site, and the raw files that a client would have of it."""

from dataclasses import dataclass
from functools import lru_cache
from pathlib import Path

import numpy as np
import pandas as pd

from load_profiles.declarations import MonthlyBill
from load_profiles.demo_sites.demand import SiteDemand
from load_profiles.demo_sites.factory_sites import DEMO_FACTORY, STARTER_FACTORY
from load_profiles.demo_sites.hospital_sites import DEMO_HOSPITAL, STARTER_HOSPITAL
from load_profiles.demo_sites.invented_site import InventedSite
from load_profiles.demo_sites.noise import NoiseStream
from load_profiles.demo_sites.raw_files import (
    metered_power_kW,
    monthly_bills,
    power_file,
    register_file,
    spoilt_steps,
    weather_file,
    weather_recorded,
    with_bills,
)
from load_profiles.demo_sites.weather import Weather, weather_year

#: Sites of the demo, by the folder that each has beside this module.
DEMO_SITES: dict[str, InventedSite] = {"hospital": DEMO_HOSPITAL, "factory": DEMO_FACTORY}

#: Sites of the starter studies, by their folder.
STARTER_SITES: dict[str, InventedSite] = {"hospital": STARTER_HOSPITAL, "factory": STARTER_FACTORY}


@dataclass(frozen=True)
class TrueYear:
    """What a reader of the raw files should find.

    Parameters
    ----------
    hourly : DataFrame, one row a standard hour
        UTC instants; columns as in `SiteYear.hourly`, the truth even where a meter failed.
    power_measured : Series of bool
        Hours whose power stands in the file in full and unspoilt.
    weather_measured : Series of bool
        Hours whose weather stands in the file.
    """

    hourly: pd.DataFrame
    power_measured: pd.Series
    weather_measured: pd.Series


def true_year(site: InventedSite) -> TrueYear:
    """The truth, hour by hour.

    Parameters
    ----------
    site : InventedSite
        One of `DEMO_SITES` or `STARTER_SITES`.

    Returns
    -------
    TrueYear
        Power as metered, to the last printed digit; heat and cooling as they were.
    """
    weather, demand = _steps(site)
    clock = site.clock
    index = clock.utc[:: clock.steps_per_hour]
    power_kW = metered_power_kW(demand.power_kW, site.power, clock)
    hourly = pd.DataFrame(
        {
            "power_kW": clock.hourly_mean(power_kW),
            "steam_kW": clock.hourly_mean(demand.steam_kW),
            "hot_water_kW": clock.hourly_mean(demand.hot_water_kW),
            "hot_gas_kW": clock.hourly_mean(demand.hot_gas_kW),
            "cooling_kW": clock.hourly_mean(demand.cooling_kW),
            "ambient_degC": weather.ambient_degC,
            "relative_humidity_frac": weather.relative_humidity_percent / 100.0,
            "pressure_kPa": weather.pressure_hPa / 10.0,
        },
        index=index,
    )
    whole = clock.hourly_mean(spoilt_steps(site.power, clock).astype(np.float64)) == 0.0
    recorded = weather_recorded(site.weather, clock)
    return TrueYear(hourly, pd.Series(whole, index), pd.Series(recorded, index))


def true_bills(site: InventedSite) -> tuple[MonthlyBill, ...]:
    """The gas bills that belong to the true heat.

    Parameters
    ----------
    site : InventedSite
        One of `DEMO_SITES` or `STARTER_SITES`.

    Returns
    -------
    tuple of MonthlyBill
        Oldest first.
    """
    _, demand = _steps(site)
    return monthly_bills(getattr(demand, f"{site.bills.carrier}_kW"), site.bills, site.clock)


def raw_files(site: InventedSite) -> dict[str, str]:
    """Text of every raw file of a site.

    Parameters
    ----------
    site : InventedSite
        One of `DEMO_SITES` or `STARTER_SITES`.

    Returns
    -------
    dict of file name to text
        Power, gas meter and weather.
    """
    weather, demand = _steps(site)
    clock = site.clock
    power_kW = metered_power_kW(demand.power_kW, site.power, clock)
    heat_kW = getattr(demand, f"{site.register.carrier}_kW")
    return {
        site.power.dialect.file: power_file(power_kW, site.power, clock),
        site.register.dialect.file: register_file(heat_kW, site.register, clock),
        site.weather.dialect.file: weather_file(weather, site.weather, clock),
    }


def write_site(site: InventedSite, folder: Path) -> tuple[Path, ...]:
    """Write a site's raw files, and the bills into its study where there is one.

    Parameters
    ----------
    site : InventedSite
        One of `DEMO_SITES` or `STARTER_SITES`.
    folder : Path
        Its folder, which may hold a `study.toml`.

    Returns
    -------
    tuple of Path
        The files written.
    """
    texts = raw_files(site)
    study = folder / "study.toml"
    if study.exists():
        texts[study.name] = with_bills(study.read_text(encoding="utf-8"), true_bills(site))
    folder.mkdir(parents=True, exist_ok=True)
    for name, text in texts.items():
        (folder / name).write_text(text, encoding="utf-8", newline="\n")
    return tuple(folder / name for name in texts)


@lru_cache(maxsize=len(DEMO_SITES) + len(STARTER_SITES))
def _steps(site: InventedSite) -> tuple[Weather, SiteDemand]:
    """Weather by the hour and demand by the step; a stream of its own for each."""
    hours = site.clock.steps // site.clock.steps_per_hour
    weather = weather_year(site.climate, NoiseStream(site.seed), hours)
    return weather, site.demand(weather, NoiseStream(site.seed + 1_000_000))

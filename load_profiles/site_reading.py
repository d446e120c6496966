"""All raw files of one site into a `SiteYear`."""

from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

import numpy as np
import pandas as pd

from load_profiles.arrays import BoolArray, FloatArray
from load_profiles.bills import bill_faults, spread_bills
from load_profiles.clock import SiteClock
from load_profiles.cooling import spread_cooling
from load_profiles.declarations import (
    CoolingDegrees,
    DemandFiles,
    GasRegister,
    IntervalMeter,
    MonthlyBills,
    WeatherFile,
)
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding
from load_profiles.gaps import FilledYear, fill_year
from load_profiles.readers.interval_csv import read_interval_meter
from load_profiles.readers.register import read_gas_register
from load_profiles.readers.weather_csv import WeatherYear, read_weather
from load_profiles.resampling import any_in_step, step_means, unknown_excess, within_step_excess
from load_profiles.site_year import CARRIERS, SiteYear

Source = IntervalMeter | GasRegister | MonthlyBills | CoolingDegrees

#: Length of a step [h].
STEP_H = 1.0


@dataclass(frozen=True)
class CarrierYear:
    """One carrier's year by the hour.

    Parameters
    ----------
    demand_kW : array, shape (hours,) [kW]
        Mean over the hour.
    origin : array of str, shape (hours,)
        One of `site_year.ORIGINS`.
    findings : tuple of Finding
        Repairs and doubts.
    """

    demand_kW: FloatArray
    origin: np.ndarray
    findings: tuple[Finding, ...]


def read_site_year(
    demand: DemandFiles,
    weather: WeatherFile,
    *,
    folder: Path,
    year: int,
    time_zone: str,
    altitude_m: float,
) -> SiteYear:
    """Read, check and clean every raw file of a site.

    Parameters
    ----------
    demand : DemandFiles
        What the study says of each carrier.
    weather : WeatherFile
        What the study says of the weather.
    folder : Path
        Folder of the study file.
    year : int
        Calendar year, in the site's standard time.
    time_zone : str
        IANA name of the site's clock.
    altitude_m : float [m]
        Gives the pressure where the weather file has none.

    Returns
    -------
    SiteYear
        Complete, non-negative, with every repair among its findings.

    Raises
    ------
    ProfileError
        With all faults of all files together.
    """
    site = SiteClock(time_zone, year)
    faults: list[Fault] = []
    skies = _weather(weather, folder, site, altitude_m, faults)
    carriers: dict[str, CarrierYear] = {}
    excess_kW, excess_findings = _read_power(demand, folder, site, carriers, faults)
    for name in CARRIERS[1:]:
        source: Source | None = getattr(demand, name)
        if source is None:
            continue
        try:
            found = _read_carrier(name, source, demand, folder=folder, site=site, skies=skies)
        except ProfileError as error:
            faults += error.faults
        else:
            if found is not None:
                carriers[name] = found
    if faults or skies is None or excess_kW is None:
        raise ProfileError(tuple(dict.fromkeys(faults)))
    findings = [*skies.findings, *excess_findings]
    findings += [finding for carrier in carriers.values() for finding in carrier.findings]
    return SiteYear(
        hourly=_hourly(carriers, skies, site),
        origins=_origins(carriers, site),
        step_h=STEP_H,
        time_zone=time_zone,
        within_step_excess_kW=excess_kW,
        findings=tuple(dict.fromkeys(findings)),
    )


def _weather(
    weather: WeatherFile, folder: Path, site: SiteClock, altitude_m: float, faults: list[Fault]
) -> WeatherYear | None:
    """The weather, or none with its faults noted."""
    try:
        return read_weather(weather, folder=folder, site=site, altitude_m=altitude_m)
    except ProfileError as error:
        faults += error.faults
        return None


def _read_power(
    demand: DemandFiles,
    folder: Path,
    site: SiteClock,
    carriers: dict[str, CarrierYear],
    faults: list[Fault],
) -> tuple[pd.Series | None, list[Finding]]:
    """Power into the carriers, and what its steps hide, by month."""
    meter = demand.power
    try:
        year, slots_per_step, notes = _metered(meter, demand, folder, site)
    except ProfileError as error:
        faults += error.faults
        return None, []
    carriers["power"] = _hours_of(year, slots_per_step, notes)
    if meter.interval_minutes >= 60 * STEP_H:
        excess_kW, finding = unknown_excess(meter.file)
        return excess_kW, [finding, *_zero_findings(year, slots_per_step, meter.file)]
    month = np.asarray(site.wall(site.slots(60)).month, dtype=np.int64)
    excess_kW = within_step_excess(
        year.values_kW, year.filled, slots_per_step=slots_per_step, month=month
    )
    return excess_kW, list(_zero_findings(year, slots_per_step, meter.file))


def _zero_findings(year: FilledYear, slots_per_step: int, file: str) -> Iterator[Finding]:
    """Hours in which a whole site is said to draw nothing."""
    hours = ((year.values_kW == 0.0) & ~year.filled).sum() / slots_per_step
    if hours:
        what = f"{hours:g} h of exactly zero power; kept as metered"
        effect = "the year's energy is too low if they stand for missing readings"
        yield Finding(file, what, effect, "Ask whether the site was off the grid.", "attention")


def _read_carrier(
    name: str,
    source: Source,
    demand: DemandFiles,
    *,
    folder: Path,
    site: SiteClock,
    skies: WeatherYear | None,
) -> CarrierYear | None:
    """One carrier by the hour; none where it waits for weather that has faults."""
    path = f"demand.{name}"
    if isinstance(source, IntervalMeter):
        return _hours_of(*_metered(source, demand, folder, site))
    if isinstance(source, GasRegister):
        heat_kW, filled, findings = read_gas_register(
            source,
            folder=folder,
            site=site,
            path=path,
            permitted_fill_frac=demand.permitted_fill_frac,
        )
        return CarrierYear(heat_kW, np.where(filled, "filled", "billed"), findings)
    if skies is None:
        if isinstance(source, MonthlyBills):
            raise ProfileError(tuple(bill_faults(source, path=path, year=site.year)))
        return None
    if isinstance(source, MonthlyBills):
        billed = spread_bills(source, skies.ambient_degC, path=path, site=site)
        return CarrierYear(billed.heat_kW, np.full(site.hours, "billed"), billed.findings)
    cooling_kW, finding = spread_cooling(source, skies.ambient_degC, path=path, site=site)
    return CarrierYear(cooling_kW, np.full(site.hours, "synthesised"), (finding,))


def _metered(
    meter: IntervalMeter, demand: DemandFiles, folder: Path, site: SiteClock
) -> tuple[FilledYear, int, tuple[Finding, ...]]:
    """A metered year without gaps, its slots in a step, and findings of the file."""
    read = read_interval_meter(meter, folder=folder, site=site)
    year = fill_year(
        read.power_kW,
        site=site,
        slot_minutes=read.slot_minutes,
        where=meter.file,
        permitted_fill_frac=demand.permitted_fill_frac,
    )
    return year, int(60 * STEP_H) // read.slot_minutes, read.findings


def _hours_of(year: FilledYear, slots_per_step: int, notes: tuple[Finding, ...]) -> CarrierYear:
    """A metered year by the hour."""
    filled: BoolArray = any_in_step(year.filled, slots_per_step=slots_per_step)
    return CarrierYear(
        step_means(year.values_kW, slots_per_step=slots_per_step),
        np.where(filled, "filled", "measured"),
        (*notes, *year.findings),
    )


def _hourly(carriers: dict[str, CarrierYear], skies: WeatherYear, site: SiteClock) -> pd.DataFrame:
    """Demands and weather side by side; zero where the site has no such demand."""
    nothing = np.zeros(site.hours)
    columns = {
        f"{name}_kW": carriers[name].demand_kW if name in carriers else nothing for name in CARRIERS
    }
    columns["ambient_degC"] = skies.ambient_degC
    columns["relative_humidity_frac"] = skies.relative_humidity_frac
    columns["pressure_kPa"] = skies.pressure_kPa
    return pd.DataFrame(columns, index=site.slots(60))


def _origins(carriers: dict[str, CarrierYear], site: SiteClock) -> pd.DataFrame:
    """How each demand came to be known."""
    columns = {f"{name}_kW": carrier.origin for name, carrier in carriers.items()}
    return pd.DataFrame(columns, index=site.slots(60))

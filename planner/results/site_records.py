"""Records about the site and the study: demand, weather, tariffs, inputs, the weeks drawn."""

import hashlib
from pathlib import Path

import numpy as np
import pandas as pd

from load_profiles import CARRIERS, SiteYear
from planner.market.prices import Prices
from planner.plant import GasFuel
from planner.results.records import (
    Carrier,
    CarrierDemand,
    DefaultUsed,
    Demand,
    Heading,
    InputFile,
    Tariffs,
    WeatherYear,
    Weeks,
)
from planner.study.defaults import defaults_used
from planner.study.reading import StudyFile
from planner.study.sections import ALL_MONTHS, ALL_WEEKDAYS, Window
from planner.study.study import Study

#: Base demand is what nine steps in ten exceed.
BASE_QUANTILE = 0.1

WEEK_DAYS = 7
WEEKS_IN_A_QUARTER = 13


def heading(study: Study) -> Heading:
    """Head of the report.

    Parameters
    ----------
    study : Study
        As stated.

    Returns
    -------
    Heading
        Names, places and the frame of money.
    """
    return Heading(
        site=study.site.name,
        place=study.site.place,
        kind=study.site.kind,
        client=study.report.client,
        consultant=study.report.consultant,
        title=study.report.title,
        language=study.report.language,
        currency=study.report.currency,
        year=study.site.year,
        time_zone=study.site.time_zone,
        altitude_m=study.site.altitude_m,
        price_year=study.money.price_year,
        first_operating_year=study.money.first_operating_year,
        life_years=study.money.life_years,
        discount_rate_real_frac=study.money.discount_rate_real_frac,
    )


def input_files(source: StudyFile) -> list[InputFile]:
    """Fingerprints of the study file and of every file it names.

    Parameters
    ----------
    source : StudyFile
        As read.

    Returns
    -------
    list of InputFile
        The study first, each file once.
    """
    study = source.study
    names = [source.path.name, study.weather.file]
    for carrier in CARRIERS:
        file = getattr(getattr(study.demand, carrier), "file", None)
        if file is not None and file not in names:
            names.append(file)
    return [_fingerprint(name, source.folder / name) for name in names]


def _fingerprint(name: str, path: Path) -> InputFile:
    """Name, size and SHA-256 of one file."""
    content = path.read_bytes()
    digest = hashlib.sha256(content).hexdigest()
    return InputFile(file=name, sha256=digest, bytes=len(content))


def defaults(study: Study) -> list[DefaultUsed]:
    """Every default that worked in the answer.

    Parameters
    ----------
    study : Study
        As stated.

    Returns
    -------
    list of DefaultUsed
        In the order of the manual.
    """
    return [
        DefaultUsed(path=default.path, value=default.value, meaning=default.meaning)
        for default in defaults_used(study)
    ]


def demand(site_year: SiteYear) -> Demand:
    """What the site wants, carrier by carrier.

    Parameters
    ----------
    site_year : SiteYear
        As cleaned.

    Returns
    -------
    Demand
        Carriers without demand are left out.
    """
    hourly = site_year.hourly
    wanted: list[Carrier] = [name for name in CARRIERS if hourly[f"{name}_kW"].to_numpy().any()]
    heat_kW = hourly["steam_kW"] + hourly["hot_water_kW"] + hourly["hot_gas_kW"]
    by_day = heat_kW.groupby(_standard_days(site_year)).mean()
    return Demand(
        step_h=site_year.step_h,
        carriers=[_carrier_demand(site_year, name) for name in wanted],
        daily_mean_heat_kW=[float(value) for value in by_day],
        within_step_excess_kW=[float(v) for v in site_year.within_step_excess_kW],
        weather=WeatherYear(
            mean_degC=float(hourly["ambient_degC"].mean()),
            minimum_degC=float(hourly["ambient_degC"].min()),
            maximum_degC=float(hourly["ambient_degC"].max()),
            mean_relative_humidity_frac=float(hourly["relative_humidity_frac"].mean()),
            mean_pressure_kPa=float(hourly["pressure_kPa"].mean()),
        ),
    )


def _standard_days(site_year: SiteYear) -> np.ndarray:
    """Number of each step's day of the year, on the site's standard clock."""
    steps_a_day = round(24.0 / site_year.step_h)
    return np.arange(len(site_year.hourly)) // steps_a_day


def _carrier_demand(site_year: SiteYear, carrier: Carrier) -> CarrierDemand:
    """One carrier's year in figures."""
    demand_kW = site_year.hourly[f"{carrier}_kW"]
    local = site_year.local_time
    monthly = (demand_kW * site_year.step_h).groupby(local.month).sum()
    peak_step = int(demand_kW.to_numpy().argmax())
    peak_kW = float(demand_kW.max())
    origins = site_year.origins.get(f"{carrier}_kW")
    shares = {} if origins is None else origins.value_counts(normalize=True).to_dict()
    return CarrierDemand(
        carrier=carrier,
        annual_kWh=float(demand_kW.sum() * site_year.step_h),
        peak_kW=peak_kW,
        peak_local_time=local[peak_step].isoformat(),
        base_kW=float(demand_kW.quantile(BASE_QUANTILE)),
        load_factor_frac=float(demand_kW.mean()) / peak_kW,
        monthly_kWh=[float(monthly.get(month, 0.0)) for month in ALL_MONTHS],
        origin_frac={str(origin): float(share) for origin, share in shares.items()},
    )


def tariffs(study: Study, prices: Prices, fuel: GasFuel) -> Tariffs:
    """Contracts in words and numbers.

    Parameters
    ----------
    study : Study
        As stated.
    prices : Prices
        What the dispatch paid.
    fuel : GasFuel
        The gas.

    Returns
    -------
    Tariffs
        Each charge as one line.
    """
    currency = study.report.currency
    power, gas = study.power_tariff, study.gas_tariff
    power_lines = [
        f"{line.name}: {line.price_per_kWh:g} {currency}/kWh, {_when(line)}"
        for line in power.energy
    ]
    power_lines += [
        f"{line.name}: {line.rate_per_kW_month:g} {currency}/kW and month, highest "
        f"{line.interval_minutes} min, {_when(line)}"
        for line in power.demand
    ]
    power_lines.append(f"Levies on import: {power.levy_per_kWh:g} {currency}/kWh")
    power_lines.append(f"Standing charge: {power.standing_per_month:g} {currency} a month")
    export = f"{power.export_price_per_kWh:g} {currency}/kWh up to {power.export_limit_kW:g} kW"
    power_lines.append(f"Export: {export if power.export_limit_kW > 0 else 'not allowed'}")
    gas_lines = [
        f"Commodity: {gas.commodity_per_hhv_kWh:g} {currency}/kWh HHV",
        f"Transport: {gas.transport_per_hhv_kWh:g} {currency}/kWh HHV",
        f"Levies: {gas.levy_per_hhv_kWh:g} {currency}/kWh HHV",
        f"Standing charge: {gas.standing_per_month:g} {currency} a month",
        f"Carbon price: {gas.carbon_price_per_t:g} {currency}/t CO2 on site fuel",
    ]
    return Tariffs(
        power_lines=power_lines,
        gas_lines=gas_lines,
        all_in_gas_per_lhv_kWh=float(np.mean(prices.fuel_per_lhv_kWh)),
        mean_import_per_kWh=float(np.mean(prices.import_per_kWh)),
        hhv_over_lhv=fuel.hhv_over_lhv,
        fuel_name=study.fuel.name,
        lhv_MJ_per_kg=fuel.lhv_MJ_per_kg,
    )


def _when(window: Window) -> str:
    """A window in words."""
    days = "every day" if window.weekdays == ALL_WEEKDAYS else " ".join(window.weekdays)
    hours = f"{window.from_hour:02d}:00 to {window.to_hour:02d}:00"
    if window.months == ALL_MONTHS:
        return f"{days}, {hours}"
    return f"{days}, {hours}, months {', '.join(str(month) for month in window.months)}"


def weeks(site_year: SiteYear) -> Weeks:
    """Choose the two weeks that the report draws.

    Parameters
    ----------
    site_year : SiteYear
        As cleaned.

    Returns
    -------
    Weeks
        The Mondays of the weeks nearest to the mean of the coldest and of the hottest quarter.
    """
    local = site_year.local_time
    monday = (local - pd.to_timedelta(local.day_of_week, unit="D")).date
    ambient_degC = site_year.hourly["ambient_degC"]
    by_week = ambient_degC.groupby(monday).agg(["mean", "count"])
    whole = by_week[by_week["count"] >= (WEEK_DAYS * 24 - 1) / site_year.step_h]["mean"]
    ordered = whole.sort_values()
    cold, hot = ordered.iloc[:WEEKS_IN_A_QUARTER], ordered.iloc[-WEEKS_IN_A_QUARTER:]
    winter = (cold - cold.mean()).abs().idxmin()
    summer = (hot - hot.mean()).abs().idxmin()
    return Weeks(winter_monday=str(winter), summer_monday=str(summer))

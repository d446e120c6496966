"""A study's tariffs as `Prices`: what the dispatch pays and earns in every step."""

import numpy as np
import pandas as pd

from load_profiles import SiteYear
from planner.arrays import FloatArray
from planner.market.prices import DemandCharge, Prices
from planner.market.windows import calendar_of, steps_in
from planner.plant.fuel import GasFuel
from planner.study.sections import DemandRate, PowerTariff
from planner.study.study import Study

MONTHS = 12
MINUTES_PER_HOUR = 60.0
KG_PER_T = 1e3


def prices(study: Study, site_year: SiteYear, fuel: GasFuel) -> Prices:
    """Prices of every step of a site's year.

    Parameters
    ----------
    study : Study
        Tariffs; checked by `check_tariff`.
    site_year : SiteYear
        Its clock and steps, and the within-step excess of its power.
    fuel : GasFuel
        Calorific values and carbon of the gas.

    Returns
    -------
    Prices
        Windows follow the local clock, daylight saving included.

    Notes
    -----
    Gas is invoiced on HHV: a kWh of LHV holds `hhv_over_lhv` kWh of HHV, and costs as much more.
    A step near the turn of the year whose local month is already the next January counts in
    January: the year is taken as one that repeats.
    """
    tariff = study.power_tariff
    local_time = site_year.local_time
    months_standing = tariff.standing_per_month + study.gas_tariff.standing_per_month
    return Prices(
        step_h=site_year.step_h,
        import_per_kWh=_import_per_kWh(tariff, local_time),
        export_per_kWh=np.full(len(local_time), tariff.export_price_per_kWh),
        import_limit_kW=tariff.import_limit_kW,
        export_limit_kW=tariff.export_limit_kW,
        fuel_per_lhv_kWh=np.full(len(local_time), gas_per_lhv_kWh(study, fuel)),
        demand_charges=tuple(_demand_charge(rate, site_year) for rate in tariff.demand),
        fixed_per_year=MONTHS * months_standing,
    )


def gas_per_lhv_kWh(study: Study, fuel: GasFuel) -> float:
    """All-in price of gas, with its carbon.

    Parameters
    ----------
    study : Study
        Gas tariff, priced on HHV, and carbon price.
    fuel : GasFuel
        Calorific values and carbon of the gas.

    Returns
    -------
    float [currency/kWh LHV]
        Commodity, transport, levies and carbon.
    """
    gas = study.gas_tariff
    per_hhv_kWh = gas.commodity_per_hhv_kWh + gas.transport_per_hhv_kWh + gas.levy_per_hhv_kWh
    carbon_per_lhv_kWh = gas.carbon_price_per_t * fuel.co2_kg_per_lhv_kWh / KG_PER_T
    return per_hhv_kWh * fuel.hhv_over_lhv + carbon_per_lhv_kWh


def excess_counts(rate: DemandRate, step_h: float) -> bool:
    """Whether a charge's meter sees peaks that a step's mean hides.

    Parameters
    ----------
    rate : DemandRate
        The charge, with the interval of its meter.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    bool
        True where the interval is shorter than the step.
    """
    return rate.interval_minutes < step_h * MINUTES_PER_HOUR


def _import_per_kWh(tariff: PowerTariff, local_time: pd.DatetimeIndex) -> FloatArray:
    """Energy price of the step's window, with levies."""
    by_calendar = sum(
        (calendar_of(charge) * charge.price_per_kWh for charge in tariff.energy), start=np.zeros(())
    )
    by_step = by_calendar[local_time.month - 1, local_time.day_of_week, local_time.hour]
    return np.asarray(by_step + tariff.levy_per_kWh)


def _demand_charge(rate: DemandRate, site_year: SiteYear) -> DemandCharge:
    """One demand charge by local calendar month; months without a counted step cost nothing."""
    local_time = site_year.local_time
    counted = steps_in(rate, local_time)
    period = np.asarray(local_time.month - 1, dtype=np.int64)
    charged = np.isin(np.arange(MONTHS), period[counted])
    excess_kW = site_year.within_step_excess_kW.reindex(range(1, MONTHS + 1)).to_numpy(dtype=float)
    applies = charged & excess_counts(rate, site_year.step_h)
    return DemandCharge(
        name=rate.name,
        counted=counted,
        period=period,
        rate_per_kW=np.where(charged, rate.rate_per_kW_month, 0.0),
        excess_kW=np.where(applies, excess_kW, 0.0),
    )

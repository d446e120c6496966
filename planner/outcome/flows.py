"""A schedule's flows with the exact plant model in place of its piecewise fit."""

import numpy as np
import pandas as pd

from load_profiles import SiteYear
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope

#: Grades of heat, and the heaters that stand in where the exact model offers less than the fit.
GRADES = ("steam", "hot_water", "hot_gas")


def exact_flows(
    scheduled: pd.DataFrame,
    exact: pd.DataFrame | None,
    *,
    envelope: OperatingEnvelope,
    site_year: SiteYear,
    prices: Prices,
) -> pd.DataFrame:
    """Flows that the site would meter, demands and prices beside them.

    The unit's power, state and exhaust split are the schedule's. Fuel and heat are the exact
    model's: where it offers more heat than the fit, the surplus is dumped; where it offers less,
    the heater of that grade makes up for it.

    Parameters
    ----------
    scheduled : DataFrame
        `Schedule.hourly`.
    exact : DataFrame or None
        `Plant.exact_year` of the same hours; None for separate supply.
    envelope : OperatingEnvelope
        Heaters of the option.
    site_year : SiteYear
        Demands and weather.
    prices : Prices
        Import prices for the hourly file.

    Returns
    -------
    DataFrame, one row a step
        Columns of `planner.results.hourly_columns`, without `nox_g_per_s`.
    """
    flows = scheduled.copy()
    if exact is not None:
        flows["unit_fuel_lhv_kW"] = exact["unit_fuel_lhv_kW"]
        for grade in GRADES:
            _replace_heat(flows, exact, grade, envelope)
    flows["unit_maximum_kW"] = _maximum_power_kW(envelope, len(flows))
    flows["price_import_per_kWh"] = prices.import_per_kWh
    flows["ambient_degC"] = site_year.hourly["ambient_degC"]
    for carrier in ("power", "steam", "hot_water", "hot_gas", "cooling"):
        flows[f"{carrier}_demand_kW"] = site_year.hourly[f"{carrier}_kW"]
    instants = pd.DatetimeIndex(flows.index)
    flows["utc_start"] = instants.strftime("%Y-%m-%dT%H:%M:%SZ")
    local = site_year.local_time
    flows["local_start"] = [stamp.isoformat() for stamp in local]
    return flows


def _replace_heat(
    flows: pd.DataFrame, exact: pd.DataFrame, grade: str, envelope: OperatingEnvelope
) -> None:
    """Put the exact heat of one grade in place, and let dumping or the heater close the balance."""
    offered_kW = exact[f"unit_{grade}_kW"]
    used_kW = flows[f"unit_{grade}_kW"] - flows[f"dumped_{grade}_kW"]
    surplus_kW = offered_kW - used_kW
    shortfall_kW = np.maximum(-surplus_kW, 0.0)
    flows[f"unit_{grade}_kW"] = offered_kW
    flows[f"dumped_{grade}_kW"] = np.maximum(surplus_kW, 0.0)
    flows[f"heater_{grade}_kW"] += shortfall_kW
    flows["heater_fuel_lhv_kW"] += shortfall_kW * _fuel_per_heat_lhv(envelope, grade)


def _fuel_per_heat_lhv(envelope: OperatingEnvelope, grade: str) -> float:
    """Fuel of the dearest heater of a grade for a further kW; zero where there is none."""
    slopes = [h.fuel_per_heat_lhv for h in envelope.heaters if h.carrier == grade]
    return max(slopes, default=0.0)


def _maximum_power_kW(envelope: OperatingEnvelope, steps: int) -> np.ndarray:
    """Most net power of all units, zero in outages."""
    total_kW = np.zeros(steps)
    for unit in envelope.units:
        total_kW += np.where(unit.available, unit.maximum_power_kW, 0.0)
    return total_kW

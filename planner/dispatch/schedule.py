"""`Schedule`: every flow in every step, with the proof of how good it is."""

from dataclasses import dataclass

import pandas as pd


@dataclass(frozen=True)
class Schedule:
    """The cheapest year found, and the bound that no year can beat.

    Parameters
    ----------
    name : str
        Option, or "Separate supply".
    hourly : DataFrame, one row a step, indexed like `SiteYear.hourly`
        Net flows, all non-negative, mean over the step. Always present:
        `grid_import_kW`, `grid_export_kW`, `unit_on` (0 or 1), `unit_start` (0 or 1),
        `unit_power_kW`, `unit_fuel_lhv_kW` (running fuel, without start fuel),
        `start_fuel_lhv_kW` (start fuel, spread over the step of the start),
        `unit_steam_kW`, `unit_hot_water_kW`, `unit_hot_gas_kW` (yield of the chosen paths),
        `dumped_steam_kW`, `dumped_hot_water_kW`, `dumped_hot_gas_kW` (yield not used),
        `share_hot_gas_frac`, `share_steam_then_water_frac`, `share_water_only_frac`,
        `share_bypass_frac` (shares of the exhaust; zero when off),
        `heater_steam_kW`, `heater_hot_water_kW`, `heater_hot_gas_kW`, `heater_fuel_lhv_kW`
        (standing fuel included), `electric_cooling_kW`, `absorption_cooling_kW`,
        `chiller_power_kW` (drive of electric chillers), `absorption_heat_kW`,
        `store_charge_kW`, `store_discharge_kW`, `store_level_kWh` (at the step's end),
        `price_power_per_kWh`, `price_power_peak_per_kWh`, `price_steam_per_kWh`,
        `price_hot_water_per_kWh`, `price_hot_gas_per_kWh` (marginal prices; the demand charge's
        part of the power price apart).
    cost_per_year : float [currency]
        Import, demand charges, fuel, wear and starts, less export, with fixed charges.
    lower_bound_per_year : float [currency]
        Proven for the whole year.
    path : str
        Which way of solving was taken, and why, in one sentence.
    seconds : float [s]
        Wall time of the solve.
    """

    name: str
    hourly: pd.DataFrame
    cost_per_year: float
    lower_bound_per_year: float
    path: str
    seconds: float

    @property
    def gap_frac(self) -> float:
        """(Achieved - lower bound) / achieved, for the whole year."""
        return (self.cost_per_year - self.lower_bound_per_year) / abs(self.cost_per_year)

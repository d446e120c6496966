"""A small invented study, its year and its gas, with round numbers for calculation by hand."""

from dataclasses import dataclass
from typing import Any

import numpy as np
import pandas as pd

from load_profiles import SiteYear
from planner.study.study import Study

#: Columns of the hourly flows, all zero in an idle year.
FLOWS = [
    "grid_import_kW",
    "grid_export_kW",
    "unit_on",
    "unit_start",
    "unit_maximum_kW",
    "unit_power_kW",
    "unit_fuel_lhv_kW",
    "start_fuel_lhv_kW",
    "unit_steam_kW",
    "unit_hot_water_kW",
    "unit_hot_gas_kW",
    "dumped_steam_kW",
    "dumped_hot_water_kW",
    "dumped_hot_gas_kW",
    "heater_steam_kW",
    "heater_hot_water_kW",
    "heater_hot_gas_kW",
    "heater_fuel_lhv_kW",
    "electric_cooling_kW",
    "absorption_cooling_kW",
    "store_charge_kW",
    "store_discharge_kW",
    "power_demand_kW",
    "steam_demand_kW",
    "hot_water_demand_kW",
    "hot_gas_demand_kW",
    "cooling_demand_kW",
    "ambient_degC",
]


@dataclass(frozen=True)
class RoundGas:
    """A gas of round numbers, with what the rooms under test ask of `GasFuel`."""

    hhv_over_lhv: float = 1.1
    co2_kg_per_lhv_kWh: float = 0.2
    dry_flue_gas_15O2_Nm3_per_lhv_kWh: float = 3.0


def small_study(**sections: Any) -> Study:
    """A study with one heater and one option; keyword arguments replace whole sections."""
    return Study.model_validate({**_SECTIONS, **sections})


def small_tariff(**fields: Any) -> dict[str, Any]:
    """The power tariff of `small_study`, with fields replaced."""
    return {**_SECTIONS["power_tariff"], **fields}


def small_option(**fields: Any) -> dict[str, Any]:
    """The option of `small_study`, with fields replaced."""
    return {**_SECTIONS["option"][0], **fields}


def small_unit(**fields: Any) -> dict[str, Any]:
    """The unit of `small_study`, with fields replaced."""
    return {**_SECTIONS["option"][0]["unit"], **fields}


def small_year(
    step_h: float = 1.0,
    *,
    time_zone: str = "Europe/Berlin",
    utc_offset_h: float = 1.0,
    year: int = 2025,
    excess_kW: float = 0.0,
    **demands: Any,
) -> SiteYear:
    """A whole year on a site's standard clock, with the demands given and mild weather."""
    start = pd.Timestamp(year=year, month=1, day=1, tz="UTC") - pd.Timedelta(hours=utc_offset_h)
    end = pd.Timestamp(year=year + 1, month=1, day=1, tz="UTC") - pd.Timedelta(hours=utc_offset_h)
    index = pd.date_range(start, end, freq=pd.Timedelta(hours=step_h), inclusive="left")
    columns = ("power_kW", "steam_kW", "hot_water_kW", "hot_gas_kW", "cooling_kW")
    hourly = pd.DataFrame(0.0, index=index, columns=list(columns)).assign(
        ambient_degC=15.0, relative_humidity_frac=0.6, pressure_kPa=101.325, **demands
    )
    return SiteYear(
        hourly=hourly,
        origins=pd.DataFrame(index=index),
        step_h=step_h,
        time_zone=time_zone,
        within_step_excess_kW=pd.Series(excess_kW, index=range(1, 13)),
    )


def idle_flows(site_year: SiteYear, **flows: Any) -> pd.DataFrame:
    """Flows of a year in which nothing happens but what is given."""
    idle = pd.DataFrame(0.0, index=site_year.hourly.index, columns=FLOWS)
    return idle.assign(ambient_degC=15.0, **flows)


def random_flows(site_year: SiteYear, seed: int) -> pd.DataFrame:
    """Flows without any pattern, so that no sum is right by luck."""
    generator = np.random.default_rng(seed)
    steps = len(site_year.hourly)
    flows = {name: generator.uniform(0.0, 1000.0, steps) for name in FLOWS}
    on = generator.integers(0, 2, steps)
    return pd.DataFrame(flows, index=site_year.hourly.index).assign(
        unit_on=on, unit_start=np.diff(on, prepend=0).clip(0)
    )


_POWER_FILE = {
    "source": "interval_meter",
    "file": "power.csv",
    "value_column": "kWh",
    "quantity": "energy_kWh",
    "interval_minutes": 60,
}

_SECTIONS: dict[str, Any] = {
    "format": 1,
    "site": {
        "name": "Testfield Works",
        "kind": "factory",
        "place": "Testfield",
        "time_zone": "Europe/Berlin",
        "altitude_m": 0.0,
        "year": 2025,
    },
    "report": {"client": "Client", "consultant": "Consultant", "currency": "EUR"},
    "weather": {"file": "weather.csv"},
    "demand": {"power": _POWER_FILE},
    "heat": {"hot_water": {"flow_degC": 80.0, "return_degC": 60.0}},
    "separate_supply": {
        "heater": (
            {
                "name": "boiler house",
                "serves": "hot_water",
                "capacity_kW": 3000.0,
                "largest_unit_kW": 2000.0,
                "efficiency_frac": 0.9,
                "efficiency_basis": "LHV",
                "upkeep_per_year": 5000.0,
            },
        ),
    },
    "power_tariff": {
        "energy": ({"name": "All hours", "price_per_kWh": 0.1},),
        "import_limit_kW": 5000.0,
    },
    "gas_tariff": {"commodity_per_hhv_kWh": 0.03},
    "fuel": {"composition_mol_frac": {"methane": 1.0}, "supply_pressure_kPa_gauge": 2000.0},
    "option": (
        {
            "name": "One turbine",
            "unit": {
                "name": "Turbine A",
                "sheet": {
                    "power_kW": 2000.0,
                    "efficiency_frac": 0.3,
                    "efficiency_basis": "LHV",
                    "exhaust_flow_kg_per_s": 8.0,
                    "exhaust_degC": 510.0,
                    "pressure_ratio": 12.0,
                    "control": "fuel_only",
                    "minimum_load_frac": 0.5,
                    "fuel_gas_pressure_kPa_gauge": 1500.0,
                    "nox": {"nox_ppm_15O2": 25.0, "from_load_frac": 0.6},
                },
                "auxiliary_kW": 20.0,
                "start_fuel_lhv_kWh": 500.0,
                "maintenance_per_run_hour": 4.0,
                "maintenance_per_MWh": 6.0,
                "maintenance_per_start": 50.0,
                "overhaul_cost": 300000.0,
                "overhaul_every_run_hours": 30000.0,
                "planned_outage": (),
                "forced_outage_frac": 0.0,
                "demand_saving_lost_months": 0,
            },
            "recovery": {"hot_water": True},
            "capital": ({"line": "machine", "cost": 1000000.0},),
        },
    ),
    "money": {
        "discount_rate_real_frac": 0.08,
        "life_years": 10,
        "price_year": 2025,
        "first_operating_year": 2027,
    },
    "grid_carbon": {
        "path": ({"year": 2027, "kg_per_kWh": 0.4},),
        "basis": "average",
        "source": "invented for the test",
    },
    "emissions": {"nox_regime": "eu_mcp_new_turbine_gas"},
}

"""Columns of `hourly_<key>.csv` that the figures draw; a file may hold more."""

#: Local clock of each step's beginning.
LOCAL_START = "local_start"

#: Numbers that the figures need.
NUMBERS = (
    "ambient_degC",
    "power_demand_kW",
    "steam_demand_kW",
    "hot_water_demand_kW",
    "hot_gas_demand_kW",
    "cooling_demand_kW",
    "grid_import_kW",
    "grid_export_kW",
    "unit_on",
    "unit_maximum_kW",
    "unit_power_kW",
    "unit_steam_kW",
    "unit_hot_water_kW",
    "unit_hot_gas_kW",
    "dumped_steam_kW",
    "dumped_hot_water_kW",
    "dumped_hot_gas_kW",
    "heater_steam_kW",
    "heater_hot_water_kW",
    "heater_hot_gas_kW",
    "absorption_heat_kW",
    "store_charge_kW",
    "store_discharge_kW",
)

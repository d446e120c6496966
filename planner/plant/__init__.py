"""Machines and recovered heat, hour by hour.

In the order in which data passes: `fuel`, `gas`, `air` and `combustion` are what flows; `turbine`
calibrates a machine from its sheet and `audit` judges the sheet; `running` and `load` run it in
any weather, with `gas_compressor` between terminals and busbar; `exchange`, `steam` and
`steam_boiler`, `water_heater` and `drying` use the exhaust along `exhaust_paths`; `unit_year` is
the exact model of a year and `envelope_fit` its `envelope`; `heaters` are the site's; `plant` puts
them together, `plant_findings` and `machine_record` tell the reader.
"""

from planner.plant.fuel import GasFuel
from planner.plant.plant import Plant, build_plant

__all__ = ["GasFuel", "Plant", "build_plant"]

"""Machines that are drawn at random, with exhausts that close the first law."""

import numpy as np

from planner.errors import StudyError
from planner.plant.fuel import GasFuel
from planner.plant.turbine import GasTurbine, calibrate
from planner.study.sections import DataSheet, GuaranteedNox

GAS = GasFuel.from_composition(
    "Natural gas", {"methane": 0.93, "ethane": 0.04, "propane": 0.01, "nitrogen": 0.02}
)


def drawn_turbine(draw: np.random.Generator) -> GasTurbine:
    """A calibrated machine of 1 to 50 MW; draws again where no such machine could be."""
    while True:
        power_kW = float(np.exp(draw.uniform(np.log(1000.0), np.log(50_000.0))))
        efficiency = draw.uniform(0.22, 0.40)
        exhaust_degC = draw.uniform(420.0, 570.0)
        kept_frac = draw.uniform(0.945, 0.975)  # of the fuel, in power and exhaust
        exhaust_kW = power_kW / efficiency * kept_frac - power_kW
        sheet = DataSheet(
            power_kW=power_kW,
            efficiency_frac=efficiency,
            efficiency_basis="LHV",
            # Mean specific heat 1.10 kJ/kgK, and the burnt water's share of the exhaust.
            exhaust_flow_kg_per_s=exhaust_kW / (1.10 * (exhaust_degC - 15.0)),
            exhaust_degC=exhaust_degC,
            pressure_ratio=draw.uniform(5.0, 30.0),
            control=draw.choice(["fuel_only", "guide_vanes"]).item(),
            held=draw.choice(["firing_temperature", "exhaust_temperature"]).item(),
            minimum_load_frac=0.5,
            fuel_gas_pressure_kPa_gauge=1900.0,
            nox=GuaranteedNox(nox_ppm_15O2=15.0, from_load_frac=0.5),
        )
        try:
            turbine = calibrate(sheet, GAS)
        except StudyError:
            continue
        if 0.80 <= turbine.polytropic_efficiency <= 0.92:
            return turbine

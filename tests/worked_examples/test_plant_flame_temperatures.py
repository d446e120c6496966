"""Flames without dissociation.

Given   methane, propane and hydrogen burnt with just their oxygen and 3.76 nitrogen, from 25 degC.
Find    flame temperature with complete combustion.
Source  GRI-Mech 3.0 polynomials through a chemistry library: 2325.6, 2392.1 and 2519.4 K.
By hand methane: 802 550 kJ/kmol into 1 CO2 + 2 H2O + 7.52 N2. With mean specific heats to 2325 K of
        55.0, 44.5 and 33.4 kJ/kmolK: 55.0 + 89.0 + 251.2 = 395.2, so 298 + 802 550 / 395.2 = 2329
        K.
Differs propane's calorific value in the standard is 0.04 % below the polynomials': 1 K.
"""

import numpy as np
import pytest

from planner.plant.combustion import burnable, burnt
from planner.plant.fuel import GasFuel
from tests.planner.plant.invented_gases import gas_of

OXYGEN_AIR_kg_per_mol = (31.998 + 3.76 * 28.014) * 1e-3


@pytest.mark.parametrize(
    ("name", "flame_K"), [("methane", 2325.6), ("propane", 2392.1), ("hydrogen", 2519.4)]
)
def test_flame_of_a_pure_gas(name: str, flame_K: float) -> None:
    """A flame of the table."""
    gas, air = GasFuel.from_composition(name, {name: 1.0}), gas_of(oxygen=1.0, nitrogen=3.76)
    air_kg_per_mol = gas.oxygen_need_mol_per_mol * OXYGEN_AIR_kg_per_mol
    fuel_per_air = np.array([gas.molar_mass_kg_per_kmol * 1e-3 / air_kg_per_mol])
    fuel = burnable(gas)

    brought = air.enthalpy_kJ_per_kg(np.array([298.15])) + fuel_per_air * fuel.enthalpy_kJ_per_kg
    products = burnt(air, fuel_per_air, fuel)
    found_K = products.temperature_at_enthalpy_K(brought / (1.0 + fuel_per_air), 2000.0)

    assert found_K[0] == pytest.approx(flame_K, abs=1.5)

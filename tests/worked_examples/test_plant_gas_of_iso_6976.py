"""Calorific value, molar mass and carbon of a natural gas by composition.

Given   CH4 0.933212, C2H6 0.025656, C3H8 0.015368, N2 0.010350, CO2 0.015414.
Find    molar mass, gross molar calorific value at 25 degC, CO2 over net calorific value.
Source  ISO 6976:2016, annex D, first example; composition from memory, reproduced with a reference
        library: M = 17.38843 kg/kmol, Hs(25 degC) = 905.245 kJ/mol, 56.34 kg/GJ (LHV).
By hand 0.933212 x 890.58 + 0.025656 x 1560.69 + 0.015368 x 2219.17 = 905.24 kJ/mol.
Differs atomic masses in the fourth digit: 0.01 % on molar mass and CO2.
"""

import pytest

from planner.plant.fuel import GasFuel

COMPOSITION = {
    "methane": 0.933212,
    "ethane": 0.025656,
    "propane": 0.015368,
    "nitrogen": 0.010350,
    "carbon_dioxide": 0.015414,
}


def test_gas_of_the_standard() -> None:
    """Molar mass, gross calorific value and carbon, as worked above."""
    gas = GasFuel.from_composition("Standard's gas", COMPOSITION)

    assert gas.molar_mass_kg_per_kmol == pytest.approx(17.38843, rel=1e-4)
    assert gas.hhv_kJ_per_mol == pytest.approx(905.245, rel=1e-5)
    assert gas.co2_kg_per_lhv_kWh / 3.6e-3 == pytest.approx(56.34, rel=3e-4)

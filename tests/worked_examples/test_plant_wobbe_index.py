"""Gross Wobbe index of pure gases.

Given   ideal gross volumetric values at 15/15 degC: methane 37.704, ethane 66.07, propane 93.94,
        n-butane 121.79, hydrogen 12.102 MJ/m3; molar masses 16.043, 30.070, 44.097, 58.124, 2.016.
Find    Wobbe index for combustion at 25 degC and volumes at 0 degC.
Source  ISO 6976:2016, values for the ideal gas; gross molar values 890.58 (25 degC) and 891.51 (15
        degC) for methane and so on.
By hand methane: 37.704 x 288.15 / 273.15 x 890.58 / 891.51 = 39.733 MJ/m3; relative density 16.043
        / 28.9647 = 0.55388; 39.733 / sqrt(0.55388) = 53.39 MJ/m3.
Differs nothing; rounding of the table.
"""

import math

import pytest

from planner.plant.fuel import GasFuel

#: Volumetric at 15/15 [MJ/m3], molar at 25 and 15 degC [kJ/mol], molar mass [kg/kmol].
TABLE = {
    "methane": (37.704, 890.58, 891.51, 16.043),
    "ethane": (66.07, 1560.69, 1562.14, 30.070),
    "propane": (93.94, 2219.17, 2221.10, 44.097),
    "n_butane": (121.79, 2877.40, 2879.76, 58.124),
    "hydrogen": (12.102, 285.83, 286.15, 2.016),
}


@pytest.mark.parametrize("name", TABLE)
def test_wobbe_index_of_a_pure_gas(name: str) -> None:
    """A row of the table, turned to the reference of the report."""
    volumetric, warm, cool, molar_mass = TABLE[name]
    expected = volumetric * 288.15 / 273.15 * warm / cool / math.sqrt(molar_mass / 28.9647)
    gas = GasFuel.from_composition(name, {name: 1.0})

    assert gas.wobbe_hhv_MJ_per_Nm3 == pytest.approx(expected, rel=2e-4)


def test_wobbe_index_of_methane_by_hand() -> None:
    """Methane, as worked above."""
    gas = GasFuel.from_composition("Methane", {"methane": 1.0})

    assert gas.wobbe_hhv_MJ_per_Nm3 == pytest.approx(53.39, abs=0.01)

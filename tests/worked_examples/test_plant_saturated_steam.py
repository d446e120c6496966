"""Saturated water and steam.

Given   pressures from 1 atmosphere to 40 bar.
Find    boiling temperature, enthalpy of steam; enthalpy of liquid at 10 bar.
Source  IAPWS-IF97 as tabulated by the release's reference implementation: at 10 bar 179.886 degC,
        2777.12 kJ/kg; at 1.01325 bar 99.974 degC, 2675.53; at 20 bar 212.38 degC, 2798.38; liquid
        at 10 bar, 60 degC 251.98, 105 degC 440.86 kJ/kg.
By hand not applicable.
Differs the table's spline by less than 0.01 K and 0.05 kJ/kg, the liquid's rise with pressure by
        less than 0.3 kJ/kg.
"""

import pytest

from planner.plant.steam import (
    liquid_enthalpy_kJ_per_kg,
    saturation_degC,
    vapour_enthalpy_kJ_per_kg,
)


@pytest.mark.parametrize(
    ("pressure_kPa", "boiling_degC", "steam_kJ_per_kg"),
    [
        (101.325, 99.974, 2675.53),
        (500.0, 151.84, 2748.11),
        (1000.0, 179.886, 2777.12),
        (2000.0, 212.38, 2798.38),
        (4000.0, 250.36, 2800.90),
    ],
)
def test_saturation(pressure_kPa: float, boiling_degC: float, steam_kJ_per_kg: float) -> None:
    """Boiling temperature and steam, as tabulated."""
    assert saturation_degC(pressure_kPa) == pytest.approx(boiling_degC, abs=0.01)
    assert vapour_enthalpy_kJ_per_kg(pressure_kPa) == pytest.approx(steam_kJ_per_kg, abs=0.05)


@pytest.mark.parametrize(
    ("water_degC", "liquid_kJ_per_kg"),
    [(60.0, 251.98), (70.0, 293.81), (80.0, 335.71), (90.0, 377.69), (105.0, 440.86)],
)
def test_liquid_at_ten_bar(water_degC: float, liquid_kJ_per_kg: float) -> None:
    """Liquid enthalpy under pressure, as tabulated."""
    found = liquid_enthalpy_kJ_per_kg(water_degC, 1000.0)

    assert found == pytest.approx(liquid_kJ_per_kg, abs=0.3)

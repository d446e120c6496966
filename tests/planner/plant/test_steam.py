"""The saturation table and the liquid against the industrial formulation itself."""

import numpy as np
import pytest
from iapws import IAPWS97

from planner.plant.air import saturation_pressure_kPa
from planner.plant.steam import (
    liquid_enthalpy_kJ_per_kg,
    saturation_degC,
    vapour_enthalpy_kJ_per_kg,
)


@pytest.mark.parametrize("pressure_kPa", [120.0, 333.0, 812.0, 1234.0, 2750.0, 4100.0])
def test_saturation_between_the_table_s_rows(pressure_kPa: float) -> None:
    """Boiling temperature to 1 mK and enthalpies to 0.01 kJ/kg of IAPWS-IF97 (iapws 1.5)."""
    steam = IAPWS97(P=pressure_kPa * 1e-3, x=1.0)
    water = IAPWS97(P=pressure_kPa * 1e-3, x=0.0)
    boiling_degC = saturation_degC(pressure_kPa)

    assert boiling_degC == pytest.approx(steam.T - 273.15, abs=1e-3)
    assert vapour_enthalpy_kJ_per_kg(pressure_kPa) == pytest.approx(steam.h, abs=0.01)
    assert liquid_enthalpy_kJ_per_kg(boiling_degC, pressure_kPa) == pytest.approx(water.h, abs=0.01)


@pytest.mark.parametrize("pressure_kPa", [700.0, 1500.0, 4000.0])
@pytest.mark.parametrize("water_degC", [12.0, 60.0, 105.0, 150.0])
def test_liquid_under_pressure(water_degC: float, pressure_kPa: float) -> None:
    """Compressed liquid within 0.3 kJ/kg of IAPWS-IF97, as the function promises."""
    water = IAPWS97(T=water_degC + 273.15, P=pressure_kPa * 1e-3)

    found = liquid_enthalpy_kJ_per_kg(water_degC, pressure_kPa)

    assert found == pytest.approx(water.h, abs=0.3)


def test_vapour_pressure_of_the_air_s_water() -> None:
    """Over water IAPWS-IF97; over ice 0.6117 kPa at 0 degC and 0.1033 kPa at -20 degC.

    Source over ice: handbook tables of moist air, 103.2 Pa at -20 degC (from memory).
    """
    for degC in (5.0, 20.0, 45.0):
        by_formulation = IAPWS97(T=degC + 273.15, x=1.0).P * 1e3
        found = saturation_pressure_kPa(np.array([degC + 273.15]))[0]
        assert found == pytest.approx(by_formulation, rel=1e-3)
    ice = saturation_pressure_kPa(np.array([273.15, 253.15]))
    np.testing.assert_allclose(ice, [0.6112, 0.1032], rtol=2e-3)

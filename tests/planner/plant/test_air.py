"""Humid air against a property library, from frost to heat."""

import numpy as np
import pytest
from CoolProp.HumidAirProp import HAPropsSI

from planner.plant.air import MOST_WATER_mol_frac, humid_air
from planner.plant.gas import SPECIES, Mixture


def _humidity_ratio(air: Mixture) -> float:
    """Water over dry air."""
    water = float(air.mass_frac[0, SPECIES.index("water")])
    return water / (1.0 - water)


@pytest.mark.parametrize(
    ("degC", "humidity", "kPa"),
    [
        (-15.0, 0.7, 101.325),
        (0.5, 0.8, 101.325),
        (15.0, 0.6, 101.325),
        (30.0, 0.8, 101.325),
        (40.0, 0.4, 95.0),
        (25.0, 1.0, 75.0),
    ],
)
def test_humidity_ratio(degC: float, humidity: float, kPa: float) -> None:
    """Within 0.7 % of the library, which knows that vapour in air is 0.3 to 0.6 % denser."""
    kelvin = degC + 273.15
    air = humid_air(np.array([kelvin]), np.array([kPa]), np.array([humidity]))

    by_library = HAPropsSI("W", "T", kelvin, "R", humidity, "P", kPa * 1e3)
    assert -0.007 <= _humidity_ratio(air) / by_library - 1.0 <= 0.0005


def test_dry_air_s_molar_mass() -> None:
    """Dry air has 0.287053 kJ/kgK (ISO 2533), to 0.005 %: argon is rounded and CO2 has risen."""
    air = humid_air(np.array([288.15]), np.array([101.325]), np.array([0.0]))

    assert air.gas_constant_kJ_per_kgK[0] == pytest.approx(0.287053, rel=5e-5)


def test_water_never_fills_the_air() -> None:
    """Air asked to hold more vapour than its pressure allows is cut off, not turned negative."""
    air = humid_air(np.array([363.15]), np.array([70.0]), np.array([1.0]))

    assert air.mol_frac[0, SPECIES.index("water")] == pytest.approx(MOST_WATER_mol_frac, abs=1e-12)
    assert (air.mass_frac >= 0.0).all()

"""Steam from a gas-turbine exhaust at several pinches.

Given   exhaust of methane at an air ratio of 3.5 in humid air (15 degC, 60 %), 500 degC; saturated
        steam at 10 bar, feedwater 105 degC, no approach, no loss, no blowdown.
Find    steam and stack.
Source  worked with a chemistry library and IAPWS-IF97: at a pinch of 5, 8, 10, 15, 20, 25 K steam
        is 0.1722, 0.1706, 0.1695, 0.1669, 0.1642, 0.1616 kg/kg and the stack 132.6, 136.1, 138.5,
        144.3, 150.2, 156.0 degC.
By hand at 10 K: 1.0915 kJ/kgK x (500 - 189.9) / (2777.1 - 762.7) = 0.168, the mean specific heat
        being a little higher at the hot end.
Differs 0.3 % of steam; 1 K of stack, for the model keeps the economiser's water 1 K below boiling,
        which leaves 0.1669 x 4.4 / 1.09 = 0.7 K in the gas.
"""

import numpy as np
import pytest

from planner.constants import STANDARD_PRESSURE_kPa
from planner.plant.air import humid_air
from planner.plant.combustion import burnable, burnt
from planner.plant.exchange import GasFlow
from planner.plant.fuel import GasFuel
from planner.plant.steam_boiler import design_steam_boiler, run_steam_boiler
from planner.study.sections import SteamSystem

AIR_RATIO = 3.5
DRY_AIR_PER_METHANE_kg_per_kg = 17.236


def _exhaust() -> GasFlow:
    """A kilogram a second of the gas above."""
    air = humid_air(np.array([288.15]), np.array([101.325]), np.array([0.6]))
    dry_frac = 1.0 - air.mass_frac[0, -1]
    fuel_per_air = dry_frac / (AIR_RATIO * DRY_AIR_PER_METHANE_kg_per_kg)
    methane = burnable(GasFuel.from_composition("Methane", {"methane": 1.0}))
    gas = burnt(air, np.array([fuel_per_air]), methane)
    return GasFlow(gas, np.array([1.0]), np.array([773.15]))


@pytest.mark.parametrize(
    ("pinch_K", "steam_kg_per_s", "stack_degC"),
    [
        (5.0, 0.1722, 132.6),
        (8.0, 0.1706, 136.1),
        (10.0, 0.1695, 138.5),
        (15.0, 0.1669, 144.3),
        (20.0, 0.1642, 150.2),
        (25.0, 0.1616, 156.0),
    ],
)
def test_steam_and_stack(pinch_K: float, steam_kg_per_s: float, stack_degC: float) -> None:
    """Steam and stack at the design point, as worked above."""
    system = SteamSystem(
        pressure_kPa_gauge=1000.0 - STANDARD_PRESSURE_kPa, feedwater_degC=105.0, blowdown_frac=0.0
    )
    exhaust = _exhaust()
    boiler = design_steam_boiler(exhaust, system, pinch_K=pinch_K, approach_K=1.0, loss_frac=0.0)
    run = run_steam_boiler(boiler, exhaust)

    assert run.steam_kg_per_s[0] == pytest.approx(steam_kg_per_s, rel=3e-3)
    assert run.stack_K[0] - 273.15 == pytest.approx(stack_degC, abs=1.0)

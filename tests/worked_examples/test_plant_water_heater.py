"""A water heater at its design point and at half the gas.

Given   a kilogram a second of methane's exhaust at an air ratio of 3.5, 500 degC; network 90 / 60
        degC; 1 % casing loss; coldest stack 60 degC, so that the bank is sized for 85 degC.
Find    heat and stack at full and at half flow.
Source  energy balance and logarithmic mean; mean specific heats from a chemistry library: 1.0901 to
        85 degC, 1.0885 kJ/kgK to 70 degC.
By hand full: 1.0901 x 415 x 0.99 = 447.9 kW; mean difference (410 - 25) / ln(410 / 25) = 137.6 K,
        so 3.255 kW/K. Half: 3.255 x 0.5^0.6 = 2.147 kW/K. A stack of 70.2 degC gives 0.5 x 1.0885 x
        429.8 x 0.99 = 231.6 kW and takes 2.147 x (410 - 10.2) / ln(410 / 10.2) = 2.147 x 108.2 =
        232.4 kW: the balance is at 70.1 degC and 231.7 kW.
Differs rounding of the hand calculation, 0.2 K at the stack.
"""

import numpy as np
import pytest

from planner.plant.water_heater import design_water_heater, run_water_heater
from planner.study.sections import Recovery, WaterSystem
from tests.planner.plant.invented_gases import gas_flow, methane_exhaust

NETWORK = WaterSystem(flow_degC=90.0, return_degC=60.0)


def test_water_heater_at_half_flow() -> None:
    """Heat and stack, as worked above."""
    recovery = Recovery(hot_water=True, loss_frac=0.01, minimum_stack_degC=60.0)
    gas = methane_exhaust(3.5)
    heater = design_water_heater(gas_flow(gas, degC=500.0), NETWORK, recovery)
    assert heater is not None
    heat_kW, stack_K = run_water_heater(
        heater, gas_flow(gas, degC=500.0, kg_per_s=np.array([1.0, 0.5]))
    )

    np.testing.assert_allclose(heat_kW, [447.9, 231.7], rtol=1e-3)
    np.testing.assert_allclose(stack_K - 273.15, [85.0, 70.1], atol=0.3)


def test_coldest_stack_is_kept() -> None:
    """With 95 degC allowed, half the gas gives half the heat: the damper keeps the stack warm."""
    recovery = Recovery(hot_water=True, loss_frac=0.01, minimum_stack_degC=95.0)
    gas = methane_exhaust(3.5)
    heater = design_water_heater(gas_flow(gas, degC=500.0), NETWORK, recovery)
    assert heater is not None
    heat_kW, stack_K = run_water_heater(
        heater, gas_flow(gas, degC=500.0, kg_per_s=np.array([1.0, 0.5]))
    )

    # Mean specific heat from 95 to 500 degC, from a chemistry library: 1.0911 kJ/kgK.
    np.testing.assert_allclose(heat_kW, 1.0911 * 405.0 * 0.99 * np.array([1.0, 0.5]), rtol=5e-4)
    np.testing.assert_allclose(stack_K - 273.15, 95.0, atol=1e-6)


@pytest.mark.parametrize("exhaust_degC", [60.0, 85.0])
def test_gas_colder_than_the_flow_gives_nothing(exhaust_degC: float) -> None:
    """A gas that cannot reach the flow temperature heats no water."""
    recovery = Recovery(hot_water=True, loss_frac=0.01, minimum_stack_degC=60.0)
    gas = methane_exhaust(3.5)
    heater = design_water_heater(gas_flow(gas, degC=500.0), NETWORK, recovery)
    assert heater is not None

    heat_kW, _ = run_water_heater(heater, gas_flow(gas, degC=exhaust_degC))

    assert heat_kW[0] == 0.0

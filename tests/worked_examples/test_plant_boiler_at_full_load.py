"""Fuel of a boiler at full load, at half load and kept hot.

Given   6000 kW, 82 % on HHV at full load, standing loss 1 % of capacity, pure methane.
Find    fuel (LHV) at full load, at half load and at no load.
Source  definition of efficiency; HHV over LHV of methane 890.58 / 802.55 = 1.10968 (ISO 6976).
By hand on LHV the efficiency is 0.82 x 1.10968 = 0.90994. Full load: 6000 / 0.90994 = 6593.8 kW.
        No load: 0.01 x 6000 / 0.90994 = 65.94 kW. Half load: 65.94 + 0.99 x 3000 / 0.90994 =
        3329.9 kW, so 90.1 % instead of 91.0 %.
Differs nothing; the tolerance is the rounding of the hand calculation.
"""

import pytest

from planner.plant.fuel import GasFuel
from planner.plant.heaters import heater_envelope
from planner.study.sections import Heater


@pytest.mark.parametrize(
    ("heat_kW", "fuel_lhv_kW"), [(6000.0, 6593.8), (3000.0, 3329.9), (0.0, 65.94)]
)
def test_boiler(heat_kW: float, fuel_lhv_kW: float) -> None:
    """Standing fuel and further fuel, as worked above."""
    methane = GasFuel.from_composition("Methane", {"methane": 1.0})
    stated = Heater(
        name="Boilers",
        serves="steam",
        capacity_kW=6000.0,
        largest_unit_kW=3000.0,
        efficiency_frac=0.82,
        efficiency_basis="HHV",
        standing_loss_frac=0.01,
        upkeep_per_year=0.0,
    )

    envelope = heater_envelope(stated, methane)

    found = envelope.standing_fuel_lhv_kW + envelope.fuel_per_heat_lhv * heat_kW
    assert found == pytest.approx(fuel_lhv_kW, rel=5e-5)

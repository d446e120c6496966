"""Steam generator, water heater and dryer: balances, limits, and what is too cold for them."""

import numpy as np
import pytest

from planner.arrays import FloatArray
from planner.errors import StudyError
from planner.plant.air import humid_air
from planner.plant.combustion import burnable, burnt
from planner.plant.drying import drying_heat_kW
from planner.plant.exchange import GasFlow
from planner.plant.fuel import GasFuel
from planner.plant.gas import Mixture
from planner.plant.steam_boiler import SteamBoiler, design_steam_boiler, run_steam_boiler
from planner.plant.water_heater import design_water_heater, run_water_heater
from planner.study.sections import GasSystem, Recovery, SteamSystem, WaterSystem

METHANE = burnable(GasFuel.from_composition("Methane", {"methane": 1.0}))
NETWORK = WaterSystem(flow_degC=85.0, return_degC=60.0)


def _air(hours: int, degC: float = 15.0) -> Mixture:
    """Humid air."""
    one = np.ones(hours)
    return humid_air((degC + 273.15) * one, 101.325 * one, 0.6 * one)


def _exhaust(degC: FloatArray, flow_kg_per_s: FloatArray | float = 20.0) -> GasFlow:
    """Exhaust of some hours, one part of methane to sixty of air."""
    hours = len(degC)
    gas = burnt(_air(hours), np.full(hours, 1.0 / 60.0), METHANE)
    return GasFlow(gas, np.zeros(hours) + flow_kg_per_s, degC + 273.15)


def _boiler(
    design_degC: float = 500.0, gauge_kPa: float = 900.0, approach_K: float = 8.0
) -> SteamBoiler | None:
    """A steam generator of the usual kind."""
    return design_steam_boiler(
        _exhaust(np.array([design_degC])),
        SteamSystem(pressure_kPa_gauge=gauge_kPa),
        pinch_K=10.0,
        approach_K=approach_K,
        loss_frac=0.01,
    )


def _taken_up_kW(boiler: SteamBoiler, steam_kg_per_s: FloatArray) -> FloatArray:
    """Heat in steam and blowdown over feedwater."""
    state = boiler.state
    blown = state.blowdown_frac * (state.boiling - state.feed)
    return np.asarray(steam_kg_per_s * (state.steam - state.feed + blown))


@pytest.mark.parametrize(("gauge_kPa", "approach_K"), [(900.0, 8.0), (900.0, 0.0), (50.0, 8.0)])
def test_boiler_keeps_energy(gauge_kPa: float, approach_K: float) -> None:
    """What gas gives, less the casing's loss, is in steam and blowdown, to a millionth.

    From gas colder than boiling to gas hotter than designed, with a third of the flow and more than
    all of it; at 50 kPa gauge the feedwater stands within the approach, and at no approach the
    economiser boils.
    """
    boiler = _boiler(gauge_kPa=gauge_kPa, approach_K=approach_K)
    degC = np.array([80.0, 179.0, 182.0, 250.0, 420.0, 500.0, 560.0])
    exhaust = _exhaust(degC, np.array([7.0, 20.0, 20.0, 14.0, 15.0, 20.0, 22.0]))

    assert boiler is not None
    run = run_steam_boiler(boiler, exhaust)

    given_kW = exhaust.cooled_to_kW(run.stack_K) * (1.0 - boiler.loss_frac)
    scale_kW = float(given_kW.max())
    np.testing.assert_allclose(
        _taken_up_kW(boiler, run.steam_kg_per_s), given_kW, atol=1e-6 * scale_kW
    )
    assert (run.stack_K <= exhaust.temperature_K).all()
    assert (np.diff(run.steam_kg_per_s)[2:] > 0.0).all()


def test_design_point_is_the_design() -> None:
    """At its design point the generator has its pinch and its approach."""
    boiler = _boiler()
    exhaust = _exhaust(np.array([500.0]))

    assert boiler is not None
    run = run_steam_boiler(boiler, exhaust)

    pinch_K = run.after_evaporator_K[0] - 273.15 - boiler.state.boiling_degC
    assert pinch_K == pytest.approx(10.0, abs=1e-6)
    assert not run.steaming[0]


def test_gas_colder_than_boiling_makes_no_steam() -> None:
    """It passes the generator as it came."""
    boiler = _boiler()
    exhaust = _exhaust(np.array([120.0, 179.0]))

    assert boiler is not None
    run = run_steam_boiler(boiler, exhaust)

    assert (run.steam_kg_per_s == 0.0).all()
    np.testing.assert_array_equal(run.stack_K, exhaust.temperature_K)


def test_exhaust_too_cold_for_a_boiler() -> None:
    """At 40 bar water boils at 250 degC, so gas of 262 degC over a pinch of 10 K buys no boiler."""
    assert _boiler(design_degC=262.0, gauge_kPa=3900.0) is None
    assert _boiler(design_degC=300.0, gauge_kPa=3900.0) is not None


def test_feedwater_that_boils_is_refused() -> None:
    """Feedwater of 130 degC at 100 kPa gauge, where water boils at 120 degC."""
    with pytest.raises(StudyError) as refusal:
        design_steam_boiler(
            _exhaust(np.array([500.0])),
            SteamSystem(pressure_kPa_gauge=100.0, feedwater_degC=130.0),
            pinch_K=10.0,
            approach_K=8.0,
            loss_frac=0.01,
        )
    assert "heat.steam.feedwater_degC" in str(refusal.value)
    assert "120.4 degC" in str(refusal.value)


def test_water_heater_at_its_design_point() -> None:
    """Designed to 95 degC, it cools the gas so far, and less where there is more gas."""
    heater = design_water_heater(_exhaust(np.array([500.0])), NETWORK, Recovery(hot_water=True))
    exhaust = _exhaust(np.array([500.0, 500.0, 500.0]), np.array([10.0, 20.0, 24.0]))

    assert heater is not None
    heat_kW, stack_K = run_water_heater(heater, exhaust)

    # The bank is designed on the gas's true heat and run on its mean specific heat: 2 K.
    assert stack_K[1] - 273.15 == pytest.approx(95.0, abs=2.0)
    assert stack_K[2] > stack_K[1]
    assert stack_K[0] - 273.15 == pytest.approx(95.0, abs=1e-6)
    np.testing.assert_allclose(heat_kW, exhaust.cooled_to_kW(stack_K) * 0.99, rtol=1e-12)


def test_gas_too_cold_for_water() -> None:
    """Gas below the network's flow heats nothing, and buys no bank."""
    recovery = Recovery(hot_water=True)
    heater = design_water_heater(_exhaust(np.array([150.0])), NETWORK, recovery)

    assert design_water_heater(_exhaust(np.array([90.0])), NETWORK, recovery) is None
    assert heater is not None
    cold = _exhaust(np.array([70.0, 84.0]))
    heat_kW, stack_K = run_water_heater(heater, cold)
    np.testing.assert_allclose(heat_kW, 0.0, atol=1e-9)
    np.testing.assert_array_equal(stack_K, cold.temperature_K)


def test_drying_heat() -> None:
    """Above the reference all counts, below the need nothing, and tempering costs a little.

    Gas of 600 degC is tempered to 500 degC with air of 15 degC. By hand: a kilogram gives 1.12 x
    100 kJ above the limit, which warms 112 / (1.035 x 485) = 0.22 kg of air; bringing that from 15
    to 90 degC takes 0.22 x 1.01 x 75 = 17 kJ of the 1.09 x 510 = 558 kJ above the reference: 3 %.
    """
    dryer = GasSystem(reference_degC=90.0, required_degC=360.0, limit_degC=500.0)
    exhaust = _exhaust(np.array([350.0, 480.0, 600.0]), 1.0)

    heat_kW = drying_heat_kW(exhaust, _air(3), np.full(3, 288.15), dryer)

    whole_kW = exhaust.cooled_to_kW(90.0 + 273.15)
    assert heat_kW[0] == 0.0
    assert heat_kW[1] == pytest.approx(whole_kW[1], rel=1e-12)
    assert 1.0 - heat_kW[2] / whole_kW[2] == pytest.approx(0.03, abs=0.002)

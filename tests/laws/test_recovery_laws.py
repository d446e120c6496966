"""Laws of heat recovery: closer, colder and hotter is never less; size alone changes nothing.

Each would be broken by a wrong end of an exchanger, and none is written into the model.
"""

import numpy as np
import pytest

from planner.arrays import FloatArray
from planner.plant.steam_boiler import SteamBoiler, design_steam_boiler, run_steam_boiler
from planner.plant.water_heater import design_water_heater, run_water_heater
from planner.study.sections import Recovery, SteamSystem, WaterSystem
from tests.planner.plant.invented_gases import gas_flow, methane_exhaust

#: Rounding of converged searches.
ROUNDING = 1e-9


def boiler_of(
    *, pinch_K: float = 10.0, gauge_kPa: float = 900.0, kg_per_s: float = 20.0
) -> SteamBoiler:
    """A steam generator designed for an exhaust of 510 degC."""
    boiler = design_steam_boiler(
        gas_flow(methane_exhaust(3.5), degC=510.0, kg_per_s=kg_per_s),
        SteamSystem(pressure_kPa_gauge=gauge_kPa),
        pinch_K=pinch_K,
        approach_K=8.0,
        loss_frac=0.01,
    )
    if boiler is None:
        pytest.fail("an exhaust of 510 degC must be hot enough")
    return boiler


def steam_kg_per_s(boiler: SteamBoiler, degC: FloatArray, kg_per_s: FloatArray) -> FloatArray:
    """Steam of a generator in some hours."""
    exhaust = gas_flow(methane_exhaust(3.5), degC=degC, kg_per_s=kg_per_s)
    return run_steam_boiler(boiler, exhaust).steam_kg_per_s


#: Hours of recovery: every temperature from cold to hot with every flow from a half to all.
SOME_degC, SOME_kg_per_s = (
    grid.ravel() for grid in np.meshgrid(np.linspace(200.0, 560.0, 19), np.linspace(10.0, 22.0, 7))
)


def test_closer_pinch_never_makes_less_steam() -> None:
    """Larger surface takes more heat, in every hour."""
    pinches_K = (4.0, 6.0, 10.0, 16.0, 25.0, 40.0, 60.0)
    made = [steam_kg_per_s(boiler_of(pinch_K=p), SOME_degC, SOME_kg_per_s) for p in pinches_K]

    assert (np.diff(np.array(made), axis=0) < ROUNDING).all()


def test_lower_pressure_never_makes_less_heat() -> None:
    """Steam that boils colder cools the gas further."""
    gauges_kPa = (300.0, 600.0, 1000.0, 1600.0, 2500.0)
    taken = []
    for gauge_kPa in gauges_kPa:
        boiler = boiler_of(gauge_kPa=gauge_kPa)
        exhaust = gas_flow(methane_exhaust(3.5), degC=SOME_degC, kg_per_s=SOME_kg_per_s)
        hot = SOME_degC > 320.0
        taken.append(exhaust.cooled_to_kW(run_steam_boiler(boiler, exhaust).stack_K)[hot])

    assert (np.diff(np.array(taken), axis=0) < ROUNDING).all()


def test_more_or_hotter_gas_never_makes_less_steam() -> None:
    """Steam rises with the gas's temperature and with its flow."""
    boiler = boiler_of()
    by_flow_and_degC = steam_kg_per_s(boiler, SOME_degC, SOME_kg_per_s).reshape(7, 19)

    assert (np.diff(by_flow_and_degC, axis=0) > 0.0).all()
    assert (np.diff(by_flow_and_degC, axis=1) > 0.0).all()


def test_recovery_scales() -> None:
    """Three times the generator on three times the gas makes three times the steam."""
    small, large = boiler_of(), boiler_of(kg_per_s=60.0)

    made = steam_kg_per_s(small, SOME_degC, SOME_kg_per_s)
    threefold = steam_kg_per_s(large, SOME_degC, 3.0 * SOME_kg_per_s)

    np.testing.assert_allclose(threefold, 3.0 * made, rtol=1e-8)


def test_colder_return_never_gives_less_hot_water() -> None:
    """A network that comes back colder takes more from the same gas."""
    exhaust = gas_flow(methane_exhaust(3.5), degC=SOME_degC, kg_per_s=SOME_kg_per_s)
    design = gas_flow(methane_exhaust(3.5), degC=510.0, kg_per_s=20.0)
    recovery = Recovery(hot_water=True, minimum_stack_degC=60.0)
    heats = []
    for return_degC in (40.0, 50.0, 60.0, 70.0):
        network = WaterSystem(flow_degC=85.0, return_degC=return_degC)
        heater = design_water_heater(design, network, recovery)
        assert heater is not None
        heats.append(run_water_heater(heater, exhaust)[0])

    assert (np.diff(np.array(heats), axis=0) < ROUNDING * np.array(heats[1:])).all()

"""Random machines in random weather at random loads: the model never fails and keeps energy."""

import numpy as np
import pytest

from planner.plant.load import NetMachine
from planner.plant.running import Ambient, RunningPoint, ambient
from planner.plant.turbine import GasTurbine
from tests.planner.plant.invented_machines import drawn_turbine

CASES_A_MACHINE = 40
AUXILIARY_FRAC = 0.01
LEAST_LOAD_FRAC = 0.3
COMPRESSION_kJ_per_kg = 350.0


def _energy_miss_frac(turbine: GasTurbine, hours: Ambient, point: RunningPoint) -> np.ndarray:
    """Fuel and air less shaft, exhaust and combustor losses, over fuel (LHV)."""
    fuel, gas = point.fuel_kg_per_s, point.exhaust_kg_per_s
    brought = (gas - fuel) * hours.air.enthalpy_kJ_per_kg(hours.temperature_K)
    brought = brought + fuel * turbine.fuel.enthalpy_kJ_per_kg
    lost = turbine.combustor_loss_frac * fuel * turbine.fuel.lhv_kJ_per_kg
    shaft_kW = brought - gas * point.gas.enthalpy_kJ_per_kg(point.exhaust_K) - lost
    full_kW = turbine.sheet.power_kW / turbine.drive_efficiency
    drive_loss_kW = turbine.drive_loss_kW * (0.5 + 0.5 * (shaft_kW / full_kW) ** 2)
    miss_kW = shaft_kW - drive_loss_kW - point.terminal_power_kW
    return np.asarray(miss_kW / (fuel * turbine.fuel.lhv_kJ_per_kg))


def _hold(seed: int, machines: int) -> None:
    """Draw machines, run them, and hold each case to its laws."""
    draw = np.random.default_rng(seed)
    count = CASES_A_MACHINE
    for _ in range(machines):
        turbine = drawn_turbine(draw)
        rated_kW = turbine.sheet.power_kW
        hours = ambient(
            draw.uniform(-40.0, 50.0, count),
            draw.uniform(0.0, 1.0, count),
            draw.uniform(70.0, 104.0, count),
            inlet_loss_kPa=draw.uniform(0.0, 1.5),
            exhaust_loss_kPa=draw.uniform(0.0, 4.0),
        )
        cap_kW = rated_kW * draw.choice([0.9, 1.0, 1.15, 2.0])
        auxiliary_kW = AUXILIARY_FRAC * rated_kW
        machine = NetMachine(turbine, hours, auxiliary_kW, COMPRESSION_kJ_per_kg, cap_kW)

        full = machine.full_load()
        asked_kW = draw.uniform(LEAST_LOAD_FRAC, 1.0, count) * machine.net_kW(full)
        point = machine.at_net_power(asked_kW, full)

        assert (full.terminal_power_kW <= cap_kW * (1.0 + 1e-8)).all()
        np.testing.assert_allclose(machine.net_kW(point), asked_kW, rtol=1e-5)
        for state in (full, point):
            assert np.isfinite(state.exhaust_K).all()
            assert np.abs(_energy_miss_frac(turbine, hours, state)).max() <= 1e-6
        assert (point.fuel_kg_per_s <= full.fuel_kg_per_s * (1.0 + 1e-9)).all()
        assert (point.exhaust_K <= full.exhaust_K + 1e-3).all()


@pytest.mark.parametrize("seed", range(3))
def test_random_machines(seed: int) -> None:
    """960 cases: -40 to 50 degC, 70 to 104 kPa, any humidity, 30 to 100 % load, any cap.

    Never NaN; the load to 1e-5; the first law to 1e-6 of the fuel; no part load burns more than
    full load or has a hotter exhaust.
    """
    _hold(seed, machines=8)


@pytest.mark.long
@pytest.mark.parametrize("seed", range(100, 150))
def test_many_random_machines(seed: int) -> None:
    """The same for 50,000 cases."""
    _hold(seed, machines=25)

"""Laws of machines in any weather at any load: entropy, monotony, losses, scaling.

Each would be broken by a wrong sign or unit, and none is written into the model.
"""

from typing import Any

import numpy as np
import pytest

from planner.plant.fuel import GasFuel
from planner.plant.load import NetMachine
from planner.plant.running import Ambient, RunningPoint, ambient
from planner.plant.turbine import COMBUSTOR_PRESSURE_LOSS_FRAC, GasTurbine, calibrate
from planner.study.sections import DataSheet, GuaranteedNox

GAS = GasFuel.from_composition(
    "Natural gas", {"methane": 0.93, "ethane": 0.04, "propane": 0.01, "nitrogen": 0.02}
)

#: Invented machines: power, efficiency (LHV), exhaust flow and temperature, pressure ratio.
CLASSES = {
    "3 MW": (3500.0, 0.28, 19.0, 440.0, 10.1),
    "8 MW": (8000.0, 0.345, 26.0, 535.0, 16.0),
    "45 MW": (45_000.0, 0.41, 125.0, 460.0, 29.0),
}
CONTROLS = ("fuel_only", "guide_vanes")


def machine_of(kind: str, *, scale: float = 1.0, **changes: Any) -> GasTurbine:
    """An invented machine, or one so many times as large."""
    power_kW, efficiency, flow, exhaust_degC, ratio = CLASSES[kind]
    stated: dict[str, Any] = {
        "power_kW": scale * power_kW,
        "efficiency_frac": efficiency,
        "efficiency_basis": "LHV",
        "exhaust_flow_kg_per_s": scale * flow,
        "exhaust_degC": exhaust_degC,
        "pressure_ratio": ratio,
        "control": "fuel_only",
        "minimum_load_frac": 0.4,
        "fuel_gas_pressure_kPa_gauge": 2000.0,
        "nox": GuaranteedNox(nox_ppm_15O2=15.0, from_load_frac=0.5),
    }
    return calibrate(DataSheet.model_validate(stated | changes), GAS)


def random_hours(seed: int, count: int = 400) -> Ambient:
    """Weather from arctic to desert, from below the sea to 3000 m."""
    draw = np.random.default_rng(seed)
    return ambient(
        draw.uniform(-40.0, 50.0, count), draw.random(count), draw.uniform(70.0, 104.0, count)
    )


def at_random_load(turbine: GasTurbine, hours: Ambient, seed: int) -> RunningPoint:
    """The machine at a quarter to full load in each hour."""
    bare = NetMachine(turbine, hours, 0.0, 0.0, 1.15 * turbine.sheet.power_kW)
    full = bare.full_load()
    load_frac = np.random.default_rng(seed).uniform(0.25, 1.0, len(hours.temperature_K))
    return bare.at_net_power(load_frac * full.terminal_power_kW, full)


@pytest.mark.parametrize("control", CONTROLS)
@pytest.mark.parametrize("kind", CLASSES)
def test_no_entropy_is_destroyed(kind: str, control: str) -> None:
    """In compressor and turbine entropy rises, in every hour and at every load."""
    hours = random_hours(31)
    point = at_random_load(machine_of(kind, control=control), hours, 32)

    air, gas, ratio = hours.air, point.gas, point.pressure_ratio
    expansion = hours.inlet_kPa * ratio * (1.0 - COMBUSTOR_PRESSURE_LOSS_FRAC) / hours.outlet_kPa
    compressor = air.entropy_kJ_per_kgK(point.compressed_K)
    compressor = compressor - air.entropy_kJ_per_kgK(hours.temperature_K)
    compressor = compressor - air.gas_constant_kJ_per_kgK * np.log(ratio)
    turbine = gas.entropy_kJ_per_kgK(point.exhaust_K) - gas.entropy_kJ_per_kgK(point.firing_K)
    turbine = turbine + gas.gas_constant_kJ_per_kgK * np.log(expansion)
    assert (compressor > 0.0).all()
    assert (turbine > 0.0).all()


@pytest.mark.parametrize("held", ["firing_temperature", "exhaust_temperature"])
@pytest.mark.parametrize("control", CONTROLS)
def test_more_power_burns_more(control: str, held: str) -> None:
    """At one ambient fuel rises with power, and so does the exhaust's heat."""
    turbine = machine_of("8 MW", control=control, held=held)
    loads = np.linspace(0.3, 1.0, 36)
    hours = ambient(np.full(36, 22.0), np.full(36, 0.5), np.full(36, 99.0))
    bare = NetMachine(turbine, hours, 50.0, 340.0, 1.15 * turbine.sheet.power_kW)
    full = bare.full_load()
    point = bare.at_net_power(loads * bare.net_kW(full), full)

    heat = point.gas.enthalpy_kJ_per_kg(point.exhaust_K)
    heat = heat - point.gas.enthalpy_kJ_per_kg(np.full(36, 373.15))
    assert (np.diff(point.fuel_kg_per_s) > 0.0).all()
    assert (np.diff(point.exhaust_kg_per_s * heat) > 0.0).all()


@pytest.mark.parametrize("loss", ["inlet_loss_kPa", "exhaust_loss_kPa"])
@pytest.mark.parametrize("kind", CLASSES)
def test_losses_cost_power_and_efficiency(kind: str, loss: str) -> None:
    """A kilopascal lost in a duct lowers power and efficiency at full load, whatever the hour."""
    turbine = machine_of(kind)
    weather = (np.linspace(-20.0, 40.0, 25), np.full(25, 0.6), np.full(25, 101.325))

    def full_load(lost_kPa: float) -> RunningPoint:
        hours = ambient(*weather, **{loss: lost_kPa})
        return NetMachine(turbine, hours, 0.0, 0.0, 9.0 * turbine.sheet.power_kW).full_load()

    free, lossy = full_load(0.0), full_load(1.0)
    assert (lossy.terminal_power_kW < free.terminal_power_kW).all()
    per_fuel = [point.terminal_power_kW / point.fuel_kg_per_s for point in (free, lossy)]
    assert (per_fuel[1] < per_fuel[0]).all()


@pytest.mark.parametrize("control", CONTROLS)
def test_machines_scale(control: str) -> None:
    """Twice the machine makes, burns and blows out twice as much, at the same temperatures.

    Above 45 MW, where the drive's efficiency no longer rises with size.
    """
    hours = random_hours(35, count=100)
    one = at_random_load(machine_of("45 MW", control=control), hours, 36)
    two = at_random_load(machine_of("45 MW", scale=2.0, control=control), hours, 36)

    for flow in ("terminal_power_kW", "fuel_kg_per_s", "exhaust_kg_per_s"):
        np.testing.assert_allclose(getattr(two, flow), 2.0 * getattr(one, flow), rtol=1e-7)
    np.testing.assert_allclose(two.exhaust_K, one.exhaust_K, rtol=1e-7)

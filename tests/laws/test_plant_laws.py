"""Laws that hold for any gas, weather and exhaust: conservation, monotony, homogeneity, bounds.

They follow from the first and second law and from the definition of the quantities, not from any
model of ours.
"""

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from planner.plant.air import humid_air
from planner.plant.combustion import burnable, burnt
from planner.plant.exchange import GasFlow, counterflow_effectiveness, log_mean_K
from planner.plant.fuel import GasFuel
from planner.plant.gas_compressor import compression_kJ_per_kg
from planner.plant.load import NetMachine
from planner.plant.running import Ambient, RunningPoint, ambient
from planner.plant.steam_boiler import design_steam_boiler, run_steam_boiler
from planner.plant.turbine import GasTurbine
from planner.plant.water_heater import design_water_heater, run_water_heater
from planner.study.sections import Recovery, SteamSystem, WaterSystem
from tests.planner.plant.invented_machines import drawn_turbine

quick = settings(max_examples=40, deadline=None, derandomize=True)

AMBIENTS_degC = st.floats(-40.0, 50.0)
PRESSURES_kPa = st.floats(70.0, 104.0)
EXHAUSTS_degC = st.floats(350.0, 620.0)


@st.composite
def fuels(draw: st.DrawFn) -> GasFuel:
    """A gas with at least half methane."""
    names = ("ethane", "propane", "hydrogen", "carbon_monoxide", "nitrogen", "carbon_dioxide")
    parts = {name: draw(st.floats(0.0, 1.0)) for name in names}
    rest = 0.5 * draw(st.floats(0.0, 1.0)) / max(sum(parts.values()), 1e-9)
    shares = {name: rest * part for name, part in parts.items()}
    return GasFuel.from_composition("Gas", {"methane": 1.0 - sum(shares.values()), **shares})


@st.composite
def turbines(draw: st.DrawFn) -> GasTurbine:
    """A calibrated machine."""
    return drawn_turbine(np.random.default_rng(draw(st.integers(0, 10_000))))


def _hours(degC: float, kPa: float, humidity: float = 0.0) -> Ambient:
    """One hour without losses."""
    return ambient(np.array([degC]), np.array([humidity]), np.array([kPa]))


def _full_load(turbine: GasTurbine, hours: Ambient) -> RunningPoint:
    """Full load without a cap."""
    return NetMachine(turbine, hours, 0.0, 0.0, 9.0 * turbine.sheet.power_kW).full_load()


def _exhaust(degC: float, flow_kg_per_s: float = 10.0) -> GasFlow:
    """Exhaust of one hour."""
    one = np.ones(1)
    methane = burnable(GasFuel.from_composition("Methane", {"methane": 1.0}))
    gas = burnt(humid_air(288.15 * one, 101.325 * one, 0.6 * one), one / 60.0, methane)
    return GasFlow(gas, flow_kg_per_s * one, one * (degC + 273.15))


@quick
@given(fuel=fuels(), lean=st.floats(1.0, 6.0))
def test_combustion_keeps_mass_and_leaves_nothing_negative(fuel: GasFuel, lean: float) -> None:
    """What burns in air enough of it makes whole masses, none below nothing; HHV is above LHV."""
    one = np.ones(1)
    air = humid_air(288.15 * one, 101.325 * one, 0.0 * one)
    oxygen_kg_per_kg = -burnable(fuel).made_kg_per_kg[1]
    fuel_per_air = air.mass_frac[:, 1] / (oxygen_kg_per_kg * lean)

    gas = burnt(air, fuel_per_air, burnable(fuel))

    assert burnable(fuel).made_kg_per_kg.sum() == pytest.approx(1.0, abs=1e-12)
    assert gas.mass_frac.min() >= -1e-12
    assert fuel.hhv_kJ_per_mol > fuel.lhv_kJ_per_mol > 0.0


@quick
@given(turbine=turbines(), degC=AMBIENTS_degC, kPa=PRESSURES_kPa)
def test_thin_air_scales_everything(turbine: GasTurbine, degC: float, kPa: float) -> None:
    """In dry air all flows go with the pressure, and no temperature or ratio moves."""
    low = _full_load(turbine, _hours(degC, 0.9 * kPa))
    high = _full_load(turbine, _hours(degC, kPa))

    for name in ("fuel_kg_per_s", "exhaust_kg_per_s"):
        assert getattr(low, name)[0] == pytest.approx(0.9 * getattr(high, name)[0], rel=1e-7)
    for name in ("exhaust_K", "compressed_K", "pressure_ratio"):
        assert getattr(low, name)[0] == pytest.approx(getattr(high, name)[0], rel=1e-7)


@quick
@given(turbine=turbines(), degC=st.floats(-40.0, 45.0), kPa=PRESSURES_kPa)
def test_colder_air_makes_more_power(turbine: GasTurbine, degC: float, kPa: float) -> None:
    """Five kelvin warmer, every machine makes less from less air."""
    cold = _full_load(turbine, _hours(degC, kPa))
    warm = _full_load(turbine, _hours(degC + 5.0, kPa))

    assert warm.terminal_power_kW[0] < cold.terminal_power_kW[0]
    assert warm.exhaust_kg_per_s[0] < cold.exhaust_kg_per_s[0]


@quick
@given(turbine=turbines(), degC=AMBIENTS_degC, humidity=st.floats(0.0, 1.0))
def test_no_machine_beats_carnot(turbine: GasTurbine, degC: float, humidity: float) -> None:
    """Terminal power over fuel is below Carnot's between firing and ambient temperature."""
    hours = _hours(degC, 101.325, humidity)
    point = _full_load(turbine, hours)

    efficiency = point.terminal_power_kW / (point.fuel_kg_per_s * turbine.fuel.lhv_kJ_per_kg)
    assert (efficiency < 1.0 - hours.temperature_K / point.firing_K).all()


@quick
@given(
    design_degC=EXHAUSTS_degC,
    degC=st.floats(100.0, 620.0),
    flow_frac=st.floats(0.4, 1.2),
    gauge_kPa=st.floats(50.0, 3000.0),
    pinch_K=st.floats(5.0, 50.0),
)
def test_steam_obeys_both_laws(
    *, design_degC: float, degC: float, flow_frac: float, gauge_kPa: float, pinch_K: float
) -> None:
    """Gas leaves the evaporator above boiling and the stack above the feedwater; heat is kept."""
    system = SteamSystem(pressure_kPa_gauge=gauge_kPa)
    boiler = design_steam_boiler(
        _exhaust(design_degC), system, pinch_K=pinch_K, approach_K=8.0, loss_frac=0.01
    )
    assert boiler is not None
    exhaust = _exhaust(degC, 10.0 * flow_frac)

    run = run_steam_boiler(boiler, exhaust)

    state = boiler.state
    if degC > state.boiling_degC:
        assert run.after_evaporator_K[0] - 273.15 >= state.boiling_degC - 1e-6
    assert run.stack_K[0] - 273.15 >= min(degC, boiler.feedwater_degC) - 1e-6
    blown = state.blowdown_frac * (state.boiling - state.feed)
    taken_kW = run.steam_kg_per_s[0] * (state.steam - state.feed + blown)
    given_kW = exhaust.cooled_to_kW(run.stack_K)[0] * 0.99
    assert taken_kW == pytest.approx(given_kW, rel=1e-6, abs=1e-3)


@quick
@given(design_degC=EXHAUSTS_degC, degC=st.floats(60.0, 600.0), flow_frac=st.floats(0.3, 1.2))
def test_water_obeys_both_laws(design_degC: float, degC: float, flow_frac: float) -> None:
    """The stack is never colder than allowed or than the return, nor hotter than the gas."""
    network = WaterSystem(flow_degC=90.0, return_degC=60.0)
    heater = design_water_heater(_exhaust(design_degC), network, Recovery(hot_water=True))
    assert heater is not None
    exhaust = _exhaust(degC, 10.0 * flow_frac)

    heat_kW, stack_K = run_water_heater(heater, exhaust)

    assert heat_kW[0] >= -1e-9
    assert min(degC, 95.0) - 1e-6 <= stack_K[0] - 273.15 <= degC + 1e-6


@quick
@given(ntu=st.floats(0.0, 20.0), ratio=st.floats(0.0, 1.0))
def test_effectiveness_is_a_share(ntu: float, ratio: float) -> None:
    """Between the parallel exchanger's and the evaporator's, which bound any counterflow one."""
    found = counterflow_effectiveness(np.array([ntu]), np.array([ratio]))[0]

    parallel = (1.0 - math.exp(-ntu * (1.0 + ratio))) / (1.0 + ratio)
    assert parallel - 1e-7 <= found <= 1.0 - math.exp(-ntu) + 1e-7


@quick
@given(one=st.floats(0.1, 500.0), other=st.floats(0.1, 500.0))
def test_logarithmic_mean_lies_between_the_others(one: float, other: float) -> None:
    """Between the geometric and the arithmetic mean, whichever end is which."""
    found = log_mean_K(np.array([one]), np.array([other]))[0]

    assert math.sqrt(one * other) * (1 - 1e-5) <= found <= 0.5 * (one + other) * (1 + 1e-5)
    assert found == pytest.approx(log_mean_K(np.array([other]), np.array([one]))[0], rel=1e-5)


@quick
@given(fuel=fuels(), supply=st.floats(2.0, 3000.0), needed=st.floats(200.0, 4000.0))
def test_compression_takes_at_least_isothermal_work(
    fuel: GasFuel, supply: float, needed: float
) -> None:
    """No compressor beats isothermal work at 20 degC; none runs where the main is high enough."""
    work = compression_kJ_per_kg(
        fuel, supply_kPa_gauge=supply, needed_kPa_gauge=needed, ambient_kPa=100.0
    )

    if supply >= needed:
        assert work == 0.0
    else:
        specific = 8.314462618 * 293.15 / fuel.molar_mass_kg_per_kmol
        assert work >= specific * math.log((needed + 100.0) / (supply + 100.0))

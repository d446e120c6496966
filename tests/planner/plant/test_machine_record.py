"""The machine's figures for the report agree with each other and with the sheet."""

from itertools import pairwise
from pathlib import Path

import numpy as np
import pandas as pd
import pytest

import load_profiles.demo_sites
from load_profiles import SiteYear
from planner.plant import GasFuel, build_plant
from planner.results.records import Machine
from planner.study.reading import load_study

DEMO_SITES = Path(load_profiles.demo_sites.__file__).parent


def _site_year() -> SiteYear:
    """A day of a site a little above the sea, with no demand."""
    index = pd.date_range("2025-01-01", periods=24, freq="h", tz="UTC")
    weather = {"ambient_degC": 15.0, "relative_humidity_frac": 0.6, "pressure_kPa": 99.0}
    wanted = dict.fromkeys(("power_kW", "steam_kW", "hot_water_kW", "hot_gas_kW", "cooling_kW"), 0)
    return SiteYear(
        hourly=pd.DataFrame({**wanted, **weather}, index=index),
        origins=pd.DataFrame(index=index),
        step_h=1.0,
        time_zone="Europe/Berlin",
        within_step_excess_kW=pd.Series(0.0, index=range(1, 13)),
    )


@pytest.fixture(
    scope="module", params=[("hospital", 0), ("hospital", 1), ("factory", 0), ("factory", 1)]
)
def machine(request: pytest.FixtureRequest) -> Machine:
    """The machine of each demo option."""
    site, number = request.param
    study = load_study(DEMO_SITES / site).study
    gas = GasFuel.from_composition(study.fuel.name, study.fuel.composition_mol_frac)
    return build_plant(study, study.option[number], _site_year(), gas).machine()


def test_points_agree_with_themselves(machine: Machine) -> None:
    """Nine points; efficiency is power over fuel, and falls with load and with ambient heat."""
    table = {(point.label, point.load_frac): point for point in machine.points}

    assert len(table) == 9
    for point in machine.points:
        ratio = point.net_power_kW / point.fuel_lhv_kW
        assert point.efficiency_lhv_frac == pytest.approx(ratio, rel=1e-9)
        full_kW = table[point.label, 1.0].net_power_kW
        assert point.net_power_kW == pytest.approx(point.load_frac * full_kW, rel=1e-5)
    for label in ("cold", "ISO", "hot"):
        by_load = [table[label, load].efficiency_lhv_frac for load in (1.0, 0.75, 0.5)]
        assert by_load == sorted(by_load, reverse=True)
    full = [table[label, 1.0] for label in ("cold", "ISO", "hot")]
    assert np.all(np.diff([point.net_power_kW for point in full]) < 0.0)
    assert np.all(np.diff([point.efficiency_lhv_frac for point in full]) < 0.0)


def test_net_power_is_below_the_sheet(machine: Machine) -> None:
    """Losses, ageing, air pressure, auxiliaries and gas compressor take 5 to 15 % at ISO.

    By hand: air pressure with the inlet's loss some 5 %, the exhaust's loss 1.5 %, ageing 2.5 %,
    auxiliaries 1 to 2 %, gas compressor up to 3 %.
    """
    iso = next(p for p in machine.points if p.label == "ISO" and p.load_frac == 1.0)

    assert 0.85 <= iso.net_power_kW / machine.sheet_power_kW <= 0.95
    assert iso.efficiency_lhv_frac < machine.sheet_efficiency_lhv_frac


def test_stations_follow_the_gas(machine: Machine) -> None:
    """Compression warms, the flame is hottest, fuel joins between, pressures rise and fall."""
    inlet, compressed, fired, outlet = machine.stations

    assert inlet.temperature_degC == pytest.approx(15.0, abs=1e-9)
    assert inlet.temperature_degC < compressed.temperature_degC < fired.temperature_degC
    assert outlet.temperature_degC < fired.temperature_degC
    assert inlet.flow_kg_per_s == compressed.flow_kg_per_s < fired.flow_kg_per_s
    assert fired.flow_kg_per_s == outlet.flow_kg_per_s
    assert inlet.pressure_kPa < outlet.pressure_kPa < fired.pressure_kPa < compressed.pressure_kPa


def test_gas_stays_above_what_it_heats(machine: Machine) -> None:
    """On the composite curves the gas's line lies above every sink, and both end together."""
    (start_kW, hot_degC), (end_kW, stack_degC) = machine.recovery_heat_degC
    sink_kW, sink_degC = np.array(machine.recovery_sink_degC).T

    gas_degC = np.interp(sink_kW, [start_kW, end_kW], [hot_degC, stack_degC])
    assert start_kW == 0.0
    assert sink_kW[-1] == pytest.approx(end_kW, rel=1e-9)
    assert stack_degC == pytest.approx(machine.stack_degC)
    assert all(before <= after for before, after in pairwise(sink_kW))
    # The gas's line is drawn straight; its specific heat bends it by a few kelvin.
    assert (gas_degC >= sink_degC - 5.0).all()

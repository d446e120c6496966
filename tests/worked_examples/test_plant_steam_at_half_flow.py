"""A steam generator at half its gas flow.

Given   exhaust of methane at an air ratio of 3.5, 500 degC; steam at 10 bar, boiling at 179.9 degC,
        pinch 10 K at full flow; then half the flow at the same temperature.
Find    gas behind the evaporator.
Source  an exchanger whose other side boils: (T - Ts) falls by exp(-UA / C), any heat-transfer text;
        UA with the flow to the power 0.6 (common practice for finned tubes).
By hand full flow: UA / C = ln(320.1 / 10) = 3.466. Half flow: UA falls by 0.5^0.6, C by 0.5, so UA
        / C = 3.466 x 0.5^-0.4 = 4.574, and 320.1 x exp(-4.574) = 3.30 K above boiling.
Differs specific heat over a span that is 7 K longer: 0.02 K.
"""

import numpy as np
import pytest

from planner.constants import STANDARD_PRESSURE_kPa
from planner.plant.steam_boiler import design_steam_boiler, run_steam_boiler
from planner.study.sections import SteamSystem
from tests.planner.plant.invented_gases import gas_flow, methane_exhaust

BOILING_degC = 179.886


def test_pinch_at_half_flow() -> None:
    """Gas behind the evaporator at full and at half flow, as worked above."""
    system = SteamSystem(pressure_kPa_gauge=1000.0 - STANDARD_PRESSURE_kPa)
    gas = methane_exhaust(3.5)
    boiler = design_steam_boiler(
        gas_flow(gas, degC=500.0), system, pinch_K=10.0, approach_K=8.0, loss_frac=0.0
    )
    assert boiler is not None
    run = run_steam_boiler(boiler, gas_flow(gas, degC=500.0, kg_per_s=np.array([1.0, 0.5])))

    above_boiling_K = run.after_evaporator_K - 273.15 - BOILING_degC
    assert above_boiling_K[0] == pytest.approx(10.0, abs=0.02)
    assert above_boiling_K[1] == pytest.approx(3.30, abs=0.05)
    # The colder stack lets half the gas make a little more than half the steam.
    assert 0.5 < run.steam_kg_per_s[1] / run.steam_kg_per_s[0] < 0.52

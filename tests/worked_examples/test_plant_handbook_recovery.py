"""A handbook's heat-recovery steam generator.

Given   150 000 lb/h of exhaust at 900 degF (3 % CO2, 6.5 % H2O, 76 % N2, 14.5 % O2 by volume),
        boiling at 459.6 degF (450 psig), pinch 20 degF, approach 10 degF, feedwater 240 degF, steam
        at 1330.9 Btu/lb (650 degF), blowdown 2 %, heat loss 1 %.
Find    heat to boiling and superheat, steam, heat of the economiser, stack.
Source  Hicks, Handbook of Energy Engineering Calculations, pages 180 to 182: 16.65 million Btu/h,
        18 502 lb/h, 4.182 million Btu/h, 371.7 degF.
By hand 150 000 x 0.99 x 0.267 Btu/lbF x (900 - 480) = 16.65 million Btu/h.
Differs 1 %, for the handbook takes one specific heat, and 431.2 Btu/lb for water at 449.6 degF
        where IAPWS-IF97 has 429.8; the stack by 2 degF.
"""

import numpy as np
import pytest

from planner.plant.exchange import GasFlow
from planner.plant.gas import Mixture, molar_masses_kg_per_kmol
from planner.plant.steam import liquid_enthalpy_kJ_per_kg, saturation_degC

KJ_PER_BTU = 1.05505585
KG_PER_LB = 0.45359237
KPA_PER_PSI = 6.894757
STEAM_Btu_per_lb = 1330.9
LOSS_FRAC, BLOWDOWN_FRAC = 0.01, 0.02


def kelvin(degF: float) -> float:
    """Absolute temperature."""
    return (degF - 32.0) / 1.8 + 273.15


def water_Btu_per_lb(degF: float) -> float:
    """Enthalpy of liquid at 450 psig."""
    liquid = liquid_enthalpy_kJ_per_kg((degF - 32.0) / 1.8, 464.7 * KPA_PER_PSI)
    return liquid * KG_PER_LB / KJ_PER_BTU


def test_handbook_recovery() -> None:
    """Heats, steam and stack, as worked above."""
    masses = np.array([0.76, 0.145, 0.0, 0.03, 0.065]) * molar_masses_kg_per_kmol()
    gas = Mixture((masses / masses.sum())[None, :])
    exhaust = GasFlow(gas, np.array([150e3 * KG_PER_LB / 3600.0]), np.array([kelvin(900.0)]))
    Btu_per_h_per_kW = 3600.0 / KJ_PER_BTU

    boiling_degF = saturation_degC(464.7 * KPA_PER_PSI) * 1.8 + 32.0
    boiling_heat = float(exhaust.cooled_to_kW(kelvin(480.0))[0]) * (1 - LOSS_FRAC)
    boiling_heat *= Btu_per_h_per_kW
    into, blown = water_Btu_per_lb(449.6), water_Btu_per_lb(459.5)
    steam_lb_per_h = boiling_heat / (STEAM_Btu_per_lb - into + BLOWDOWN_FRAC * (blown - into))
    preheat = steam_lb_per_h * (1 + BLOWDOWN_FRAC) * (into - water_Btu_per_lb(240.0))
    given_kW = np.array([preheat / Btu_per_h_per_kW / (1 - LOSS_FRAC)])
    stack_K = exhaust.at(np.array([kelvin(480.0)])).after_kW(given_kW)[0]

    assert boiling_degF == pytest.approx(459.6, abs=0.1)
    assert boiling_heat == pytest.approx(16.65e6, rel=0.01)
    assert steam_lb_per_h == pytest.approx(18_502.0, rel=0.01)
    assert preheat == pytest.approx(4.182e6, rel=0.015)
    assert stack_K == pytest.approx(kelvin(371.7), abs=2.0 / 1.8)

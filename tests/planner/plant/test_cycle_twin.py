"""A machine made in a chemistry library, step by step, and found again from its data sheet."""

from dataclasses import dataclass

import cantera as ct
import numpy as np
import pytest
from scipy.optimize import brentq

from planner.plant.load import NetMachine
from planner.plant.running import ambient
from planner.plant.turbine import (
    CASING_LOSS_FRAC,
    COMBUSTION_LOSS_FRAC,
    COMBUSTOR_PRESSURE_LOSS_FRAC,
    DRIVE_EFFICIENCY,
    DRIVE_POWER_kW,
    calibrate,
)
from planner.study.sections import DataSheet, GuaranteedNox
from tests.planner.plant.invented_gases import METHANE

STEPS = 300
AIR_kg_per_s = 20.0
INLET_K, INLET_Pa = 288.15, 101_325.0
WATER_mol_frac = 0.6 * 1.7058 / 101.325  # IAPWS vapour pressure at 15 degC

#: Heat lost around the combustor, over fuel (LHV).
LOSS_FRAC = 0.015


@dataclass(frozen=True)
class Twin:
    """What a maker would measure, and what only the twin knows."""

    shaft_kW: float
    fuel_lhv_kW: float
    exhaust_kg_per_s: float
    exhaust_K: float


def _polytropic(gas: ct.Solution, outlet_Pa: float, efficiency: float) -> None:
    """Change a gas's pressure by dh = v dp / eta, or v dp eta in an expansion, in small steps."""
    ratio = (outlet_Pa / gas.P) ** (1.0 / STEPS)
    factor = 1.0 / efficiency if ratio > 1.0 else efficiency
    for _ in range(STEPS):
        enthalpy, after_Pa = gas.enthalpy_mass, gas.P * ratio
        first = np.log(ratio) * gas.P / gas.density  # v dp of an ideal gas
        gas.HP = enthalpy + factor * first, after_Pa
        last = np.log(ratio) * gas.P / gas.density
        gas.HP = enthalpy + factor * 0.5 * (first + last), after_Pa


def _burnt(air: dict[str, float], methane: float) -> dict[str, float]:
    """Moles after complete combustion."""
    left = dict(air)
    left["O2"] -= 2.0 * methane
    left["CO2"] += methane
    left["H2O"] += 2.0 * methane
    return left


def _twin(pressure_ratio: float, firing_K: float, efficiency: float) -> Twin:
    """Compress, burn and expand in the library."""
    gas, fuel = ct.Solution("gri30.yaml"), ct.Solution("gri30.yaml")
    dry = {"N2": 0.78084, "O2": 0.20946, "AR": 0.00934, "CO2": 0.00036}
    air = {name: share * (1.0 - WATER_mol_frac) for name, share in dry.items()}
    air["H2O"] = WATER_mol_frac
    gas.TPX = INLET_K, INLET_Pa, air
    air_kmol_per_s, cold = AIR_kg_per_s / gas.mean_molecular_weight, gas.enthalpy_mass
    _polytropic(gas, INLET_Pa * pressure_ratio, efficiency)
    compressed, high_Pa = gas.enthalpy_mass, gas.P
    fuel.TPX = 298.15, ct.one_atm, "CH4:1"
    lhv_J_per_kmol = METHANE.lhv_kJ_per_mol * 1e6

    def surplus_W(methane: float) -> float:
        gas.TPX = firing_K, high_Pa, _burnt(air, methane)
        flow = AIR_kg_per_s + air_kmol_per_s * methane * fuel.mean_molecular_weight
        brought = fuel.enthalpy_mole - LOSS_FRAC * lhv_J_per_kmol
        return float(
            AIR_kg_per_s * compressed
            + air_kmol_per_s * methane * brought
            - flow * gas.enthalpy_mass
        )

    methane = brentq(surplus_W, 1e-4, 0.09, xtol=1e-14)
    gas.TPX = (
        firing_K,
        high_Pa * (1.0 - COMBUSTOR_PRESSURE_LOSS_FRAC),
        _burnt(air, methane),
    )
    hot = gas.enthalpy_mass
    _polytropic(gas, INLET_Pa, efficiency)
    exhaust = AIR_kg_per_s + air_kmol_per_s * methane * fuel.mean_molecular_weight
    work_W = exhaust * (hot - gas.enthalpy_mass) - AIR_kg_per_s * (compressed - cold)
    return Twin(
        shaft_kW=work_W * 1e-3,
        fuel_lhv_kW=air_kmol_per_s * methane * lhv_J_per_kmol * 1e-3,
        exhaust_kg_per_s=exhaust,
        exhaust_K=gas.T,
    )


def _sheet(twin: Twin, pressure_ratio: float) -> DataSheet:
    """The twin's data sheet: power behind a drive as good as the model takes it."""
    power_kW = twin.shaft_kW
    for _ in range(20):
        drive = np.interp(np.log(power_kW), np.log(DRIVE_POWER_kW), DRIVE_EFFICIENCY)
        power_kW = twin.shaft_kW * float(drive)
    return DataSheet(
        power_kW=power_kW,
        efficiency_frac=power_kW / twin.fuel_lhv_kW,
        efficiency_basis="LHV",
        exhaust_flow_kg_per_s=twin.exhaust_kg_per_s,
        exhaust_degC=twin.exhaust_K - 273.15,
        pressure_ratio=pressure_ratio,
        control="fuel_only",
        minimum_load_frac=0.4,
        fuel_gas_pressure_kPa_gauge=2000.0,
        nox=GuaranteedNox(nox_ppm_15O2=15.0, from_load_frac=0.5),
    )


@pytest.mark.parametrize(
    ("pressure_ratio", "firing_K", "efficiency"),
    [(7.0, 1180.0, 0.85), (12.0, 1300.0, 0.87), (20.0, 1480.0, 0.89)],
)
def test_twin_is_found_again(pressure_ratio: float, firing_K: float, efficiency: float) -> None:
    """From the sheet alone: firing temperature to 0.2 K, polytropic efficiency to 0.0002.

    The audit leaves just what the twin loses beyond usual losses. The library's calorific value is
    0.002 % away from the standard's, its water content from ours by as much.
    """
    twin = _twin(pressure_ratio, firing_K, efficiency)

    turbine = calibrate(_sheet(twin, pressure_ratio), METHANE)

    assert turbine.firing_K == pytest.approx(firing_K, abs=0.2)
    assert turbine.polytropic_efficiency == pytest.approx(efficiency, abs=2e-4)
    beyond_usual = LOSS_FRAC - COMBUSTION_LOSS_FRAC - CASING_LOSS_FRAC
    assert turbine.audit_residual_frac == pytest.approx(beyond_usual, abs=2e-4)


def test_state_of_another_hour_is_the_library_s() -> None:
    """At 32 degC and 62 % load, gas of the model's composition has the model's enthalpies.

    Shaft power recomputed from the library's enthalpies of air and exhaust, to 0.01 %.
    """
    turbine = calibrate(_sheet(_twin(12.0, 1300.0, 0.87), 12.0), METHANE)
    hours = ambient(np.array([32.0]), np.array([0.5]), np.array([97.0]))
    machine = NetMachine(turbine, hours, 0.0, 0.0, 2.0 * turbine.sheet.power_kW)
    full = machine.full_load()
    point = machine.at_net_power(0.62 * full.terminal_power_kW, full)

    def enthalpy_kJ_per_kg(mass_frac: np.ndarray, kelvin: float) -> float:
        library.TPY = kelvin, ct.one_atm, dict(zip(names, mass_frac, strict=True))
        return float(library.enthalpy_mass) * 1e-3

    library, names = ct.Solution("gri30.yaml"), ("N2", "O2", "AR", "CO2", "H2O")
    fuel, gas = float(point.fuel_kg_per_s[0]), float(point.exhaust_kg_per_s[0])
    air, burnt = hours.air.mass_frac[0], point.gas.mass_frac[0]
    fired_K, exhaust_K = float(point.firing_K[0]), float(point.exhaust_K[0])
    expansion = gas * (enthalpy_kJ_per_kg(burnt, fired_K) - enthalpy_kJ_per_kg(burnt, exhaust_K))
    rise = enthalpy_kJ_per_kg(air, float(point.compressed_K[0])) - enthalpy_kJ_per_kg(air, 305.15)
    shaft_kW = expansion - (gas - fuel) * rise
    full_shaft_kW = turbine.sheet.power_kW / turbine.drive_efficiency
    drive_loss_kW = 0.5 * turbine.drive_loss_kW * (1.0 + (shaft_kW / full_shaft_kW) ** 2)

    assert shaft_kW - drive_loss_kW == pytest.approx(float(point.terminal_power_kW[0]), rel=1e-4)

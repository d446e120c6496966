"""A simple-cycle gas turbine calibrated from its data sheet.

With power, efficiency, exhaust flow and exhaust temperature given, the first law is an audit of the
sheet and not an equation for an efficiency: what is left over is booked as heat loss and shown.
Power then gives one relation between compressor and turbine; it is closed by equal polytropic
efficiencies.
"""

from dataclasses import dataclass

import numpy as np
from scipy.optimize import brentq

from load_profiles import Fault
from planner.arrays import FloatArray
from planner.constants import ZERO_CELSIUS_K
from planner.errors import StudyError
from planner.plant.air import humid_air
from planner.plant.combustion import BurnableFuel, burnable, burnt
from planner.plant.fuel import AIR_MOLAR_MASS_kg_per_kmol, GasFuel
from planner.plant.gas import Mixture
from planner.study.sections import DataSheet

#: Combustion efficiency and casing loss of a combustor in good order: common practice.
COMBUSTION_LOSS_FRAC = 0.003
CASING_LOSS_FRAC = 0.003

#: Pressure lost in the combustor over its inlet pressure: common practice, 3 to 6 %.
COMBUSTOR_PRESSURE_LOSS_FRAC = 0.045

#: Efficiency of gearbox, generator and bearings by size: common practice.
DRIVE_POWER_kW = (1_000.0, 5_000.0, 15_000.0, 45_000.0)
DRIVE_EFFICIENCY = (0.94, 0.955, 0.965, 0.975)

#: Polytropic efficiencies between which a real machine lies.
POLYTROPIC_RANGE = (0.60, 0.97)


@dataclass(frozen=True)
class GasTurbine:
    """Parameters of a machine at its sheet's condition; off-design is in `running`.

    Parameters
    ----------
    sheet : DataSheet
        As stated.
    fuel : BurnableFuel
        What it burns.
    fuel_kg_per_s, air_kg_per_s : float [kg/s]
        Flows at the sheet's condition.
    polytropic_efficiency : float [-]
        Of compressor and turbine alike.
    drive_efficiency : float [-]
        Shaft to terminals at the sheet's power.
    combustor_loss_frac : float [-]
        Heat lost over fuel (LHV), the audit's residual included.
    audit_residual_frac : float [-]
        Fuel less power, exhaust and the losses of common practice, over fuel (LHV).
    inlet_K, compressed_K, firing_K, exhaust_K : float [K]
        Temperatures through the cycle.
    inlet_gas_constant, exhaust_gas_constant : float [kJ/kgK]
        Of humid air and of burnt gas.
    swallowing : float
        Stodola constant: flow times root of temperature over pressure, over the ellipse's root.
    ideal_expansion_kJ_per_kg : float [kJ/kg]
        Isentropic enthalpy drop of the turbine.
    """

    sheet: DataSheet
    fuel: BurnableFuel
    fuel_kg_per_s: float
    air_kg_per_s: float
    polytropic_efficiency: float
    drive_efficiency: float
    combustor_loss_frac: float
    audit_residual_frac: float
    inlet_K: float
    compressed_K: float
    firing_K: float
    exhaust_K: float
    inlet_gas_constant: float
    exhaust_gas_constant: float
    swallowing: float
    ideal_expansion_kJ_per_kg: float

    @property
    def drive_loss_kW(self) -> float:
        """Loss of gearbox, generator and bearings at the sheet's power."""
        return self.sheet.power_kW * (1.0 / self.drive_efficiency - 1.0)

    @property
    def sheet_efficiency_lhv(self) -> float:
        """Terminal power over fuel (LHV) at the sheet's condition."""
        return self.sheet.power_kW / (self.fuel_kg_per_s * self.fuel.lhv_kJ_per_kg)


def calibrate(sheet: DataSheet, fuel: GasFuel, path: str = "unit.sheet") -> GasTurbine:
    """Find the machine behind a data sheet.

    Parameters
    ----------
    sheet : DataSheet
        At one stated condition, without site losses.
    fuel : GasFuel
        The site's gas; the sheet's efficiency is taken to hold for it.
    path : str
        Place of the sheet in the study file, for refusals.

    Returns
    -------
    GasTurbine
        It gives the sheet back at the sheet's condition.

    Raises
    ------
    StudyError
        If the exhaust is less than the fuel and the air to burn it, or if no compressor and turbine
        could make the power.

    Notes
    -----
    Choices that a sheet cannot show hardly matter: polytropic efficiencies apart by 0.06,
    combustor loss 0.03 to 0.06 and drive efficiency within 0.01 move power by at most 0.35 % and
    heat rate by 0.3 % over all ambients.
    """
    burns = burnable(fuel)
    basis = 1.0 if sheet.efficiency_basis == "LHV" else fuel.hhv_over_lhv
    fuel_lhv_kW = sheet.power_kW / (sheet.efficiency_frac * basis)
    fuel_kg_per_s = fuel_lhv_kW / burns.lhv_kJ_per_kg
    air_kg_per_s = _air_kg_per_s(sheet, fuel, fuel_kg_per_s, path)
    inlet_K = np.array([sheet.ambient_degC + ZERO_CELSIUS_K])
    air = humid_air(
        inlet_K, np.array([sheet.pressure_kPa]), np.array([sheet.relative_humidity_frac])
    )
    gas = burnt(air, np.array([fuel_kg_per_s / air_kg_per_s]), burns)
    exhaust_K = np.array([sheet.exhaust_degC + ZERO_CELSIUS_K])
    lost_kW = float(
        air_kg_per_s * air.enthalpy_kJ_per_kg(inlet_K)[0]
        + fuel_kg_per_s * burns.enthalpy_kJ_per_kg
        - sheet.exhaust_flow_kg_per_s * gas.enthalpy_kJ_per_kg(exhaust_K)[0]
        - sheet.power_kW
    )
    drive = float(np.interp(np.log(sheet.power_kW), np.log(DRIVE_POWER_kW), DRIVE_EFFICIENCY))
    drive_loss_frac = sheet.power_kW * (1.0 / drive - 1.0) / fuel_lhv_kW
    usual_frac = drive_loss_frac + COMBUSTION_LOSS_FRAC + CASING_LOSS_FRAC
    cycle = _Cycle(
        sheet=sheet,
        air=air,
        gas=gas,
        air_kg_per_s=air_kg_per_s,
        heat_kW=fuel_kg_per_s * burns.enthalpy_kJ_per_kg - lost_kW + drive_loss_frac * fuel_lhv_kW,
        shaft_kW=sheet.power_kW / drive,
        inlet_K=inlet_K,
        exhaust_K=exhaust_K,
    )
    efficiency = _polytropic_efficiency(cycle, lost_kW / fuel_lhv_kW - usual_frac, path)
    compressed_K, firing_K = cycle.temperatures_K(efficiency)
    return GasTurbine(
        sheet=sheet,
        fuel=burns,
        fuel_kg_per_s=fuel_kg_per_s,
        air_kg_per_s=air_kg_per_s,
        polytropic_efficiency=efficiency,
        drive_efficiency=drive,
        combustor_loss_frac=lost_kW / fuel_lhv_kW - drive_loss_frac,
        audit_residual_frac=lost_kW / fuel_lhv_kW - usual_frac,
        inlet_K=float(inlet_K[0]),
        compressed_K=float(compressed_K[0]),
        firing_K=float(firing_K[0]),
        exhaust_K=float(exhaust_K[0]),
        inlet_gas_constant=float(air.gas_constant_kJ_per_kgK[0]),
        exhaust_gas_constant=float(gas.gas_constant_kJ_per_kgK[0]),
        swallowing=cycle.swallowing(firing_K),
        ideal_expansion_kJ_per_kg=cycle.ideal_expansion_kJ_per_kg(firing_K),
    )


def _air_kg_per_s(sheet: DataSheet, fuel: GasFuel, fuel_kg_per_s: float, path: str) -> float:
    """Air into the machine; refuses an exhaust that is less than what has to be burnt."""
    air_need = fuel.air_need_mol_per_mol * AIR_MOLAR_MASS_kg_per_kmol / fuel.molar_mass_kg_per_kmol
    least_kg_per_s = fuel_kg_per_s * (1.0 + air_need)
    if sheet.exhaust_flow_kg_per_s <= least_kg_per_s:
        must = (
            f"must be above {least_kg_per_s:.3g} kg/s, the fuel and the air to burn it; "
            "is it stated in kg/s?"
        )
        came = f"{sheet.exhaust_flow_kg_per_s:g}"
        raise StudyError((Fault(f"{path}.exhaust_flow_kg_per_s", came, must),))
    return sheet.exhaust_flow_kg_per_s - fuel_kg_per_s


def _polytropic_efficiency(cycle: "_Cycle", residual_frac: float, path: str) -> float:
    """Of compressor and turbine alike; refuses a sheet that no real machine could have."""
    low, high = POLYTROPIC_RANGE
    if cycle.mismatch(low) * cycle.mismatch(high) > 0.0:
        came = f"a first-law residual of {residual_frac:+.1%} of fuel (LHV)"
        must = (
            "power, efficiency, exhaust flow, exhaust temperature and pressure ratio cannot be "
            f"true together: no compressor and turbine of {low:.0%} to {high:.0%} polytropic "
            "efficiency make them; mend the sheet"
        )
        raise StudyError((Fault(path, came, must),))
    return float(brentq(cycle.mismatch, low, high, xtol=1e-13))


@dataclass(frozen=True)
class _Cycle:
    """The sheet's cycle, waiting for one polytropic efficiency."""

    sheet: DataSheet
    air: Mixture
    gas: Mixture
    air_kg_per_s: float
    heat_kW: float
    shaft_kW: float
    inlet_K: FloatArray
    exhaust_K: FloatArray

    @property
    def expansion_ratio(self) -> float:
        """Pressure ratio of the turbine."""
        return self.sheet.pressure_ratio * (1.0 - COMBUSTOR_PRESSURE_LOSS_FRAC)

    def temperatures_K(self, efficiency: float) -> tuple[FloatArray, FloatArray]:
        """Temperatures after compressor and combustor."""
        r = self.air.gas_constant_kJ_per_kgK
        entropy = self.air.entropy_kJ_per_kgK(self.inlet_K)
        entropy = entropy + r * np.log(self.sheet.pressure_ratio) / efficiency
        compressed_K = self.air.temperature_at_entropy_K(entropy, 650.0)
        brought_kW = self.air_kg_per_s * self.air.enthalpy_kJ_per_kg(compressed_K) + self.heat_kW
        enthalpy = brought_kW / self.sheet.exhaust_flow_kg_per_s
        return compressed_K, self.gas.temperature_at_enthalpy_K(enthalpy, 1400.0)

    def mismatch(self, efficiency: float) -> float:
        """Polytropic efficiency that the turbine needs, less the compressor's."""
        _, firing_K = self.temperatures_K(efficiency)
        drop = self.gas.entropy_kJ_per_kgK(firing_K) - self.gas.entropy_kJ_per_kgK(self.exhaust_K)
        ideal = self.gas.gas_constant_kJ_per_kgK * np.log(self.expansion_ratio)
        return float((drop / ideal)[0]) - efficiency

    def swallowing(self, firing_K: FloatArray) -> float:
        """Stodola constant at the sheet's condition."""
        inlet_kPa = self.sheet.pressure_kPa * self.expansion_ratio
        flow = self.sheet.exhaust_flow_kg_per_s
        root = np.sqrt(firing_K * self.gas.gas_constant_kJ_per_kgK)
        ellipse = np.sqrt(1.0 - (self.sheet.pressure_kPa / inlet_kPa) ** 2)
        return float((flow * root / inlet_kPa / ellipse)[0])

    def ideal_expansion_kJ_per_kg(self, firing_K: FloatArray) -> float:
        """Isentropic enthalpy drop of the turbine."""
        r = self.gas.gas_constant_kJ_per_kgK
        entropy = self.gas.entropy_kJ_per_kgK(firing_K) - r * np.log(self.expansion_ratio)
        ideal_K = self.gas.temperature_at_entropy_K(entropy, 800.0)
        enthalpy = self.gas.enthalpy_kJ_per_kg
        return float((enthalpy(firing_K) - enthalpy(ideal_K))[0])

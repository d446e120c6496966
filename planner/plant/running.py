"""How a calibrated turbine runs away from its sheet: any ambient, firing and guide-vane position.

Turbine: Stodola's ellipse. Compressor at constant speed: a speed line in corrected flow and
pressure ratio. Turbine efficiency: parabola in the velocity ratio. Drive loss: half constant, half
with the square of power.
"""

from dataclasses import dataclass

import numpy as np

from planner.arrays import FloatArray
from planner.constants import ZERO_CELSIUS_K
from planner.plant.air import humid_air
from planner.plant.combustion import burnt
from planner.plant.gas import Mixture, species_enthalpies_kJ_per_kg
from planner.plant.turbine import COMBUSTOR_PRESSURE_LOSS_FRAC, GasTurbine

#: Slope of the speed line: logarithm of corrected flow over that of pressure ratio. Common practice
#: for axial compressors is a steep line; 0.05 to 0.10 move ambient power by less than 0.3 %.
SPEED_LINE_SLOPE = 0.07

#: What guide vanes and speed off design cost in compressor efficiency: common practice.
VANE_LOSS = 0.4
SPEED_LOSS = 0.3

ITERATIONS = 60
TOLERANCE = 1e-11

#: Of the match's logarithm over that of the pressure ratio: minus one, and what the speed line,
#: the fuel and the ellipse add.
SLOPES = (-2.0, -0.5)
LEAST_TELLING_STEP = 1e-8


@dataclass(frozen=True)
class Ambient:
    """Air before the machine, and the pressures at its two ends.

    Parameters
    ----------
    temperature_K : array, shape (hours,) [K]
        At the compressor's inlet.
    inlet_kPa : array, shape (hours,) [kPa]
        At the compressor's inlet.
    outlet_kPa : array, shape (hours,) [kPa]
        At the turbine's outlet.
    air : Mixture
        Humid air.
    """

    temperature_K: FloatArray
    inlet_kPa: FloatArray
    outlet_kPa: FloatArray
    air: Mixture


def ambient(
    ambient_degC: FloatArray,
    relative_humidity_frac: FloatArray,
    pressure_kPa: FloatArray,
    *,
    inlet_loss_kPa: float = 0.0,
    exhaust_loss_kPa: float = 0.0,
) -> Ambient:
    """Air of some hours as the machine feels it.

    Parameters
    ----------
    ambient_degC : array, shape (hours,) [degC]
        Dry bulb at the site.
    relative_humidity_frac : array, shape (hours,) [-]
        Humidity at the site.
    pressure_kPa : array, shape (hours,) [kPa]
        Air pressure at the site.
    inlet_loss_kPa, exhaust_loss_kPa : float [kPa]
        Losses of filter and ducts, and of recovery and stack.

    Returns
    -------
    Ambient
        With losses taken off and put on.
    """
    temperature_K = np.asarray(ambient_degC, dtype=np.float64) + ZERO_CELSIUS_K
    pressure = np.asarray(pressure_kPa, dtype=np.float64)
    humidity = np.asarray(relative_humidity_frac, dtype=np.float64)
    return Ambient(
        temperature_K,
        pressure - inlet_loss_kPa,
        pressure + exhaust_loss_kPa,
        humid_air(temperature_K, pressure, humidity),
    )


@dataclass(frozen=True)
class RunningPoint:
    """State of the machine in some hours; all arrays have shape (hours,).

    Parameters
    ----------
    terminal_power_kW : array [kW]
        At the generator's terminals.
    fuel_kg_per_s, exhaust_kg_per_s : array [kg/s]
        Flows.
    compressed_K, firing_K, exhaust_K : array [K]
        Temperatures.
    pressure_ratio : array [-]
        Of the compressor.
    gas : Mixture
        Exhaust.
    """

    terminal_power_kW: FloatArray
    fuel_kg_per_s: FloatArray
    exhaust_kg_per_s: FloatArray
    compressed_K: FloatArray
    firing_K: FloatArray
    exhaust_K: FloatArray
    pressure_ratio: FloatArray
    gas: Mixture


def run(
    turbine: GasTurbine,
    hours: Ambient,
    firing_K: FloatArray,
    vane_frac: FloatArray,
    *,
    near: "RunningPoint | None" = None,
) -> RunningPoint:
    """Run a machine at a firing temperature and guide-vane position.

    Parameters
    ----------
    turbine : GasTurbine
        Calibrated.
    hours : Ambient
        Air of each hour.
    firing_K : array, shape (hours,) [K]
        Mixed temperature before the turbine.
    vane_frac : array, shape (hours,) [-]
        Flow area of the guide vanes over fully open.
    near : RunningPoint, optional
        A point in the neighbourhood, from which the search for the pressure ratio starts.

    Returns
    -------
    RunningPoint
        Where compressor and turbine pass the same flow.
    """
    speed = np.sqrt(
        turbine.inlet_gas_constant
        * turbine.inlet_K
        / (hours.air.gas_constant_kJ_per_kgK * hours.temperature_K)
    )
    design = np.log(turbine.sheet.pressure_ratio)
    log_ratio = design + np.log(speed * vane_frac) + 0.5 * np.log(firing_K / turbine.firing_K)
    if near is not None:
        log_ratio = np.log(near.pressure_ratio)
    matched = _Match(turbine, hours, firing_K, vane_frac, speed)
    compressed_K: FloatArray | float = turbine.compressed_K if near is None else near.compressed_K
    slope: FloatArray | float = -(1.0 + SPEED_LINE_SLOPE)
    step, before = np.zeros_like(log_ratio), np.zeros_like(log_ratio)
    for _ in range(ITERATIONS):
        compressed_K = matched.compressed_K(log_ratio, compressed_K)
        miss = matched.miss(log_ratio, compressed_K)
        # Steps that are all rounding tell nothing about the slope.
        telling = np.abs(step) > LEAST_TELLING_STEP
        found = np.divide(miss - before, step, out=np.zeros_like(step), where=telling)
        slope = np.where(telling, np.clip(found, *SLOPES), slope)
        step, before = -miss / slope, miss
        log_ratio = log_ratio + step
        if np.abs(miss).max() < TOLERANCE:
            break
    return matched.point(log_ratio, matched.compressed_K(log_ratio, compressed_K))


@dataclass(frozen=True)
class _Match:
    """Compressor and turbine of some hours, waiting for the pressure ratio that fits both."""

    turbine: GasTurbine
    hours: Ambient
    firing_K: FloatArray
    vane_frac: FloatArray
    speed: FloatArray

    def air_kg_per_s(self, log_ratio: FloatArray) -> FloatArray:
        """Air flow on the speed line."""
        off = log_ratio - np.log(self.turbine.sheet.pressure_ratio)
        off = off - np.log(self.speed) - np.log(self.vane_frac)
        corrected = np.exp(np.log(self.speed * self.vane_frac) - SPEED_LINE_SLOPE * off)
        density = self.hours.inlet_kPa / self.turbine.sheet.pressure_kPa * self.speed
        return np.asarray(self.turbine.air_kg_per_s * corrected * density)

    def compressor_efficiency(self, log_ratio: FloatArray) -> FloatArray:
        """Polytropic efficiency off design."""
        off = log_ratio - np.log(self.turbine.sheet.pressure_ratio)
        off = off - np.log(self.speed) - np.log(self.vane_frac)
        flow_coefficient = np.exp(SPEED_LINE_SLOPE * off)
        bell = flow_coefficient * (2.0 - flow_coefficient)
        vanes = 1.0 - VANE_LOSS * (1.0 - self.vane_frac) ** 2
        return np.asarray(
            self.turbine.polytropic_efficiency
            * bell
            * vanes
            * (1.0 - SPEED_LOSS * (1.0 - self.speed) ** 2)
        )

    def compressed_K(self, log_ratio: FloatArray, guess_K: FloatArray | float) -> FloatArray:
        """Temperature after the compressor, sought from a guess."""
        air = self.hours.air
        rise = air.gas_constant_kJ_per_kgK * log_ratio / self.compressor_efficiency(log_ratio)
        entropy = air.entropy_kJ_per_kgK(self.hours.temperature_K) + rise
        return air.temperature_at_entropy_K(entropy, guess_K)

    def fuel_per_air(self, compressed_K: FloatArray) -> FloatArray:
        """Fuel that brings the air to the firing temperature."""
        air, fuel, t4 = self.hours.air, self.turbine.fuel, self.firing_K
        made = species_enthalpies_kJ_per_kg(t4) @ fuel.made_kg_per_kg
        usable = fuel.enthalpy_kJ_per_kg - self.turbine.combustor_loss_frac * fuel.lhv_kJ_per_kg
        warmed = air.enthalpy_kJ_per_kg(t4) - air.enthalpy_kJ_per_kg(compressed_K)
        return np.asarray(warmed / (usable - made))

    def miss(self, log_ratio: FloatArray, compressed_K: FloatArray) -> FloatArray:
        """Logarithm of the pressure the turbine needs over the one the compressor gives."""
        far = self.fuel_per_air(compressed_K)
        flow = self.air_kg_per_s(log_ratio) * (1.0 + far)
        gas = burnt(self.hours.air, far, self.turbine.fuel)
        root = np.sqrt(self.firing_K * gas.gas_constant_kJ_per_kgK)
        needed_kPa = np.hypot(flow * root / self.turbine.swallowing, self.hours.outlet_kPa)
        given_kPa = np.exp(log_ratio) * self.hours.inlet_kPa * (1.0 - COMBUSTOR_PRESSURE_LOSS_FRAC)
        return np.asarray(np.log(needed_kPa / given_kPa))

    def point(self, log_ratio: FloatArray, compressed_K: FloatArray) -> RunningPoint:
        """State at the matched pressure ratio."""
        turbine, hours = self.turbine, self.hours
        far = self.fuel_per_air(compressed_K)
        air_flow = self.air_kg_per_s(log_ratio)
        gas_flow = air_flow * (1.0 + far)
        gas = burnt(hours.air, far, turbine.fuel)
        inlet_kPa = np.exp(log_ratio) * hours.inlet_kPa * (1.0 - COMBUSTOR_PRESSURE_LOSS_FRAC)
        drop = gas.gas_constant_kJ_per_kgK * np.log(inlet_kPa / hours.outlet_kPa)
        entropy, enthalpy = gas.entropy_kJ_per_kgK(self.firing_K), gas.enthalpy_kJ_per_kg
        ideal_K = gas.temperature_at_entropy_K(entropy - drop, turbine.exhaust_K)
        ideal_drop = enthalpy(self.firing_K) - enthalpy(ideal_K)
        velocity = np.sqrt(turbine.ideal_expansion_kJ_per_kg / ideal_drop)
        efficiency = turbine.polytropic_efficiency * velocity * (2.0 - velocity)
        exhaust_K = gas.temperature_at_entropy_K(entropy - drop * efficiency, ideal_K)
        expansion_kW = gas_flow * (enthalpy(self.firing_K) - enthalpy(exhaust_K))
        air_enthalpy = hours.air.enthalpy_kJ_per_kg
        compression_kW = air_flow * (air_enthalpy(compressed_K) - air_enthalpy(hours.temperature_K))
        return RunningPoint(
            terminal_power_kW=_terminal_kW(turbine, expansion_kW - compression_kW),
            fuel_kg_per_s=air_flow * far,
            exhaust_kg_per_s=gas_flow,
            compressed_K=compressed_K,
            firing_K=self.firing_K,
            exhaust_K=exhaust_K,
            pressure_ratio=np.exp(log_ratio),
            gas=gas,
        )


def _terminal_kW(turbine: GasTurbine, shaft_kW: FloatArray) -> FloatArray:
    """Power at the terminals: half of the drive's loss is constant, half goes with the square."""
    full_kW = turbine.sheet.power_kW / turbine.drive_efficiency
    return np.asarray(shaft_kW - turbine.drive_loss_kW * (0.5 + 0.5 * (shaft_kW / full_kW) ** 2))

"""Power of the fuel-gas compressor, from the site's supply pressure to the machine's fuel skid."""

import math

from planner.constants import GAS_CONSTANT_J_per_molK, STANDARD_PRESSURE_kPa
from planner.plant.fuel import GasFuel

#: Isentropic, motor and drive efficiency of a screw or piston compressor: common practice.
ISENTROPIC_EFFICIENCY = 0.75
MOTOR_EFFICIENCY = 0.94

#: Heat capacity ratio of natural gas at 300 to 400 K: 1.27, common practice.
HEAT_CAPACITY_RATIO = 1.27

#: Gas at the suction, and after each intercooler.
SUCTION_K = 293.15

#: A stage does no more than this; beyond it another one follows with an intercooler.
MOST_STAGE_RATIO = 4.0

#: Pressure that control valve and filter take between compressor and skid.
VALVE_LOSS_kPa = 150.0


def compression_kJ_per_kg(
    fuel: GasFuel, *, supply_kPa_gauge: float, needed_kPa_gauge: float, ambient_kPa: float
) -> float:
    r"""Electrical work of compressing a kilogram of fuel gas.

    .. math:: w = \frac{n}{\eta_s \eta_m} \frac{k}{k-1} \frac{R T_1}{M}
              \left[\left(\frac{p_2}{p_1}\right)^{\frac{k-1}{n k}} - 1\right]

    Parameters
    ----------
    fuel : GasFuel
        The gas.
    supply_kPa_gauge, needed_kPa_gauge : float [kPa gauge]
        At the site's meter, and at the machine's skid.
    ambient_kPa : float [kPa]
        Air pressure at the site.

    Returns
    -------
    float [kJ/kg]
        Zero where the supply is high enough; with equal stages and intercoolers otherwise.

    Examples
    --------
    >>> methane = GasFuel.from_composition("Methane", {"methane": 1.0})
    >>> work = compression_kJ_per_kg(
    ...     methane, supply_kPa_gauge=400.0, needed_kPa_gauge=2000.0, ambient_kPa=101.325
    ... )
    >>> print(f"{work:.0f}")
    351
    """
    inlet_kPa = supply_kPa_gauge + ambient_kPa
    outlet_kPa = needed_kPa_gauge + VALVE_LOSS_kPa + ambient_kPa
    if inlet_kPa >= needed_kPa_gauge + ambient_kPa:
        return 0.0
    ratio = outlet_kPa / inlet_kPa
    stages = max(1, math.ceil(math.log(ratio) / math.log(MOST_STAGE_RATIO)))
    k, n = HEAT_CAPACITY_RATIO, stages
    specific = GAS_CONSTANT_J_per_molK * SUCTION_K / fuel.molar_mass_kg_per_kmol
    ideal = n * k / (k - 1.0) * specific * (ratio ** ((k - 1.0) / (n * k)) - 1.0)
    return ideal / (ISENTROPIC_EFFICIENCY * MOTOR_EFFICIENCY)


def standard_air_pressure_kPa(altitude_m: float) -> float:
    """Air pressure of the standard atmosphere.

    Parameters
    ----------
    altitude_m : float [m]
        Below 11 km.

    Returns
    -------
    float [kPa]
        ISO 2533.

    Examples
    --------
    >>> print(f"{standard_air_pressure_kPa(1000.0) / STANDARD_PRESSURE_kPa:.4f}")
    0.8870
    """
    return float(STANDARD_PRESSURE_kPa * (1.0 - 2.25577e-5 * altitude_m) ** 5.25588)

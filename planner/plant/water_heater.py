"""A bank that heats the hot-water network, behind the steam generator or alone."""

from dataclasses import dataclass

import numpy as np

from planner.arrays import FloatArray
from planner.constants import ZERO_CELSIUS_K
from planner.plant.exchange import FLOW_EXPONENT, GasFlow, conductance_kW_per_K, log_mean_K
from planner.study.sections import Recovery, WaterSystem

#: Gas leaves the water heater this far above the returning water, at the design point.
WATER_APPROACH_K = 25.0


BISECTIONS = 60


@dataclass(frozen=True)
class WaterHeater:
    """A bank that heats the network's return to its flow temperature, designed.

    Parameters
    ----------
    flow_degC, return_degC : float [degC]
        Of the network.
    loss_frac : float [-]
        Casing loss over heat given up.
    coldest_stack_degC : float [degC]
        Gas is cooled no further.
    conductance_kW_per_K : float [kW/K]
        At the design flow.
    design_flow_kg_per_s : float [kg/s]
        Gas at the design point.
    """

    flow_degC: float
    return_degC: float
    loss_frac: float
    coldest_stack_degC: float
    conductance_kW_per_K: float
    design_flow_kg_per_s: float


def design_water_heater(
    exhaust: GasFlow, system: WaterSystem, recovery: Recovery
) -> WaterHeater | None:
    """Size a water heater for one gas.

    Parameters
    ----------
    exhaust : GasFlow
        One hour: the design point, behind whatever stands before the bank.
    system : WaterSystem
        The network.
    recovery : Recovery
        Losses and the coldest stack.

    Returns
    -------
    WaterHeater or None
        None where the gas is too cold to reach the flow temperature.
    """
    coldest_degC = max(recovery.minimum_stack_degC, system.return_degC + WATER_APPROACH_K)
    hot_degC = float(exhaust.temperature_K[0]) - ZERO_CELSIUS_K
    if hot_degC <= max(coldest_degC, system.flow_degC) + 1.0:
        return None
    heat_kW = exhaust.cooled_to_kW(coldest_degC + ZERO_CELSIUS_K) * (1.0 - recovery.loss_frac)
    conductance = conductance_kW_per_K(
        heat_kW,
        np.array([hot_degC - system.flow_degC]),
        np.array([coldest_degC - system.return_degC]),
    )
    return WaterHeater(
        flow_degC=system.flow_degC,
        return_degC=system.return_degC,
        loss_frac=recovery.loss_frac,
        coldest_stack_degC=recovery.minimum_stack_degC,
        conductance_kW_per_K=conductance,
        design_flow_kg_per_s=float(exhaust.flow_kg_per_s[0]),
    )


def run_water_heater(heater: WaterHeater, exhaust: GasFlow) -> tuple[FloatArray, FloatArray]:
    """Heat of a water heater in some hours.

    Parameters
    ----------
    heater : WaterHeater
        Designed.
    exhaust : GasFlow
        Gas before the bank.

    Returns
    -------
    tuple of array, shape (hours,) [kW] and array [K]
        Useful heat, and the stack. The water's flow follows so that it leaves at the flow
        temperature; the stack is where the bank passes what the gas gives.
    """
    flow_K = heater.flow_degC + ZERO_CELSIUS_K
    return_K = heater.return_degC + ZERO_CELSIUS_K
    relative = (exhaust.flow_kg_per_s / heater.design_flow_kg_per_s) ** FLOW_EXPONENT
    hot_K = exhaust.temperature_K
    usable = hot_K > flow_K + 1.0
    low_K = np.full_like(hot_K, return_K + 1e-3)
    high_K = np.maximum(hot_K - 1e-3, low_K)
    mean_capacity = exhaust.cooled_to_kW(return_K + 30.0) / np.maximum(hot_K - return_K - 30.0, 1.0)
    for _ in range(BISECTIONS):
        middle_K = 0.5 * (low_K + high_K)
        given = mean_capacity * (hot_K - middle_K) * (1.0 - heater.loss_frac)
        difference = log_mean_K(np.maximum(hot_K - flow_K, 1.0), middle_K - return_K)
        colder = given < heater.conductance_kW_per_K * relative * difference
        high_K, low_K = np.where(colder, middle_K, high_K), np.where(colder, low_K, middle_K)
    stack_K = np.maximum(0.5 * (low_K + high_K), heater.coldest_stack_degC + ZERO_CELSIUS_K)
    stack_K = np.where(usable, np.minimum(stack_K, hot_K), hot_K)
    return exhaust.cooled_to_kW(stack_K) * (1.0 - heater.loss_frac), stack_K

"""Hot exhaust used directly: heat above the dryer's reference, tempered where it is too hot."""

import numpy as np

from planner.arrays import FloatArray
from planner.constants import ZERO_CELSIUS_K
from planner.plant.exchange import GasFlow
from planner.plant.gas import Mixture
from planner.study.sections import GasSystem


def drying_heat_kW(
    exhaust: GasFlow, air: Mixture, air_K: FloatArray, dryer: GasSystem
) -> FloatArray:
    """Heat that an exhaust brings a dryer.

    Parameters
    ----------
    exhaust : GasFlow
        At the turbine's flange.
    air : Mixture
        Air that tempers gas which is too hot.
    air_K : array, shape (hours,) [K]
        Its temperature.
    dryer : GasSystem
        Reference, needed and highest temperature; once through.

    Returns
    -------
    array, shape (hours,) [kW]
        Zero where the exhaust is colder than the dryer needs. Tempering air has to be warmed to
        the reference first, which takes a little of the heat.
    """
    reference_K = np.full_like(air_K, dryer.reference_degC + ZERO_CELSIUS_K)
    limit_K = np.full_like(air_K, dryer.limit_degC + ZERO_CELSIUS_K)
    above_kW = exhaust.cooled_to_kW(reference_K)
    too_hot_kW = np.maximum(exhaust.cooled_to_kW(limit_K), 0.0)
    enthalpy = air.enthalpy_kJ_per_kg
    air_kg_per_s = too_hot_kW / (enthalpy(limit_K) - enthalpy(air_K))
    warming_kW = air_kg_per_s * np.maximum(enthalpy(reference_K) - enthalpy(air_K), 0.0)
    usable = exhaust.temperature_K >= dryer.required_degC + ZERO_CELSIUS_K
    return np.where(usable, np.maximum(above_kW - warming_kW, 0.0), 0.0)

"""Gas that gives up heat, and the exchangers that take it."""

from dataclasses import dataclass

import numpy as np

from planner.arrays import FloatArray
from planner.plant.gas import Mixture

#: Conductance over gas flow, as an exponent: common practice for finned tubes.
FLOW_EXPONENT = 0.6


@dataclass(frozen=True)
class GasFlow:
    """Exhaust of some hours.

    Parameters
    ----------
    gas : Mixture
        Composition of each hour.
    flow_kg_per_s : array, shape (hours,) [kg/s]
        Mass flow.
    temperature_K : array, shape (hours,) [K]
        At the turbine's flange, or behind a bank.
    """

    gas: Mixture
    flow_kg_per_s: FloatArray
    temperature_K: FloatArray

    def cooled_to_kW(self, temperature_K: FloatArray | float) -> FloatArray:
        """Heat that cooling to a temperature gives."""
        cold = np.zeros_like(self.temperature_K) + temperature_K
        drop = self.gas.enthalpy_kJ_per_kg(self.temperature_K) - self.gas.enthalpy_kJ_per_kg(cold)
        return np.asarray(self.flow_kg_per_s * drop)

    def after_kW(self, heat_kW: FloatArray) -> FloatArray:
        """Temperature after giving up some heat."""
        enthalpy = self.gas.enthalpy_kJ_per_kg(self.temperature_K) - heat_kW / self.flow_kg_per_s
        return self.gas.temperature_at_enthalpy_K(enthalpy, self.temperature_K - 100.0)

    def at(self, temperature_K: FloatArray) -> "GasFlow":
        """The same gas, cooled to a temperature."""
        return GasFlow(self.gas, self.flow_kg_per_s, temperature_K)


def counterflow_effectiveness(ntu: FloatArray, ratio: FloatArray) -> FloatArray:
    r"""Effectiveness of a counterflow exchanger.

    .. math:: \epsilon = \frac{1 - e^{-N(1-C)}}{1 - C e^{-N(1-C)}}

    Parameters
    ----------
    ntu : array [-]
        Conductance over the smaller capacity flow.
    ratio : array [-]
        Smaller over larger capacity flow, 0 to 1.

    Returns
    -------
    array [-]
        Heat over the most that could be passed.

    Examples
    --------
    >>> print(f"{counterflow_effectiveness(np.array([2.0]), np.array([0.5]))[0]:.4f}")
    0.7746
    """
    near_one = np.minimum(ratio, 1.0 - 1e-9)
    decay = np.exp(-np.asarray(ntu) * (1.0 - near_one))
    return np.asarray((1.0 - decay) / (1.0 - near_one * decay))


def log_mean_K(one: FloatArray, other: FloatArray) -> FloatArray:
    """Logarithmic mean of two temperature differences.

    Parameters
    ----------
    one, other : array [K]
        Differences at the two ends, above zero.

    Returns
    -------
    array [K]
        Their logarithmic mean; the difference itself where both are equal.

    Examples
    --------
    >>> print(f"{log_mean_K(np.array([60.0]), np.array([20.0]))[0]:.2f}")
    36.41
    """
    other = np.maximum(other, 1e-6)
    equal = np.abs(one - other) < 1e-6 * one
    logarithm = np.log(np.where(equal, 2.0, one / other))
    return np.where(equal, one, (one - other) / logarithm)


def conductance_kW_per_K(heat_kW: FloatArray, one_K: FloatArray, other_K: FloatArray) -> float:
    """Conductance that passes a heat between two temperature differences.

    Parameters
    ----------
    heat_kW : array, one value [kW]
        What is passed.
    one_K : array, one value [K]
        Difference at one end.
    other_K : array, one value [K]
        Difference at the other end.

    Returns
    -------
    float [kW/K]
        Heat over the logarithmic mean difference.
    """
    return float((heat_kW / log_mean_K(one_K, other_K))[0])

"""Degree-hours and degree-days, and the straight line of heat over them."""

from dataclasses import dataclass

import numpy as np
from scipy.optimize import nnls

from load_profiles.arrays import FloatArray, IntArray

#: Base temperatures that are tried where none is given [degC].
BASE_TEMPERATURES_degC = np.arange(8.0, 22.01, 0.25)


def heating_degree_hours(ambient_degC: FloatArray, base_degC: float) -> FloatArray:
    """How far each hour lies below the base.

    Parameters
    ----------
    ambient_degC : array, shape (hours,) [degC]
        Dry-bulb temperature.
    base_degC : float [degC]
        Ambient above which no heating is needed.

    Returns
    -------
    array, shape (hours,) [K h]
        Zero above the base.

    Examples
    --------
    >>> heating_degree_hours(np.array([5.0, 20.0]), 15.0).tolist()
    [10.0, 0.0]
    """
    return np.maximum(base_degC - ambient_degC, 0.0)


def cooling_degree_hours(ambient_degC: FloatArray, base_degC: float) -> FloatArray:
    """How far each hour lies above the base.

    Parameters
    ----------
    ambient_degC : array, shape (hours,) [degC]
        Dry-bulb temperature.
    base_degC : float [degC]
        Ambient below which no cooling is needed.

    Returns
    -------
    array, shape (hours,) [K h]
        Zero below the base.
    """
    return np.maximum(ambient_degC - base_degC, 0.0)


def heating_degree_days(ambient_degC: FloatArray, base_degC: float) -> FloatArray:
    """How far each day's mean lies below the base: the degree-days of weather services.

    Parameters
    ----------
    ambient_degC : array, shape (24 x days,) [degC]
        Hourly dry-bulb temperature from midnight.
    base_degC : float [degC]
        Ambient above which no heating is needed.

    Returns
    -------
    array, shape (days,) [K d]
        Zero on days with a mean above the base.
    """
    return heating_degree_hours(ambient_degC.reshape(-1, 24).mean(axis=1), base_degC)


@dataclass(frozen=True)
class HeatLine:
    """Heat of a billed period as base heat by the day and weather-bound heat by the degree-day.

    Parameters
    ----------
    base_temperature_degC : float [degC]
        Given or fitted.
    base_kWh_per_day : float [kWh/d]
        Heat that does not depend on the weather.
    slope_kWh_per_K_day : float [kWh/(K d)]
        Heat for each degree-day.
    r_squared : float [-]
        Share of the bills' variance that the line explains; zero where they do not vary.
    fitted : bool
        Whether the base temperature was fitted.
    """

    base_temperature_degC: float
    base_kWh_per_day: float
    slope_kWh_per_K_day: float
    r_squared: float
    fitted: bool


def fit_heat_line(
    heat_kWh: FloatArray,
    period: IntArray,
    ambient_degC: FloatArray,
    *,
    base_temperature_degC: float | None,
) -> HeatLine:
    """Least squares of billed heat over days and degree-days, neither with a negative share.

    Parameters
    ----------
    heat_kWh : array, shape (periods,) [kWh]
        Heat of each billed period.
    period : array of int, shape (hours,)
        Period of each hour, from 0.
    ambient_degC : array, shape (hours,) [degC]
        Dry-bulb temperature.
    base_temperature_degC : float or None [degC]
        None: the best of `BASE_TEMPERATURES_degC`.

    Returns
    -------
    HeatLine
        The line with the least sum of squares.

    Notes
    -----
    Degree-days are degree-hours over 24, not those of daily means: the same degree-hours then
    spread the heat over the hours. In mild weather they come out a few percent higher.

    References
    ----------
    M. F. Fels, PRISM: an introduction, Energy and Buildings 9 (1986): the same three parameters.
    """
    fitted = base_temperature_degC is None
    bases = BASE_TEMPERATURES_degC if fitted else np.array([base_temperature_degC])
    days = np.bincount(period, minlength=heat_kWh.size) / 24.0
    lines = []
    for base_degC in bases:
        degree_h = heating_degree_hours(ambient_degC, float(base_degC))
        degree_days = np.bincount(period, degree_h, minlength=heat_kWh.size) / 24.0
        shares, residual_kWh = nnls(np.column_stack((days, degree_days)), heat_kWh)
        lines.append((float(residual_kWh) ** 2, float(base_degC), shares))
    squares, best_degC, (per_day, per_degree_day) = min(lines, key=lambda line: line[0])
    total = float(np.sum((heat_kWh - heat_kWh.mean()) ** 2))
    explained = max(1.0 - squares / total, 0.0) if total > 0.0 else 0.0
    return HeatLine(best_degC, float(per_day), float(per_degree_day), explained, fitted)

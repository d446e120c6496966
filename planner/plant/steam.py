"""Saturated water and steam, from a table of the industrial formulation."""

import csv
from functools import cache
from importlib.resources import files

import numpy as np
from scipy.interpolate import CubicSpline

from planner.constants import STANDARD_PRESSURE_kPa


@cache
def _table() -> dict[str, np.ndarray]:
    """Columns of the saturation table."""
    text = (files("planner.data") / "saturated_water.csv").read_text(encoding="utf-8")
    rows = list(csv.DictReader(text.splitlines()))
    names = ("saturation_degC", "pressure", "liquid_enthalpy", "vapour_enthalpy", "liquid_volume")
    return {name: np.array([float(row[name]) for row in rows]) for name in names}


@cache
def _spline(of: str) -> CubicSpline:
    """A column over the saturation temperature; temperature over the logarithm of pressure."""
    table = _table()
    if of == "saturation_degC":
        return CubicSpline(np.log(table["pressure"]), table["saturation_degC"])
    return CubicSpline(table["saturation_degC"], table[of])


def saturation_degC(pressure_kPa: float) -> float:
    """Boiling temperature.

    Parameters
    ----------
    pressure_kPa : float [kPa]
        Absolute, between 1 and 11 000 kPa.

    Returns
    -------
    float [degC]
        Saturation temperature.

    References
    ----------
    [IAPWS R7-97]_, region 4.

    Examples
    --------
    >>> print(f"{saturation_degC(1000.0):.2f}")
    179.89
    """
    return float(_spline("saturation_degC")(np.log(pressure_kPa)))


def vapour_enthalpy_kJ_per_kg(pressure_kPa: float) -> float:
    """Enthalpy of dry saturated steam.

    Parameters
    ----------
    pressure_kPa : float [kPa]
        Absolute.

    Returns
    -------
    float [kJ/kg]
        Over liquid water at its triple point.
    """
    return float(_spline("vapour_enthalpy")(saturation_degC(pressure_kPa)))


def liquid_enthalpy_kJ_per_kg(
    temperature_degC: float, pressure_kPa: float = STANDARD_PRESSURE_kPa
) -> float:
    """Enthalpy of liquid water.

    Parameters
    ----------
    temperature_degC : float [degC]
        Between 1 and 320 degC.
    pressure_kPa : float [kPa]
        Absolute; below saturation the saturated liquid is meant.

    Returns
    -------
    float [kJ/kg]
        Saturated liquid and the rise with pressure, v (1 - beta T): within 0.3 kJ/kg of
        the formulation up to 40 bar.

    Examples
    --------
    >>> print(f"{liquid_enthalpy_kJ_per_kg(105.0, 1000.0):.1f}")
    440.9
    """
    saturated_kPa = float(_spline("pressure")(temperature_degC))
    volume_m3_per_kg = float(_spline("liquid_volume")(temperature_degC))
    above_kPa = max(pressure_kPa - saturated_kPa, 0.0)
    enthalpy = float(_spline("liquid_enthalpy")(temperature_degC))
    return enthalpy + volume_m3_per_kg * above_kPa * (1.0 - 2.6e-3 * temperature_degC)

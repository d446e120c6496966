"""Hourly flows put together for the figures: all grades of heat, recovered and used, and so on."""

import numpy as np
import numpy.typing as npt
import pandas as pd

from reports.wording import GRADES

Array = npt.NDArray[np.float64]


def column(frame: pd.DataFrame, name: str) -> Array:
    """One column as numbers."""
    return frame[name].to_numpy(dtype=np.float64)


def heat_demand_kW(frame: pd.DataFrame) -> Array:
    """Heat of all grades that the site takes, heat for absorption chillers included."""
    wanted = [column(frame, f"{grade}_demand_kW") for grade in GRADES]
    return np.sum([*wanted, column(frame, "absorption_heat_kW")], axis=0)


def used_kW(frame: pd.DataFrame, grade: str) -> Array:
    """Recovered heat of one grade, less what is dumped."""
    return np.clip(column(frame, f"unit_{grade}_kW") - column(frame, f"dumped_{grade}_kW"), 0, None)


def direct_kW(frame: pd.DataFrame, grade: str) -> Array:
    """Recovered heat of one grade that goes straight to the site, not into the store."""
    used = used_kW(frame, grade)
    if grade != "hot_water":
        return used
    return np.clip(used - column(frame, "store_charge_kW"), 0, None)


def heaters_kW(frame: pd.DataFrame) -> Array:
    """Heat of boilers and burners."""
    return np.sum([column(frame, f"heater_{grade}_kW") for grade in GRADES], axis=0)

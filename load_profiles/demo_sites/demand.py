"""`SiteDemand`: what a site truly uses, step by step, before any meter sees it."""

from dataclasses import dataclass

import numpy as np
from scipy.signal import lfilter

from load_profiles.arrays import FloatArray
from load_profiles.demo_sites.clock import StepClock


@dataclass(frozen=True)
class SiteDemand:
    """True mean flows of a year.

    Parameters
    ----------
    power_kW : array, shape (steps,) [kW]
        At the grid meter, today's electric chillers included.
    steam_kW, hot_water_kW, hot_gas_kW, cooling_kW : array, shape (steps,) [kW]
        Useful heat and cooling; zero where the site has none.
    """

    power_kW: FloatArray
    steam_kW: FloatArray
    hot_water_kW: FloatArray
    hot_gas_kW: FloatArray
    cooling_kW: FloatArray


def on_steps(hourly: FloatArray, clock: StepClock) -> FloatArray:
    """Hourly means as a course over the shorter steps of a clock.

    Parameters
    ----------
    hourly : array, shape (hours,)
        Means of standard hours.
    clock : StepClock
        Whose steps are wanted.

    Returns
    -------
    array, shape (steps,)
        Straight lines between the middles of the hours.
    """
    step_h = (np.arange(clock.steps) + 0.5) / clock.steps_per_hour
    return np.asarray(np.interp(step_h, np.arange(hourly.size) + 0.5, hourly))


def lagged(values: FloatArray, *, memory_steps: float) -> FloatArray:
    """What thick walls feel of the outdoor temperature.

    Parameters
    ----------
    values : array, shape (steps,)
        Any course.
    memory_steps : float
        Time constant in steps.

    Returns
    -------
    array, shape (steps,)
        First-order lag, in balance with the first value at the start.
    """
    kept = float(np.exp(-1.0 / memory_steps))
    course, _ = lfilter([1.0 - kept], [1.0, -kept], values, zi=[kept * values[0]])
    return np.asarray(course, dtype=np.float64)

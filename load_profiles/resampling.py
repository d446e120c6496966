"""Intervals into steps, conserving energy, and the peaks that a step hides."""

import numpy as np
import pandas as pd

from load_profiles.arrays import BoolArray, FloatArray, IntArray
from load_profiles.findings import Finding


def step_means(values: FloatArray, *, slots_per_step: int) -> FloatArray:
    """Mean over each step.

    Parameters
    ----------
    values : array, shape (steps x slots_per_step,)
        Means over the slots.
    slots_per_step : int
        Slots in a step.

    Returns
    -------
    array, shape (steps,)
        Means over the steps; the sum of energy is the same.
    """
    return np.asarray(values.reshape(-1, slots_per_step).mean(axis=1))


def any_in_step(mask: BoolArray, *, slots_per_step: int) -> BoolArray:
    """Steps of which at least one slot is marked.

    Parameters
    ----------
    mask : array of bool, shape (steps x slots_per_step,)
        Marks of slots.
    slots_per_step : int
        Slots in a step.

    Returns
    -------
    array of bool, shape (steps,)
        True where any slot is.
    """
    return np.asarray(mask.reshape(-1, slots_per_step).any(axis=1))


def within_step_excess(
    power_kW: FloatArray, filled: BoolArray, *, slots_per_step: int, month: IntArray
) -> pd.Series:
    """What the month's highest slot adds to the mean of its step.

    Parameters
    ----------
    power_kW : array, shape (steps x slots_per_step,) [kW]
        Means over the slots.
    filled : array of bool, same shape
        Slots that were not metered; they prove no peak.
    slots_per_step : int
        Slots in a step.
    month : array of int, shape (steps,)
        Calendar month of each step on the site's clock, 1 to 12.

    Returns
    -------
    Series, index 1 to 12 [kW]
        Of equal peaks the one that adds most; zero in a month that has no metered slot.
    """
    slots_kW = np.where(filled, -np.inf, power_kW).reshape(-1, slots_per_step)
    highest_kW = slots_kW.max(axis=1)
    means_kW = step_means(power_kW, slots_per_step=slots_per_step)
    frame = pd.DataFrame({"month": month, "highest": highest_kW, "mean": means_kW})
    frame = frame[np.isfinite(highest_kW)]
    frame["excess"] = frame["highest"] - frame["mean"]
    frame = frame.sort_values(["highest", "excess"]).groupby("month").last()
    months = pd.RangeIndex(1, 13, name="month")
    excess = frame["excess"].clip(lower=0.0).reindex(months, fill_value=0.0)
    return excess.rename("within_step_excess_kW").astype(float)


def unknown_excess(where: str) -> tuple[pd.Series, Finding]:
    """No excess where the meter is no finer than the step, and the finding that says so.

    Parameters
    ----------
    where : str
        File of the meter.

    Returns
    -------
    Series, index 1 to 12 [kW]
        Zero.
    Finding
        That peaks within the hour are unknown.
    """
    months = pd.RangeIndex(1, 13, name="month")
    what = "power is metered by the hour, so peaks within the hour are not known"
    effect = "demand charged on shorter intervals is too low on both sides"
    advice = "Ask the network operator for the quarter-hours."
    series = pd.Series(0.0, index=months, name="within_step_excess_kW")
    return series, Finding(where, what, effect, advice, "attention")

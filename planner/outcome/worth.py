"""What a series of yearly cash flows is worth: NPV, IRR and paybacks."""

import numpy as np
from scipy.optimize import brentq

from planner.arrays import FloatArray

#: Rates between which internal rates are looked for; outside them nobody would quote one.
LOWEST_RATE_FRAC = -0.99
HIGHEST_RATE_FRAC = 10.0

#: Places at which the present value is sampled; two roots nearer than one step may be missed.
SAMPLES = 4001


def discounted(flows: FloatArray, rate_frac: float) -> FloatArray:
    """Present value of each year's flow.

    Parameters
    ----------
    flows : array, shape (years,) [currency]
        Year 0 first, which is not discounted; later years at their ends.
    rate_frac : float [-]
        Discount rate, above -1; real for real flows.

    Returns
    -------
    array, shape (years,) [currency]
        Flow over (1 + rate) to the power of its year.

    References
    ----------
    NIST Handbook 135, single present value.
    """
    years = np.arange(len(flows))
    return np.asarray(flows / np.power(1.0 + rate_frac, years))


def net_present_value(flows: FloatArray, rate_frac: float) -> float:
    """Sum of the present values.

    Parameters
    ----------
    flows : array, shape (years,) [currency]
        Year 0 first, which is not discounted.
    rate_frac : float [-]
        Discount rate, above -1.

    Returns
    -------
    float [currency]
        Net present value in money of year 0.

    Examples
    --------
    >>> flows = np.array([-40000.0, 5000.0, 8000.0, 12000.0, 30000.0])
    >>> print(f"{net_present_value(flows, 0.08):.4f}")
    3065.2227
    """
    return float(discounted(flows, rate_frac).sum())


def internal_rates(flows: FloatArray) -> FloatArray:
    """Every rate at which the present value is zero.

    Parameters
    ----------
    flows : array, shape (years,) [currency]
        Year 0 first.

    Returns
    -------
    array, shape (roots,) [-]
        Rising; empty where the flows never change sign, or only outside -99 % and 1000 %.

    Notes
    -----
    The present value is a polynomial in the discount factor 1/(1 + rate). It is sampled on a
    logarithmic grid of factors, and each change of sign is closed by Brent's method.
    """
    coefficients = np.trim_zeros(np.asarray(flows, dtype=np.float64), "b")[::-1]
    if not (np.any(coefficients > 0.0) and np.any(coefficients < 0.0)):
        return np.empty(0)
    factors = np.geomspace(1.0 / (1.0 + HIGHEST_RATE_FRAC), 1.0 / (1.0 + LOWEST_RATE_FRAC), SAMPLES)
    values = np.polyval(coefficients, factors)
    rates = [1.0 / factor - 1.0 for factor in factors[values == 0.0]]
    for place in np.flatnonzero(values[:-1] * values[1:] < 0.0):
        root = brentq(
            lambda factor: float(np.polyval(coefficients, factor)),
            factors[place],
            factors[place + 1],
        )
        rates.append(1.0 / root - 1.0)
    return np.sort(np.asarray(rates, dtype=np.float64))


def internal_rate_frac(flows: FloatArray) -> float | None:
    """Internal rate of return, where there is exactly one.

    Parameters
    ----------
    flows : array, shape (years,) [currency]
        Year 0 first.

    Returns
    -------
    float or None [-]
        None where the flows never change sign, and where several rates fit: an investment that
        is paid for twice has no rate of its own, and its NPV decides.
    """
    rates = internal_rates(flows)
    return float(rates[0]) if len(rates) == 1 else None


def simple_payback_years(capital_net: float, first_year_saving: float) -> float | None:
    """Capital over the first full year's saving.

    Parameters
    ----------
    capital_net : float [currency]
        Capital less what it avoids.
    first_year_saving : float [currency]
        With the overhaul reserve taken off.

    Returns
    -------
    float or None [years]
        Zero where nothing net is spent; None where nothing is saved.
    """
    if capital_net <= 0.0:
        return 0.0
    return capital_net / first_year_saving if first_year_saving > 0.0 else None


def discounted_payback_years(flows: FloatArray, rate_frac: float) -> int | None:
    """First year in which the discounted balance turns non-negative and stays so.

    Parameters
    ----------
    flows : array, shape (years,) [currency]
        Year 0 first.
    rate_frac : float [-]
        Discount rate, above -1.

    Returns
    -------
    int or None [years]
        None where the balance ends below zero.
    """
    balance = np.cumsum(discounted(flows, rate_frac))
    below = np.flatnonzero(~(balance >= 0.0))
    first = int(below[-1]) + 1 if below.size else 0
    return first if first < len(balance) else None

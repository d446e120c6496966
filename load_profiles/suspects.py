"""Readings that cannot be true: stuck meters and spikes."""

import numpy as np

from load_profiles.arrays import BoolArray, FloatArray
from load_profiles.findings import Finding
from load_profiles.runs import runs_of, within_runs

#: A meter that shows the same non-zero value for so long is taken as stuck [h]. Common practice.
STUCK_AFTER_h = 24.0

#: A spike exceeds the 99th percentile of the year's non-zero readings so many times.
#: Common practice: no site's true peak is three times what it reaches 87 hours a year.
SPIKE_RATIO = 3.0

#: Longer runs of high readings are no spikes.
SPIKE_SLOTS = 2


def stuck_slots(values_kW: FloatArray, *, slot_h: float) -> BoolArray:
    """Where a meter shows the same non-zero value for `STUCK_AFTER_h` or longer.

    Parameters
    ----------
    values_kW : array, shape (slots,) [kW]
        As metered, NaN where missing.
    slot_h : float [h]
        Length of a slot.

    Returns
    -------
    array of bool, shape (slots,)
        True in the whole run, its first reading included.
    """
    same = np.zeros(values_kW.size, dtype=bool)
    same[1:] = (values_kW[1:] == values_kW[:-1]) & (values_kW[1:] > 0.0)
    shortest = max(int(np.ceil(STUCK_AFTER_h / slot_h)) - 1, 1)
    stuck = within_runs(same, shortest=shortest)
    stuck[:-1] |= stuck[1:]  # a run of repeats begins with the reading that is repeated
    return stuck


def spike_slots(values_kW: FloatArray) -> BoolArray:
    """Where one or two readings tower above the year.

    Parameters
    ----------
    values_kW : array, shape (slots,) [kW]
        As metered, NaN where missing.

    Returns
    -------
    array of bool, shape (slots,)
        True in a spike.
    """
    positive = values_kW[values_kW > 0.0]
    if positive.size == 0:
        return np.zeros(values_kW.size, dtype=bool)
    threshold_kW = SPIKE_RATIO * np.percentile(positive, 99.0)
    return within_runs(values_kW > threshold_kW, longest=SPIKE_SLOTS)


def set_aside_suspects(
    values_kW: FloatArray, *, slot_h: float, where: str, started: np.ndarray
) -> tuple[FloatArray, list[Finding]]:
    """Readings that cannot be true, counted as missing from here on.

    Parameters
    ----------
    values_kW : array, shape (slots,) [kW]
        As metered, NaN where missing.
    slot_h : float [h]
        Length of a slot.
    where : str
        File, for the findings.
    started : array of str, shape (slots,)
        Wall-clock time of each slot, for the findings.

    Returns
    -------
    array, shape (slots,) [kW]
        NaN also where a reading is suspect.
    list of Finding
        What was set aside.
    """
    spikes = spike_slots(values_kW)
    stuck = stuck_slots(values_kW, slot_h=slot_h)
    findings = []
    for start, length in zip(*runs_of(stuck), strict=True):
        value_kW = values_kW[start]
        what = f"the same {value_kW:g} kW for {length * slot_h:g} h from {started[start]}: stuck"
        effect = f"{length * slot_h:g} h with {length * slot_h * value_kW:,.0f} kWh set aside"
        advice = "Ask for the true readings of these hours."
        findings.append(Finding(where, what, effect, advice, "attention"))
    if spikes.any():
        first = int(np.argmax(spikes))
        what = (
            f"{spikes.sum()} spikes, the first at {started[first]} with {values_kW[first]:,.0f} kW"
        )
        energy_kWh = values_kW[spikes].sum() * slot_h
        effect = f"{spikes.sum() * slot_h:g} h with {energy_kWh:,.0f} kWh set aside"
        advice = "Ask whether the site can draw so much."
        findings.append(Finding(where, what, effect, advice, "attention"))
    return np.where(stuck | spikes, np.nan, values_kW), findings

"""Metered intervals in delimited text: one row an interval, energy or mean power."""

from dataclasses import dataclass
from pathlib import Path

import numpy as np
import pandas as pd

from load_profiles.arrays import FloatArray, IntArray
from load_profiles.clock import SiteClock
from load_profiles.declarations import IntervalMeter
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding
from load_profiles.readers.stamps import ReadStamps, read_stamps, year_faults
from load_profiles.readers.text_table import TextTable, read_text_table
from load_profiles.row_faults import row_faults

#: Intervals that straddle the site's hours are split into slots of this length [min].
FINEST_SLOT_MINUTES = 15


@dataclass(frozen=True)
class IntervalYear:
    """One carrier's year as metered, on the year's slots.

    Parameters
    ----------
    power_kW : array, shape (slots,) [kW]
        Mean over the slot; NaN where the file has no value.
    slot_minutes : int [min]
        Length of a slot.
    findings : tuple of Finding
        Repairs of the file.
    """

    power_kW: FloatArray
    slot_minutes: int
    findings: tuple[Finding, ...]


def read_interval_meter(meter: IntervalMeter, *, folder: Path, site: SiteClock) -> IntervalYear:
    """Read a meter export onto the slots of the year.

    Parameters
    ----------
    meter : IntervalMeter
        What the study says of the file.
    folder : Path
        Folder of the study file.
    site : SiteClock
        Zone and year.

    Returns
    -------
    IntervalYear
        Values as metered: nothing is filled here.

    Raises
    ------
    ProfileError
        With every fault of the file.
    """
    wanted = {meter.stamp_column: "stamp_column", meter.value_column: "value_column"}
    table = read_text_table(folder, meter, wanted)
    faults: list[Fault] = []
    stamps = read_stamps(table, meter, site, interval_s=meter.interval_minutes * 60, faults=faults)
    values = table.numbers(meter.value_column, faults)
    faults += _negative_faults(table, values, meter.value_column)
    faults += _interval_faults(table, stamps, meter.interval_minutes)
    faults += year_faults(table, stamps, site, meter.stamp_column)
    if faults:
        raise ProfileError(tuple(faults))
    power_kW = values[stamps.places]
    if meter.quantity == "energy_kWh":
        power_kW = power_kW * (60.0 / meter.interval_minutes)
    starts_s, power_kW, repeats = _merged(table.file, stamps.seconds, power_kW, meter)
    year = _on_slots(table.file, starts_s, power_kW, meter.interval_minutes, site)
    return IntervalYear(
        year.power_kW, year.slot_minutes, (*stamps.findings, *repeats, *year.findings)
    )


def _negative_faults(table: TextTable, values: FloatArray, column: str) -> list[Fault]:
    """Demands below zero."""
    wrong = np.flatnonzero(values < 0.0)
    must = "must not be negative; is it a net meter behind generation on the site?"
    came = [f"{column} {values[place]:g}" for place in wrong]
    return row_faults(table.file, table.rows[wrong].tolist(), came, must)


def _interval_faults(table: TextTable, stamps: ReadStamps, interval_minutes: int) -> list[Fault]:
    """An interval that the stamps contradict, or stamps beside the grid."""
    apart_s = np.diff(np.unique(stamps.seconds))
    if apart_s.size == 0:
        return []
    lengths, counts = np.unique(apart_s, return_counts=True)
    usual_min = lengths[np.argmax(counts)] / 60.0
    if usual_min != interval_minutes:
        came = f"stamps {usual_min:g} min apart"
        must = f"must be {interval_minutes} min apart, as interval_minutes says"
        return [Fault(table.file, came, must)]
    finest_min = min(FINEST_SLOT_MINUTES, interval_minutes)
    beside = stamps.places[stamps.seconds % (60 * finest_min) != 0]
    overlapping = np.flatnonzero(apart_s < interval_minutes * 60)
    late = stamps.places[np.isin(stamps.seconds, np.unique(stamps.seconds)[1 + overlapping])]
    return [
        *_rows_with(
            table,
            beside,
            f"a stamp beside the {finest_min}-minute grid",
            f"must begin on a full {finest_min} minutes of standard time",
        ),
        *_rows_with(
            table,
            late,
            "an interval that overlaps the one before",
            f"must begin {interval_minutes} min or more after it",
        ),
    ]


def _rows_with(table: TextTable, places: IntArray, came: str, must: str) -> list[Fault]:
    """The same fault in several rows."""
    return row_faults(table.file, table.rows[places].tolist(), [came] * places.size, must)


def _merged(
    file: str, starts_s: IntArray, power_kW: FloatArray, meter: IntervalMeter
) -> tuple[IntArray, FloatArray, list[Finding]]:
    """One value an interval: identical repeats merged, conflicting ones averaged."""
    starts, groups, counts = np.unique(starts_s, return_inverse=True, return_counts=True)
    if starts.size == starts_s.size:
        order = np.argsort(starts_s)
        return starts_s[order], power_kW[order], []
    by_start = pd.Series(power_kW).groupby(groups)
    spread_kW = (by_start.max() - by_start.min()).fillna(0.0).to_numpy(dtype=float)
    alike = int(((counts > 1) & (spread_kW == 0.0)).sum())
    unlike = spread_kW > 0.0
    interval_h = meter.interval_minutes / 60.0
    findings = []
    if alike:
        what = f"intervals that stand there again with the same value: {alike}; merged"
        findings.append(Finding(file, what, f"{alike * interval_h:g} h, no energy changed"))
    if unlike.any():
        hours, energy = unlike.sum() * interval_h, spread_kW.sum() * interval_h
        what = f"intervals with two different values: {unlike.sum()}; their mean is taken"
        effect = f"{hours:g} h, in doubt by {energy:,.1f} kWh"
        advice = "Ask which of the rows hold."
        findings.append(Finding(file, what, effect, advice, "attention"))
    return starts, np.asarray(by_start.mean(), dtype=np.float64), findings


def _on_slots(
    file: str, starts_s: IntArray, power_kW: FloatArray, interval_minutes: int, site: SiteClock
) -> IntervalYear:
    """Intervals on the year's slots; those that straddle them are split evenly."""
    findings = []
    straddle = bool(np.any(starts_s % (interval_minutes * 60)))
    slot_minutes = FINEST_SLOT_MINUTES if straddle else interval_minutes
    parts = interval_minutes // slot_minutes
    if straddle:
        what = f"intervals straddle the site's standard-time slots of {interval_minutes} min"
        effect = f"each is split evenly into {parts} parts"
        findings.append(Finding(file, what, effect, severity="attention"))
    slots = (starts_s // (slot_minutes * 60))[:, None] + np.arange(parts)
    values = np.repeat(power_kW, parts)
    inside = (slots.ravel() >= 0) & (slots.ravel() < site.hours * 60 // slot_minutes)
    year_kW = np.full(site.hours * 60 // slot_minutes, np.nan)
    year_kW[slots.ravel()[inside]] = values[inside]
    if not inside.all():
        outside_h = (~inside).sum() * slot_minutes / 60.0
        what = f"{outside_h:g} h lie outside {site.year} in standard time; left out"
        findings.append(Finding(file, what, "no effect on the year"))
    return IntervalYear(year_kW, slot_minutes, tuple(findings))

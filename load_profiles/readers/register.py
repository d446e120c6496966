"""Cumulative readings of a gas meter: differences into heat, spread between the readings."""

from pathlib import Path

import numpy as np

from load_profiles.arrays import BoolArray, FloatArray, IntArray
from load_profiles.clock import SiteClock
from load_profiles.day_shapes import day_shape, shape_in_hours
from load_profiles.declarations import GasRegister
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding
from load_profiles.readers.stamps import read_stamps
from load_profiles.readers.text_table import TextTable, read_text_table
from load_profiles.row_faults import row_faults

#: Readings further apart leave the season unknown [d]. Common practice: meters are read monthly.
LONG_WITHOUT_READING_d = 45.0

#: A fall to below this share of a register's range from above the rest looks like a rollover.
_ROLLOVER_FRAC = 0.05


def read_gas_register(
    register: GasRegister,
    *,
    folder: Path,
    site: SiteClock,
    path: str,
    permitted_fill_frac: float,
) -> tuple[FloatArray, BoolArray, tuple[Finding, ...]]:
    """Heat of the year by the hour from a gas register.

    Parameters
    ----------
    register : GasRegister
        What the study says of the file.
    folder : Path
        Folder of the study file.
    site : SiteClock
        Zone and year.
    path : str
        Section of the study file.
    permitted_fill_frac : float [-]
        Largest share of the year before the first and after the last reading.

    Returns
    -------
    heat_kW : array, shape (hours,) [kW]
        Useful heat; between any two readings it comes to their difference.
    filled : array of bool, shape (hours,)
        Hours that no pair of readings spans.
    findings : tuple of Finding
        How the readings were spread.

    Raises
    ------
    ProfileError
        With every fault of the file.
    """
    wanted = {register.stamp_column: "stamp_column", register.value_column: "value_column"}
    faults: list[Fault] = []
    try:
        shape = day_shape(register.shape, path=f"{path}.shape")
    except ProfileError as error:
        faults += error.faults
    try:
        table = read_text_table(folder, register, wanted)
    except ProfileError as error:
        raise ProfileError((*faults, *error.faults)) from None
    stamps = read_stamps(table, register, site, interval_s=0, faults=faults)
    values_m3 = table.numbers(register.value_column, faults)
    if faults:
        raise ProfileError(tuple(faults))
    times_s, readings_m3, findings = _readings(table, stamps.seconds, values_m3, stamps.places)
    faults += _cover_faults(table.file, times_s, site, permitted_fill_frac)
    if faults:
        raise ProfileError(tuple(faults))
    factor = register.calorific_value_hhv_kWh_per_m3 * register.heater_efficiency_hhv_frac
    heat_kWh = np.diff(readings_m3) * factor
    heat_kW, filled, more = _year_of_heat(times_s, heat_kWh, shape, site, table.file)
    return heat_kW, filled, (*stamps.findings, *findings, *more)


def _readings(
    table: TextTable, times_s: IntArray, values_m3: FloatArray, places: IntArray
) -> tuple[IntArray, FloatArray, list[Finding]]:
    """Readings in rising time, one an instant; a register that falls is refused."""
    there = ~np.isnan(values_m3[places])
    order = np.argsort(times_s[there], kind="stable")
    places, times_s = places[there][order], times_s[there][order]
    readings_m3 = values_m3[places]
    rows = table.rows[places]
    repeated = np.diff(times_s) == 0
    clash = 1 + np.flatnonzero(repeated & (np.diff(readings_m3) != 0))
    came = [f"{readings_m3[i]:g} m3 after {readings_m3[i - 1]:g} m3" for i in clash]
    faults = row_faults(table.file, rows[clash].tolist(), came, "one instant, two readings")
    faults += _fall_faults(table.file, rows, readings_m3, np.diff(times_s) > 0)
    if faults:
        raise ProfileError(tuple(faults))
    findings = []
    if not there.all():
        what = f"{(~there).sum()} rows without a reading; left out"
        findings.append(Finding(table.file, what, "the spans around them are spread as one"))
    first = np.concatenate(([True], ~repeated)) if times_s.size else repeated
    return times_s[first], readings_m3[first], findings


def _fall_faults(
    file: str, rows: IntArray, readings_m3: FloatArray, apart: BoolArray
) -> list[Fault]:
    """Readings below the one before."""
    fallen = 1 + np.flatnonzero((np.diff(readings_m3) < 0) & apart)
    faults = []
    for place in fallen:
        before, after = readings_m3[place - 1], readings_m3[place]
        full = 10.0 ** np.ceil(np.log10(max(before, 1.0)))
        rolled = before > full * (1 - _ROLLOVER_FRAC) and after < full * _ROLLOVER_FRAC
        must = "a register must not fall; was the meter exchanged or a digit lost?"
        if rolled:
            must = f"a register must not fall; if it rolled over at {full:g}, add that to the rest"
        faults += row_faults(file, [int(rows[place])], [f"{after:g} m3 after {before:g} m3"], must)
    return faults


def _cover_faults(
    file: str, times_s: IntArray, site: SiteClock, permitted_frac: float
) -> list[Fault]:
    """A register that leaves too much of the year open."""
    fewest = 2
    if times_s.size < fewest:
        came = f"{times_s.size} readings"
        return [Fault(file, came, "must hold two or more: heat is their difference")]
    year_s = site.hours * 3600
    covered_s = min(times_s[-1], year_s) - max(times_s[0], 0)
    share = 1.0 - max(covered_s, 0) / year_s
    if share <= permitted_frac:
        return []
    came = f"{share:.1%} of {site.year} before the first or after the last reading"
    must = f"must not exceed demand.permitted_fill_frac = {permitted_frac:g}; add readings"
    return [Fault(file, came, must)]


def _year_of_heat(
    times_s: IntArray, heat_kWh: FloatArray, shape: FloatArray, site: SiteClock, file: str
) -> tuple[FloatArray, BoolArray, list[Finding]]:
    """Heat over the year's hours, the open ends at the rate of the nearest span."""
    year_s = site.hours * 3600
    before_h = max(-int(times_s[0] // 3600), 0)
    after_h = max(int(-(-times_s[-1] // 3600)) - site.hours, 0)
    wall = site.wall(site.slots(60, before_h=before_h, after_h=after_h))
    weights = shape_in_hours(shape, wall)
    bounds_s = times_s.astype(np.float64) + before_h * 3600
    hours_kWh = spread_between(bounds_s, heat_kWh, weights)[before_h : before_h + site.hours]
    findings = [_spread_finding(file, times_s, float(hours_kWh.sum()))]
    hour_s = np.arange(site.hours) * 3600
    early, late = hour_s < times_s[0], hour_s + 3600 > times_s[-1]
    inner = weights[before_h : before_h + site.hours]
    for open_hours, span in ((early, 0), (late, -1)):
        if open_hours.any():
            rate = _rate(times_s, heat_kWh, weights, before_h, span)
            hours_kWh = hours_kWh + rate * inner * _open_frac(hour_s, times_s, open_hours)
    filled = early | late
    if filled.any():
        open_s = max(times_s[0], 0) + max(year_s - times_s[-1], 0)
        what = "the year's ends without readings filled at the rate of the nearest readings"
        effect = f"{open_s / 3600:g} h, {hours_kWh[filled].sum():,.0f} kWh in the hours concerned"
        findings.append(Finding(file, what, effect, severity="attention"))
    return hours_kWh, filled, findings


def spread_between(bounds_s: FloatArray, energy_kWh: FloatArray, weights: FloatArray) -> FloatArray:
    """Energy of spans over the hours they cover, in proportion to the hours' weights.

    Parameters
    ----------
    bounds_s : array, shape (spans + 1,) [s]
        Rising instants between which each span lies, from the beginning of the first hour.
    energy_kWh : array, shape (spans,) [kWh]
        Energy of each span.
    weights : array, shape (hours,) [-]
        Non-negative weight of each hour; a span without any is spread evenly.

    Returns
    -------
    array, shape (hours,) [kWh]
        The sum over a span, with parts of hours at its ends, is the span's energy.
    """
    edges_s = np.arange(weights.size + 1) * 3600.0
    cuts_s = np.union1d(edges_s, bounds_s)
    middles_s = (cuts_s[:-1] + cuts_s[1:]) / 2.0
    span = np.searchsorted(bounds_s, middles_s) - 1
    inside = (span >= 0) & (span < energy_kWh.size)
    span, length_s = span[inside], np.diff(cuts_s)[inside]
    hour = (middles_s[inside] // 3600.0).astype(np.int64)
    shares = weights[hour] * length_s
    empty = np.bincount(span, shares, minlength=energy_kWh.size) <= 0.0
    shares = np.where(empty[span], length_s, shares)
    sums = np.bincount(span, shares, minlength=energy_kWh.size)
    pieces_kWh = shares * (energy_kWh / sums)[span]
    return np.asarray(np.bincount(hour, pieces_kWh, minlength=weights.size), dtype=np.float64)


def _rate(
    times_s: IntArray, heat_kWh: FloatArray, weights: FloatArray, before_h: int, span: int
) -> float:
    """Heat of a span over the weighted hours that it covers."""
    first, last = (times_s[0], times_s[1]) if span == 0 else (times_s[-2], times_s[-1])
    begin = before_h + int(first // 3600)
    end = max(before_h + int(-(-last // 3600)), begin + 1)
    weighted_h = float(weights[begin:end].mean()) * float(last - first) / 3600.0
    return float(heat_kWh[span]) / weighted_h if weighted_h > 0.0 else 0.0


def _open_frac(hour_s: IntArray, times_s: IntArray, open_hours: BoolArray) -> FloatArray:
    """Share of each hour that lies before the first or after the last reading."""
    before_s = np.clip(times_s[0] - hour_s, 0, 3600)
    after_s = np.clip(hour_s + 3600 - times_s[-1], 0, 3600)
    return np.where(open_hours, np.maximum(before_s, after_s) / 3600.0, 0.0)


def _spread_finding(file: str, times_s: IntArray, heat_kWh: float) -> Finding:
    """What the reader must know of the spread."""
    apart_d = np.diff(times_s) / 86400.0
    what = (
        f"{times_s.size} register readings, {np.median(apart_d):g} days apart as a rule and "
        f"{apart_d.max():.1f} at most, spread over the hours by a day shape"
    )
    effect = f"{heat_kWh:,.0f} kWh; every reading closes, hourly peaks are not known"
    long = apart_d.max() > LONG_WITHOUT_READING_d
    advice = "Ask for readings in between." if long else ""
    return Finding(file, what, effect, advice, "attention" if long else "note")

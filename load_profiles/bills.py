"""Heat known only from gas bills: an hourly year in which every bill closes."""

from dataclasses import dataclass
from datetime import date, timedelta
from itertools import pairwise

import numpy as np

from load_profiles.arrays import FloatArray, IntArray
from load_profiles.clock import SiteClock
from load_profiles.day_shapes import day_shape, shape_in_hours
from load_profiles.declarations import MonthlyBill, MonthlyBills
from load_profiles.degree_days import (
    BASE_TEMPERATURES_degC,
    HeatLine,
    fit_heat_line,
    heating_degree_hours,
)
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding

#: Fewer bills cannot tell base heat from heating.
FEWEST_BILLS = 3

#: Fewer bills cannot tell the base temperature as well.
FEWEST_BILLS_TO_FIT = 5

#: A fit that explains less asks for a look. Common practice (ASHRAE Guideline 14: 0.75 to 0.8).
R_SQUARED_TO_TRUST = 0.75


@dataclass(frozen=True)
class BilledYear:
    """Heat by the hour.

    Parameters
    ----------
    heat_kW : array, shape (hours,) [kW]
        Mean over the hour.
    line : HeatLine
        The regression that tells base heat from heating.
    findings : tuple of Finding
        How the bills were spread.
    """

    heat_kW: FloatArray
    line: HeatLine
    findings: tuple[Finding, ...]


def bill_faults(bills: MonthlyBills, *, path: str, year: int) -> list[Fault]:
    """Bills that do not follow each other day by day through the year.

    Parameters
    ----------
    bills : MonthlyBills
        As declared.
    path : str
        Section of the study file.
    year : int
        Year to cover.

    Returns
    -------
    list of Fault
        Empty where they do.
    """
    faults = []
    for number, bill in enumerate(bills.bill, start=1):
        if bill.last_day < bill.first_day:
            must = f"must not be before first_day = {bill.first_day}"
            faults.append(Fault(f"{path}.bill[{number}].last_day", str(bill.last_day), must))
    for number, (before, after) in enumerate(pairwise(bills.bill), start=2):
        next_day = before.last_day + timedelta(days=1)
        if after.first_day != next_day:
            must = f"must be {next_day}, the day after the bill before"
            faults.append(Fault(f"{path}.bill[{number}].first_day", str(after.first_day), must))
    faults += _cover_faults(bills.bill, path, year)
    fewest = FEWEST_BILLS if bills.base_temperature_degC is not None else FEWEST_BILLS_TO_FIT
    if len(bills.bill) < fewest:
        must = f"{fewest} or more are needed to tell base heat from heating"
        if len(bills.bill) >= FEWEST_BILLS:
            must += ", or give base_temperature_degC"
        faults.append(Fault(f"{path}.bill", f"{len(bills.bill)} bills", must))
    shares = [bill.fuel_hhv_kWh for bill in bills.bill]
    if not any(shares):
        faults.append(Fault(f"{path}.bill", "no fuel at all", "leave the section out"))
    return faults


def _cover_faults(bills: tuple[MonthlyBill, ...], path: str, year: int) -> list[Fault]:
    """Bills that begin late or end early."""
    faults = []
    first, last = date(year, 1, 1), date(year, 12, 31)
    if bills[0].first_day > first:
        must = f"must be {first} or earlier: bills must cover {year}"
        faults.append(Fault(f"{path}.bill[1].first_day", str(bills[0].first_day), must))
    if bills[-1].last_day < last:
        must = f"must be {last} or later: bills must cover {year}"
        faults.append(Fault(f"{path}.bill[{len(bills)}].last_day", str(bills[-1].last_day), must))
    return faults


def spread_bills(
    bills: MonthlyBills, ambient_degC: FloatArray, *, path: str, site: SiteClock
) -> BilledYear:
    """Billed heat over the hours, so that every bill closes.

    Parameters
    ----------
    bills : MonthlyBills
        As declared; a bill's day is a day of standard time.
    ambient_degC : array, shape (hours,) [degC]
        Weather of the year.
    path : str
        Section of the study file.
    site : SiteClock
        Zone and year.

    Returns
    -------
    BilledYear
        Base heat by the base shape; the rest by degree-hours times the day shape; both scaled
        by one factor a bill.

    Raises
    ------
    ProfileError
        If the bills do not cover the year or a shape is unknown.
    """
    faults = bill_faults(bills, path=path, year=site.year)
    shapes = []
    for key, name in (("shape", bills.shape), ("base_shape", bills.base_shape)):
        try:
            shapes.append(day_shape(name, path=f"{path}.{key}"))
        except ProfileError as error:
            faults += error.faults
    if faults:
        raise ProfileError(tuple(faults))
    inside, heat_kWh, cut = _bills_inside(bills, site.year)
    period = _period_of_hours(inside, site)
    line = fit_heat_line(
        heat_kWh, period, ambient_degC, base_temperature_degC=bills.base_temperature_degC
    )
    wall = site.wall(site.slots(60))
    degree_h = heating_degree_hours(ambient_degC, line.base_temperature_degC)
    shape, base_shape = (shape_in_hours(factors, wall) for factors in shapes)
    base_kWh = _spread(np.full(site.hours, line.base_kWh_per_day / 24.0), base_shape, period)
    heating_kWh = _spread(degree_h * line.slope_kWh_per_K_day / 24.0, shape, period)
    heat_kW = close_periods(base_kWh + heating_kWh, period, heat_kWh)
    findings = (*_line_findings(line, path, len(inside), heat_kWh.sum()), *_cut(cut, path))
    return BilledYear(heat_kW, line, findings)


def close_periods(hours_kWh: FloatArray, period: IntArray, total_kWh: FloatArray) -> FloatArray:
    """Hours scaled by one factor a period so that each period has its total.

    Parameters
    ----------
    hours_kWh : array, shape (hours,) [kWh]
        Non-negative; a period without any is spread evenly.
    period : array of int, shape (hours,)
        Period of each hour.
    total_kWh : array, shape (periods,) [kWh]
        What each period must come to.

    Returns
    -------
    array, shape (hours,) [kWh]
        Sums by period equal `total_kWh`.
    """
    sums = np.bincount(period, hours_kWh, minlength=total_kWh.size)
    weights = np.where(sums[period] > 0.0, hours_kWh, 1.0)
    sums = np.bincount(period, weights, minlength=total_kWh.size)
    return np.asarray(weights * (total_kWh / sums)[period])


def _spread(hours_kWh: FloatArray, shape: FloatArray, period: IntArray) -> FloatArray:
    """Hours times a shape, with the sum of each period kept."""
    sums = np.asarray(np.bincount(period, hours_kWh), dtype=np.float64)
    shaped = hours_kWh * shape
    kept = np.bincount(period, shaped) > 0.0
    return close_periods(np.where(kept[period], shaped, hours_kWh), period, sums)


def _bills_inside(
    bills: MonthlyBills, year: int
) -> tuple[list[tuple[date, date]], FloatArray, list[int]]:
    """First and last day and heat of each bill's part inside the year, and which were cut."""
    spans, heat_kWh, cut = [], [], []
    for number, bill in enumerate(bills.bill, start=1):
        first = max(bill.first_day, date(year, 1, 1))
        last = min(bill.last_day, date(year, 12, 31))
        if last < first:
            continue
        part = ((last - first).days + 1) / ((bill.last_day - bill.first_day).days + 1)
        if part < 1.0:
            cut.append(number)
        spans.append((first, last))
        heat_kWh.append(bill.fuel_hhv_kWh * bills.heater_efficiency_hhv_frac * part)
    return spans, np.array(heat_kWh), cut


def _period_of_hours(spans: list[tuple[date, date]], site: SiteClock) -> IntArray:
    """Bill of each hour of the year."""
    ends = np.array([(last - date(site.year, 1, 1)).days + 1 for _, last in spans])
    day = np.arange(site.hours, dtype=np.int64) // 24
    return np.searchsorted(ends, day, side="right").astype(np.int64)


def _line_findings(line: HeatLine, path: str, bills: int, heat_kWh: float) -> tuple[Finding, ...]:
    """What the reader must know of the regression."""
    origin = "fitted" if line.fitted else "given"
    what = (
        f"heat of {bills} bills spread by the hour: base heat {line.base_kWh_per_day:,.0f} kWh a "
        f"day, {line.slope_kWh_per_K_day:,.0f} kWh a degree-day below "
        f"{line.base_temperature_degC:g} degC ({origin}), R2 = {line.r_squared:.2f}"
    )
    effect = f"{heat_kWh:,.0f} kWh; every bill closes, hourly peaks are not known"
    edges = (BASE_TEMPERATURES_degC[0], BASE_TEMPERATURES_degC[-1])
    at_edge = line.fitted and line.base_temperature_degC in edges
    doubtful = line.r_squared < R_SQUARED_TO_TRUST or at_edge
    advice = "Meter the heat for some winter weeks before the size is decided."
    return (Finding(path, what, effect, advice, "attention" if doubtful else "note"),)


def _cut(numbers: list[int], path: str) -> tuple[Finding, ...]:
    """Bills that reach beyond the year."""
    return tuple(
        Finding(
            f"{path}.bill[{number}]",
            "reaches beyond the year; its part inside is taken by days",
            "heat at the turn of the year is off by the weather's difference",
        )
        for number in numbers
    )

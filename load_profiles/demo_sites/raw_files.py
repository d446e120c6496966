"""Raw files as a client would send them, written from the truth."""

import re
from collections.abc import Iterable
from datetime import date, datetime, timedelta, timezone
from zoneinfo import ZoneInfo

import numpy as np
import pandas as pd

from load_profiles.arrays import BoolArray, FloatArray
from load_profiles.declarations import MonthlyBill
from load_profiles.demo_sites.clock import StepClock
from load_profiles.demo_sites.exports import (
    BillPlan,
    Dialect,
    PowerExport,
    RegisterExport,
    WeatherExport,
)
from load_profiles.demo_sites.weather import Weather

#: One bill of a study file: the generator writes the fuel, a person everything else.
BILL_LINE = re.compile(
    r"(first_day = )(\S+)(, last_day = )(\S+)(, fuel_hhv_kWh = )[0-9_]+", flags=re.ASCII
)


def metered_power_kW(power_kW: FloatArray, export: PowerExport, clock: StepClock) -> FloatArray:
    """True power rounded as the meter's export rounds it.

    Parameters
    ----------
    power_kW : array, shape (steps,) [kW]
        True mean power.
    export : PowerExport
        What a value of the file is.
    clock : StepClock
        Steps of the file.

    Returns
    -------
    array, shape (steps,) [kW]
        Mean power that the printed tenths stand for.
    """
    per_kW = 1.0 / clock.steps_per_hour if export.quantity == "energy_kWh" else 1.0
    return np.asarray(np.round(power_kW * per_kW, 1) / per_kW)


def spoilt_steps(export: PowerExport, clock: StepClock) -> BoolArray:
    """Steps in which the export does not hold what the meter saw.

    Parameters
    ----------
    export : PowerExport
        With its faults.
    clock : StepClock
        Steps of the file.

    Returns
    -------
    array of bool, shape (steps,)
        True where a row is missing, empty or stuck.
    """
    spoilt = np.zeros(clock.steps, dtype=bool)
    for fault in export.faults:
        spoilt |= _stretch(clock, fault.first, fault.hours)
    return spoilt


def power_file(power_kW: FloatArray, export: PowerExport, clock: StepClock) -> str:
    """The power meter's export.

    Parameters
    ----------
    power_kW : array, shape (steps,) [kW]
        Metered mean power.
    export : PowerExport
        How it is written and what went wrong.
    clock : StepClock
        Steps of the file.

    Returns
    -------
    str
        Text of the file.
    """
    per_kW = 1.0 / clock.steps_per_hour if export.quantity == "energy_kWh" else 1.0
    values = power_kW * per_kW
    empty, missing = np.zeros(clock.steps, dtype=bool), np.zeros(clock.steps, dtype=bool)
    for fault in export.faults:
        stretch = _stretch(clock, fault.first, fault.hours)
        if fault.kind == "stuck":
            values = np.where(stretch, values[np.flatnonzero(stretch)[0]], values)
        empty |= stretch if fault.kind == "empty" else False
        missing |= stretch if fault.kind == "missing" else False

    ends = pd.Timedelta(minutes=clock.step_minutes if export.marks == "end" else 0)
    stamps = _stamps(clock.utc + ends, export.dialect, clock)
    cells = [
        "" if blank else _number(value, export.dialect)
        for value, blank in zip(values.tolist(), empty.tolist(), strict=True)
    ]
    rows = [
        (stamp, cell)
        for stamp, cell, gone in zip(stamps, cells, missing.tolist(), strict=True)
        if not gone
    ]
    return _table(export.dialect, (export.value_header,), rows)


def register_file(heat_kW: FloatArray, export: RegisterExport, clock: StepClock) -> str:
    """The list of gas-meter readings.

    Parameters
    ----------
    heat_kW : array, shape (steps,) [kW]
        True useful heat behind the meter.
    export : RegisterExport
        Meter, heaters and reading times.
    clock : StepClock
        Steps of the heat.

    Returns
    -------
    str
        Text of the file, whole cubic metres.
    """
    m3_per_kWh = 1.0 / (export.heater_efficiency_hhv_frac * export.calorific_value_hhv_kWh_per_m3)
    step_h = clock.step_minutes / 60.0
    register_m3 = (
        export.first_m3 + np.concatenate([[0.0], np.cumsum(heat_kW)]) * step_h * m3_per_kWh
    )
    zone = ZoneInfo(clock.time_zone)
    instants = pd.DatetimeIndex([reading.replace(tzinfo=zone) for reading in export.readings])
    elapsed_h = (instants.tz_convert("UTC") - clock.utc[0]) / pd.Timedelta(hours=1)
    read_m3: FloatArray = np.interp(
        np.asarray(elapsed_h, dtype=np.float64), np.arange(clock.steps + 1) * step_h, register_m3
    )
    stamps = _stamps(instants.tz_convert("UTC"), export.dialect, clock)
    rows = [(stamp, f"{value:.0f}") for stamp, value in zip(stamps, read_m3.tolist(), strict=True)]
    return _table(export.dialect, (export.value_header,), rows)


def weather_recorded(export: WeatherExport, clock: StepClock) -> BoolArray:
    """Hours whose weather stands in the file.

    Parameters
    ----------
    export : WeatherExport
        With the hours that were lost.
    clock : StepClock
        The site's clock, whatever its steps.

    Returns
    -------
    array of bool, shape (hours,)
        False where a row is missing.
    """
    hourly = StepClock(clock.time_zone, clock.year, 60)
    recorded = np.ones(hourly.steps, dtype=bool)
    for first, hours in export.lost:
        start = pd.Timestamp(first.replace(tzinfo=timezone(hourly.standard_offset)))
        lost = (hourly.utc >= start) & (hourly.utc < start + timedelta(hours=hours))
        recorded &= ~np.asarray(lost)
    return recorded


def weather_file(weather: Weather, export: WeatherExport, clock: StepClock) -> str:
    """The weather station's export.

    Parameters
    ----------
    weather : Weather
        Hourly weather of the year.
    export : WeatherExport
        How it is written and what was lost.
    clock : StepClock
        The site's clock, whatever its steps.

    Returns
    -------
    str
        Text of the file.
    """
    hourly = StepClock(clock.time_zone, clock.year, 60)
    kept = weather_recorded(export, clock)
    columns = (weather.ambient_degC, weather.relative_humidity_percent, weather.pressure_hPa)
    decimals = (1, 0, 1)
    cells = [
        [_number(value, export.dialect, places) for value in column.tolist()]
        for column, places, _ in zip(columns, decimals, export.headers, strict=False)
    ]
    stamps = _stamps(hourly.utc, export.dialect, hourly)
    rows = [
        row
        for row, keep in zip(zip(stamps, *cells, strict=True), kept.tolist(), strict=True)
        if keep
    ]
    return _table(export.dialect, export.headers, rows)


def monthly_bills(heat_kW: FloatArray, plan: BillPlan, clock: StepClock) -> tuple[MonthlyBill, ...]:
    """The gas bills of the year.

    Parameters
    ----------
    heat_kW : array, shape (steps,) [kW]
        True useful heat behind the bills.
    plan : BillPlan
        Heaters and days.
    clock : StepClock
        Steps of the heat.

    Returns
    -------
    tuple of MonthlyBill
        Whole kWh, so that they close with the heat within a kilowatt-hour each.
    """
    bills, first_day = [], date(clock.year, 1, 1)
    for last_day in plan.last_days:
        billed = clock.between(first_day, last_day)
        heat_kWh = float(heat_kW[billed].sum()) * clock.step_minutes / 60.0
        fuel_hhv_kWh = float(round(heat_kWh / plan.heater_efficiency_hhv_frac))
        bills.append(MonthlyBill(first_day=first_day, last_day=last_day, fuel_hhv_kWh=fuel_hhv_kWh))
        first_day = last_day + timedelta(days=1)
    return tuple(bills)


def with_bills(study_text: str, bills: tuple[MonthlyBill, ...]) -> str:
    """A study file's text with the fuel of its bills brought up to date.

    Parameters
    ----------
    study_text : str
        Text whose bills stand one a line, as `first_day = …, last_day = …, fuel_hhv_kWh = …`.
    bills : tuple of MonthlyBill
        The bills of the year.

    Returns
    -------
    str
        The same text, with `fuel_hhv_kWh` of each bill replaced.
    """
    fuel = {(bill.first_day.isoformat(), bill.last_day.isoformat()): bill for bill in bills}

    def line(match: re.Match[str]) -> str:
        bill = fuel[match[2], match[4]]
        return f"{''.join(match.groups())}{bill.fuel_hhv_kWh:.0f}"

    return BILL_LINE.sub(line, study_text)


def _stretch(clock: StepClock, first: datetime, hours: float) -> BoolArray:
    """Steps of a stretch that begins at a local time."""
    start = pd.Timestamp(first.replace(tzinfo=ZoneInfo(clock.time_zone)))
    end = start + pd.Timedelta(hours=hours)
    return np.asarray((clock.utc >= start) & (clock.utc < end))


def _stamps(utc: pd.DatetimeIndex, dialect: Dialect, clock: StepClock) -> list[str]:
    """Instants as the file's clock shows them."""
    if dialect.clock == "local":
        shown = utc.tz_convert(clock.time_zone)
    elif dialect.clock == "standard":
        shown = utc.tz_convert(timezone(clock.standard_offset))
    else:
        shown = utc
    return [str(stamp) for stamp in shown.strftime(dialect.stamp_format)]


def _number(value: float, dialect: Dialect, places: int = 1) -> str:
    """A number with the file's decimal mark, never a minus zero."""
    text = f"{value:.{places}f}"
    text = text.removeprefix("-") if float(text) == 0.0 else text
    return text.replace(".", dialect.decimal)


def _table(dialect: Dialect, headers: tuple[str, ...], rows: Iterable[tuple[str, ...]]) -> str:
    """Preamble, header row and rows, one a line."""
    lines = [*dialect.preamble, dialect.delimiter.join((dialect.stamp_header, *headers))]
    lines += [dialect.delimiter.join(row) for row in rows]
    return "\n".join(lines) + "\n"

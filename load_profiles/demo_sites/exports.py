"""How a client's files are written, and what went wrong while they were recorded."""

from dataclasses import dataclass
from datetime import date, datetime, time, timedelta
from typing import Literal

Carrier = Literal["steam", "hot_water", "hot_gas"]


@dataclass(frozen=True)
class Dialect:
    """How a text file is written.

    Parameters
    ----------
    file : str
        File name.
    delimiter, decimal : str
        Column separator and decimal mark.
    stamp_header : str
        Header of the time column.
    stamp_format : str
        strftime format.
    clock : {"local", "standard", "utc"}
        What the stamps show.
    preamble : tuple of str
        Lines above the header row.
    """

    file: str
    delimiter: str
    decimal: str
    stamp_header: str
    stamp_format: str
    clock: Literal["local", "standard", "utc"]
    preamble: tuple[str, ...] = ()


@dataclass(frozen=True)
class MeterFault:
    """A stretch in which the meter or its line failed.

    Parameters
    ----------
    kind : {"missing", "empty", "stuck"}
        Rows left out; rows without a value; the first value of the stretch repeated.
    first : datetime
        Local beginning of the first spoilt interval, away from clock changes.
    hours : float [h]
        Length.
    """

    kind: Literal["missing", "empty", "stuck"]
    first: datetime
    hours: float


@dataclass(frozen=True)
class PowerExport:
    """Export of the power meter.

    Parameters
    ----------
    dialect : Dialect
        How it is written.
    value_header : str
        Header of the value column.
    quantity : {"energy_kWh", "mean_kW"}
        What a value is.
    marks : {"start", "end"}
        Whether stamps mark the start or the end of an interval.
    faults : tuple of MeterFault
        What went wrong.
    """

    dialect: Dialect
    value_header: str
    quantity: Literal["energy_kWh", "mean_kW"]
    marks: Literal["start", "end"]
    faults: tuple[MeterFault, ...] = ()


@dataclass(frozen=True)
class RegisterExport:
    """A list of readings of one gas meter.

    Parameters
    ----------
    dialect : Dialect
        How it is written.
    value_header : str
        Header of the register column.
    carrier : str
        Heat that the gas behind this meter makes.
    heater_efficiency_hhv_frac : float [-]
        Useful heat over fuel (HHV).
    calorific_value_hhv_kWh_per_m3 : float [kWh/m3]
        HHV of a cubic metre as metered.
    first_m3 : float [m3]
        Register at the beginning of the year.
    readings : tuple of datetime
        Local times at which somebody read the meter.
    """

    dialect: Dialect
    value_header: str
    carrier: Carrier
    heater_efficiency_hhv_frac: float
    calorific_value_hhv_kWh_per_m3: float
    first_m3: float
    readings: tuple[datetime, ...]


@dataclass(frozen=True)
class WeatherExport:
    """Export of a weather station.

    Parameters
    ----------
    dialect : Dialect
        How it is written.
    headers : tuple of str
        Headers for temperature, humidity and, where it is given, pressure.
    lost : tuple of (datetime, int)
        Standard-time beginning and hours of stretches without rows.
    """

    dialect: Dialect
    headers: tuple[str, ...]
    lost: tuple[tuple[datetime, int], ...] = ()


@dataclass(frozen=True)
class BillPlan:
    """When gas for one heat is billed.

    Parameters
    ----------
    carrier : str
        Heat that the billed gas makes.
    heater_efficiency_hhv_frac : float [-]
        Useful heat over fuel (HHV).
    last_days : tuple of date
        Last local day of each bill; the first bill begins with the year.
    """

    carrier: Carrier
    heater_efficiency_hhv_frac: float
    last_days: tuple[date, ...]


def reading_round(
    year: int, *, weekday: int, at: time, every_days: int, missed: tuple[int, ...] = ()
) -> tuple[datetime, ...]:
    """Local times at which somebody walks to a gas meter.

    Parameters
    ----------
    year : int
        Calendar year. The supplier reads the meter remotely at both of its New Year midnights.
    weekday : int
        Usual day, 0 for Monday.
    at : time
        Usual time; the round comes up to 50 minutes later.
    every_days : int
        Days between rounds.
    missed : tuple of int
        Rounds that nobody walked, counted from 0.

    Returns
    -------
    tuple of datetime
        Ascending, the two midnights included.
    """
    new_year = datetime.combine(date(year, 1, 1), time())
    next_year = datetime.combine(date(year + 1, 1, 1), time())
    day = new_year + timedelta(days=(weekday - new_year.weekday()) % 7)
    times, count = [new_year], 0
    while day < next_year:
        if count not in missed:
            late = timedelta(minutes=5 * (count * 7 % 11))
            times.append(datetime.combine(day.date(), at) + late)
        day += timedelta(days=every_days)
        count += 1
    return (*times, next_year)


def month_ends(
    year: int, *, moved: dict[int, int] | None = None, extra: tuple[date, ...] = ()
) -> tuple[date, ...]:
    """Last days of the year's bills: twelve months, and further readings.

    Parameters
    ----------
    year : int
        Calendar year.
    moved : dict of month to days, optional
        Months whose meter was read some days early (negative) or late.
    extra : tuple of date
        Further last days, such as both ends of a works holiday.

    Returns
    -------
    tuple of date
        Ascending; the last bill ends with the year.
    """
    firsts = [date(year, month, 1) for month in range(2, 13)] + [date(year + 1, 1, 1)]
    shifts = moved or {}
    ends = [
        first - timedelta(days=1) + timedelta(days=shifts.get(month, 0))
        for month, first in enumerate(firsts, start=1)
    ]
    return tuple(sorted((*ends, *extra)))

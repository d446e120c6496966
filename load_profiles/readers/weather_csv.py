"""Hourly weather in delimited text."""

from dataclasses import dataclass
from pathlib import Path

import numpy as np

from load_profiles.arrays import FloatArray, IntArray
from load_profiles.atmosphere import standard_pressure_kPa
from load_profiles.clock import SiteClock
from load_profiles.declarations import WeatherFile
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding
from load_profiles.gaps import bridge
from load_profiles.readers.stamps import read_stamps, year_faults
from load_profiles.readers.text_table import TextTable, read_text_table
from load_profiles.row_faults import row_faults
from load_profiles.runs import runs_of
from load_profiles.typical_year import hours_of_year, with_leap_day

#: Longer gaps are refused: weather has no like days [h].
LONGEST_GAP_h = 6

#: A mean pressure further from the standard atmosphere's is likely reduced to sea level [hPa].
PRESSURE_DOUBT_hPa = 25.0

#: What stations can report: temperature [degC], humidity [%], pressure [hPa].
_RANGES = {"temperature": (-60.0, 60.0), "humidity": (0.0, 100.0), "pressure": (500.0, 1100.0)}


@dataclass(frozen=True)
class WeatherYear:
    """Weather of every hour.

    Parameters
    ----------
    ambient_degC, relative_humidity_frac, pressure_kPa : arrays, shape (hours,) [degC], [-], [kPa]
        Means over the hour.
    findings : tuple of Finding
        What was filled or computed.
    """

    ambient_degC: FloatArray
    relative_humidity_frac: FloatArray
    pressure_kPa: FloatArray
    findings: tuple[Finding, ...]


def read_weather(
    weather: WeatherFile, *, folder: Path, site: SiteClock, altitude_m: float
) -> WeatherYear:
    """Read a weather file onto the hours of the year.

    Parameters
    ----------
    weather : WeatherFile
        What the study says of the file.
    folder : Path
        Folder of the study file.
    site : SiteClock
        Zone and year.
    altitude_m : float [m]
        Gives the pressure where the file has none.

    Returns
    -------
    WeatherYear
        Gaps up to `LONGEST_GAP_h` on a straight line.

    Raises
    ------
    ProfileError
        With every fault of the file.
    """
    table, named = _table(weather, folder)
    faults: list[Fault] = []
    stamps = read_stamps(table, weather, site, interval_s=3600, faults=faults)
    hour, notes = hours_of_year(stamps.seconds, site, table.file)
    inside = (hour >= 0) & (hour < site.hours)
    if not inside.any():
        faults += year_faults(table, stamps, site, weather.stamp_column)
        raise ProfileError(tuple(faults))
    series: dict[str, FloatArray] = {}
    findings: list[Finding] = [*stamps.findings, *notes]
    for kind, column in named.items():
        values = table.numbers(column, faults)
        faults += _range_faults(table, values, column, kind)
        hourly = _hourly(values[stamps.places][inside], hour[inside], site.hours)
        if notes:
            hourly = with_leap_day(hourly, site)
        series[kind] = _bridged(hourly, column, table.file, site, faults=faults, findings=findings)
    if faults:
        raise ProfileError(tuple(faults))
    pressure_kPa, doubts = _pressure(series.get("pressure"), weather, altitude_m, site.hours)
    return WeatherYear(
        series["temperature"], series["humidity"] / 100.0, pressure_kPa, (*findings, *doubts)
    )


def _table(weather: WeatherFile, folder: Path) -> tuple[TextTable, dict[str, str]]:
    """The file's cells, and the column of each quantity that it holds."""
    keys = {
        weather.stamp_column: "weather.stamp_column",
        weather.temperature_column: "weather.temperature_column",
        weather.humidity_column: "weather.humidity_column",
    }
    named = {"temperature": weather.temperature_column, "humidity": weather.humidity_column}
    if weather.pressure_column is None:
        return read_text_table(folder, weather, keys), named
    with_pressure = {**keys, weather.pressure_column: "weather.pressure_column"}
    try:
        table = read_text_table(folder, weather, with_pressure)
    except ProfileError:
        if "pressure_column" in weather.model_fields_set:
            raise
        return read_text_table(folder, weather, keys), named  # the default names no column here
    return table, {**named, "pressure": weather.pressure_column}


def _range_faults(table: TextTable, values: FloatArray, column: str, kind: str) -> list[Fault]:
    """Values that no station reports, and humidity as a fraction."""
    low, high = _RANGES[kind]
    wrong = np.flatnonzero((values < low) | (values > high))
    came = [f"{column} {values[place]:g}" for place in wrong]
    must = f"must be between {low:g} and {high:g}"
    faults = row_faults(table.file, table.rows[wrong].tolist(), came, must)
    if kind == "humidity" and np.any(values > 0.0) and np.nanmax(values) <= 1.0:
        came_most = f"{column} of {np.nanmax(values):g} at most"
        faults.append(Fault(table.file, came_most, "must be in percent, 0 to 100"))
    return faults


def _hourly(values: FloatArray, hour: IntArray, hours: int) -> FloatArray:
    """Mean of the values that fall in each hour, NaN where none does."""
    there = ~np.isnan(values)
    counts = np.bincount(hour[there], minlength=hours)
    sums = np.bincount(hour[there], values[there], minlength=hours)
    return np.where(counts > 0, sums / np.maximum(counts, 1), np.nan)


def _bridged(
    hourly: FloatArray,
    column: str,
    file: str,
    site: SiteClock,
    *,
    faults: list[Fault],
    findings: list[Finding],
) -> FloatArray:
    """Short gaps bridged with a finding, long ones refused."""
    bridged, mask = bridge(hourly, longest=LONGEST_GAP_h)
    standard = site.standard(site.slots(60))
    if mask.any():
        gaps = runs_of(mask)[0].size
        named = "one gap" if gaps == 1 else f"{gaps} gaps"
        what = f"{column}: {mask.sum()} h in {named} bridged by straight lines"
        findings.append(Finding(file, what, f"{mask.sum()} h of weather are not measured"))
    starts, lengths = runs_of(np.isnan(bridged))
    for start, length in list(zip(starts, lengths, strict=True))[:5]:
        came = f"{column} missing for {length} h from {standard[start]:%Y-%m-%d %H:%M}"
        must = f"gaps must not exceed {LONGEST_GAP_h} h; take the hours from a station nearby"
        faults.append(Fault(file, came, must))
    return bridged


def _pressure(
    station_hPa: FloatArray | None, weather: WeatherFile, altitude_m: float, hours: int
) -> tuple[FloatArray, list[Finding]]:
    """Station pressure, or the standard atmosphere's where there is none."""
    standard_kPa = standard_pressure_kPa(altitude_m)
    if station_hPa is None:
        what = f"no pressure; taken from the standard atmosphere at {altitude_m:g} m"
        effect = f"{standard_kPa:.2f} kPa all year; the weather moves it by 3 % either way"
        return np.full(hours, standard_kPa), [Finding(weather.file, what, effect)]
    apart_hPa = float(station_hPa.mean()) - standard_kPa * 10.0
    findings = []
    if abs(apart_hPa) > PRESSURE_DOUBT_hPa:
        what = f"mean pressure {station_hPa.mean():.0f} hPa, {apart_hPa:+.0f} of the standard"
        effect = f"a turbine's power is off by {apart_hPa / (standard_kPa * 10.0):+.1%} if wrong"
        advice = f"Ask whether it is reduced to sea level; the site lies at {altitude_m:g} m."
        findings.append(Finding(weather.file, what, effect, advice, "attention"))
    return station_hPa / 10.0, findings

"""A plausible year of weather: seasons, fronts, clouds, and the day's swing."""

from dataclasses import dataclass

import numpy as np

from load_profiles.arrays import FloatArray
from load_profiles.demo_sites.noise import NoiseStream

HOURS_A_YEAR = 8760.0


@dataclass(frozen=True)
class Climate:
    """What a place's weather is like.

    Parameters
    ----------
    mean_degC : float [degC]
        Mean of the year.
    seasonal_K : float [K]
        Half the difference between midsummer's and midwinter's mean.
    fronts_K : float [K]
        Standard deviation of what passing fronts add.
    summer_swing_K, winter_swing_K : float [K]
        Half the daily range under a half-clouded sky.
    altitude_m : float [m]
        Altitude of the station.
    dew_point_gap_K : float [K]
        Mean distance of the dew point below the air temperature.
    """

    mean_degC: float
    seasonal_K: float
    fronts_K: float
    summer_swing_K: float
    winter_swing_K: float
    altitude_m: float
    dew_point_gap_K: float


@dataclass(frozen=True)
class Weather:
    """Hourly weather as a station would record it.

    Parameters
    ----------
    ambient_degC : array, shape (hours,) [degC]
        Dry bulb, to a tenth.
    relative_humidity_percent : array, shape (hours,) [%]
        Whole percent.
    pressure_hPa : array, shape (hours,) [hPa]
        At the station, to a tenth.
    """

    ambient_degC: FloatArray
    relative_humidity_percent: FloatArray
    pressure_hPa: FloatArray


def weather_year(climate: Climate, stream: NoiseStream, hours: int) -> Weather:
    """Weather of one year.

    Parameters
    ----------
    climate : Climate
        What the place is like.
    stream : NoiseStream
        Where fronts and clouds come from.
    hours : int
        Standard hours of the year, from 1 January, 00:00.

    Returns
    -------
    Weather
        Rounded as a station rounds.
    """
    time_h = np.arange(hours, dtype=np.float64) + 0.5
    hour = np.asarray(time_h % 24.0, dtype=np.float64)
    fronts = stream.persistent(hours, memory_steps=70.0)
    cloud_frac = _cloud_frac(stream, hours)
    # The air is coldest in mid-January and warmest in mid-July, three weeks behind the sun.
    season = -np.cos(2.0 * np.pi * (time_h / HOURS_A_YEAR - 18.0 / 365.0))
    middle_K = 0.5 * (climate.summer_swing_K + climate.winter_swing_K)
    half_K = 0.5 * (climate.summer_swing_K - climate.winter_swing_K)
    swing_K = (middle_K + half_K * season) * (1.6 - 1.2 * cloud_frac)
    trend_degC = climate.mean_degC + climate.seasonal_K * season + climate.fronts_K * fronts
    ambient_degC = trend_degC + swing_K * _day_curve(hour)

    # Dew point follows the air mass, hardly the hour: dry under a clear sky, near the air in fog.
    gap_K = climate.dew_point_gap_K * (1.9 - 1.8 * cloud_frac) * (1.0 + 0.25 * season)
    dew_degC = trend_degC - gap_K + 0.3 * swing_K * _day_curve(hour)
    humidity_frac = np.clip(_vapour_hPa(dew_degC) / _vapour_hPa(ambient_degC), 0.15, 1.0)

    highs_and_lows_hPa = 8.0 * stream.persistent(hours, memory_steps=80.0)
    pressure_hPa = _standard_pressure_hPa(climate.altitude_m) + highs_and_lows_hPa
    return Weather(
        np.round(ambient_degC, 1),
        np.round(100.0 * humidity_frac),
        np.round(pressure_hPa, 1),
    )


def _cloud_frac(stream: NoiseStream, hours: int) -> FloatArray:
    """Cloud cover in (0, 1), changing over a day or so."""
    return np.asarray(1.0 / (1.0 + np.exp(-1.4 * stream.persistent(hours, memory_steps=30.0))))


def _day_curve(hour: FloatArray) -> FloatArray:
    """Daily course from -1 about sunrise to 1 in mid-afternoon, mean 0."""
    first = np.cos(2.0 * np.pi * (hour - 15.0) / 24.0)
    second = np.cos(4.0 * np.pi * (hour - 13.5) / 24.0)
    return np.asarray((first + 0.18 * second) / 1.05)


def _vapour_hPa(dew_degC: FloatArray) -> FloatArray:
    """Saturation pressure over water, Magnus form with the WMO's coefficients."""
    return np.asarray(6.112 * np.exp(17.62 * dew_degC / (243.12 + dew_degC)))


def _standard_pressure_hPa(altitude_m: float) -> float:
    """Pressure of the standard atmosphere (ISO 2533), troposphere."""
    return float(1013.25 * (1.0 - 2.25577e-5 * altitude_m) ** 5.25588)

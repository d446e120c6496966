"""A process factory's true demands: two shifts, a quiet Sunday, a summer stop, hot dryers."""

from dataclasses import dataclass
from datetime import date

import numpy as np

from load_profiles.arrays import BoolArray, FloatArray
from load_profiles.demo_sites.clock import StepClock, plateau
from load_profiles.demo_sites.demand import SiteDemand, on_steps
from load_profiles.demo_sites.noise import NoiseStream
from load_profiles.demo_sites.weather import Weather

SATURDAY = 5

#: Chance that a line fails in an hour: once in some ten shifts.
FAILURE_CHANCE = 0.006

#: Dryers are shut below this share of full output.
DRYER_SHUT_FRAC = 0.04


@dataclass(frozen=True)
class FactorySize:
    """How much of everything a factory has.

    Parameters
    ----------
    quiet_kW : float [kW]
        Power on a Sunday: stirrers, pumps, cold store, offices.
    production_kW : float [kW]
        Further power in full production.
    dryer_kW : float [kW]
        Hot gas to the dryers in full production.
    process_steam_kW : float [kW]
        Steam in full production.
    standby_steam_kW : float [kW]
        Steam that keeps tanks and mains warm.
    hall_heating_kW_per_K : float [kW/K]
        Steam to the hall heaters for each kelvin below the heating limit.
    heating_limit_degC : float [degC]
        Outdoor temperature above which nothing is heated.
    stops : tuple of (first day, last day)
        Works holidays, both days included.
    """

    quiet_kW: float
    production_kW: float
    dryer_kW: float
    process_steam_kW: float
    standby_steam_kW: float
    hall_heating_kW_per_K: float
    heating_limit_degC: float
    stops: tuple[tuple[date, date], ...]


def factory_demand(
    size: FactorySize, clock: StepClock, weather: Weather, stream: NoiseStream
) -> SiteDemand:
    """True demands of a factory over the year.

    Parameters
    ----------
    size : FactorySize
        How much of everything it has.
    clock : StepClock
        Steps and working days.
    weather : Weather
        Hourly weather of the year.
    stream : NoiseStream
        Order book, breakdowns, and what no rule explains.

    Returns
    -------
    SiteDemand
        Power, steam and hot gas.
    """
    stopped = _stopped(size, clock)
    output_frac = _output_frac(clock, stopped, stream)
    mains = np.where(stopped, 0.25, 1.0)
    below_K = np.maximum(size.heating_limit_degC - on_steps(weather.ambient_degC, clock), 0.0)
    quick = stream.normal(clock.steps)
    slow = stream.persistent(clock.steps, memory_steps=2.0 * clock.steps_per_hour)

    quiet_kW = size.quiet_kW * np.where(stopped, 0.8, 1.0) * (1.0 + 0.02 * slow + 0.01 * quick)
    steam_kW = size.standby_steam_kW * mains + size.process_steam_kW * output_frac
    steam_kW = steam_kW * (1.0 + 0.06 * slow)
    heated = np.where(stopped, 0.4, 1.0) * (0.45 + 0.55 * _shift_frac(clock))
    return SiteDemand(
        power_kW=quiet_kW + size.production_kW * output_frac * (1.0 + 0.015 * quick),
        steam_kW=steam_kW + size.hall_heating_kW_per_K * below_K * heated,
        hot_water_kW=np.zeros(clock.steps),
        hot_gas_kW=size.dryer_kW * _dryer_frac(clock, output_frac, stopped),
        cooling_kW=np.zeros(clock.steps),
    )


def _stopped(size: FactorySize, clock: StepClock) -> BoolArray:
    """Steps of the works holidays."""
    stopped = np.zeros(clock.steps, dtype=bool)
    for first_day, last_day in size.stops:
        stopped |= clock.between(first_day, last_day)
    return stopped


def _shift_frac(clock: StepClock) -> FloatArray:
    """Two shifts from Monday to Friday, one on Saturday morning."""
    hour, weekday = clock.local_hour, clock.weekday
    week = plateau(hour, from_h=6.0, to_h=21.8, edge_h=0.12)
    saturday = plateau(hour, from_h=6.0, to_h=13.8, edge_h=0.12)
    return np.where(weekday < SATURDAY, week, np.where(weekday == SATURDAY, saturday, 0.0))


def _output_frac(clock: StepClock, stopped: BoolArray, stream: NoiseStream) -> FloatArray:
    """Production over capacity: order book, each shift's luck, breakdowns of an hour or two."""
    hour_steps = clock.steps_per_hour
    orders = 0.93 + 0.03 * stream.persistent(clock.steps, memory_steps=600.0 * hour_steps)
    luck = 0.035 * stream.persistent(clock.steps, memory_steps=5.0 * hour_steps)
    # An hour's draw decides whether a line fails; it is back within two hours.
    hours = clock.steps // hour_steps
    fails = stream.uniform(hours) < FAILURE_CHANCE
    fails[1:] |= fails[:-1]
    broken = np.where(np.repeat(fails, hour_steps), 0.55, 1.0)
    output_frac = _shift_frac(clock) * np.clip(orders + luck, 0.6, 1.05) * broken
    return np.where(stopped, 0.0, output_frac)


def _dryer_frac(
    clock: StepClock,
    output_frac: FloatArray,
    stopped: BoolArray,
) -> FloatArray:
    """Dryers follow production, are warmed up before the early shift, and rest otherwise."""
    warming = plateau(clock.local_hour, from_h=5.0, to_h=6.0, edge_h=0.08)
    warming = np.where((clock.weekday <= SATURDAY) & ~stopped, 0.45 * warming, 0.0)
    fired = np.maximum(output_frac, warming)
    return np.where(fired > DRYER_SHUT_FRAC, fired, 0.0)

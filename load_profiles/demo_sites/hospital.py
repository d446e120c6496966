"""A hospital's true demands: wards that never sleep, clinics that do, a winter and a summer."""

from dataclasses import dataclass

import numpy as np

from load_profiles.arrays import FloatArray
from load_profiles.demo_sites.clock import SUNDAY, StepClock, bump, plateau
from load_profiles.demo_sites.demand import SiteDemand, lagged, on_steps
from load_profiles.demo_sites.noise import NoiseStream
from load_profiles.demo_sites.weather import Weather

#: Clinics and operating theatres by day of the week, Monday first: emergencies at weekends.
CLINIC_DAYS = np.array([1.0, 1.03, 1.02, 1.0, 0.94, 0.36, 0.30])


@dataclass(frozen=True)
class HospitalSize:
    """How much of everything a hospital has.

    Parameters
    ----------
    wards_kW : float [kW]
        Power by day and night: wards, ventilation, computers, cold rooms.
    clinics_kW : float [kW]
        Further power of clinics, theatres and imaging on a full working day.
    kitchen_kW, lighting_kW : float [kW]
        Peaks of the kitchen's power and of evening light.
    heat_loss_kW_per_K : float [kW/K]
        Space heating for each kelvin below the heating limit.
    heating_limit_degC : float [degC]
        Outdoor temperature above which nothing is heated.
    domestic_kW : float [kW]
        Mean of domestic hot water and its circulation.
    steam_base_kW : float [kW]
        Steam by day and night: mains, humidifiers' standby, decontamination.
    steriliser_kW, laundry_kW, steam_kitchen_kW, humidifier_kW : float [kW]
        Peaks of steam for each use.
    cooling_base_kW : float [kW]
        Chilled water in every hour: computers, imaging.
    cooling_kW_per_K : float [kW/K]
        Further chilled water for each kelvin above the cooling limit.
    cooling_limit_degC : float [degC]
        Outdoor temperature below which fresh air cools.
    chiller_cop : float [-]
        Cooling over power of the electric chillers.
    """

    wards_kW: float
    clinics_kW: float
    kitchen_kW: float
    lighting_kW: float
    heat_loss_kW_per_K: float
    heating_limit_degC: float
    domestic_kW: float
    steam_base_kW: float
    steriliser_kW: float
    laundry_kW: float
    steam_kitchen_kW: float
    humidifier_kW: float
    cooling_base_kW: float
    cooling_kW_per_K: float
    cooling_limit_degC: float
    chiller_cop: float


def hospital_demand(
    size: HospitalSize, clock: StepClock, weather: Weather, stream: NoiseStream
) -> SiteDemand:
    """True demands of a hospital over the year.

    Parameters
    ----------
    size : HospitalSize
        How much of everything it has.
    clock : StepClock
        Steps and working days.
    weather : Weather
        Hourly weather of the year.
    stream : NoiseStream
        What no rule explains.

    Returns
    -------
    SiteDemand
        Power with chillers, steam, hot water and cooling.
    """
    ambient_degC = on_steps(weather.ambient_degC, clock)
    cooling_kW = _cooling_kW(size, clock, ambient_degC, stream)
    power_kW = _power_kW(size, clock, stream) + cooling_kW / size.chiller_cop
    return SiteDemand(
        power_kW=power_kW,
        steam_kW=_steam_kW(size, clock, ambient_degC, stream),
        hot_water_kW=_hot_water_kW(size, clock, ambient_degC, stream),
        hot_gas_kW=np.zeros(clock.steps),
        cooling_kW=cooling_kW,
    )


def _power_kW(size: HospitalSize, clock: StepClock, stream: NoiseStream) -> FloatArray:
    """Power without chillers."""
    hour = clock.local_hour
    clinics = CLINIC_DAYS[clock.weekday] * plateau(hour, from_h=7.0, to_h=16.8, edge_h=0.7)
    evening = 0.30 * plateau(hour, from_h=15.0, to_h=21.0, edge_h=0.6)
    meals = bump(hour, centre_h=6.8, width_h=0.8) + bump(hour, centre_h=10.8, width_h=1.2)
    meals = meals + 0.8 * bump(hour, centre_h=16.8, width_h=0.8)
    # Dusk falls at about 16:00 in midwinter and 21:00 in midsummer; wards sleep after 22:00.
    dusk_h = 18.5 - 2.5 * np.cos(2.0 * np.pi * (clock.day_of_year + 10.0) / 365.0)
    light = plateau(hour, from_h=dusk_h, to_h=22.3, edge_h=0.4)

    slow = stream.persistent(clock.steps, memory_steps=3.0 * clock.steps_per_hour)
    quick = stream.normal(clock.steps)
    return np.asarray(
        size.wards_kW * (1.0 + 0.012 * slow + 0.006 * quick)
        + size.clinics_kW * np.maximum(clinics, evening) * (1.0 + 0.03 * slow)
        + size.kitchen_kW * meals
        + size.lighting_kW * light
    )


def _hot_water_kW(
    size: HospitalSize, clock: StepClock, ambient_degC: FloatArray, stream: NoiseStream
) -> FloatArray:
    """Space heating behind thick walls, and domestic hot water."""
    hour = clock.local_hour
    felt_degC = 0.5 * ambient_degC
    felt_degC = felt_degC + 0.5 * lagged(ambient_degC, memory_steps=20.0 * clock.steps_per_hour)
    below_K = np.maximum(size.heating_limit_degC - felt_degC, 0.0)
    day = 0.90 + 0.22 * plateau(hour, from_h=5.0, to_h=18.0, edge_h=0.8)
    day = day + 0.10 * bump(hour, centre_h=6.3, width_h=1.0)
    washing = 0.62 + 0.95 * bump(hour, centre_h=7.5, width_h=1.4)
    washing = washing + 0.35 * bump(hour, centre_h=12.5, width_h=1.8)
    washing = washing + 0.55 * bump(hour, centre_h=18.5, width_h=1.8)
    washing = washing * np.where(clock.weekday >= SUNDAY - 1, 0.94, 1.0)
    noise = 1.0 + 0.04 * stream.persistent(clock.steps, memory_steps=2.0 * clock.steps_per_hour)
    heating_kW = size.heat_loss_kW_per_K * below_K * day
    return np.asarray((heating_kW + size.domestic_kW * washing) * noise)


def _steam_kW(
    size: HospitalSize, clock: StepClock, ambient_degC: FloatArray, stream: NoiseStream
) -> FloatArray:
    """Steam for sterilisers, laundry, kitchen, and humidifiers in dry cold air."""
    hour = clock.local_hour
    clinics = CLINIC_DAYS[clock.weekday]
    laundry_days = np.array([1.0, 1.0, 1.0, 1.0, 1.0, 0.3, 0.0])[clock.weekday]
    steriliser = clinics * plateau(hour, from_h=8.0, to_h=20.5, edge_h=0.6)
    laundry = laundry_days * plateau(hour, from_h=6.0, to_h=14.5, edge_h=0.3)
    kitchen = 0.6 * bump(hour, centre_h=6.3, width_h=0.7) + bump(hour, centre_h=10.8, width_h=1.1)
    kitchen = kitchen + 0.6 * bump(hour, centre_h=16.5, width_h=0.8)
    dry = np.clip((8.0 - ambient_degC) / 16.0, 0.0, 1.0)
    noise = 1.0 + 0.06 * stream.persistent(clock.steps, memory_steps=1.0 * clock.steps_per_hour)
    return np.asarray(
        noise
        * (
            size.steam_base_kW
            + size.steriliser_kW * steriliser
            + size.laundry_kW * laundry
            + size.steam_kitchen_kW * kitchen
            + size.humidifier_kW * dry
        )
    )


def _cooling_kW(
    size: HospitalSize, clock: StepClock, ambient_degC: FloatArray, stream: NoiseStream
) -> FloatArray:
    """Chilled water for rooms in warm weather, and for machines always."""
    above_K = np.maximum(ambient_degC - size.cooling_limit_degC, 0.0)
    day = 0.65 + 0.45 * plateau(clock.local_hour, from_h=7.5, to_h=19.0, edge_h=0.8)
    noise = 1.0 + 0.05 * stream.persistent(clock.steps, memory_steps=2.0 * clock.steps_per_hour)
    return np.asarray((size.cooling_base_kW + size.cooling_kW_per_K * above_K * day) * noise)

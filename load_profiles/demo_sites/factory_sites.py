"""The invented factories: a pigment works for the demo, a smaller one to start a study from."""

from datetime import date, datetime, time

from load_profiles.demo_sites.clock import StepClock
from load_profiles.demo_sites.exports import (
    BillPlan,
    Dialect,
    MeterFault,
    PowerExport,
    RegisterExport,
    WeatherExport,
    month_ends,
    reading_round,
)
from load_profiles.demo_sites.factory import FactorySize
from load_profiles.demo_sites.invented_site import InventedSite
from load_profiles.demo_sites.weather import Climate

YEAR = 2025

#: Public holidays of the demo's region outside its works holidays.
DEMO_HOLIDAYS = (
    date(YEAR, 4, 18),
    date(YEAR, 4, 21),
    date(YEAR, 5, 5),
    date(YEAR, 5, 26),
    date(YEAR, 8, 25),
)

DEMO_FACTORY = InventedSite(
    seed=1040,
    clock=StepClock("Europe/London", YEAR, 30, DEMO_HOLIDAYS),
    climate=Climate(
        mean_degC=9.9,
        seasonal_K=6.1,
        fronts_K=2.6,
        summer_swing_K=3.9,
        winter_swing_K=2.0,
        altitude_m=62.0,
        dew_point_gap_K=3.1,
    ),
    size=FactorySize(
        quiet_kW=980.0,
        production_kW=4750.0,
        dryer_kW=6900.0,
        process_steam_kW=2300.0,
        standby_steam_kW=380.0,
        hall_heating_kW_per_K=42.0,
        heating_limit_degC=14.0,
        stops=(
            (date(YEAR, 1, 1), date(YEAR, 1, 1)),
            (date(YEAR, 7, 28), date(YEAR, 8, 10)),
            (date(YEAR, 12, 24), date(YEAR, 12, 31)),
        ),
    ),
    power=PowerExport(
        dialect=Dialect(
            file="half_hourly_import.csv",
            delimiter=",",
            decimal=".",
            stamp_header="Period ending",
            stamp_format="%d/%m/%Y %H:%M",
            clock="local",
            preamble=("Half-hourly import (invented site),all values in kW",),
        ),
        value_header="Import kW",
        quantity="mean_kW",
        marks="end",
        faults=(
            MeterFault("empty", datetime.fromisoformat("2025-01-23T15:00"), 2.0),
            MeterFault("missing", datetime.fromisoformat("2025-03-18T10:30"), 5.5),
            MeterFault("stuck", datetime.fromisoformat("2025-06-12T00:00"), 24.0),
            MeterFault("missing", datetime.fromisoformat("2025-09-14T03:00"), 1.5),
        ),
    ),
    register=RegisterExport(
        dialect=Dialect(
            file="dryer_gas_meter.csv",
            delimiter=",",
            decimal=".",
            stamp_header="Read at",
            stamp_format="%d/%m/%Y %H:%M",
            clock="local",
        ),
        value_header="Index m3",
        carrier="hot_gas",
        heater_efficiency_hhv_frac=0.80,
        calorific_value_hhv_kWh_per_m3=11.02,
        first_m3=617205.0,
        readings=reading_round(
            YEAR, weekday=0, at=time(5, 0), every_days=7, missed=(5, 12, 25, 26, 38)
        ),
    ),
    bills=BillPlan(
        "steam",
        0.79,
        month_ends(
            YEAR,
            moved={4: 2, 7: -4, 10: -2},
            extra=(date(YEAR, 8, 10), date(YEAR, 12, 23)),
        ),
    ),
    weather=WeatherExport(
        dialect=Dialect(
            file="weather_gmt.csv",
            delimiter=",",
            decimal=".",
            stamp_header="GMT",
            stamp_format="%d/%m/%Y %H:%M",
            clock="standard",
        ),
        headers=("Temp C", "RH %", "Pressure hPa"),
        lost=((datetime.fromisoformat("2025-04-27T02:00"), 3),),
    ),
)

STARTER_FACTORY = InventedSite(
    seed=1077,
    clock=StepClock("Europe/Amsterdam", YEAR, 60),
    climate=Climate(
        mean_degC=10.9,
        seasonal_K=7.2,
        fronts_K=2.8,
        summer_swing_K=4.0,
        winter_swing_K=2.0,
        altitude_m=12.0,
        dew_point_gap_K=3.2,
    ),
    size=FactorySize(
        quiet_kW=520.0,
        production_kW=2450.0,
        dryer_kW=3500.0,
        process_steam_kW=1250.0,
        standby_steam_kW=180.0,
        hall_heating_kW_per_K=22.0,
        heating_limit_degC=14.0,
        stops=(
            (date(YEAR, 1, 1), date(YEAR, 1, 1)),
            (date(YEAR, 8, 4), date(YEAR, 8, 17)),
            (date(YEAR, 12, 24), date(YEAR, 12, 31)),
        ),
    ),
    power=PowerExport(
        dialect=Dialect(
            file="power.csv",
            delimiter=",",
            decimal=".",
            stamp_header="time",
            stamp_format="%Y-%m-%d %H:%M",
            clock="local",
        ),
        value_header="import_kWh",
        quantity="energy_kWh",
        marks="start",
        faults=(MeterFault("missing", datetime.fromisoformat("2025-05-14T11:00"), 3.0),),
    ),
    register=RegisterExport(
        dialect=Dialect(
            file="dryer_gas_meter.csv",
            delimiter=",",
            decimal=".",
            stamp_header="time",
            stamp_format="%Y-%m-%d %H:%M",
            clock="local",
        ),
        value_header="register_m3",
        carrier="hot_gas",
        heater_efficiency_hhv_frac=0.80,
        calorific_value_hhv_kWh_per_m3=9.77,
        first_m3=240118.0,
        readings=reading_round(YEAR, weekday=0, at=time(5, 0), every_days=7),
    ),
    bills=BillPlan(
        "steam",
        0.79,
        month_ends(
            YEAR,
            moved={7: 3},
            extra=(date(YEAR, 8, 17), date(YEAR, 12, 23)),
        ),
    ),
    weather=WeatherExport(
        dialect=Dialect(
            file="weather.csv",
            delimiter=",",
            decimal=".",
            stamp_header="time",
            stamp_format="%Y-%m-%d %H:%M",
            clock="standard",
        ),
        headers=("ambient_degC", "relative_humidity_percent"),
    ),
)

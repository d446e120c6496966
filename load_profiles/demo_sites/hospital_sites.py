"""The invented hospitals: a large one for the demo, a smaller one to start a study from."""

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
from load_profiles.demo_sites.hospital import HospitalSize
from load_profiles.demo_sites.invented_site import InventedSite
from load_profiles.demo_sites.weather import Climate

YEAR = 2025

#: Public holidays of the demo's region that do not fall on a Sunday.
DEMO_HOLIDAYS = (
    date(YEAR, 1, 1),
    date(YEAR, 1, 6),
    date(YEAR, 4, 21),
    date(YEAR, 5, 1),
    date(YEAR, 5, 29),
    date(YEAR, 6, 9),
    date(YEAR, 6, 19),
    date(YEAR, 8, 15),
    date(YEAR, 11, 1),
    date(YEAR, 12, 8),
    date(YEAR, 12, 25),
    date(YEAR, 12, 26),
)

DEMO_HOSPITAL = InventedSite(
    seed=1070,
    clock=StepClock("Europe/Vienna", YEAR, 15, DEMO_HOLIDAYS),
    climate=Climate(
        mean_degC=10.1,
        seasonal_K=10.2,
        fronts_K=3.3,
        summer_swing_K=4.8,
        winter_swing_K=2.4,
        altitude_m=340.0,
        dew_point_gap_K=4.2,
    ),
    size=HospitalSize(
        wards_kW=2700.0,
        clinics_kW=1700.0,
        kitchen_kW=210.0,
        lighting_kW=190.0,
        heat_loss_kW_per_K=330.0,
        heating_limit_degC=16.5,
        domestic_kW=1350.0,
        steam_base_kW=720.0,
        steriliser_kW=820.0,
        laundry_kW=560.0,
        steam_kitchen_kW=430.0,
        humidifier_kW=260.0,
        cooling_base_kW=150.0,
        cooling_kW_per_K=235.0,
        cooling_limit_degC=16.0,
        chiller_cop=4.0,
    ),
    power=PowerExport(
        dialect=Dialect(
            file="power_quarter_hours.csv",
            delimiter=";",
            decimal=",",
            stamp_header="Zeitpunkt",
            stamp_format="%d.%m.%Y %H:%M",
            clock="local",
            preamble=(
                "Lastgang Bezug;Zaehler E-01;erfunden",
                "Zeitraum 01.01.2025 bis 31.12.2025;Ortszeit",
                "",
            ),
        ),
        value_header="Wirkarbeit kWh",
        quantity="energy_kWh",
        marks="start",
        faults=(
            MeterFault("missing", datetime.fromisoformat("2025-02-11T09:15"), 3.5),
            MeterFault("empty", datetime.fromisoformat("2025-05-22T13:00"), 1.25),
            MeterFault("stuck", datetime.fromisoformat("2025-08-19T00:00"), 24.0),
            MeterFault("missing", datetime.fromisoformat("2025-11-08T01:00"), 9.0),
        ),
    ),
    register=RegisterExport(
        dialect=Dialect(
            file="steam_boiler_gas_meter.csv",
            delimiter=";",
            decimal=",",
            stamp_header="Ablesung",
            stamp_format="%d.%m.%Y %H:%M",
            clock="local",
        ),
        value_header="Zaehlerstand m3",
        carrier="steam",
        heater_efficiency_hhv_frac=0.80,
        calorific_value_hhv_kWh_per_m3=11.28,
        first_m3=4182637.0,
        readings=reading_round(
            YEAR, weekday=0, at=time(7, 15), every_days=7, missed=(7, 16, 29, 30, 31, 44, 51)
        ),
    ),
    bills=BillPlan("hot_water", 0.84, month_ends(YEAR, moved={2: -1, 7: 3})),
    weather=WeatherExport(
        dialect=Dialect(
            file="weather_station.csv",
            delimiter=",",
            decimal=".",
            stamp_header="time_utc",
            stamp_format="%Y-%m-%dT%H:%M:%SZ",
            clock="utc",
        ),
        headers=("temperature_degC", "humidity_percent", "pressure_hPa"),
        lost=((datetime.fromisoformat("2025-10-03T14:00"), 5),),
    ),
)

STARTER_HOSPITAL = InventedSite(
    seed=1038,
    clock=StepClock("Europe/Berlin", YEAR, 60),
    climate=Climate(
        mean_degC=10.4,
        seasonal_K=9.0,
        fronts_K=3.2,
        summer_swing_K=4.4,
        winter_swing_K=2.2,
        altitude_m=95.0,
        dew_point_gap_K=4.0,
    ),
    size=HospitalSize(
        wards_kW=1230.0,
        clinics_kW=720.0,
        kitchen_kW=100.0,
        lighting_kW=90.0,
        heat_loss_kW_per_K=150.0,
        heating_limit_degC=16.0,
        domestic_kW=520.0,
        steam_base_kW=300.0,
        steriliser_kW=380.0,
        laundry_kW=220.0,
        steam_kitchen_kW=180.0,
        humidifier_kW=100.0,
        cooling_base_kW=60.0,
        cooling_kW_per_K=110.0,
        cooling_limit_degC=16.0,
        chiller_cop=3.8,
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
        faults=(MeterFault("missing", datetime.fromisoformat("2025-06-17T10:00"), 4.0),),
    ),
    register=RegisterExport(
        dialect=Dialect(
            file="steam_gas_meter.csv",
            delimiter=",",
            decimal=".",
            stamp_header="time",
            stamp_format="%Y-%m-%d %H:%M",
            clock="local",
        ),
        value_header="register_m3",
        carrier="steam",
        heater_efficiency_hhv_frac=0.80,
        calorific_value_hhv_kWh_per_m3=11.2,
        first_m3=812044.0,
        readings=reading_round(YEAR, weekday=2, at=time(8, 0), every_days=14),
    ),
    bills=BillPlan("hot_water", 0.85, month_ends(YEAR)),
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

"""The invented sites: reproducible, realistic, and known to the last kilowatt-hour."""

import re
from collections import Counter
from datetime import timedelta
from pathlib import Path
from zoneinfo import ZoneInfo

import numpy as np
import pandas as pd
import pytest
from numpy.typing import NDArray

import load_profiles.demo_sites
import planner.study
from load_profiles import SiteYear, read_site_year
from load_profiles.declarations import CoolingDegrees
from load_profiles.demo_sites.__main__ import main
from load_profiles.demo_sites.generator import (
    DEMO_SITES,
    STARTER_SITES,
    raw_files,
    true_bills,
    true_year,
)
from load_profiles.demo_sites.invented_site import InventedSite
from load_profiles.demo_sites.noise import NoiseStream
from planner.study.reading import StudyFile, load_study

DEMO_FOLDER = Path(load_profiles.demo_sites.__file__).parent
STARTER_FOLDER = Path(planner.study.__file__).parent / "starters"
SITES = [
    *((site, DEMO_FOLDER / kind) for kind, site in DEMO_SITES.items()),
    *((site, STARTER_FOLDER / kind) for kind, site in STARTER_SITES.items()),
]
each_site = pytest.mark.parametrize(
    ("site", "folder"), SITES, ids=["hospital", "factory", "starter hospital", "starter factory"]
)
each_demo = pytest.mark.parametrize("kind", ["hospital", "factory"])

#: 22.414 litres a mole, NO2 of 46.0055 g/mol: mg/Nm3 of one ppm (ideal gas at 0 degC, 101.325 kPa).
MG_PER_NM3_OF_1_PPM = 46.0055 / 22.414


def local_year(kind: str) -> tuple[pd.DataFrame, pd.DatetimeIndex]:
    """Truth of a demo site, and its hours on the site's own clock."""
    site = DEMO_SITES[kind]
    hourly = true_year(site).hourly
    return hourly, pd.DatetimeIndex(hourly.index).tz_convert(site.clock.time_zone)


def summer_stop(local: pd.DatetimeIndex) -> NDArray[np.bool_]:
    """Hours from 28 July to 10 August, when the works are closed."""
    first = pd.Timestamp("2025-07-28", tz=local.tz)
    return np.asarray((local >= first) & (local < first + pd.Timedelta(days=14)))


def read_as_a_user_would(file: StudyFile) -> SiteYear:
    """The clean year that the study's declarations give."""
    study = file.study
    return read_site_year(
        study.demand,
        study.weather,
        folder=file.folder,
        year=study.site.year,
        time_zone=study.site.time_zone,
        altitude_m=study.site.altitude_m,
    )


@each_site
def test_committed_files_are_written_again_byte_for_byte(site: InventedSite, folder: Path) -> None:
    """The generator gives the committed raw files on every machine."""
    for name, text in raw_files(site).items():
        assert (folder / name).read_bytes() == text.encode(), name


def test_the_command_writes_raw_files_and_brings_bills_up_to_date(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Empty folders and studies with wrong bills come out as they are committed."""
    demo, starters = tmp_path / "demo", tmp_path / "starters"
    for committed, copy in ((DEMO_FOLDER, demo), (STARTER_FOLDER, starters)):
        for kind in DEMO_SITES:
            text = (committed / kind / "study.toml").read_text(encoding="utf-8")
            wrong = re.sub(r"fuel_hhv_kWh = [0-9]+", "fuel_hhv_kWh = 7", text)
            (copy / kind).mkdir(parents=True)
            (copy / kind / "study.toml").write_text(wrong, encoding="utf-8", newline="\n")
    folders = (demo / "hospital", demo / "factory")
    monkeypatch.setattr("load_profiles.demo_sites.__main__.DEMO_FOLDERS", folders)

    assert main([str(starters)]) == 0

    for committed, copy in ((DEMO_FOLDER, demo), (STARTER_FOLDER, starters)):
        for path in (p for p in committed.glob("*/*.*") if p.suffix in {".csv", ".toml"}):
            written = copy / path.relative_to(committed)
            assert written.read_bytes() == path.read_bytes(), path.name


def test_a_folder_that_is_none_is_refused(tmp_path: Path) -> None:
    """A mistyped folder writes nothing and returns 2."""
    assert main([str(tmp_path / "nowhere")]) == 2


def test_the_files_are_small() -> None:
    """Raw files of both demo sites together stay below 3 MB, a starter's file below 600 kB."""
    demo_bytes = sum(path.stat().st_size for path in DEMO_FOLDER.rglob("*.csv"))
    largest_starter_bytes = max(path.stat().st_size for path in STARTER_FOLDER.rglob("*.csv"))

    assert 1e6 < demo_bytes < 3e6
    assert largest_starter_bytes < 600e3


def test_uniform_noise_is_the_published_sequence() -> None:
    """NumPy's manual, `numpy.random.default_rng`: seed 12345 begins with 0.22733602246716966."""
    assert NoiseStream(12345).uniform(1)[0] == 0.22733602246716966


def test_noise_has_the_spread_and_memory_it_claims() -> None:
    """Standard deviation 1, and a correlation of 1/e after the memory (law of AR(1))."""
    noise = NoiseStream(1).persistent(200_000, memory_steps=10.0)

    # 200,000 steps hold about 10,000 independent ones, so three standard errors are 0.03.
    assert noise.mean() == pytest.approx(0.0, abs=0.05)
    assert noise.std() == pytest.approx(1.0, abs=0.03)
    assert np.corrcoef(noise[:-10], noise[10:])[0, 1] == pytest.approx(np.exp(-1.0), abs=0.03)


@each_demo
def test_the_year_has_every_standard_hour(kind: str) -> None:
    """8,760 hours that begin at midnight of 1 January, standard time."""
    hourly = true_year(DEMO_SITES[kind]).hourly
    first = hourly.index[0].tz_convert(DEMO_SITES[kind].clock.time_zone)

    assert len(hourly) == 8760
    assert first.isoformat()[:13] == "2025-01-01T00"
    assert set(np.diff(hourly.index)) == {np.timedelta64(1, "h")}
    assert (hourly.drop(columns="ambient_degC") >= 0.0).all(axis=None)


@pytest.mark.parametrize(
    ("kind", "day_format", "whole", "spring", "autumn"),
    [("hospital", "%d.%m.%Y", 96, 92, 100), ("factory", "%d/%m/%Y", 48, 46, 50)],
)
def test_power_files_follow_the_clock_over_both_changes(
    kind: str, day_format: str, whole: int, spring: int, autumn: int
) -> None:
    """Directive 2000/84/EC: 23 hours on the last Sunday of March, 25 on October's."""
    site = DEMO_SITES[kind]
    # A stamp that marks an interval's end lies in the day before at midnight only.
    lines = raw_files(site)[site.power.dialect.file].splitlines()
    rows = Counter(line[:10] for line in lines)
    days = pd.to_datetime(["2025-03-30", "2025-07-01", "2025-10-26"]).strftime(day_format)

    assert [rows[day] for day in days] == [spring, whole, autumn]


@pytest.mark.parametrize(
    ("kind", "spoilt_hours"),
    # Hours touched, by hand: 09:15 to 12:45 is 4, 13:00 to 14:15 is 2, a stuck day 24, 01:00 to
    # 10:00 is 9; and 15:00 to 17:00 is 2, 10:30 to 16:00 is 6, a stuck day 24, 03:00 to 04:30 is 2.
    [("hospital", 4 + 2 + 24 + 9), ("factory", 2 + 6 + 24 + 2)],
)
def test_a_reader_finds_the_truth_wherever_it_was_measured(kind: str, spoilt_hours: int) -> None:
    """Read as declared, measured power and weather equal the truth to the last digit."""
    truth = true_year(DEMO_SITES[kind])
    measured = truth.power_measured.to_numpy()
    recorded = truth.weather_measured.to_numpy()

    read = read_as_a_user_would(load_study(DEMO_FOLDER / kind))

    assert (~measured).sum() == spoilt_hours
    for column, known in (
        ("power_kW", measured),
        ("ambient_degC", recorded),
        ("relative_humidity_frac", recorded),
        ("pressure_kPa", recorded),
    ):
        np.testing.assert_allclose(
            read.hourly[column].to_numpy()[known],
            truth.hourly[column].to_numpy()[known],
            rtol=1e-12,
            atol=1e-9,
            err_msg=column,
        )
    assert (read.origins["power_kW"].to_numpy() == "measured").sum() == measured.sum()


@each_demo
def test_heat_that_was_only_billed_comes_near_the_truth(kind: str) -> None:
    """Sums close; hours spread by day shapes correlate with the true ones above 0.8."""
    truth = true_year(DEMO_SITES[kind]).hourly

    read = read_as_a_user_would(load_study(DEMO_FOLDER / kind)).hourly

    for carrier in ("steam_kW", "hot_water_kW", "hot_gas_kW"):
        if not truth[carrier].any():
            continue
        assert read[carrier].sum() == pytest.approx(truth[carrier].sum(), rel=1e-3)
        assert np.corrcoef(read[carrier], truth[carrier])[0, 1] > 0.8


@each_site
def test_bills_close_with_the_true_heat(site: InventedSite, folder: Path) -> None:
    """Each bill in the study is the heat of its local days over the heaters' efficiency."""
    bills = getattr(load_study(folder).study.demand, site.bills.carrier)
    heat_kW = true_year(site).hourly[f"{site.bills.carrier}_kW"]
    zone = ZoneInfo(site.clock.time_zone)

    assert bills.heater_efficiency_hhv_frac == site.bills.heater_efficiency_hhv_frac
    for bill, true in zip(bills.bill, true_bills(site), strict=True):
        start = pd.Timestamp(bill.first_day, tz=zone)
        end = pd.Timestamp(bill.last_day + timedelta(days=1), tz=zone)
        heat_kWh = heat_kW[(heat_kW.index >= start) & (heat_kW.index < end)].sum()
        # Half a kilowatt-hour is the rounding of the bill.
        assert bill.fuel_hhv_kWh == true.fuel_hhv_kWh
        assert bill.fuel_hhv_kWh * bills.heater_efficiency_hhv_frac == pytest.approx(
            heat_kWh, abs=0.5
        )
    billed_days = sum((bill.last_day - bill.first_day).days + 1 for bill in bills.bill)
    assert billed_days == 365


@each_site
def test_the_gas_register_closes_with_the_true_heat(site: InventedSite, folder: Path) -> None:
    """Last less first reading is the year's heat over calorific value and efficiency."""
    register = site.register
    study = getattr(load_study(folder).study.demand, register.carrier)
    table = pd.read_csv(folder / study.file, sep=study.delimiter)
    readings_m3 = table[study.value_column]
    heat_kWh = true_year(site).hourly[f"{register.carrier}_kW"].sum()

    used_m3 = float(readings_m3.iloc[-1] - readings_m3.iloc[0])
    fuel_hhv_kWh = used_m3 * study.calorific_value_hhv_kWh_per_m3

    # Two readings of whole cubic metres of about 11 kWh.
    assert fuel_hhv_kWh * study.heater_efficiency_hhv_frac == pytest.approx(heat_kWh, abs=12.0)
    assert readings_m3.is_monotonic_increasing
    assert 25 < len(readings_m3) < 60


def test_the_hospital_uses_power_like_one() -> None:
    """Large hospitals, common practice: load factor 0.60 to 0.80, night over day 0.55 to 0.80."""
    hourly, local = local_year("hospital")
    power_kW, hour, weekday = hourly["power_kW"], local.hour, local.day_of_week < 5
    night = power_kW[weekday & (hour < 5)].mean()
    day = power_kW[weekday & (hour >= 9) & (hour < 16)].mean()

    assert 3000 < power_kW.mean() < 6000
    assert 0.60 < power_kW.mean() / power_kW.max() < 0.80
    assert 0.55 < night / day < 0.80
    # 1,500 beds: 15 to 30 MWh of power a bed and year (common practice).
    assert 15.0 < power_kW.sum() / 1500 / 1000 < 30.0


def test_the_hospital_uses_heat_like_one() -> None:
    """Common practice: summer heat 15 to 35 % of winter's; steam twice as high by day."""
    hourly, local = local_year("hospital")
    month, hour = local.month, local.hour
    water_kW, steam_kW = hourly["hot_water_kW"], hourly["steam_kW"]
    winter, summer = month.isin([12, 1, 2]), month.isin([6, 7, 8])
    working_noon = (local.day_of_week < 5) & (hour >= 8) & (hour < 13)

    assert 0.15 < water_kW[summer].mean() / water_kW[winter].mean() < 0.35
    assert 1.5 < steam_kW[working_noon].mean() / steam_kW[hour < 4].mean() < 4.0
    # Sterilisers and kitchens hardly know the season.
    assert 0.7 < steam_kW[summer].mean() / steam_kW[winter].mean() < 1.0
    # 1,500 beds: 20 to 40 MWh of heat a bed and year (common practice).
    assert 20.0 < (water_kW + steam_kW).sum() / 1500 / 1000 < 40.0


def test_the_hospital_cools_in_summer() -> None:
    """Cooling peaks on hot afternoons, rests on its base in winter, and fits the declared total."""
    hourly, local = local_year("hospital")
    cooling_kW = hourly["cooling_kW"]
    declared = load_study(DEMO_FOLDER / "hospital").study
    peak = local[int(cooling_kW.to_numpy().argmax())]

    assert peak.month in {6, 7, 8}
    assert 11 <= peak.hour <= 18
    assert cooling_kW[local.month == 1].max() < 0.1 * cooling_kW.max()
    assert isinstance(declared.demand.cooling, CoolingDegrees)
    assert cooling_kW.sum() / 1000 == pytest.approx(
        declared.demand.cooling.annual_cooling_MWh, rel=0.03
    )
    assert declared.separate_supply.chiller is not None
    assert cooling_kW.max() < declared.separate_supply.chiller.capacity_kW


def test_the_factory_uses_power_like_two_shifts() -> None:
    """Two shifts, common practice: load factor 0.40 to 0.65, Sundays below 0.4 of weekdays."""
    hourly, local = local_year("factory")
    power_kW, weekday = hourly["power_kW"], local.day_of_week
    stop = summer_stop(local)

    assert 0.40 < power_kW.mean() / power_kW.max() < 0.65
    assert power_kW[weekday == 6].mean() / power_kW[weekday < 5].mean() < 0.4
    assert power_kW[stop].max() < 0.4 * power_kW[~stop & (weekday < 5)].mean()


def test_the_dryers_rest_when_nobody_works() -> None:
    """No hot gas on Sundays, at night and in the summer stop; most of it in the two shifts."""
    hourly, local = local_year("factory")
    hot_gas_kW = hourly["hot_gas_kW"]
    shifts = (local.day_of_week < 5) & (local.hour >= 6) & (local.hour < 22)
    stop = summer_stop(local)

    assert hot_gas_kW[local.day_of_week == 6].max() == 0.0
    assert hot_gas_kW[stop].max() == 0.0
    assert hot_gas_kW[(local.hour >= 23) | (local.hour < 4)].max() == 0.0
    assert hot_gas_kW[shifts].sum() > 0.85 * hot_gas_kW.sum()


@pytest.mark.parametrize(
    ("kind", "mean_degC", "standard_hPa"),
    # ISO 2533 table: 977.73 hPa at 300 m and 966.11 at 400 m, so 973.08 at 340 m; 1013.25 at 0 m
    # and 1001.29 at 100 m, so 1005.83 at 62 m (from memory).
    [("hospital", 10.5, 973.1), ("factory", 10.0, 1005.8)],
)
def test_the_weather_is_plausible(kind: str, mean_degC: float, standard_hPa: float) -> None:
    """Mean, seasons, daily range, humidity and pressure of a temperate lowland."""
    hourly, local = local_year(kind)
    ambient_degC = hourly["ambient_degC"]
    daily = ambient_degC.groupby(local.date)
    range_K = daily.max() - daily.min()
    month = pd.DatetimeIndex(range_K.index).month
    summer, winter = month.isin([6, 7, 8]), month.isin([12, 1, 2])
    humidity_frac = hourly["relative_humidity_frac"]

    assert ambient_degC.mean() == pytest.approx(mean_degC, abs=1.0)
    assert -20.0 < ambient_degC.min() < 0.0
    assert 25.0 < ambient_degC.max() < 37.0
    assert 7.0 < range_K[summer].mean() < 13.0
    assert 4.0 < range_K[winter].mean() < 8.0
    assert 0.68 < humidity_frac.mean() < 0.88
    assert 0.01 < (humidity_frac >= 0.97).mean() < 0.15
    # Damp nights and drier afternoons.
    morning, afternoon = humidity_frac[local.hour == 5], humidity_frac[local.hour == 15]
    assert morning.mean() > afternoon.mean() + 0.08
    assert 10.0 * hourly["pressure_kPa"].mean() == pytest.approx(standard_hPa, abs=3.0)
    assert 5.0 < 10.0 * hourly["pressure_kPa"].std() < 12.0


@each_site
def test_studies_are_valid_and_name_their_own_files(site: InventedSite, folder: Path) -> None:
    """Each study passes every check and declares what the generator wrote."""
    study = load_study(folder).study

    assert study.site.time_zone == site.clock.time_zone
    assert study.site.altitude_m == site.climate.altitude_m
    assert study.demand.power.file == site.power.dialect.file
    assert study.demand.power.interval_minutes == site.clock.step_minutes
    assert study.weather.file == site.weather.dialect.file
    assert "invented" in f"{study.site.place} {study.report.consultant}"


@each_site
def test_heaters_lose_what_the_metered_year_says(site: InventedSite, folder: Path) -> None:
    """Full-load efficiency less standing loss gives the year's declared efficiency within 2 %."""
    study = load_study(folder).study
    truth = true_year(site).hourly

    for heater in study.separate_supply.heater:
        mean_kW = truth[f"{heater.serves}_kW"].mean()
        kept_frac = mean_kW / (mean_kW + heater.standing_loss_frac * heater.capacity_kW)
        year_frac = getattr(study.demand, heater.serves).heater_efficiency_hhv_frac
        assert heater.efficiency_basis == "HHV"
        assert heater.efficiency_frac * kept_frac == pytest.approx(year_frac, rel=0.02)
        assert truth[f"{heater.serves}_kW"].max() < heater.capacity_kW


def test_one_hospital_machine_meets_the_limit_and_one_does_not() -> None:
    """Directive (EU) 2015/2193, annex II part 2: 50 mg/Nm3 for a new gas turbine on natural gas."""
    large, small = load_study(DEMO_FOLDER / "hospital").study.option

    assert large.unit.sheet.nox.nox_ppm_15O2 * MG_PER_NM3_OF_1_PPM == pytest.approx(30.8, abs=0.05)
    assert small.unit.sheet.nox.nox_ppm_15O2 * MG_PER_NM3_OF_1_PPM == pytest.approx(51.3, abs=0.05)
    assert large.store is not None
    assert small.store is None


@pytest.mark.parametrize("kind", ["hospital", "factory"])
def test_starters_say_what_to_replace(kind: str) -> None:
    """A starter calls itself invented and marks the fields that a user must replace."""
    text = (STARTER_FOLDER / kind / "study.toml").read_text(encoding="utf-8")
    lines = text.splitlines()

    assert "EVERY number in it is invented" in text
    assert sum("REPLACE" in line for line in lines) > 25
    assert max(len(line) for line in lines) <= 120
    # The first rows shown in its comments are those of the file.
    first = (STARTER_FOLDER / kind / "power.csv").read_text(encoding="utf-8").splitlines()[:2]
    assert all(f"#     {row}" in lines for row in first)

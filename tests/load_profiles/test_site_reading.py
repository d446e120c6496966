"""A whole site: every file read, every fault told, one clean year handed on."""

import subprocess
import sys
from dataclasses import replace
from datetime import date, timedelta
from pathlib import Path
from typing import Any

import numpy as np
import pytest

import load_profiles
from load_profiles import CARRIERS, ProfileError, SiteYear, read_site_year
from load_profiles.declarations import DemandFiles, WeatherFile
from tests.load_profiles.known_year import Export, known_power_kW

WEATHER = WeatherFile(file="weather.csv", clock="standard", pressure_column=None)
BILLS: dict[str, Any] = {
    "source": "monthly_bills",
    "heater_efficiency_hhv_frac": 0.8,
    "shape": "hospital_heating",
    "base_shape": "hospital_hot_water",
    "bill": tuple(
        {
            "first_day": date(2025, month, 1),
            "last_day": date(2025, month, last),
            "fuel_hhv_kWh": 1000.0 * month,
        }
        for month, last in enumerate((31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31), start=1)
    ),
}
LAST_DAYS_2024 = [date(2024, month, 1) - timedelta(days=1) for month in range(2, 13)] + [
    date(2024, 12, 31)
]
REGISTER = {
    "source": "gas_register",
    "file": "gas.csv",
    "value_column": "m3",
    "calorific_value_hhv_kWh_per_m3": 11.0,
    "heater_efficiency_hhv_frac": 0.8,
    "shape": "hospital_steam",
}
COOLING = {"source": "cooling_degrees", "annual_cooling_MWh": 500.0, "shape": "hospital_cooling"}


def meter(**changes: Any) -> dict[str, Any]:
    """A meter of mean power in quarter-hours."""
    keys: dict[str, Any] = {
        "source": "interval_meter",
        "file": "power.csv",
        "value_column": "power",
        "quantity": "mean_kW",
        "interval_minutes": 15,
    }
    return {**keys, **changes}


def write_weather(folder: Path) -> None:
    """A year of weather with a warm summer."""
    hour = np.arange(8760)
    ambient_degC = np.round(10.0 - 12.0 * np.cos(2 * np.pi * hour / 8760), 2)
    header = ("time", "ambient_degC", "relative_humidity_percent")
    export = Export(minutes=60, clock="standard", header=header)
    export.write(folder / "weather.csv", ambient_degC, np.full(8760, 70.0))


def write_site(folder: Path) -> np.ndarray:
    """Files of a whole site; hands back its power by the quarter-hour."""
    power_kW = known_power_kW(8760 * 4)
    Export().write(folder / "power.csv", power_kW)
    write_weather(folder)
    gas = "time,m3\n2025-01-01 00:00,0\n2025-05-04 07:00,4000\n2026-01-01 00:00,9000\n"
    (folder / "gas.csv").write_text(gas, encoding="utf-8")
    return power_kW


def read(folder: Path, *, weather: WeatherFile = WEATHER, **demand: Any) -> SiteYear:
    """The site of the folder."""
    files = DemandFiles.model_validate({"power": meter(), **demand})
    return read_site_year(
        files, weather, folder=folder, year=2025, time_zone="Europe/Berlin", altitude_m=0.0
    )


def test_site_year_holds_what_the_files_say(tmp_path: Path) -> None:
    """Power is the mean of its quarter-hours; bills, register and cooling close on their totals."""
    power_kW = write_site(tmp_path)

    site = read(tmp_path, hot_water=BILLS, steam=REGISTER, cooling=COOLING)

    np.testing.assert_allclose(
        site.hourly["power_kW"], power_kW.reshape(-1, 4).mean(axis=1), rtol=1e-14
    )
    assert site.hourly["hot_water_kW"].sum() == pytest.approx(78_000.0 * 0.8, rel=1e-9)
    assert site.hourly["steam_kW"].sum() == pytest.approx(9000.0 * 11.0 * 0.8, rel=1e-9)
    assert site.hourly["cooling_kW"].sum() == pytest.approx(500_000.0, rel=1e-9)
    assert not site.hourly["hot_gas_kW"].any()
    np.testing.assert_allclose(site.hourly["pressure_kPa"], 101.325)


def test_site_year_is_complete_and_non_negative(tmp_path: Path) -> None:
    """Every hour of 2025 stands there once, from 1 January 00:00 CET, without a gap."""
    write_site(tmp_path)

    site = read(tmp_path, hot_water=BILLS, steam=REGISTER, cooling=COOLING)

    assert len(site.hourly) == 8760
    assert str(site.hourly.index[0]) == "2024-12-31 23:00:00+00:00"
    assert site.hourly.index.is_monotonic_increasing
    assert site.hourly.index.is_unique
    assert not site.hourly.isna().to_numpy().any()
    assert (site.hourly[[f"{name}_kW" for name in CARRIERS]].to_numpy() >= 0.0).all()


def test_southern_leap_year_closes_too(tmp_path: Path) -> None:
    """Sydney 2024: 8784 hours from 1 January 00:00 AEST, and the bills come to their total."""
    export = Export(time_zone="Australia/Sydney", standard_offset_h=10.0, year=2024)
    power_kW = known_power_kW(8784 * 4)
    export.write(tmp_path / "power.csv", power_kW)
    header = ("time", "ambient_degC", "relative_humidity_percent")
    ambient_degC = np.round(15.0 + 8.0 * np.cos(2 * np.pi * np.arange(8784) / 8784), 2)
    replace(export, minutes=60, clock="standard", header=header).write(
        tmp_path / "weather.csv", ambient_degC, np.full(8784, 60.0)
    )
    bills = [
        {**bill, "first_day": bill["first_day"].replace(year=2024), "last_day": last}
        for bill, last in zip(BILLS["bill"], LAST_DAYS_2024, strict=True)
    ]

    site = read_site_year(
        DemandFiles.model_validate({"power": meter(), "steam": {**BILLS, "bill": tuple(bills)}}),
        WEATHER,
        folder=tmp_path,
        year=2024,
        time_zone="Australia/Sydney",
        altitude_m=20.0,
    )

    np.testing.assert_allclose(
        site.hourly["power_kW"], power_kW.reshape(-1, 4).mean(axis=1), rtol=1e-14
    )
    assert str(site.hourly.index[0]) == "2023-12-31 14:00:00+00:00"
    assert site.hourly["steam_kW"].sum() == pytest.approx(78_000.0 * 0.8, rel=1e-9)


def test_origins_tell_how_each_hour_is_known(tmp_path: Path) -> None:
    """A lost quarter-hour makes its hour a filled one; bills, register, cooling are no meters."""
    write_site(tmp_path)
    lost = Export(left_out=frozenset({4000}))
    lost.write(tmp_path / "power.csv", known_power_kW(8760 * 4))

    site = read(tmp_path, hot_water=BILLS, steam=REGISTER, cooling=COOLING)

    power = site.origins["power_kW"]
    assert power[power == "filled"].index.tolist() == [site.hourly.index[1000]]
    assert set(site.origins["hot_water_kW"]) == {"billed"}
    assert set(site.origins["steam_kW"]) == {"billed"}
    assert set(site.origins["cooling_kW"]) == {"synthesised"}
    assert "hot_gas_kW" not in site.origins


def test_within_step_excess_by_month(tmp_path: Path) -> None:
    """The month's highest quarter-hour less the mean of its hour, taken by hand from the file."""
    power_kW = write_site(tmp_path)
    power_kW[2 * 96 + 40] = 1800.0  # 3 January, 10:00
    Export().write(tmp_path / "power.csv", power_kW)

    site = read(tmp_path)

    in_hour_kW = power_kW[2 * 96 + 40 : 2 * 96 + 44]
    assert site.within_step_excess_kW[1] == pytest.approx(1800.0 - in_hour_kW.mean())
    assert (site.within_step_excess_kW >= 0.0).all()


def test_hourly_power_leaves_peaks_unknown(tmp_path: Path) -> None:
    """A meter by the hour gives no excess and a finding that asks for attention."""
    write_site(tmp_path)
    Export(minutes=60).write(tmp_path / "power.csv", known_power_kW(8760))

    site = read(tmp_path, power=meter(interval_minutes=60))

    assert not site.within_step_excess_kW.any()
    assert [f.severity for f in site.findings if "within the hour" in f.what] == ["attention"]


def test_zero_power_is_kept_and_told(tmp_path: Path) -> None:
    """Two hours of exactly zero are kept, since a site can be cut off, and a look is asked for."""
    power_kW = write_site(tmp_path)
    power_kW[400:408] = 0.0
    Export().write(tmp_path / "power.csv", power_kW)

    site = read(tmp_path)

    assert site.hourly["power_kW"].iloc[100:102].tolist() == [0.0, 0.0]
    assert any("2 h of exactly zero power" in finding.what for finding in site.findings)


def test_all_faults_of_all_files_come_together(tmp_path: Path) -> None:
    """No power file, letters in the weather, a falling register, bills with a gap: all at once."""
    write_site(tmp_path)
    (tmp_path / "power.csv").unlink()
    broken = (tmp_path / "weather.csv").read_text("utf-8").replace(",70\n", ",x\n", 1)
    (tmp_path / "weather.csv").write_text(broken, encoding="utf-8")
    (tmp_path / "gas.csv").write_text(
        "time,m3\n2025-01-01 00:00,9\n2025-05-04 07:00,4\n2026-01-01 00:00,90\n", encoding="utf-8"
    )
    gap = {**BILLS, "bill": (*BILLS["bill"][:3], *BILLS["bill"][4:])}

    with pytest.raises(ProfileError) as caught:
        read(tmp_path, hot_water=gap, steam=REGISTER, cooling=COOLING)

    assert [fault.path for fault in caught.value.faults] == [
        "weather.csv row 2",
        "power.csv",
        "gas.csv row 3",
        "demand.hot_water.bill[4].first_day",
    ]


def test_unknown_zone_is_refused(tmp_path: Path) -> None:
    """The site's zone is checked before any file."""
    with pytest.raises(ProfileError, match=r"site\.time_zone"):
        read_site_year(
            DemandFiles.model_validate({"power": meter()}),
            WEATHER,
            folder=tmp_path,
            year=2025,
            time_zone="Berlin",
            altitude_m=0.0,
        )


def test_declarations_load_without_pandas() -> None:
    """A command line that only checks a study must start at once."""
    code = (
        "import sys, load_profiles.declarations; from load_profiles import Fault, Finding, "
        "ProfileError; print({'pandas', 'numpy', 'scipy'} & set(sys.modules))"
    )
    folder = Path(load_profiles.__file__).parents[1]

    done = subprocess.run(
        [sys.executable, "-c", code], capture_output=True, text=True, check=True, cwd=folder
    )

    assert done.stdout.strip() == "set()"


def test_names_that_are_not_there_are_refused() -> None:
    """A slip in a name is an AttributeError, as of any module."""
    with pytest.raises(AttributeError, match="no attribute 'read_site_yaer'"):
        load_profiles.__getattr__("read_site_yaer")

"""Degree-days against definitions and a public weather record."""

import csv
from pathlib import Path

import numpy as np
import pandas as pd
import pytest

from load_profiles.arrays import FloatArray
from load_profiles.clock import SiteClock
from load_profiles.cooling import spread_cooling
from load_profiles.day_shapes import day_shape, shape_in_hours, shape_names
from load_profiles.declarations import CoolingDegrees
from load_profiles.degree_days import (
    cooling_degree_hours,
    fit_heat_line,
    heating_degree_days,
    heating_degree_hours,
)
from load_profiles.faults import ProfileError

BERLIN = SiteClock("Europe/Berlin", 2025)
GREENSBORO = Path(__file__).parent / "data" / "greensboro_tmy3.csv"


def greensboro_degC() -> FloatArray:
    """Hourly dry bulb of the typical year of Greensboro, North Carolina (NREL, TMY3 723170)."""
    lines = GREENSBORO.read_text("utf-8").splitlines()[1:]
    return np.array([float(row["ambient_degC"]) for row in csv.DictReader(lines)])


def test_degree_days_of_a_public_typical_year() -> None:
    """Degree-days of Greensboro near the climate normals of its airport.

    NOAA 1971-2000, Greensboro AP, base 65 degF: heating 3848, cooling 1332 degF days (from
    memory), so 2138 and 740 K d. A typical year is joined from single months of other decades
    and may differ by a tenth.
    """
    ambient_degC = greensboro_degC()
    base_degC = (65.0 - 32.0) / 1.8

    heating = heating_degree_days(ambient_degC, base_degC).sum()
    cooling = cooling_degree_hours(ambient_degC.reshape(-1, 24).mean(axis=1), base_degC).sum()

    assert heating == pytest.approx(2138.0, rel=0.10)
    assert cooling == pytest.approx(740.0, rel=0.10)


def test_degree_hours_exceed_degree_days() -> None:
    """Jensen: the mean of hours below the base is at least the day's mean below it."""
    ambient_degC = greensboro_degC()

    by_hour = heating_degree_hours(ambient_degC, 15.5).reshape(-1, 24).mean(axis=1)

    assert np.all(by_hour >= heating_degree_days(ambient_degC, 15.5) - 1e-9)


def test_heating_less_cooling_is_the_mean_below_the_base() -> None:
    """max(b - T, 0) - max(T - b, 0) = b - T for each hour."""
    ambient_degC = greensboro_degC()

    difference = heating_degree_hours(ambient_degC, 18.0) - cooling_degree_hours(ambient_degC, 18.0)

    np.testing.assert_allclose(difference, 18.0 - ambient_degC, atol=1e-12)


def test_line_has_the_normal_equations_of_least_squares() -> None:
    """With the base given, the line equals numpy's least squares of the same three bills."""
    rng = np.random.default_rng(7)
    ambient_degC = rng.normal(8.0, 8.0, 96 * 24)
    period = np.arange(96 * 24) // (8 * 24)
    heat_kWh = rng.uniform(2000.0, 3000.0, 12) + 30.0 * np.arange(12)

    line = fit_heat_line(heat_kWh, period, ambient_degC, base_temperature_degC=12.0)

    degree_days = np.maximum(12.0 - ambient_degC, 0.0).reshape(12, -1).sum(axis=1) / 24.0
    design = np.column_stack((np.full(12, 8.0), degree_days))
    base, slope = np.linalg.lstsq(design, heat_kWh, rcond=None)[0]
    assert line.base_kWh_per_day == pytest.approx(base, rel=1e-9)
    assert line.slope_kWh_per_K_day == pytest.approx(slope, rel=1e-9)
    assert not line.fitted


def cooling_of(**changes: float | str) -> CoolingDegrees:
    """A declaration of 1000 MWh of cooling."""
    keys = {"source": "cooling_degrees", "annual_cooling_MWh": 1000.0, "shape": "hospital_cooling"}
    return CoolingDegrees.model_validate({**keys, **changes})


def test_cooling_closes_on_its_total() -> None:
    """1000 MWh over a typical year, a fifth of it whatever the weather: 22.83 kW a mean hour."""
    cooling_kW, finding = spread_cooling(
        cooling_of(), greensboro_degC(), path="demand.cooling", site=BERLIN
    )

    assert cooling_kW.sum() == pytest.approx(1e6, rel=1e-12)
    cold_kWh = cooling_kW[greensboro_degC() <= 16.0].sum()
    assert 0.0 < cold_kWh < 0.2e6
    assert finding.severity == "attention"


def test_cooling_without_a_warm_hour_is_refused() -> None:
    """A base above the year's warmest hour leaves nothing to spread by."""
    with pytest.raises(ProfileError, match=r"base_temperature_degC = 36: must be below .* 35\.6"):
        spread_cooling(
            cooling_of(base_temperature_degC=36.0),
            greensboro_degC(),
            path="demand.cooling",
            site=BERLIN,
        )


@pytest.mark.parametrize("name", shape_names())
def test_shape_means_one_over_a_week(name: str) -> None:
    """Every shape has a mean of one over a week of five weekdays, Saturday and Sunday."""
    week = pd.date_range("2025-01-06", periods=168, freq="h")

    factors = shape_in_hours(day_shape(name, path="shape"), week)

    assert factors.mean() == pytest.approx(1.0, rel=1e-12)
    assert factors.min() >= 0.0


def test_unknown_shape_names_the_nearest() -> None:
    """A slip in a shape's name is answered with the nearest."""
    with pytest.raises(ProfileError) as caught:
        day_shape("hospital_steem", path="demand.steam.shape")

    assert str(caught.value) == (
        'demand.steam.shape = "hospital_steem": is no day shape; nearest is "hospital_steam"'
    )


def test_shapes_state_their_source() -> None:
    """Each shape file says in its head where it comes from."""
    folder = Path(__file__).parents[2] / "load_profiles" / "shapes"

    for name in shape_names():
        head = (folder / f"{name}.csv").read_text("utf-8").splitlines()[:2]
        assert head[1].startswith("# Source: ")

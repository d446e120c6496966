"""Bills become hourly heat in which every bill closes."""

from datetime import date, timedelta
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from load_profiles import ProfileError
from load_profiles.arrays import FloatArray
from load_profiles.bills import spread_bills
from load_profiles.clock import SiteClock
from load_profiles.declarations import MonthlyBill, MonthlyBills

BERLIN = SiteClock("Europe/Berlin", 2025)
HOURS = np.arange(8760)
#: A year of weather: cold at its ends, with a day's swing.
AMBIENT_degC = 10.0 - 11.0 * np.cos(2 * np.pi * HOURS / 8760) - 4.0 * np.cos(2 * np.pi * HOURS / 24)


def bills_of(first_days: list[date], fuel_kWh: list[float], **changes: Any) -> MonthlyBills:
    """Bills that follow each other to the end of the year."""
    last_days = [day - timedelta(days=1) for day in first_days[1:]] + [date(2025, 12, 31)]
    keys: dict[str, Any] = {
        "source": "monthly_bills",
        "heater_efficiency_hhv_frac": 0.8,
        "shape": "hospital_heating",
        "base_shape": "hospital_hot_water",
        "bill": tuple(
            MonthlyBill(first_day=first, last_day=last, fuel_hhv_kWh=fuel)
            for first, last, fuel in zip(first_days, last_days, fuel_kWh, strict=True)
        ),
    }
    return MonthlyBills(**{**keys, **changes})


MONTHS = [date(2025, month, 1) for month in range(1, 13)]


def spread(bills: MonthlyBills, ambient_degC: FloatArray = AMBIENT_degC) -> FloatArray:
    """Hourly heat of the bills."""
    return spread_bills(bills, ambient_degC, path="demand.hot_water", site=BERLIN).heat_kW


@settings(max_examples=25, deadline=None)
@given(
    cuts=st.sets(st.integers(2, 363), min_size=5, max_size=20),
    fuels=st.lists(st.floats(0.0, 1e7), min_size=21, max_size=21).filter(lambda x: max(x[:6]) > 1),
)
def test_every_bill_closes(cuts: set[int], fuels: list[float]) -> None:
    """Whatever the reading days and the fuel, each bill's hours come to fuel x efficiency."""
    days = [0, *sorted(cuts)]
    bills = bills_of([date(2025, 1, 1) + timedelta(days=day) for day in days], fuels[: len(days)])

    heat_kW = spread(bills)

    for first, last, bill in zip(days, [*days[1:], 365], bills.bill, strict=True):
        billed_kWh = heat_kW[first * 24 : last * 24].sum()
        assert billed_kWh == pytest.approx(bill.fuel_hhv_kWh * 0.8, rel=1e-9, abs=1e-9)
    assert heat_kW.min() >= 0.0


def test_known_building_is_found_again() -> None:
    """Bills made of 2400 kWh a day and 50 kWh a degree-hour below 15 degC give both back."""
    degree_h = np.maximum(15.0 - AMBIENT_degC, 0.0)
    heat_kWh = 100.0 + 50.0 * degree_h
    starts = [(day - date(2025, 1, 1)).days * 24 for day in MONTHS]
    fuel_kWh = (np.add.reduceat(heat_kWh, starts) / 0.8).tolist()
    bills = bills_of(MONTHS, fuel_kWh, shape="even", base_shape="even")

    year = spread_bills(bills, AMBIENT_degC, path="demand.hot_water", site=BERLIN)

    assert year.line.base_temperature_degC == 15.0
    assert year.line.base_kWh_per_day == pytest.approx(2400.0, rel=1e-9)
    assert year.line.slope_kWh_per_K_day == pytest.approx(1200.0, rel=1e-9)
    assert year.line.r_squared == pytest.approx(1.0, abs=1e-12)
    np.testing.assert_allclose(year.heat_kW, heat_kWh, rtol=1e-9)
    assert "below 15 degC (fitted), R2 = 1.00" in year.findings[0].what


def test_bill_that_begins_before_the_year_gives_its_days() -> None:
    """A bill from 17 December to 31 January has 46 days, 31 of them in the year."""
    bills = bills_of([date(2024, 12, 17), *MONTHS[1:]], [46_000.0, *[20_000.0] * 11])

    year = spread_bills(bills, AMBIENT_degC, path="demand.hot_water", site=BERLIN)

    assert year.heat_kW[:744].sum() == pytest.approx(31_000.0 * 0.8, rel=1e-9)
    assert year.findings[1].where == "demand.hot_water.bill[1]"


def test_summer_bill_without_degree_days_still_closes() -> None:
    """Fuel in a month without heating, and none in the base, is spread by the hours alone."""
    hot_degC = np.full(8760, 30.0)
    bills = bills_of(MONTHS, [12_000.0] * 12, base_temperature_degC=15.0)

    assert spread(bills, hot_degC).sum() == pytest.approx(12 * 12_000.0 * 0.8, rel=1e-9)


def test_bills_that_do_not_follow_each_other_are_refused_together() -> None:
    """A gap, a late start and an unknown shape come in one refusal."""
    first_days = [date(2025, 1, 3), *MONTHS[1:]]
    bills = bills_of(first_days, [1.0] * 12, shape="hospital_heatin")
    gap = bills.bill[2].model_copy(update={"last_day": date(2025, 3, 29)})
    bills = bills.model_copy(update={"bill": (*bills.bill[:2], gap, *bills.bill[3:])})

    with pytest.raises(ProfileError) as caught:
        spread(bills)

    follow, cover, shape = str(caught.value).splitlines()
    assert follow == (
        "demand.hot_water.bill[4].first_day = 2025-04-01: must be 2025-03-30, "
        "the day after the bill before"
    )
    assert cover == (
        "demand.hot_water.bill[1].first_day = 2025-01-03: must be 2025-01-01 or earlier: "
        "bills must cover 2025"
    )
    assert shape == (
        'demand.hot_water.shape = "hospital_heatin": is no day shape; nearest is "hospital_heating"'
    )


def test_too_few_bills_are_refused() -> None:
    """Three bills cannot tell the base temperature too, so it is asked for."""
    bills = bills_of([date(2025, 1, 1), date(2025, 5, 1), date(2025, 9, 1)], [3.0, 1.0, 2.0])

    with pytest.raises(
        ProfileError, match=r"5 or more are needed .*, or give base_temperature_degC"
    ):
        spread(bills)
    assert spread(bills.model_copy(update={"base_temperature_degC": 15.0})).sum() == pytest.approx(
        4.8
    )

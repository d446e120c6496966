"""Prices of the dispatch and the bill of the same flows agree, and each line is right."""

import numpy as np
import pandas as pd
import pytest

from planner.market import bill, prices, wear
from planner.market.prices import Prices
from planner.study.sections import Unit
from planner.study.study import Study
from tests.planner.market.small_study import (
    RoundGas,
    idle_flows,
    random_flows,
    small_study,
    small_tariff,
    small_unit,
    small_year,
)

FULL_TARIFF = small_tariff(
    energy=(
        {
            "name": "Winter day",
            "months": (1, 2, 3, 10, 11, 12),
            "from_hour": 6,
            "to_hour": 22,
            "price_per_kWh": 0.19,
        },
        {
            "name": "Summer day",
            "months": (4, 5, 6, 7, 8, 9),
            "from_hour": 6,
            "to_hour": 22,
            "price_per_kWh": 0.16,
        },
        {"name": "Night", "from_hour": 22, "to_hour": 6, "price_per_kWh": 0.11},
    ),
    demand=(
        {"name": "Any time", "rate_per_kW_month": 3.0, "interval_minutes": 30},
        {
            "name": "Winter evening",
            "months": (1, 2, 11, 12),
            "weekdays": ("mon", "tue", "wed", "thu", "fri"),
            "from_hour": 16,
            "to_hour": 19,
            "rate_per_kW_month": 9.0,
            "interval_minutes": 60,
        },
    ),
    levy_per_kWh=0.02,
    standing_per_month=150.0,
    export_limit_kW=2000.0,
    export_price_per_kWh=0.05,
)

FULL_GAS = {
    "commodity_per_hhv_kWh": 0.030,
    "transport_per_hhv_kWh": 0.006,
    "levy_per_hhv_kWh": 0.002,
    "standing_per_month": 90.0,
    "carbon_price_per_t": 60.0,
}


def _full_study() -> Study:
    """A study with every kind of charge."""
    return small_study(power_tariff=FULL_TARIFF, gas_tariff=FULL_GAS)


def _objective(charged: Prices, flows: pd.DataFrame, unit: Unit) -> float:
    """The dispatch's cost of a year, from `Prices` and the unit's wear alone."""
    step_h = charged.step_h
    worn = wear(unit)
    burners = ["heater_fuel_lhv_kW", "unit_fuel_lhv_kW", "start_fuel_lhv_kW"]
    hourly = (
        charged.import_per_kWh * flows["grid_import_kW"]
        - charged.export_per_kWh * flows["grid_export_kW"]
        + charged.fuel_per_lhv_kWh * flows[burners].sum(axis=1)
        + worn.cost_per_run_hour * flows["unit_on"]
        + worn.cost_per_kWh * flows["unit_power_kW"]
    )
    peaks = 0.0
    for charge in charged.demand_charges:
        for period in np.unique(charge.period[charge.counted]):
            counted = charge.counted & (charge.period == period)
            peak_kW = flows["grid_import_kW"].to_numpy()[counted].max() + charge.excess_kW[period]
            peaks += charge.rate_per_kW[period] * peak_kW
    starts = worn.cost_per_start * flows["unit_start"].sum()
    return float(hourly.sum() * step_h + starts + peaks + charged.fixed_per_year)


@pytest.mark.parametrize(
    ("step_h", "zone", "offset_h"),
    [(1.0, "Europe/Berlin", 1.0), (0.5, "Australia/Adelaide", 9.5), (1.0, "America/Chicago", -6.0)],
)
def test_bill_equals_the_objective(step_h: float, zone: str, offset_h: float) -> None:
    """Law: for any flows the bill without upkeep is the objective, to 1e-6 of the year's cost."""
    study = _full_study()
    year = small_year(step_h, time_zone=zone, utc_offset_h=offset_h, excess_kW=37.0)
    unit = study.option[0].unit
    flows = random_flows(year, seed=4)

    billed = bill(study, year, flows, RoundGas(), unit=unit, upkeep_per_year=0.0)
    upkeep = sum(line.amount for line in billed.lines if line.line.startswith("Upkeep of"))

    objective = _objective(prices(study, year, RoundGas()), flows, unit)
    assert upkeep == 5000.0
    assert billed.total - upkeep == pytest.approx(objective, rel=1e-6)


def test_bill_adds_up_line_by_line() -> None:
    """Each amount is quantity times rate, and the total their sum."""
    study = _full_study()
    year = small_year()
    flows = random_flows(year, seed=5)

    billed = bill(study, year, flows, RoundGas(), unit=study.option[0].unit, upkeep_per_year=7000.0)

    for line in billed.lines:
        assert line.amount == pytest.approx(line.quantity * line.rate, rel=1e-12)
    assert billed.total == pytest.approx(sum(line.amount for line in billed.lines), rel=1e-12)
    assert {line.section for line in billed.lines} == {"power", "export", "gas", "carbon", "upkeep"}


def test_energy_lines_share_out_all_import() -> None:
    """Every imported kWh stands in exactly one energy line."""
    study = _full_study()
    year = small_year()
    flows = random_flows(year, seed=6)

    billed = bill(study, year, flows, RoundGas(), unit=None, upkeep_per_year=0.0)

    names = {charge.name for charge in study.power_tariff.energy}
    shared_kWh = sum(line.quantity for line in billed.lines if line.line in names)
    assert shared_kWh == pytest.approx(flows["grid_import_kW"].sum(), rel=1e-12)


def test_separate_supply_has_no_wear() -> None:
    """Without a unit no maintenance is billed, and zero rates leave no line."""
    year = small_year()

    billed = bill(small_study(), year, idle_flows(year), RoundGas(), unit=None, upkeep_per_year=0.0)

    assert [line.line for line in billed.lines] == [
        "All hours",
        "Commodity",
        "Upkeep of boiler house",
    ]


def test_export_is_earned() -> None:
    """8760 h at 100 kW and 0.05 earn 43,800; without an export limit there is no line."""
    year = small_year()
    flows = idle_flows(year, grid_export_kW=100.0)

    billed = bill(_full_study(), year, flows, RoundGas(), unit=None, upkeep_per_year=0.0)
    forbidden = bill(small_study(), year, flows, RoundGas(), unit=None, upkeep_per_year=0.0)

    (line,) = [line for line in billed.lines if line.section == "export"]
    assert line.amount == pytest.approx(-43800.0)
    assert not [line for line in forbidden.lines if line.section == "export"]


def test_excess_counts_only_below_the_step() -> None:
    """On hourly steps a half-hour meter sees the excess and an hourly meter does not."""
    year = small_year(excess_kW=37.0)

    any_time, evening = prices(_full_study(), year, RoundGas()).demand_charges

    assert any_time.excess_kW.tolist() == [37.0] * 12
    assert evening.excess_kW.tolist() == [0.0] * 12
    assert evening.rate_per_kW.tolist() == [9.0, 9.0, *[0.0] * 8, 9.0, 9.0]


def test_prices_change_on_the_local_clock() -> None:
    """The day price begins at 6 local time: at 5 UTC in winter, at 4 UTC in summer."""
    year = small_year()
    price = pd.Series(prices(_full_study(), year, RoundGas()).import_per_kWh, year.hourly.index)

    assert price.loc["2025-01-15 04:00+00:00"] == pytest.approx(0.13)
    assert price.loc["2025-01-15 05:00+00:00"] == pytest.approx(0.21)
    assert price.loc["2025-07-15 03:00+00:00"] == pytest.approx(0.13)
    assert price.loc["2025-07-15 04:00+00:00"] == pytest.approx(0.18)


def test_fixed_charges_are_twelve_months() -> None:
    """12 x (150 + 90) = 2,880 a year."""
    assert prices(_full_study(), small_year(), RoundGas()).fixed_per_year == pytest.approx(2880.0)


def test_wear_by_hand() -> None:
    """4 + 300,000/30,000 = 14 a run hour, 6 a MWh = 0.006 a kWh, 50 a start."""
    worn = wear(Unit.model_validate(small_unit()))

    assert worn == pytest.approx((14.0, 0.006, 50.0))

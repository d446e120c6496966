"""The bill of a schedule that a solver found equals what the solver says it costs."""

import numpy as np
import pytest

from planner.dispatch import solve_year
from planner.market import bill, prices, wear
from planner.plant.envelope import (
    ExhaustPath,
    HeaterEnvelope,
    OperatingEnvelope,
    UnitEnvelope,
)
from planner.study.sections import Unit
from tests.planner.market.small_study import (
    RoundGas,
    small_study,
    small_tariff,
    small_unit,
    small_year,
)

STEPS = 8760

TARIFF = small_tariff(
    energy=(
        {"name": "Day", "from_hour": 6, "to_hour": 22, "price_per_kWh": 0.17},
        {"name": "Night", "from_hour": 22, "to_hour": 6, "price_per_kWh": 0.09},
    ),
    demand=({"name": "Peak demand", "rate_per_kW_month": 4.0},),
    levy_per_kWh=0.01,
    standing_per_month=200.0,
)


def _unit_envelope(unit: Unit) -> UnitEnvelope:
    """A unit of 1,000 to 2,000 kW with one segment, its exhaust to hot water or past it."""
    flat = np.ones(STEPS)
    water = ExhaustPath(
        "water only", {"hot_water": 1900.0 * flat}, {"hot_water": 1.2 * flat[:, None]}
    )
    worn = wear(unit)
    return UnitEnvelope(
        name=unit.name,
        available=np.ones(STEPS, dtype=bool),
        minimum_power_kW=1000.0 * flat,
        maximum_power_kW=2000.0 * flat,
        segment_power_kW=1000.0 * flat[:, None],
        fuel_at_minimum_lhv_kW=4200.0 * flat,
        fuel_slope_lhv=2.6 * flat[:, None],
        paths=(water, ExhaustPath("bypass", {}, {})),
        start_fuel_lhv_kWh=500.0,
        minimum_up_h=4.0,
        minimum_down_h=2.0,
        cost_per_run_hour=worn.cost_per_run_hour,
        cost_per_kWh=worn.cost_per_kWh,
        cost_per_start=worn.cost_per_start,
    )


@pytest.mark.solver
@pytest.mark.parametrize("with_unit", [False, pytest.param(True, marks=pytest.mark.slow)])
def test_bill_of_a_solved_year(with_unit: bool) -> None:
    """Bill without the heaters' upkeep and cost of the schedule agree to 1e-6 of the year."""
    study = small_study(power_tariff=TARIFF)
    unit = study.option[0].unit
    hour = np.arange(STEPS)
    year = small_year(
        power_kW=1800.0 + 700.0 * np.sin(2.0 * np.pi * hour / 24.0),
        hot_water_kW=1500.0 + 900.0 * np.cos(2.0 * np.pi * hour / STEPS),
        excess_kW=60.0,
    )
    envelope = OperatingEnvelope(
        name="One turbine" if with_unit else "Separate supply",
        units=(_unit_envelope(Unit.model_validate(small_unit())),) if with_unit else (),
        heaters=(HeaterEnvelope("boiler house", "hot_water", 3000.0, 1.1, 30.0),),
        chillers=(),
        store=None,
    )

    schedule = solve_year(
        envelope,
        prices(study, year, RoundGas()),
        year.hourly,
        gap_frac=0.05,
        duals=False,
    )
    billed = bill(
        study,
        year,
        schedule.hourly,
        RoundGas(),
        unit=unit if with_unit else None,
        upkeep_per_year=0.0,
    )

    assert billed.total - 5000.0 == pytest.approx(schedule.cost_per_year, rel=1e-6)
    assert bool(schedule.hourly["unit_on"].sum() > 0) is with_unit

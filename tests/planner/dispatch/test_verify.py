"""The check of schedules finds every kind of falsehood."""

from collections.abc import Callable
from dataclasses import replace

import numpy as np
import pandas as pd
import pytest

from planner.dispatch import Schedule, solve_year, verify
from planner.errors import SolveError
from planner.market.prices import Prices
from planner.plant.envelope import ChillerEnvelope, OperatingEnvelope, StoreEnvelope
from tests.planner.dispatch.invented_plants import Machine, boiler, charge, demands, money, plant

STEPS = 12

Case = tuple[Schedule, OperatingEnvelope, Prices, pd.DataFrame]


@pytest.fixture(scope="module")
def case() -> Case:
    """Twelve hours in which everything moves."""
    unit = Machine(
        paths={
            "steam, then water": {"steam": (40.0, 0.4), "hot_water": (20.0, 0.2)},
            "water only": {"hot_water": (80.0, 0.9)},
        },
        start_fuel_kWh=20.0,
        up_h=3.0,
        down_h=2.0,
        per_run_hour=0.3,
    ).over(STEPS)
    envelope = plant(
        unit,
        heaters=(boiler("steam"), boiler("hot_water", standing_kW=2.0)),
        chillers=(
            ChillerEnvelope("electric", "power", 60.0, 4.0),
            ChillerEnvelope("absorption", "hot_water", 30.0, 0.7),
        ),
        store=StoreEnvelope(200.0, 60.0, 60.0, 0.01),
    )
    dear = np.array([0.05, 0.05, 0.05, 0.2, 0.2, 0.2, 0.2, 0.05, 0.05, 0.05, 0.05, 0.05])
    prices = money(
        STEPS,
        import_price=dear,
        export_price=0.02,
        export_limit_kW=20.0,
        import_limit_kW=500.0,
        charges=(charge(STEPS, 0.2),),
    )
    heat_kW = 50.0 + 30.0 * np.sin(np.arange(STEPS))
    hourly = demands(STEPS, power=90.0, steam=30.0, hot_water=heat_kW, cooling=20.0)
    schedule = solve_year(envelope, prices, hourly, gap_frac=1e-6)
    return schedule, envelope, prices, hourly


def raised(column: str, by: float, *, step: int = 4) -> Callable[[Schedule], Schedule]:
    """A schedule with one value of one column moved."""

    def tampered(schedule: Schedule) -> Schedule:
        flows = schedule.hourly.copy()
        flows.iloc[step, flows.columns.get_loc(column)] += by
        return replace(schedule, hourly=flows)

    return tampered


@pytest.mark.solver
def test_an_honest_schedule_passes(case: Case) -> None:
    """What the solver made is accepted, and the unit both runs and stands in it."""
    verify(*case)

    assert 0.0 < case[0].hourly["unit_on"].sum() < STEPS


@pytest.mark.solver
@pytest.mark.parametrize(
    ("column", "by", "complaint"),
    [
        ("grid_import_kW", 1.0, "power does not balance"),
        ("grid_export_kW", 30.0, "grid_export_kW reaches"),
        ("grid_import_kW", -900.0, "grid_import_kW falls to"),
        ("unit_power_kW", 60.0, "makes more than it can"),
        ("unit_power_kW", -70.0, "runs below its minimum"),
        ("unit_fuel_lhv_kW", -5.0, "fuel is not that of its power"),
        ("unit_steam_kW", 100.0, "offers more steam than any path yields"),
        ("dumped_hot_water_kW", 500.0, "more hot_water is dumped than offered"),
        ("share_bypass_frac", 0.2, "shares of the exhaust"),
        ("heater_fuel_lhv_kW", -1.0, "heaters' fuel is not that of their heat"),
        ("heater_steam_kW", 1.0, "steam does not balance"),
        ("electric_cooling_kW", 1.0, "cooling does not balance"),
        ("electric_cooling_kW", 90.0, "electric_cooling_kW reaches"),
        ("chiller_power_kW", -3.0, "chiller_power_kW is less than"),
        ("absorption_heat_kW", 4.0, "hot_water does not balance"),
        ("store_level_kWh", 1.0, "store does not balance"),
        ("store_charge_kW", 300.0, "store_charge_kW reaches"),
        ("unit_start", 1.0, "starts are not those of the state"),
        ("price_power_per_kWh", np.nan, "price_power_per_kWh is not a number"),
        ("unit_hot_gas_kW", np.inf, "unit_hot_gas_kW is not a number"),
    ],
)
def test_a_false_flow_is_named(case: Case, column: str, by: float, complaint: str) -> None:
    """One value moved in one step is found, and the complaint says what."""
    schedule, *rest = case

    with pytest.raises(SolveError, match=complaint):
        verify(raised(column, by)(schedule), *rest)


@pytest.mark.solver
def test_a_false_cost_is_named(case: Case) -> None:
    """A cost that is not that of the flows is found beyond a millionth."""
    schedule, *rest = case
    false = replace(schedule, cost_per_year=schedule.cost_per_year * (1.0 + 3e-6))

    with pytest.raises(SolveError, match="the schedule says"):
        verify(false, *rest)


@pytest.mark.solver
def test_a_bound_above_the_cost_is_named(case: Case) -> None:
    """A bound that no schedule could reach is an error, not a number."""
    schedule, *rest = case
    false = replace(schedule, lower_bound_per_year=schedule.cost_per_year * 1.001)

    with pytest.raises(SolveError, match="bound lies above"):
        verify(false, *rest)


@pytest.mark.solver
@pytest.mark.parametrize(
    ("up_h", "down_h", "complaint"), [(9.0, 0.0, "a run of"), (0.0, 9.0, "a stop of")]
)
def test_a_short_run_or_stop_is_named(
    case: Case, up_h: float, down_h: float, complaint: str
) -> None:
    """The same schedule under longer minimum times is refused."""
    schedule, envelope, prices, hourly = case
    flows = schedule.hourly.copy()
    longer = replace(envelope.units[0], minimum_up_h=up_h, minimum_down_h=down_h)
    strict = replace(envelope, units=(longer,))
    flows["unit_on"] = [0, 1, 1, 1, 0, 0, 0, 1, 1, 1, 1, 1]

    with pytest.raises(SolveError, match=complaint):
        verify(replace(schedule, hourly=flows), strict, prices, hourly)


@pytest.mark.solver
def test_running_in_an_outage_is_named(case: Case) -> None:
    """A unit that runs while it is not available is refused."""
    schedule, envelope, prices, hourly = case
    out = replace(envelope.units[0], available=np.zeros(STEPS, dtype=bool))

    with pytest.raises(SolveError, match="runs in an outage"):
        verify(schedule, replace(envelope, units=(out,)), prices, hourly)

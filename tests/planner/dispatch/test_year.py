"""Years and months as a whole: separate supply, order of segments, time limits, repeatability."""

from dataclasses import replace

import numpy as np
import pandas as pd
import pytest

from planner.dispatch import solve, solve_year, verify
from planner.dispatch.record import DispatchModel
from planner.dispatch.window import whole_year
from planner.plant.envelope import StoreEnvelope
from tests.planner.dispatch.invented_plants import (
    Machine,
    boiler,
    charge,
    demands,
    hospital_year,
    money,
    plant,
)
from tests.planner.dispatch.random_sites import random_site

pytestmark = pytest.mark.solver


@pytest.mark.slow
def test_separate_supply_is_a_sum() -> None:
    """A year without a unit costs what each hour's meters say, added up by hand.

    Absorption is left out, so that nothing is left to decide.
    """
    envelope, prices, hourly = hospital_year(store=False)
    separate = replace(envelope, units=(), chillers=envelope.chillers[:1])

    schedule = solve_year(separate, prices, hourly, duals=False)

    verify(schedule, separate, prices, hourly)
    bought_kW = hourly["power_kW"].to_numpy()
    fuel_kW = (
        hourly["steam_kW"].to_numpy() / 0.90 + hourly["hot_water_kW"].to_numpy() / 0.93 + 140.0
    )
    expected = bought_kW @ prices.import_per_kWh + fuel_kW @ prices.fuel_per_lhv_kWh + 30000.0
    month = pd.DatetimeIndex(hourly.index).month.to_numpy()
    of_day, weekday = np.arange(8760) % 24, np.arange(8760) // 24 % 7
    window = (weekday < 5) & (of_day >= 16) & (of_day < 21)
    for number in range(1, 13):
        expected += 6.5 * (bought_kW[month == number].max() + 150.0)
        expected += 4.0 * bought_kW[(month == number) & window].max()
    assert schedule.cost_per_year == pytest.approx(expected, rel=1e-7)
    assert schedule.gap_frac <= 1e-9


def test_segments_are_filled_in_order() -> None:
    """A second segment rich in heat is not run before the first.

    By hand: 50 kW from 150 kW of gas with 75 kW of water, then 25 kW at slope 2.0 without heat,
    then 25 kW at slope 2.1 with 3 kW of water a kW. Gas 0.04, boiler 0.9, import 0.05, 100 kW of
    power and 200 kW of water wanted. The second segment alone would pay (0.084 - 0.133 a kW), the
    first alone not (0.08 against 0.05); both together cost 2.00 + 2.10 - 3.33 = 0.77 against 2.50
    of import: gas (150 + 50 + 52.5) x 0.04 = 10.10, boiler (200 - 150) / 0.9 x 0.04 = 2.22.
    """
    unit = Machine(
        50.0, (25.0, 25.0), 150.0, (2.0, 2.1), {"water only": {"hot_water": (75.0, 0.0)}}
    ).over(1)
    rich = replace(unit.paths[0], yield_slope={"hot_water": np.array([[0.0, 3.0]])})
    envelope = plant(replace(unit, paths=(rich, unit.paths[1])), heaters=(boiler(),))
    prices = money(1, import_price=0.05, fuel_price=0.04)
    hourly = demands(1, power=100.0, hot_water=200.0)

    schedule = solve_year(envelope, prices, hourly)

    verify(schedule, envelope, prices, hourly)
    assert schedule.cost_per_year == pytest.approx(10.10 + 50.0 / 0.9 * 0.04)
    assert schedule.lower_bound_per_year <= schedule.cost_per_year


def test_the_same_input_gives_the_same_schedule() -> None:
    """Two solves of one site agree in every flow and price."""
    site = random_site(7)

    first, second = (solve_year(*site, gap_frac=1e-4).hourly for _ in range(2))

    pd.testing.assert_frame_equal(first, second, check_exact=True)


@pytest.mark.slow
def test_a_time_limit_leaves_a_schedule_and_an_honest_gap(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """A month too hard for its time ends with a verified schedule and a bound below its cost."""
    monkeypatch.setattr(solve, "why_unknown", lambda _: "this test's month")
    envelope, prices, hourly = hospital_year(store=True, steps=500)
    dear = replace(prices, fuel_per_lhv_kWh=np.full(500, 0.052))

    schedule = solve_year(envelope, dear, hourly, time_limit_s=0.5, gap_frac=1e-7, duals=False)

    verify(schedule, envelope, dear, hourly)
    assert "until their time was over" in schedule.path
    assert 1e-7 < schedule.gap_frac < 0.1


@pytest.mark.long
def test_months_in_processes_give_the_same_year(monkeypatch: pytest.MonkeyPatch) -> None:
    """Two processes or one: the same bound and cost, and progress never goes back."""
    monkeypatch.setattr(solve, "why_unknown", lambda _: "this test's months")
    envelope, prices, hourly = random_site(3, steps=72)
    envelope = replace(envelope, store=None)
    charges = (replace(charge(72, 0.3), period=np.arange(72) // 24),)
    prices = replace(prices, demand_charges=charges)
    told: list[float] = []

    alone, together = (
        solve_year(
            envelope,
            prices,
            hourly,
            processes=processes,
            duals=False,
            progress=lambda _, done: told.append(done),
        )
        for processes in (1, 2)
    )

    assert together.cost_per_year == pytest.approx(alone.cost_per_year, rel=1e-12)
    assert together.lower_bound_per_year == pytest.approx(alone.lower_bound_per_year, rel=1e-12)
    assert told.count(1.0) == 2


def test_every_constraint_of_the_model_of_record_has_a_name_and_an_hour() -> None:
    """Names say the family and the step, and all families of a full site are there."""
    envelope, prices, hourly = hospital_year(store=True, steps=24)

    model = DispatchModel(whole_year(envelope, prices, hourly))
    names = {constraint.name for constraint in model.problem.constraints()}

    assert len(names) == len(list(model.problem.constraints()))
    for family in (
        "power_balance_7",
        "steam_balance_7",
        "hot_water_balance_7",
        "cooling_balance_7",
        "store_balance_7",
        "used_steam_is_yielded_7",
        "paths_share_state_7",
        "start_where_state_rises_7",
        "minimum_up_7",
        "minimum_down_7",
        "peak_0_0_counts_7",
    ):
        assert family in names


def test_a_step_of_half_an_hour_costs_half() -> None:
    """Hours cut into halves of constant demand never cost more, store and minimum times too."""
    unit = Machine(paths={"water only": {"hot_water": (75.0, 1.0)}}, up_h=2.0, down_h=1.0)
    store = StoreEnvelope(120.0, 60.0, 60.0, 0.0)
    import_price = [0.05, 0.05, 0.2, 0.2, 0.05, 0.2]
    water_kW = [60.0, 20.0, 0.0, 0.0, 90.0, 40.0]

    hourly = solve_year(
        plant(unit.over(6), heaters=(boiler(),), store=store),
        money(6, import_price=import_price),
        demands(6, power=100.0, hot_water=water_kW),
        gap_frac=1e-6,
    )
    half = replace(money(12, import_price=np.repeat(import_price, 2)), step_h=0.5)
    demand = demands(12, power=100.0, hot_water=np.repeat(water_kW, 2))
    demand.index = pd.date_range("2025-01-01", periods=12, freq="30min", tz="UTC")
    halves = solve_year(
        plant(unit.over(12), heaters=(boiler(),), store=store), half, demand, gap_frac=1e-6
    )

    # Finer steps leave more freedom, so they may cost less but never more.
    assert halves.lower_bound_per_year <= hourly.cost_per_year * (1.0 + 1e-6)
    assert halves.cost_per_year == pytest.approx(hourly.cost_per_year, rel=0.05)

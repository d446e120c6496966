"""Saving and cash flow of an option, by hand on bills of round numbers."""

from typing import Any

import pytest

from planner.outcome.checks import outcome_faults
from planner.outcome.money import economics
from planner.results.records import Economics
from tests.planner.market.small_study import small_option, small_study, small_unit
from tests.planner.outcome.small_bills import bill_of

SEPARATE = bill_of(
    energy=600_000.0, demand=90_000.0, standing=6_000.0, gas=300_000.0, carbon=40_000.0, upkeep=5e3
)
OPTION = bill_of(
    energy=200_000.0,
    demand=50_000.0,
    standing=6_000.0,
    export=-10_000.0,
    gas=420_000.0,
    carbon=55_000.0,
    upkeep=25_000.0,
    maintenance=40_000.0,
    overhaul=15_000.0,
)


def _economics(slack: float = 0.0, **sections: Any) -> Economics:
    """The two bills above under a study with sections replaced."""
    study = small_study(**sections)
    return economics(
        study, study.option[0], separate_bill=SEPARATE, option_bill=OPTION, separate_slack=slack
    )


def test_first_year_by_hand() -> None:
    """1,041,000 less 801,000 is 240,000, part by part in the columns of the cash flow."""
    first = _economics().cash_flow[1]

    assert first.power_saving == pytest.approx(400_000 + 40_000 + 10_000)
    assert first.gas_saving == pytest.approx(-120_000)
    assert first.carbon_saving == pytest.approx(-15_000)
    assert first.maintenance == pytest.approx(-40_000)
    assert first.overhaul_reserve == pytest.approx(-15_000)
    assert first.upkeep == pytest.approx(-20_000)
    assert first.net == pytest.approx(240_000)
    assert (first.year, first.calendar_year) == (1, 2027)


def test_saving_is_the_difference_of_the_bills() -> None:
    """Without outages the annual saving is one total less the other, and 23 % of the bill."""
    earned = _economics()

    assert earned.annual_saving == pytest.approx(SEPARATE.total - OPTION.total)
    assert earned.saving_share_of_bill_frac == pytest.approx(240_000 / 1_041_000)


def test_gap_of_separate_supply_never_helps() -> None:
    """What the lower bound lies below the bill is taken from the saving, to the last cent."""
    assert _economics(slack=104.0).annual_saving == pytest.approx(240_000 - 104.0)


def test_outage_cost_by_hand() -> None:
    """3 % of 400,000 + 10,000 - 120,000 - 15,000 - 40,000 - 15,000, and 2/12 of 40,000."""
    unit = small_unit(forced_outage_frac=0.03, demand_saving_lost_months=2)

    earned = _economics(option=(small_option(unit=unit),))

    expected = 0.03 * 220_000 + 2 / 12 * 40_000
    assert earned.expected_outage_cost == pytest.approx(expected)
    assert earned.annual_saving == pytest.approx(240_000 - expected)


def test_a_trip_never_earns() -> None:
    """Where running loses money on energy, an outage costs nothing rather than paying."""
    unit = small_unit(forced_outage_frac=0.1)
    study = small_study(option=(small_option(unit=unit),))
    dear = bill_of(energy=200_000.0, gas=900_000.0)

    earned = economics(
        study, study.option[0], separate_bill=SEPARATE, option_bill=dear, separate_slack=0.0
    )

    assert earned.expected_outage_cost == 0.0


def test_prices_move_along_their_own_paths() -> None:
    """After two years power has grown by 1.02², gas by 1.01², carbon by 1.05², upkeep by 1.03²."""
    paths = {
        "power_real_growth_frac": 0.02,
        "gas_real_growth_frac": 0.01,
        "carbon_price_real_growth_frac": 0.05,
        "upkeep_real_growth_frac": 0.03,
    }

    flow = _economics(price_paths=paths).cash_flow

    assert flow[1].power_saving == pytest.approx(450_000)
    assert flow[3].power_saving == pytest.approx(450_000 * 1.02**2)
    assert flow[3].gas_saving == pytest.approx(-120_000 * 1.01**2)
    assert flow[3].carbon_saving == pytest.approx(-15_000 * 1.05**2)
    assert flow[3].maintenance == pytest.approx(-40_000 * 1.03**2)
    assert flow[3].overhaul_reserve == pytest.approx(-15_000 * 1.03**2)
    assert flow[3].upkeep == pytest.approx(-20_000 * 1.03**2)


def test_columns_add_up_to_the_net() -> None:
    """Law: in every year the columns close, and the balances are running sums."""
    avoided = ({"what": "boiler", "year": 4, "cost": 200_000.0},)
    flow = _economics(option=(small_option(avoided=avoided),)).cash_flow
    parts = (
        "capital avoided_capital power_saving gas_saving carbon_saving maintenance "
        "overhaul_reserve upkeep outage_cost"
    )

    balance = 0.0
    for year in flow:
        balance += year.net
        assert year.net == pytest.approx(sum(getattr(year, part) for part in parts.split()))
        assert year.discounted == pytest.approx(year.net / 1.08**year.year)
        assert year.cumulative == pytest.approx(balance)
    assert len(flow) == 11


def test_avoided_capital_is_counted_in_its_year() -> None:
    """A boiler of 200,000 in year 4 lowers the net capital, and its present value by 1.08^4."""
    avoided = ({"what": "boiler", "year": 4, "cost": 200_000.0},)

    earned = _economics(option=(small_option(avoided=avoided),))

    assert earned.capital.net == pytest.approx(800_000)
    assert earned.capital.avoided_present_value == pytest.approx(200_000 / 1.08**4)
    assert earned.cash_flow[4].avoided_capital == 200_000
    assert earned.simple_payback_years == pytest.approx(800_000 / 240_000)
    assert earned.npv_real - _economics().npv_real == pytest.approx(200_000 / 1.08**4)


def test_avoided_in_the_first_year_is_no_saving() -> None:
    """Capital avoided in year 1 does not swell the annual saving."""
    avoided = ({"what": "boiler", "year": 1, "cost": 200_000.0},)

    assert _economics(option=(small_option(avoided=avoided),)).annual_saving == pytest.approx(240e3)


def test_option_that_loses_has_no_payback() -> None:
    """Dearer than separate supply: NPV below zero, no payback of either kind, no rate."""
    study = small_study()
    earned = economics(
        study, study.option[0], separate_bill=OPTION, option_bill=SEPARATE, separate_slack=0.0
    )

    assert earned.npv_real < -1_000_000
    assert earned.simple_payback_years is None
    assert earned.discounted_payback_years is None
    assert earned.irr_real_frac is None


def test_cost_avoided_after_the_plan_is_refused() -> None:
    """A boiler spared in year 12 of a ten-year plan would silently not count."""
    avoided = ({"what": "boiler", "year": 12, "cost": 200_000.0},)

    (fault,) = outcome_faults(small_study(option=(small_option(avoided=avoided),)))

    assert fault.path == "option[1].avoided[1].year"
    assert fault.must == "must be at most money.life_years = 10"

"""Simple and discounted payback of a level saving.

Given   capital of 1,000,000 with 100,000 of it avoided in the year of building, and a saving of
        200,000 a year for 10 years at 8 %.
Find    simple payback, discounted payback, and the balances around it.
Source  definitions of NIST Handbook 135: discounted payback is the first year in which the
        discounted balance turns non-negative; UPV(8 %, 5) = 3.9927, and 6 years 4.6229 in closed
        form.
By hand 900,000/200,000 = 4.5 years. After 5 years 200,000 x 3.9927 = 798,540, which is 101,460
        short; after 6 years 924,576, which is 24,576 over: year 6.
Differs 10 of money, the rounding of the factors.
"""

import pytest

from planner.outcome.money import economics
from tests.planner.market.small_study import small_option, small_study
from tests.planner.outcome.small_bills import bill_of


def test_paybacks_of_a_level_saving() -> None:
    """Both paybacks and the balances, as worked above."""
    avoided = ({"what": "boiler renewal", "year": 0, "cost": 100_000.0},)
    study = small_study(option=(small_option(avoided=avoided),))

    earned = economics(
        study,
        study.option[0],
        separate_bill=bill_of(energy=500_000.0),
        option_bill=bill_of(energy=300_000.0),
        separate_slack=0.0,
    )

    assert earned.simple_payback_years == pytest.approx(4.5)
    assert earned.discounted_payback_years == 6
    assert earned.cash_flow[5].cumulative_discounted == pytest.approx(-101_460.0, abs=10.0)
    assert earned.cash_flow[6].cumulative_discounted == pytest.approx(24_576.0, abs=10.0)

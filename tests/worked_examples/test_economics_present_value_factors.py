"""Present value of level and of growing savings: the factors UPV and UPV*.

Given   a saving of 100,000 in the first of 20 years, level or growing by 2 % a year with the price
        of power, at a real rate of 3 %; and level for 10 years at 8 %. Capital of 1,000,000.
Find    net present values.
Source  NIST Handbook 135, uniform present value factors: UPV(3 %, 20) = 14.8775,
        UPV(8 %, 10) = 6.7101, UPV*(3 %, 2 %, 20) = 18.0812.
By hand level: 1,487,750 - 1,000,000 = 487,750. At 8 %: 671,010 - 1,000,000 = -328,990. Growing:
        the handbook's first saving has grown a year already, ours has not:
        100,000 x 18.0812/1.02 = 1,772,667, so 772,667.
Differs at most 5 in the fourth decimal of a factor, that is 5 to 10 of money.
"""

import pytest

from planner.outcome.money import economics
from tests.planner.market.small_study import small_study
from tests.planner.outcome.small_bills import bill_of


@pytest.mark.parametrize(
    ("rate", "growth", "life_years", "expected"),
    [(0.03, 0.0, 20, 487_750.0), (0.08, 0.0, 10, -328_990.0), (0.03, 0.02, 20, 772_667.0)],
)
def test_npv_by_present_value_factors(
    rate: float, growth: float, life_years: int, expected: float
) -> None:
    """Capital and a power saving through the whole cash flow, as worked above."""
    money = {
        "discount_rate_real_frac": rate,
        "life_years": life_years,
        "price_year": 2025,
        "first_operating_year": 2027,
    }
    study = small_study(money=money, price_paths={"power_real_growth_frac": growth})

    earned = economics(
        study,
        study.option[0],
        separate_bill=bill_of(energy=300_000.0),
        option_bill=bill_of(energy=200_000.0),
        separate_slack=0.0,
    )

    assert earned.npv_real == pytest.approx(expected, abs=10.0)

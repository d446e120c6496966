"""NPV, internal rates and paybacks against a reference library and by law."""

import numpy as np
import numpy_financial
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from planner.outcome.worth import (
    discounted_payback_years,
    internal_rate_frac,
    internal_rates,
    net_present_value,
    simple_payback_years,
)

SAVINGS = st.lists(st.floats(1.0, 1e6), min_size=2, max_size=25)


@settings(max_examples=40, deadline=None)
@given(capital=st.floats(1.0, 1e7), savings=SAVINGS, rate=st.floats(0.0, 0.25))
def test_npv_equals_the_reference_library(
    capital: float, savings: list[float], rate: float
) -> None:
    """numpy-financial 1.0 discounts from year 0 too."""
    flows = np.array([-capital, *savings])

    expected = numpy_financial.npv(rate, flows)
    assert net_present_value(flows, rate) == pytest.approx(expected, rel=1e-9, abs=1e-6 * capital)


@settings(max_examples=40, deadline=None)
@given(share=st.floats(0.05, 5.0), savings=SAVINGS)
def test_rate_makes_the_present_value_zero(share: float, savings: list[float]) -> None:
    """Law: an outlay followed by savings has one rate, at which its NPV vanishes."""
    flows = np.array([-share * sum(savings), *savings])

    rate = internal_rate_frac(flows)

    if rate is not None:
        weight = np.abs(flows / (1.0 + rate) ** np.arange(len(flows))).sum()
        assert abs(net_present_value(flows, rate)) < 1e-6 * weight
        assert (rate > 0.0) == (share < 1.0) or abs(share - 1.0) < 1e-9
    else:
        assert share < 0.1 or share > 1.0  # outside -99 % and 1000 % no rate is quoted


def test_flows_of_one_sign_have_no_rate() -> None:
    """Nothing but outlays, or nothing but income."""
    assert internal_rate_frac(np.array([-100.0, -5.0, 0.0])) is None
    assert internal_rate_frac(np.array([100.0, 5.0, 0.0])) is None


def test_several_rates_are_not_one() -> None:
    """-100, 230, -132 is zero at 10 % and at 20 % (1.1 x 1.2 = 1.32): no rate is reported."""
    flows = np.array([-100.0, 230.0, -132.0])

    assert internal_rates(flows) == pytest.approx([0.1, 0.2], abs=1e-9)
    assert internal_rate_frac(flows) is None


def test_balance_that_falls_again_has_not_paid_back() -> None:
    """-100, 60, 60, -50, 40, 40 passes zero in year 2, falls below in 3, is back for good in 4."""
    flows = np.array([-100.0, 60.0, 60.0, -50.0, 40.0, 40.0])

    assert discounted_payback_years(flows, 0.0) == 4


def test_payback_of_nothing() -> None:
    """Nothing net spent pays back at once; nothing saved never does."""
    assert simple_payback_years(0.0, -5.0) == 0.0
    assert simple_payback_years(-10.0, 5.0) == 0.0
    assert simple_payback_years(100.0, 0.0) is None
    assert discounted_payback_years(np.array([0.0, 1.0]), 0.08) == 0
    assert discounted_payback_years(np.array([-10.0, 10.0]), 0.08) is None

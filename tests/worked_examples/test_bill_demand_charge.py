"""Demand charge with a window, a unit that trips once, and a meter quicker than the step.

Given   a site that takes 3,000 kW in every hour of 2025; a unit makes 2,000 kW of it all year, but
        for one hour on Wednesday 15 January from 17 to 18 local time, and one on Saturday
        14 June. Charge of 9.00 a kW and month on the highest half-hour from 16 to 19 on workdays
        of November to February; 2.00 a kW and month on the highest half-hour at any time. The
        highest half-hour lies 50 kW above its hour in every month.
Find    both lines of the bill.
Source  the way a maximum-demand contract bills (*common practice*): the charge takes the meter's
        interval after own generation, and a single hour sets the month.
By hand winter evening: January 3,050, the other three months 1,050 each: 6,200 kW-months, 55,800.
        Any time: January and June 3,050, ten months 1,050: 16,600 kW-months, 33,200.
Differs nothing.
"""

import pytest

from planner.market import bill
from tests.planner.market.small_study import (
    RoundGas,
    idle_flows,
    small_study,
    small_tariff,
    small_year,
)

DEMAND = (
    {
        "name": "Winter evening",
        "months": (1, 2, 11, 12),
        "weekdays": ("mon", "tue", "wed", "thu", "fri"),
        "from_hour": 16,
        "to_hour": 19,
        "rate_per_kW_month": 9.0,
    },
    {"name": "Any time", "rate_per_kW_month": 2.0},
)


def test_demand_charge_after_own_generation() -> None:
    """Billed kW-months and amounts, as worked above."""
    study = small_study(power_tariff=small_tariff(demand=DEMAND))
    year = small_year(excess_kW=50.0)
    flows = idle_flows(year, grid_import_kW=1000.0)
    flows.loc["2025-01-15 16:00+00:00", "grid_import_kW"] = 3000.0
    flows.loc["2025-06-14 12:00+00:00", "grid_import_kW"] = 3000.0

    lines = {
        line.line: line
        for line in bill(study, year, flows, RoundGas(), unit=None, upkeep_per_year=0.0).lines
    }

    assert lines["Winter evening"].quantity == pytest.approx(6_200.0)
    assert lines["Winter evening"].amount == pytest.approx(55_800.0)
    assert lines["Any time"].quantity == pytest.approx(16_600.0)
    assert lines["Any time"].amount == pytest.approx(33_200.0)

"""Night hours of a winter tariff over the change of the clocks.

Given   100 kW of import all year 2025 in Berlin; a night price of 0.10 from 0 to 6 o'clock in
        November to March, 0.20 in all other hours.
Find    energy and amount of each line of the bill.
Source  calendar of 2025 and the rule of Directive 2000/84/EC: clocks go forward on the last Sunday
        of March at 1:00 UTC (30 March), back on the last Sunday of October (26 October).
By hand November to March have 30 + 31 + 31 + 28 + 31 = 151 days of 6 night hours, less the hour
        that 30 March lacks: 905 h, so 90,500 kWh and 9,050. The rest of 8,760 h is 7,855 h, so
        785,500 kWh and 157,100.
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

WINTER = (1, 2, 3, 11, 12)
SUMMER = (4, 5, 6, 7, 8, 9, 10)
ENERGY = (
    {"name": "Winter night", "months": WINTER, "to_hour": 6, "price_per_kWh": 0.10},
    {"name": "Winter day", "months": WINTER, "from_hour": 6, "price_per_kWh": 0.20},
    {"name": "Summer", "months": SUMMER, "price_per_kWh": 0.20},
)


def test_bill_over_the_clock_changes() -> None:
    """Night and other hours of the year, as worked above."""
    study = small_study(power_tariff=small_tariff(energy=ENERGY))
    year = small_year()
    flows = idle_flows(year, grid_import_kW=100.0)

    lines = {
        line.line: line
        for line in bill(study, year, flows, RoundGas(), unit=None, upkeep_per_year=0.0).lines
    }

    assert lines["Winter night"].quantity == pytest.approx(90_500.0)
    assert lines["Winter night"].amount == pytest.approx(9_050.0)
    others = lines["Winter day"], lines["Summer"]
    assert sum(line.quantity for line in others) == pytest.approx(785_500.0)
    assert sum(line.amount for line in others) == pytest.approx(157_100.0)

"""Maintenance and overhaul reserve of a year of two shifts.

Given   250 days of 16 h at 1,800 kW, one start a day; 4 a run hour, 6 a MWh, 50 a start; an
        overhaul of 300,000 every 30,000 h.
Find    the four lines of the bill.
Source  arithmetic; the run-hour reserve is *common practice*.
By hand 4,000 h, 7,200 MWh, 250 starts: 16,000; 43,200; 12,500; 4,000 x 10 = 40,000. Together
        111,700, or 15.5 a MWh.
Differs nothing.
"""

import numpy as np
import pytest

from planner.market import bill, wear
from tests.planner.market.small_study import RoundGas, idle_flows, small_study, small_year


def test_wear_of_two_shifts() -> None:
    """Lines of wear as worked above, and the same sum from the dispatch's rates."""
    year = small_year()
    hour = np.arange(8760)
    on = (hour % 24 >= 6) & (hour % 24 < 22) & (hour // 24 < 250)
    started = np.diff(on.astype(int), prepend=0).clip(0)
    flows = idle_flows(year, unit_on=on * 1.0, unit_power_kW=on * 1800.0, unit_start=started * 1.0)
    study = small_study()
    unit = study.option[0].unit

    billed = bill(study, year, flows, RoundGas(), unit=unit, upkeep_per_year=0.0)

    amounts = [line.amount for line in billed.lines[-4:]]
    assert amounts == pytest.approx([16_000.0, 43_200.0, 12_500.0, 40_000.0])
    rates = wear(unit)
    dispatched = 4000 * rates.cost_per_run_hour + 7.2e6 * rates.cost_per_kWh
    assert dispatched + 250 * rates.cost_per_start == pytest.approx(111_700.0)

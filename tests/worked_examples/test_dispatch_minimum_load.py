"""A minimum load that the site cannot take keeps a unit off; a little export lets it run.

Given   one hour of 50 kW of power and 30 kW of hot water; import 0.20 a kWh, gas 0.04, boiler
        0.8. A unit makes at least 60 kW from 200 kW of gas, with 90 kW of hot water. Export is
        forbidden, or allowed to 20 kW and pays nothing.
Find    cost and dumped heat of both.
Source  hand calculation.
By hand forbidden: 60 kW have nowhere to go, so the unit is off: 50 x 0.20 + 30 / 0.8 x 0.04 =
        10.00 + 1.50 = 11.50. Allowed: the unit runs at 60 kW, 200 x 0.04 = 8.00, gives 10 kW
        away and uses 30 kW of its 90 kW of heat: 8.00.
Differs nothing.
"""

import pytest

from planner.dispatch import Schedule, solve_year, verify
from tests.planner.dispatch.invented_plants import Machine, boiler, demands, money, plant


def solved(export_limit_kW: float) -> Schedule:
    """The hour under one export limit."""
    unit = Machine(60.0, (40.0,), 200.0, (3.0,), {"water only": {"hot_water": (90.0, 1.5)}}).over(1)
    envelope = plant(unit, heaters=(boiler(efficiency=0.8),))
    prices = money(1, import_price=0.20, fuel_price=0.04, export_limit_kW=export_limit_kW)
    hourly = demands(1, power=50.0, hot_water=30.0)
    schedule = solve_year(envelope, prices, hourly, gap_frac=1e-9)
    verify(schedule, envelope, prices, hourly)
    return schedule


@pytest.mark.solver
def test_minimum_load_without_export() -> None:
    """The unit is off, as worked above."""
    schedule = solved(0.0)

    assert schedule.cost_per_year == pytest.approx(11.50)
    assert schedule.hourly["unit_on"].tolist() == [0.0]


@pytest.mark.solver
def test_minimum_load_with_export() -> None:
    """The unit runs at its minimum with a third of its heat in use, as worked above."""
    schedule = solved(20.0)

    assert schedule.cost_per_year == pytest.approx(8.00)
    assert schedule.hourly["grid_export_kW"].tolist() == pytest.approx([10.0])
    used_kW = schedule.hourly["unit_hot_water_kW"] - schedule.hourly["dumped_hot_water_kW"]
    assert used_kW.tolist() == pytest.approx([30.0])

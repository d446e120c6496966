"""A unit runs through a cheap hour when a restart costs more than the loss of running.

Given   three hours of 100 kW; import 0.20, 0.09 and 0.20 a kWh. A unit of 50 to 100 kW burns
        3 kWh of gas a kWh at 0.04 a kWh, so 0.12 a kWh. A start costs 2.00, or 1.00, of which
        half is gas. The state before the first hour is free.
Find    cost and state of both.
Source  hand calculation.
By hand dear hours: 100 x 0.12 = 12.00 each. Cheap hour off: 9.00. Cheap hour on at the minimum:
        50 x 0.12 + 50 x 0.09 = 10.50, so staying on loses 1.50. Start 2.00: stays on, 34.50.
        Start 1.00: stops, 12 + 9 + 1 + 12 = 34.00.
Differs nothing.
"""

import pytest

from planner.dispatch import solve_year, verify
from tests.planner.dispatch.invented_plants import Machine, demands, money, plant


@pytest.mark.solver
@pytest.mark.parametrize(
    ("start_cost", "state", "cost"), [(2.0, [1, 1, 1], 34.50), (1.0, [1, 0, 1], 34.00)]
)
def test_start_cost(start_cost: float, state: list[int], cost: float) -> None:
    """Stays on or stops, as worked above."""
    unit = Machine(
        start_fuel_kWh=0.5 * start_cost / 0.04,
        per_start=0.5 * start_cost,
        fuel_at_minimum_kW=150.0,
    ).over(3)
    prices = money(3, import_price=[0.20, 0.09, 0.20], fuel_price=0.04)
    hourly = demands(3, power=100.0)

    schedule = solve_year(plant(unit), prices, hourly, gap_frac=1e-9)

    verify(schedule, plant(unit), prices, hourly)
    assert schedule.cost_per_year == pytest.approx(cost)
    assert schedule.hourly["unit_on"].tolist() == state

"""A unit too dear for energy runs one hour to cut the month's peak.

Given   three hours of 80, 200 and 90 kW; import 0.10 a kWh, demand charge 5.00 a kW on the
        highest hour, 20 kW above which the meter sees within the hour. A unit of 50 to 100 kW
        burns 3 kWh of gas a kWh at 0.04: 0.12 a kWh, dearer than import. No heat is wanted.
Find    cost, and the marginal price of power with its demand part apart.
Source  hand calculation.
By hand without the unit: 370 x 0.10 + 5 x (200 + 20) = 1,137. In the second hour each kW of the
        unit costs 0.02 in energy and saves 5.00 of peak until the peak is 100: energy
        (80 + 100 + 90) x 0.10 = 27, gas 100 x 0.12 = 12, demand 5 x (100 + 20) = 600: 639.00.
        One further kW in the second hour costs 0.10 and 5.00; in the others 0.10.
Differs nothing.
"""

import pytest

from planner.dispatch import solve_year, verify
from tests.planner.dispatch.invented_plants import Machine, charge, demands, money, plant


@pytest.mark.solver
def test_one_hour_cuts_the_peak() -> None:
    """Cost and prices as worked above."""
    unit = Machine(50.0, (50.0,), 150.0, (3.0,)).over(3)
    prices = money(3, fuel_price=0.04, charges=(charge(3, 5.0, excess_kW=20.0),))
    hourly = demands(3, power=[80.0, 200.0, 90.0])

    schedule = solve_year(plant(unit), prices, hourly, gap_frac=1e-9)

    verify(schedule, plant(unit), prices, hourly)
    flows = schedule.hourly
    assert schedule.cost_per_year == pytest.approx(639.0, abs=1e-6)
    assert flows["unit_power_kW"].tolist() == pytest.approx([0.0, 100.0, 0.0])
    assert flows["price_power_per_kWh"].tolist() == pytest.approx([0.10, 0.10, 0.10])
    assert flows["price_power_peak_per_kWh"].tolist() == pytest.approx([0.0, 5.0, 0.0])

"""Heat of a dear-power hour serves a cheap-power hour through a store that loses a tenth.

Given   two hours that follow each other in a circle; power 100 kW in both at 0.30 and 0.05 a
        kWh; hot water 90 kW in the second only. A unit of 50 to 100 kW burns 3 kWh of gas a kWh
        at 0.04 and yields 1.5 kW of heat a kW; boiler 0.9. A store loses 10 % of its level an
        hour.
Find    cost with and without the store, and the level.
Source  hand calculation.
By hand first hour: the unit at 100 kW burns 12.00 in place of 30.00 of import. Second hour: import
        costs 5.00; running would cost at least 50 x 0.12 + 50 x 0.05 = 8.50, more than 5.00 and
        the 75 kW of heat at 0.0444 together (3.33). Boiler 90 / 0.9 x 0.04 = 4.00.
        Without store 12 + 5 + 4 = 21.00. With store the first hour stores 90 / 0.9 = 100 kWh of
        its 150 and the second takes 90: 17.00; the other 50 kW go
        unused.
Differs nothing.
"""

import pytest

from planner.dispatch import solve_year, verify
from planner.plant.envelope import StoreEnvelope
from tests.planner.dispatch.invented_plants import Machine, boiler, demands, money, plant


@pytest.mark.solver
@pytest.mark.parametrize(("capacity_kWh", "cost"), [(None, 21.0), (500.0, 17.0)])
def test_store_shifts_heat(capacity_kWh: float | None, cost: float) -> None:
    """Cost, level and heat in use as worked above."""
    unit = Machine(50.0, (50.0,), 150.0, (3.0,), {"water only": {"hot_water": (75.0, 1.5)}}).over(2)
    store = None if capacity_kWh is None else StoreEnvelope(capacity_kWh, 200.0, 200.0, 0.1)
    envelope = plant(unit, heaters=(boiler(),), store=store)
    prices = money(2, import_price=[0.30, 0.05], fuel_price=0.04)
    hourly = demands(2, power=100.0, hot_water=[0.0, 90.0])

    schedule = solve_year(envelope, prices, hourly, gap_frac=1e-9)

    verify(schedule, envelope, prices, hourly)
    flows = schedule.hourly
    assert schedule.cost_per_year == pytest.approx(cost)
    if store is not None:
        assert flows["store_level_kWh"].tolist() == pytest.approx([100.0, 0.0], abs=1e-6)
        used_kW = flows["unit_hot_water_kW"] - flows["dumped_hot_water_kW"]
        assert used_kW.tolist() == pytest.approx([100.0, 0.0], abs=1e-6)

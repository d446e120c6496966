"""How much of an exhaust makes steam first, when water pays for part of it.

Given   one hour; a unit of exactly 100 kW burns 300 kW of gas at 0.036. Its whole exhaust gives
        80 kW of steam and then 40 kW of hot water, or 140 kW of hot water only. Wanted: 100 kW of
        power, 40 kW of steam, 100 kW of hot water; boilers 0.8 for steam, 0.9 for hot water.
Find    shares and cost.
Source  hand calculation.
By hand a kW of steam is worth 0.036 / 0.8 = 0.045, of hot water 0.036 / 0.9 = 0.040. With share x
        on the steam path: steam 80 x, water 140 - 100 x. Below x = 0.4 water is dumped, and more x
        earns 80 x 0.045 = 3.60. Above, each step of x loses 100 x 0.040 = 4.00 of water for 3.60
        of steam. So x = 0.4: steam 32, water 100; the steam boiler adds 8 kW from 10 kW of gas.
        Cost (300 + 10) x 0.036 = 11.16.
Differs nothing.
"""

import pytest

from planner.dispatch import solve_year, verify
from tests.planner.dispatch.invented_plants import Machine, boiler, demands, money, plant


@pytest.mark.solver
def test_cascade_is_split() -> None:
    """Shares, heat and cost as worked above."""
    unit = Machine(
        100.0,
        (0.0,),
        300.0,
        (3.0,),
        {
            "steam, then water": {"steam": (80.0, 0.0), "hot_water": (40.0, 0.0)},
            "water only": {"hot_water": (140.0, 0.0)},
        },
    ).over(1)
    envelope = plant(unit, heaters=(boiler("steam", efficiency=0.8), boiler("hot_water")))
    prices = money(1, import_price=0.30, fuel_price=0.036)
    hourly = demands(1, power=100.0, steam=40.0, hot_water=100.0)

    schedule = solve_year(envelope, prices, hourly, gap_frac=1e-9)

    verify(schedule, envelope, prices, hourly)
    row = schedule.hourly.iloc[0]
    assert schedule.cost_per_year == pytest.approx(11.16)
    assert row["share_steam_then_water_frac"] == pytest.approx(0.4)
    assert row["share_water_only_frac"] == pytest.approx(0.6)
    assert row["heater_steam_kW"] == pytest.approx(8.0)
    assert row["price_steam_per_kWh"] == pytest.approx(0.045)

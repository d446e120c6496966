"""Demands that no plant can meet are refused with carrier, hour and shortfall."""

import numpy as np
import pytest

from planner.dispatch import solve_year
from planner.errors import UnmetDemandError
from planner.plant.envelope import ChillerEnvelope, StoreEnvelope
from tests.planner.dispatch.invented_plants import Machine, boiler, demands, money, plant


def test_power_beyond_the_connection() -> None:
    """The hour of the outage is short by what the unit would have made."""
    available = np.array([True, True, False, True])
    unit = Machine(available=available).over(4)
    hourly = demands(4, power=[180.0, 190.0, 170.0, 195.0])

    with pytest.raises(UnmetDemandError) as refused:
        solve_year(plant(unit), money(4, import_limit_kW=100.0), hourly)

    assert "power demand" in str(refused.value)
    assert "170 kW at 2025-01-01 02:00 UTC" in str(refused.value)
    assert "70 kW short" in str(refused.value)
    assert "in 1 steps" in str(refused.value)


def test_all_carriers_are_told_together() -> None:
    """Steam without any heater and cooling beyond the chiller are refused in one message."""
    envelope = plant(
        heaters=(boiler("hot_water", maximum_kW=50.0),),
        chillers=(ChillerEnvelope("electric", "power", 30.0, 4.0),),
    )
    hourly = demands(2, power=50.0, steam=[0.0, 7.0], hot_water=[40.0, 51.0], cooling=[30.0, 42.0])

    with pytest.raises(UnmetDemandError) as refused:
        solve_year(envelope, money(2), hourly)

    message = str(refused.value)
    assert "steam demand = 7 kW at 2025-01-01 01:00 UTC" in message
    assert "hot_water demand" in message
    assert "1 kW short" in message
    assert "cooling demand" in message
    assert "12 kW short" in message


@pytest.mark.solver
def test_a_store_that_runs_empty_is_located() -> None:
    """Each hour alone is within heater and store, but both together cannot last three hours.

    By hand: heater 50 kW, store 60 kWh without loss and 100 kW; demands 10, 130, 130 kW in a
    circle. Over the three hours 270 kWh are wanted and 150 can be made: 120 kWh are missing.
    """
    envelope = plant(
        heaters=(boiler("hot_water", maximum_kW=50.0),),
        store=StoreEnvelope(60.0, 100.0, 100.0, 0.0),
    )
    hourly = demands(3, power=10.0, hot_water=[10.0, 130.0, 130.0])

    with pytest.raises(UnmetDemandError, match="hot_water demand") as refused:
        solve_year(envelope, money(3), hourly)

    assert "all balances taken together" in str(refused.value)


@pytest.mark.solver
def test_heat_that_needs_power_nobody_takes_is_located() -> None:
    """Heat only from a unit whose power has nowhere to go.

    By hand: 80 kW of heat need the unit, which makes 50 kW at least; 20 kW of power are wanted
    and export is forbidden, so the unit stays off and the boiler's 30 kW leave 50 kW short.
    """
    unit = Machine(paths={"water only": {"hot_water": (80.0, 1.0)}}).over(2)
    envelope = plant(unit, heaters=(boiler(maximum_kW=30.0),))
    hourly = demands(2, power=20.0, hot_water=80.0)

    with pytest.raises(UnmetDemandError, match="hot_water demand"):
        solve_year(envelope, money(2), hourly)

"""Laws of the cheapest dispatch, each within the gaps of both schedules.

Minimum cost is monotone and homogeneous in prices, and more freedom never costs more; these follow
from the definition of a minimum, not from any model of ours.
"""

from dataclasses import replace

import numpy as np
import pandas as pd
import pytest

from planner.dispatch import solve_year
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope, StoreEnvelope
from tests.planner.dispatch.random_sites import random_site

pytestmark = pytest.mark.solver

SEEDS = (400, 402)

GAP_FRAC = 1e-5

#: Small windows with a store are harder on the bound than a year is.
LARGEST_GAP_FRAC = 5e-3

Site = tuple[OperatingEnvelope, Prices, pd.DataFrame]


def bracket(site: Site) -> tuple[float, float]:
    """Bound and cost, between which the true minimum lies."""
    schedule = solve_year(*site, gap_frac=GAP_FRAC, duals=False)
    return schedule.lower_bound_per_year, schedule.cost_per_year


def hold_no_dearer(free: Site, bound: Site) -> None:
    """The first site's minimum is no higher than the second's, and neither gap voids the law."""
    free_low, free_high = bracket(free)
    bound_low, bound_high = bracket(bound)
    rounding = 1e-6 * abs(bound_high)

    assert free_low <= bound_high + rounding
    assert free_high - free_low <= LARGEST_GAP_FRAC * abs(free_high)
    assert bound_high - bound_low <= LARGEST_GAP_FRAC * abs(bound_high)


@pytest.mark.parametrize("seed", SEEDS)
def test_dearer_fuel_never_lowers_cost(seed: int) -> None:
    """Fuel 20 % dearer."""
    envelope, prices, hourly = random_site(seed, steps=30)
    dearer = replace(prices, fuel_per_lhv_kWh=1.2 * prices.fuel_per_lhv_kWh)

    hold_no_dearer((envelope, prices, hourly), (envelope, dearer, hourly))


@pytest.mark.parametrize("seed", SEEDS)
def test_a_store_never_raises_cost(seed: int) -> None:
    """The same site with a store, its level closed over the steps, and without."""
    envelope, prices, hourly = random_site(seed, steps=30)
    store = StoreEnvelope(300.0, 80.0, 80.0, 0.005)

    hold_no_dearer(
        (replace(envelope, store=store), prices, hourly),
        (replace(envelope, store=None), prices, hourly),
    )


@pytest.mark.parametrize("seed", SEEDS)
def test_an_export_right_never_raises_cost(seed: int) -> None:
    """Export forbidden, and allowed."""
    envelope, prices, hourly = random_site(seed, steps=30)
    allowed, forbidden = (replace(prices, export_limit_kW=limit) for limit in (100.0, 0.0))

    hold_no_dearer((envelope, allowed, hourly), (envelope, forbidden, hourly))


@pytest.mark.parametrize("seed", SEEDS)
def test_a_longer_minimum_time_never_lowers_cost(seed: int) -> None:
    """Minimum up time of two hours, and of nine."""
    envelope, prices, hourly = random_site(seed, steps=30)
    short, long = (
        replace(envelope, units=(replace(envelope.units[0], minimum_up_h=hours),))
        for hours in (2.0, 9.0)
    )

    hold_no_dearer((short, prices, hourly), (long, prices, hourly))


@pytest.mark.parametrize("seed", SEEDS)
def test_a_lower_minimum_load_never_raises_cost(seed: int) -> None:
    """Three tenths of the minimum turned into first segment: the same line, further down."""
    envelope, prices, hourly = random_site(seed, steps=30)
    unit = envelope.units[0]
    down_kW = 0.3 * unit.minimum_power_kW
    segments_kW = unit.segment_power_kW.copy()
    segments_kW[:, 0] += down_kW
    lower = replace(
        unit,
        minimum_power_kW=unit.minimum_power_kW - down_kW,
        segment_power_kW=segments_kW,
        fuel_at_minimum_lhv_kW=unit.fuel_at_minimum_lhv_kW - down_kW * unit.fuel_slope_lhv[:, 0],
        paths=tuple(
            replace(
                path,
                yield_at_minimum_kW={
                    grade: heat_kW - down_kW * path.yield_slope[grade][:, 0]
                    for grade, heat_kW in path.yield_at_minimum_kW.items()
                },
            )
            for path in unit.paths
        ),
    )

    hold_no_dearer((replace(envelope, units=(lower,)), prices, hourly), (envelope, prices, hourly))


@pytest.mark.parametrize("seed", SEEDS)
def test_doubling_every_price_doubles_the_cost(seed: int) -> None:
    """All prices, wear and starts twice as high."""
    envelope, prices, hourly = random_site(seed, steps=30)
    unit = envelope.units[0]
    worn = replace(
        unit,
        cost_per_run_hour=2.0 * unit.cost_per_run_hour,
        cost_per_kWh=2.0 * unit.cost_per_kWh,
        cost_per_start=2.0 * unit.cost_per_start,
    )
    doubled = replace(
        prices,
        import_per_kWh=2.0 * prices.import_per_kWh,
        export_per_kWh=2.0 * prices.export_per_kWh,
        fuel_per_lhv_kWh=2.0 * prices.fuel_per_lhv_kWh,
        demand_charges=tuple(
            replace(charge, rate_per_kW=2.0 * charge.rate_per_kW)
            for charge in prices.demand_charges
        ),
        fixed_per_year=2.0 * prices.fixed_per_year,
    )

    once_low, once_high = bracket((envelope, prices, hourly))
    twice_low, twice_high = bracket((replace(envelope, units=(worn,)), doubled, hourly))

    gaps = 2.0 * (once_high - once_low) + (twice_high - twice_low)
    assert abs(twice_high - 2.0 * once_high) <= gaps + 1e-6 * abs(twice_high)


@pytest.mark.parametrize("seed", SEEDS)
def test_two_like_days_cost_at_most_two_closed_days(seed: int) -> None:
    """A day closed upon itself, and the same day twice: repeating it is always allowed.

    Demand charges are left out, since they are paid once. The state before a window is free, so
    that the turn of the day may need one start that a single day does not pay, and a minimum time
    across it; both are made nothing here.
    """
    envelope, prices, hourly = random_site(seed, steps=24)
    free = replace(
        envelope.units[0],
        minimum_up_h=0.0,
        minimum_down_h=0.0,
        cost_per_start=0.0,
        start_fuel_lhv_kWh=0.0,
    )
    envelope = replace(envelope, units=(free,))
    prices = replace(prices, demand_charges=(), fixed_per_year=0.0)

    _, one_high = bracket((envelope, prices, hourly))
    two_low, _ = bracket((_twice_plant(envelope), _twice_prices(prices), _twice_demand(hourly)))

    assert two_low <= 2.0 * one_high * (1.0 + 1e-6)


def _twice_plant(envelope: OperatingEnvelope) -> OperatingEnvelope:
    """The unit's day twice."""
    unit = envelope.units[0]

    def twice(values: np.ndarray) -> np.ndarray:
        return np.concatenate([values, values])

    paths = tuple(
        replace(
            path,
            yield_at_minimum_kW={g: twice(v) for g, v in path.yield_at_minimum_kW.items()},
            yield_slope={g: twice(v) for g, v in path.yield_slope.items()},
        )
        for path in unit.paths
    )
    arrays = (
        "available",
        "minimum_power_kW",
        "maximum_power_kW",
        "segment_power_kW",
        "fuel_at_minimum_lhv_kW",
        "fuel_slope_lhv",
    )
    days = replace(unit, paths=paths, **{name: twice(getattr(unit, name)) for name in arrays})
    return replace(envelope, units=(days,))


def _twice_prices(prices: Prices) -> Prices:
    """The prices' day twice."""
    names = ("import_per_kWh", "export_per_kWh", "fuel_per_lhv_kWh")
    return replace(prices, **{n: np.concatenate([getattr(prices, n)] * 2) for n in names})


def _twice_demand(hourly: pd.DataFrame) -> pd.DataFrame:
    """The demands' day twice."""
    index = pd.date_range(hourly.index[0], periods=2 * len(hourly), freq="h")
    return pd.concat([hourly, hourly]).set_index(index)

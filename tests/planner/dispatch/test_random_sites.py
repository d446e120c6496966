"""Random small sites against an independent statement and another solver's interface.

Source of every expected value: `scipy.optimize.milp` on `independent_milp`, which shares no code
with the planner.
"""

from collections.abc import Callable, Sequence

import pytest

from planner.dispatch import Schedule, solve, solve_year, verify
from planner.dispatch.record import DispatchModel
from planner.dispatch.window import whole_year
from tests.planner.dispatch.independent_milp import cheapest
from tests.planner.dispatch.random_sites import random_site

#: Both sides solve to far less than this share of the cost.
TOLERANCE_FRAC = 1e-6

FIXED = range(8)
ROTATING = range(8, 300)


def hold_site(seed: int) -> None:
    """Bound, optimum and schedule in this order, and the schedule within its stated gap."""
    envelope, prices, hourly = random_site(seed)
    optimum = cheapest(envelope, prices, hourly)
    assert optimum is not None

    with pytest.MonkeyPatch.context() as patch:
        for way in ("whichever suits", "by months"):
            if way == "by months":
                patch.setattr(solve, "why_unknown", lambda _: "this test's site")
            schedule = solve_year(envelope, prices, hourly, gap_frac=1e-4)
            assert ("months apart" in schedule.path) or way == "whichever suits"
            verify(schedule, envelope, prices, hourly)
            hold_schedule(schedule, optimum)


def hold_schedule(schedule: Schedule, optimum: float) -> None:
    """Bound below optimum, cost above it, and the difference within the stated gap."""
    slack = TOLERANCE_FRAC * abs(optimum)
    assert schedule.lower_bound_per_year <= optimum + slack
    assert schedule.cost_per_year >= optimum - slack
    assert schedule.cost_per_year - optimum <= schedule.gap_frac * schedule.cost_per_year + slack


@pytest.mark.solver
@pytest.mark.parametrize("seed", FIXED)
def test_schedule_and_bound_enclose_the_optimum(seed: int) -> None:
    """No bound above the optimum of an independent formulation, no schedule below it."""
    hold_site(seed)


@pytest.mark.solver
def test_schedule_and_bound_enclose_the_optimum_on_todays_sites(
    rotation: Callable[[Sequence[int], int], list[int]],
) -> None:
    """The same on a share of many more sites that rotates from day to day; all with --long."""
    for seed in rotation(ROTATING, 8):
        hold_site(seed)


@pytest.mark.solver
@pytest.mark.parametrize("seed", range(4))
def test_model_of_record_is_the_independent_problem(seed: int) -> None:
    """The model of record, left to decide everything, has the independent optimum."""
    envelope, prices, hourly = random_site(seed, steps=24)
    optimum = cheapest(envelope, prices, hourly)
    recorded = DispatchModel(whole_year(envelope, prices, hourly)).solve(gap_frac=1e-9)

    assert recorded == pytest.approx(optimum, rel=TOLERANCE_FRAC)

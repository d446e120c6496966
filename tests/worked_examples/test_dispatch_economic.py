"""Economic dispatch of three machines with quadratic cost.

Given   F1 = f1 (510 + 7.2 P + 0.00142 P2), 150 to 600 MW; F2 = 310 + 7.85 P + 0.00194 P2, 100 to
        400; F3 = 78 + 7.97 P + 0.00482 P2, 50 to 200; load 850 MW; f1 = 1.1 or 0.9.
Find    cost and marginal cost of the cheapest hour.
Source  Wood and Wollenberg, Power Generation, Operation and Control, chapter 3 (data from
        memory); optimum from the condition of equal marginal cost, solved by an independent code:
        f1 = 1.1: 8,194.36 $/h, lambda 9.1483; f1 = 0.9: 7,252.11 $/h, lambda 8.5761.
By hand f1 = 0.9 sits at unit 1's limit of 600 MW, so 7.85 + 0.00388 P2 = 7.97 + 0.00964 P3 with
        P2 + P3 = 250: P2 = (0.12 + 0.00964 x 250) / 0.01352 = 187.13, P3 = 62.87,
        lambda 7.85 + 0.00388 x 187.13 = 8.5761.
Differs a machine is a row of heaters of 2 MW, each as dear as the chord of its part; the chords lie
        at most 0.00482 above the curve, and all three machines run.
"""

import pytest

from planner.dispatch import solve_year, verify
from planner.plant.envelope import HeaterEnvelope
from tests.planner.dispatch.invented_plants import demands, money, plant

STEP = 2.0


def machine(
    name: str, scale: float, curve: tuple[float, float, float], *, low: float, high: float
) -> tuple[HeaterEnvelope, ...]:
    """A machine above its minimum, its cost at the minimum as standing fuel."""
    fixed, linear, square = (scale * factor for factor in curve)
    at_low = fixed + linear * low + square * low**2
    starts = [low + STEP * part for part in range(round((high - low) / STEP))]
    return tuple(
        HeaterEnvelope(
            f"{name} from {first:g}",
            "steam",
            STEP,
            linear + square * (2.0 * first + STEP),
            at_low if first == low else 0.0,
        )
        for first in starts
    )


@pytest.mark.solver
@pytest.mark.parametrize(
    ("scale", "cost", "marginal"), [(1.1, 8194.36, 9.1483), (0.9, 7252.11, 8.5761)]
)
def test_three_machines(scale: float, cost: float, marginal: float) -> None:
    """Cost and marginal cost of the hour, as published and worked above."""
    envelope = plant(
        heaters=(
            *machine("one", scale, (510.0, 7.2, 0.00142), low=150.0, high=600.0),
            *machine("two", 1.0, (310.0, 7.85, 0.00194), low=100.0, high=400.0),
            *machine("three", 1.0, (78.0, 7.97, 0.00482), low=50.0, high=200.0),
        )
    )
    prices = money(1, fuel_price=1.0)
    hourly = demands(1, steam=850.0 - 300.0)

    schedule = solve_year(envelope, prices, hourly)

    verify(schedule, envelope, prices, hourly)
    assert schedule.cost_per_year == pytest.approx(cost, abs=0.02)
    # A chord's slope lies within half a step of the curve's.
    assert schedule.hourly["price_steam_per_kWh"].iloc[0] == pytest.approx(marginal, abs=0.01)

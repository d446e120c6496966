"""Power price above which a unit with its heat in use earns its fuel.

Given   a unit of 100 kW without minimum load or start cost; gas g a kWh, electrical efficiency
        eta_e, useful heat eta_h of the fuel, boiler eta_b, maintenance om a kWh; 150 kW of power
        wanted in every hour, and 400 kW of hot water, or none. Import at five prices, no export.
Find    the hours in which it runs, and the cost.
Source  closed form: c = g/eta_e + om - (eta_h/eta_e) g/eta_b; with the heat dumped the last term
        falls away.
By hand g 0.040, eta_e 0.30, eta_h 0.45, eta_b 0.90, om 0.010: c = 0.133333 + 0.010 - 0.066667 =
        0.076667; dumped 0.143333.
        g 0.030, 0.25, 0.50, 0.85, 0.012: c = 0.120 + 0.012 - 0.070588 = 0.061412; dumped 0.132.
        The unit runs full in exactly the hours dearer than c and saves 100 kW x (price - c) there.
Differs nothing; costs within the solver's tolerance.
"""

import numpy as np
import pytest

from planner.dispatch import solve_year, verify
from tests.planner.dispatch.invented_plants import Machine, boiler, demands, money, plant

OFFSETS = np.array([-0.020, -0.0001, 0.0001, 0.015, 0.060])


@pytest.mark.solver
@pytest.mark.parametrize(
    ("gas", "eta_e", "eta_h", "eta_b", "upkeep", "heat_kW", "break_even"),
    [
        (0.040, 0.30, 0.45, 0.90, 0.010, 400.0, 0.076667),
        (0.040, 0.30, 0.45, 0.90, 0.010, 0.0, 0.143333),
        (0.030, 0.25, 0.50, 0.85, 0.012, 400.0, 0.061412),
        (0.030, 0.25, 0.50, 0.85, 0.012, 0.0, 0.132),
    ],
)
def test_break_even(
    *,
    gas: float,
    eta_e: float,
    eta_h: float,
    eta_b: float,
    upkeep: float,
    heat_kW: float,
    break_even: float,
) -> None:
    """Hours and cost as worked above, heat in use and dumped."""
    unit = Machine(
        minimum_kW=0.0,
        segment_kW=(100.0,),
        fuel_at_minimum_kW=0.0,
        fuel_slope=(1.0 / eta_e,),
        paths={"water only": {"hot_water": (0.0, eta_h / eta_e)}},
        per_kWh=upkeep,
    ).over(5)
    envelope = plant(unit, heaters=(boiler(efficiency=eta_b),))
    import_price = break_even + OFFSETS
    prices = money(5, import_price=import_price, fuel_price=gas)
    hourly = demands(5, power=150.0, hot_water=heat_kW)

    schedule = solve_year(envelope, prices, hourly, gap_frac=1e-9)

    verify(schedule, envelope, prices, hourly)
    runs = [0.0, 0.0, 100.0, 100.0, 100.0]
    without_unit = 150.0 * import_price.sum() + 5 * heat_kW * gas / eta_b
    saved = 100.0 * (0.0001 + 0.015 + 0.060)
    assert schedule.hourly["unit_power_kW"].tolist() == pytest.approx(runs, abs=1e-6)
    # The break-even above is rounded to 1e-6, and 300 kWh are made.
    assert schedule.cost_per_year == pytest.approx(without_unit - saved, abs=300 * 1e-6)

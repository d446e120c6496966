"""Work of compressing fuel gas in one stage and in two.

Given   methane at 20 degC; from 400 to 1350 kPa gauge at the skid, and from 100 to 1900 kPa gauge;
        150 kPa more over valve and filter; air pressure 100 kPa; isentropic efficiency 0.75, motor
        0.94, heat capacity ratio 1.27, no stage above 4 to 1, intercooling to 20 degC.
Find    electrical work of a kilogram.
Source  isentropic work of an ideal gas, any thermodynamics text: k/(k-1) R T1/M (r^((k-1)/k) - 1).
By hand R T1/M = 8.31446 x 293.15 / 16.043 = 151.93 kJ/kg; k/(k-1) = 4.7037; 0.75 x 0.94 = 0.705.
        One stage: r = 1600/500 = 3.2; 3.2^0.212598 = exp(0.247281) = 1.28054;
        4.7037 x 151.93 x 0.28054 / 0.705 = 284.4 kJ/kg.
        Two stages: r = 2150/200 = 10.75, each root 3.27872; 3.27872^0.212598 = exp(0.252443) =
        1.28717; 2 x 4.7037 x 151.93 x 0.28717 / 0.705 = 582.2 kJ/kg.
Differs nothing; the tolerance is the rounding of the hand calculation.
"""

import pytest

from planner.plant.fuel import GasFuel
from planner.plant.gas_compressor import compression_kJ_per_kg


@pytest.mark.parametrize(
    ("supply_kPa_gauge", "needed_kPa_gauge", "work_kJ_per_kg"),
    [(400.0, 1350.0, 284.4), (100.0, 1900.0, 582.2), (2000.0, 1900.0, 0.0)],
)
def test_gas_compressor(
    supply_kPa_gauge: float, needed_kPa_gauge: float, work_kJ_per_kg: float
) -> None:
    """One stage, two stages, and none where the main is high enough."""
    methane = GasFuel.from_composition("Methane", {"methane": 1.0})

    work = compression_kJ_per_kg(
        methane,
        supply_kPa_gauge=supply_kPa_gauge,
        needed_kPa_gauge=needed_kPa_gauge,
        ambient_kPa=100.0,
    )

    assert work == pytest.approx(work_kJ_per_kg, abs=0.2)

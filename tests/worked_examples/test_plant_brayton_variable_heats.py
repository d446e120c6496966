"""Ideal Brayton cycle with variable specific heats.

Given   dry air (N2 0.78084, O2 0.20946, Ar 0.0097), 300 K; pressure ratio 8 to 1300 K, and 10 to
        1400 K; ideal machines.
Find    temperatures after compressor and turbine, efficiency, back work ratio.
Source  worked with Cantera 3.2; textbooks with rounded tables have 540 K, 770 K, 0.426, 0.403 for
        the first and 0.457, 0.396 for the second (from memory).
By hand with k = 1.4 the first would be 543 K, 718 K and 0.448, which is why heats must vary.
Differs nothing; the tolerance is the rounding of the figures.
"""

import numpy as np
import pytest

from planner.plant.gas import Mixture, molar_masses_kg_per_kmol


@pytest.mark.parametrize(
    ("ratio", "hot_K", "temperatures_K", "efficiency", "back_work"),
    [
        (8.0, 1300.0, (539.48, 770.31), 0.4255, 0.4024),
        (10.0, 1400.0, (573.7, 787.7), 0.4566, 0.3957),
    ],
)
def test_brayton(
    ratio: float,
    hot_K: float,
    temperatures_K: tuple[float, float],
    efficiency: float,
    back_work: float,
) -> None:
    """Two cycles, as worked above."""
    masses = np.array([0.78084, 0.20946, 0.0097, 0.0, 0.0]) * molar_masses_kg_per_kmol()
    air = Mixture((masses / masses.sum())[None, :])
    cold, hot = np.array([300.0]), np.array([hot_K])
    rise = air.gas_constant_kJ_per_kgK * np.log(ratio)
    t2 = air.temperature_at_entropy_K(air.entropy_kJ_per_kgK(cold) + rise, 500.0)
    t4 = air.temperature_at_entropy_K(air.entropy_kJ_per_kgK(hot) - rise, 800.0)

    h = air.enthalpy_kJ_per_kg
    expansion, compression = h(hot) - h(t4), h(t2) - h(cold)
    assert (t2[0], t4[0]) == pytest.approx(temperatures_K, abs=0.05)
    assert (expansion - compression)[0] / (h(hot) - h(t2))[0] == pytest.approx(efficiency, abs=1e-4)
    assert (compression / expansion)[0] == pytest.approx(back_work, abs=1e-4)

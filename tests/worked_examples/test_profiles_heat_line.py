"""Base heat and heating told apart in four bills.

Given   four periods of 30 days at a steady 0, 5, 10 and 20 degC; base temperature 15 degC; billed
        heat 57.0, 42.0, 27.0 and 12.0 MWh.
Find    base heat a day, heat a degree-day, coefficient of determination.
Source  least squares of heat over days and degree-days (any text on energy signatures).
By hand degree-days 30 x 15 = 450, 300, 150, 0. From the last, 12 000 / 30 = 400 kWh a day; from
        the first, (57 000 - 12 000) / 450 = 100 kWh a degree-day; the others lie on the line:
        12 000 + 300 x 100 = 42 000 and 12 000 + 150 x 100 = 27 000, so R2 = 1.
Differs nothing.
"""

import numpy as np
import pytest

from load_profiles.degree_days import fit_heat_line


def test_heat_line() -> None:
    """Base, slope and R2, as worked above."""
    ambient_degC = np.repeat([0.0, 5.0, 10.0, 20.0], 720)
    period = np.repeat(np.arange(4), 720)
    heat_kWh = np.array([57_000.0, 42_000.0, 27_000.0, 12_000.0])

    line = fit_heat_line(heat_kWh, period, ambient_degC, base_temperature_degC=15.0)

    assert line.base_kWh_per_day == pytest.approx(400.0)
    assert line.slope_kWh_per_K_day == pytest.approx(100.0)
    assert line.r_squared == pytest.approx(1.0)

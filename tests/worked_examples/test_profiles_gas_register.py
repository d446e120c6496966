"""Three readings of a gas meter become heat by the hour.

Given   readings of 1000 m3 on 1 January 00:00, 1240 m3 on 11 January 00:00 and 11 140 m3 at the
        year's end; 11.2 kWh HHV/m3 on the invoice; heaters of 80 % (HHV); dryers that run by the
        shape 2 from 06 to 18 and 0 at night on all days.
Find    heat in the hours of 5 January and the year's heat.
Source  energy balance: heat = volume x calorific value x efficiency.
By hand first span 240 m3 x 11.2 x 0.80 = 2150.4 kWh over 10 days x 12 h = 17.92 kW by day;
        year 10 140 m3 x 8.96 kWh/m3 = 90 854.4 kWh.
Differs nothing.
"""

import numpy as np
import pytest

from load_profiles.readers.register import spread_between


def test_gas_register() -> None:
    """Heat by day and night, and of the year, as worked above."""
    by_day = np.tile(np.repeat([0.0, 2.0, 0.0], [6, 12, 6]), 365)
    bounds_s = np.array([0.0, 240.0, 8760.0]) * 3600.0
    heat_kWh = np.diff([1000.0, 1240.0, 11_140.0]) * 11.2 * 0.80

    hours_kWh = spread_between(bounds_s, heat_kWh, by_day)

    fifth = hours_kWh[4 * 24 : 5 * 24]
    assert fifth[6:18] == pytest.approx(np.full(12, 17.92))
    assert not fifth[:6].any()
    assert not fifth[18:].any()
    assert hours_kWh.sum() == pytest.approx(90_854.4)

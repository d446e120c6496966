"""Air pressure at altitude in the standard atmosphere.

Given   altitudes of 300, 500, 1000 and 2000 m.
Find    static pressure.
Source  ICAO Doc 7488 (ISO 2533), table of the standard atmosphere: 977.73, 954.61, 898.75 and
        794.95 hPa (from memory).
By hand 300 m: 1 - 2.25577e-5 x 300 = 0.9932327; ln = -0.00679030; x 5.25588 = -0.0356890;
        exp = 0.964940; x 1013.25 = 977.73 hPa.
Differs nothing; the table is by geopotential altitude, 0.6 m below the true one at 2000 m.
"""

import pytest

from load_profiles.atmosphere import standard_pressure_kPa


@pytest.mark.parametrize(
    ("altitude_m", "pressure_hPa"),
    [(0, 1013.25), (300, 977.73), (500, 954.61), (1000, 898.75), (2000, 794.95)],
)
def test_standard_atmosphere(altitude_m: float, pressure_hPa: float) -> None:
    """Pressures of the table to its last digit."""
    assert standard_pressure_kPa(altitude_m) * 10.0 == pytest.approx(pressure_hPa, abs=0.01)

"""NOx from parts per million to milligrams, and a common guarantee against a common limit.

Given   9, 15, 25, 42 and 50 ppm NOx as NO2, dry at 15 % oxygen.
Find    mg/Nm3 at 0 degC and 101.325 kPa, and whether 25 ppm keeps a limit of 50 mg/Nm3.
Source  ideal gas: molar mass of NO2 46.0055 (IUPAC) over the molar volume 22.414 m3/kmol, 2.0525;
        limit of Directive (EU) 2015/2193 for new gas turbines on natural gas (*from memory*).
By hand 18.5, 30.8, 51.3, 86.2, 102.6 mg/Nm3. The ceiling of 25 ppm lies above 50, the centre of its
        band at 0.8 x 51.31 = 41.05 below: at risk. 24.36 ppm is 50 mg/Nm3.
Differs nothing; tolerance is the last printed digit.
"""

import pytest

from planner.outcome.nox import nox
from planner.outcome.nox_limits import mg_per_Nm3_from_ppm
from tests.planner.market.small_study import RoundGas, idle_flows, small_study, small_year


@pytest.mark.parametrize(
    ("ppm", "mg_per_Nm3"), [(9.0, 18.5), (15.0, 30.8), (25.0, 51.3), (42.0, 86.2), (50.0, 102.6)]
)
def test_ppm_to_mg(ppm: float, mg_per_Nm3: float) -> None:
    """Conversions as worked above."""
    assert mg_per_Nm3_from_ppm(ppm) == pytest.approx(mg_per_Nm3, abs=0.05)


def test_guarantee_of_25_ppm_is_at_risk_under_50_mg() -> None:
    """A unit at full load all year, its band across the limit."""
    study = small_study()
    flows = idle_flows(
        small_year(),
        unit_on=1,
        unit_power_kW=2000.0,
        unit_maximum_kW=2000.0,
        unit_fuel_lhv_kW=6500.0,
    )

    judged, _ = nox(study, study.option[0].unit, RoundGas(), flows, 1.0)

    assert judged.limit_mg_per_Nm3 == 50.0
    assert judged.band_high_mg_per_Nm3 == pytest.approx(51.3, abs=0.05)
    assert judged.band_centre_mg_per_Nm3 == pytest.approx(41.05, abs=0.005)
    assert judged.status == "at risk"

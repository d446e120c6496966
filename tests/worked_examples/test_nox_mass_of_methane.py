"""Mass of NOx from a concentration, for methane.

Given   methane burnt at 1,000 kW (LHV) all year with a guarantee of 24.36 ppm, 50 mg/Nm3, dry at
        15 % oxygen.
Find    mass of NOx at the upper edge of the band, in a year and per energy; the same in lb/MMBtu.
Source  atom balance: at 15 % oxygen, with air of 20.95 % oxygen, a mole of methane leaves 30.09
        moles of dry flue gas, 840.4 Nm3 a GJ (LHV); US EPA Method 19 with the published F-factor
        of natural gas, 8,710 dscf/MMBtu: 25 ppm are 0.0921 lb/MMBtu (HHV).
By hand 50 x 840.4 = 42.0 g/GJ. A year of 1 MW is 31,536 GJ: 1,325 kg. In HHV 25 ppm are
        43.1/1.1107 = 38.8 g/GJ, times 1.05506/453.592 per MMBtu and lb: 0.0903 lb/MMBtu.
Differs 0.3 % on the first (molar masses, 15 or 25 degC calorific value); 2.5 % on the second: the
        published F-factor is an average of gases, 1.3 % above methane's, and Method 19 takes
        20.9 % oxygen.
"""

from typing import Any

import pytest

from planner.outcome.nox import nox
from planner.plant.fuel import GasFuel
from planner.results.records import Nox
from tests.planner.market.small_study import (
    idle_flows,
    small_option,
    small_study,
    small_unit,
    small_year,
)

METHANE = {"methane": 1.0}
GJ_A_YEAR = 31_536.0


def _year_of_one_MW(ppm: float) -> tuple[Nox, Any]:
    """A year at full load on 1,000 kW of methane."""
    sheet = {**small_unit()["sheet"], "nox": {"nox_ppm_15O2": ppm, "from_load_frac": 0.5}}
    study = small_study(option=(small_option(unit=small_unit(sheet=sheet)),))
    flows = idle_flows(
        small_year(),
        unit_on=1,
        unit_power_kW=300.0,
        unit_maximum_kW=300.0,
        unit_fuel_lhv_kW=1000.0,
    )
    fuel = GasFuel.from_composition("Methane", METHANE)
    return nox(study, study.option[0].unit, fuel, flows, 1.0)[0], fuel


def test_mass_at_fifty_mg() -> None:
    """Upper edge of a year, as worked above."""
    judged, _ = _year_of_one_MW(24.36)

    assert judged.annual_high_kg == pytest.approx(1325.0, rel=3e-3)
    assert judged.annual_high_kg * 1000.0 / GJ_A_YEAR == pytest.approx(42.0, rel=3e-3)


def test_mass_by_method_19() -> None:
    """25 ppm of methane within 2.5 % of the published factor of natural gas."""
    judged, fuel = _year_of_one_MW(25.0)

    g_per_hhv_GJ = judged.annual_high_kg * 1000.0 / GJ_A_YEAR / fuel.hhv_over_lhv
    assert g_per_hhv_GJ * 1.05506 / 453.592 == pytest.approx(0.0921, rel=0.025)

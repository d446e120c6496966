"""Legal test of a year with steam and hot water, some of it dumped.

Given   a unit of 4 MW: in a year 100 GWh of fuel (LHV) give 30 GWh of power, 38 GWh of steam of
        which 2 are dumped, and 14 GWh of hot water; starts take a further 0.5 GWh of fuel.
Find    overall efficiency, primary-energy saving, and whether high efficiency is met.
Source  Directive 2012/27/EU, annex I (75 %) and annex II (10 %), with the references 53, 87, 92 %.
By hand overall (30 + 36 + 14)/100.5 = 79.60 %. Apart: 30/0.53 + 36/0.87 + 14/0.92 = 56.604 +
        41.379 + 15.217 = 113.200 GWh, so PES = 1 - 100.5/113.200 = 11.22 %: met.
Differs nothing.
"""

import pytest

from planner.outcome.efficiency import efficiency
from planner.results.records import EnergyYear
from tests.planner.market.small_study import RoundGas, small_option, small_study, small_unit


def test_high_efficiency_of_a_mixed_year() -> None:
    """Efficiencies and verdict, as worked above."""
    year = EnergyYear(
        power_made_kWh=30e6,
        grid_import_kWh=0.0,
        grid_export_kWh=0.0,
        unit_fuel_lhv_kWh=100.5e6,
        start_fuel_lhv_kWh=0.5e6,
        heater_fuel_lhv_kWh=0.0,
        recovered_kWh={"steam": 38e6, "hot_water": 14e6, "hot_gas": 0.0},
        dumped_kWh={"steam": 2e6, "hot_water": 0.0, "hot_gas": 0.0},
        heater_heat_kWh={"steam": 0.0, "hot_water": 0.0, "hot_gas": 0.0},
        electric_cooling_kWh=0.0,
        absorption_cooling_kWh=0.0,
        store_charged_kWh=0.0,
        store_discharged_kWh=0.0,
        exhaust_loss_kWh=18.5e6,
    )
    sheet = {**small_unit()["sheet"], "power_kW": 4000.0}
    study = small_study(option=(small_option(unit=small_unit(sheet=sheet)),))

    judged = efficiency(study, study.option[0], year, RoundGas())

    assert judged.overall_lhv_frac == pytest.approx(0.7960, abs=5e-5)
    assert judged.primary_energy_saving_frac == pytest.approx(0.1122, abs=5e-5)
    assert (judged.required_overall_frac, judged.required_saving_frac) == (0.75, 0.10)
    assert judged.met is True

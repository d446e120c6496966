"""Legal efficiency tests, and the peak with the CHP off."""

from typing import Any

import pytest

from planner.outcome.efficiency import efficiency, useful_heat_kWh
from planner.outcome.energy import energy_year
from planner.outcome.security import security
from planner.results.records import Efficiency
from tests.planner.market.small_study import (
    RoundGas,
    idle_flows,
    small_option,
    small_study,
    small_unit,
    small_year,
)

YEAR = small_year()


def _judged(power_kW: float = 2000.0, **flows: float) -> Efficiency:
    """A unit of a size, over a steady year that burns 1,000 kW."""
    sheet = {**small_unit()["sheet"], "power_kW": power_kW}
    study = small_study(option=(small_option(unit=small_unit(sheet=sheet)),))
    energy = energy_year(idle_flows(YEAR, unit_fuel_lhv_kW=1000.0, **flows), 1.0)
    return efficiency(study, study.option[0], energy, RoundGas())


def test_good_year_meets_the_test() -> None:
    """30 % power and 52 % steam: 82 % in all and 14.1 % saved, by hand."""
    judged = _judged(unit_power_kW=300.0, unit_steam_kW=520.0)

    assert judged.overall_lhv_frac == pytest.approx(0.82)
    assert judged.overall_hhv_frac == pytest.approx(0.82 / 1.1)
    assert judged.primary_energy_saving_frac == pytest.approx(1 - 1 / (0.3 / 0.53 + 0.52 / 0.87))
    assert judged.met is True


def test_dumped_heat_is_not_useful() -> None:
    """The same year with a fifth of the heat dumped falls below 75 %."""
    judged = _judged(unit_power_kW=300.0, unit_steam_kW=520.0, dumped_steam_kW=104.0)

    assert judged.overall_lhv_frac == pytest.approx(0.716)
    assert judged.met is False


@pytest.mark.parametrize(("power_kW", "required"), [(999.0, 0.0), (1000.0, 0.1)])
def test_small_units_need_any_saving(power_kW: float, required: float) -> None:
    """Below 1 MW any saving will do; 77 % with 5.0 % saved passes only there."""
    judged = _judged(power_kW, unit_power_kW=270.0, unit_hot_water_kW=500.0)

    assert judged.required_saving_frac == required
    assert judged.met is (power_kW < 1000.0)


def test_test_can_be_waived() -> None:
    """With no test asked for, nothing is required and nothing is judged."""
    study = small_study(
        emissions={"nox_regime": "eu_mcp_new_turbine_gas", "efficiency_test": "none"}
    )
    energy = energy_year(idle_flows(YEAR), 1.0)

    judged = efficiency(study, study.option[0], energy, RoundGas())

    assert judged.met is None
    assert judged.required_overall_frac is None
    assert judged.overall_lhv_frac == 0.0


def test_store_losses_are_taken_off() -> None:
    """100 kW into the store and 90 kW out: 10 kW of the hot water was never used."""
    flows = idle_flows(
        YEAR, unit_hot_water_kW=400.0, store_charge_kW=100.0, store_discharge_kW=90.0
    )

    assert useful_heat_kWh(energy_year(flows, 1.0))["hot_water"] == pytest.approx(390.0 * 8760)


def _secured(**demands: Any) -> dict[str, Any]:
    """Security lines by carrier for steady demands, with 40 kW of within-step excess."""
    year = small_year(excess_kW=40.0, **demands)
    return {line.carrier: line for line in security(small_study(), year)}


def test_boilers_carry_the_peak_by_hand() -> None:
    """3,000 kW of boilers against 2,500 kW: 500 kW spare, 1,500 short with the largest out."""
    line = _secured(hot_water_kW=2500.0)["hot_water"]

    assert line.margin_kW == pytest.approx(500.0)
    assert line.margin_one_heater_out_kW == pytest.approx(-1500.0)
    assert line.met


def test_grid_carries_the_short_peak() -> None:
    """5,000 kW of connection carry 4,960 kW with 40 kW on top, and not one more."""
    assert _secured(power_kW=4960.0)["power"].met
    assert not _secured(power_kW=4961.0)["power"].met


def test_only_wanted_carriers_are_listed() -> None:
    """A site without cooling needs no line for it; cooling without chillers is not carried."""
    assert list(_secured(power_kW=100.0, cooling_kW=0.0)) == ["power"]
    assert not _secured(cooling_kW=10.0)["cooling"].met

"""Yearly and monthly sums of the flows, and how the unit runs."""

import numpy as np
import pytest

from planner.outcome.energy import energy_year, month_flows, running
from tests.planner.market.small_study import idle_flows, random_flows, small_year


@pytest.mark.parametrize("step_h", [1.0, 0.5])
def test_steady_year_by_hand(step_h: float) -> None:
    """1,000 kW of power and 2,000 kW of steam from 4,000 kW of fuel for 8,760 h."""
    year = small_year(step_h)
    flows = idle_flows(
        year,
        unit_on=1,
        unit_power_kW=1000.0,
        unit_maximum_kW=1250.0,
        unit_fuel_lhv_kW=4000.0,
        unit_steam_kW=2000.0,
        dumped_steam_kW=500.0,
        heater_steam_kW=300.0,
        heater_hot_water_kW=200.0,
        grid_import_kW=500.0,
        grid_export_kW=100.0,
    )

    energy = energy_year(flows, year.step_h)
    run = running(flows, year.step_h)

    assert energy.power_made_kWh == pytest.approx(8.76e6)
    assert energy.recovered_kWh["steam"] == pytest.approx(17.52e6)
    assert energy.exhaust_loss_kWh == pytest.approx(8.76e6)
    assert run.run_hours == pytest.approx(8760.0)
    assert run.full_load_hours == pytest.approx(8760.0 * 0.8)
    assert run.mean_load_frac == pytest.approx(0.8)
    assert run.power_covered_frac == pytest.approx(900.0 / 1400.0)
    assert run.heat_covered_frac == pytest.approx(1500.0 / 2000.0)


def test_start_fuel_is_fuel() -> None:
    """Two starts of 500 kWh are part of the unit's fuel and of what the exhaust loses."""
    year = small_year()
    flows = idle_flows(year)
    flows.iloc[[100, 5000], flows.columns.get_loc("start_fuel_lhv_kW")] = 500.0

    energy = energy_year(flows, year.step_h)

    assert energy.start_fuel_lhv_kWh == pytest.approx(1000.0)
    assert energy.unit_fuel_lhv_kWh == pytest.approx(1000.0)
    assert energy.exhaust_loss_kWh == pytest.approx(1000.0)


def test_months_add_up_to_the_year() -> None:
    """Law: any flow is shared out over the twelve months without loss."""
    year = small_year(0.5)
    flows = random_flows(year, seed=7)

    months = month_flows(flows, year)
    energy = energy_year(flows, year.step_h)

    assert [month.month for month in months] == list(range(1, 13))
    assert sum(month.power_made_kWh for month in months) == pytest.approx(energy.power_made_kWh)
    assert sum(month.heater_heat_kWh for month in months) == pytest.approx(
        sum(energy.heater_heat_kWh.values())
    )
    assert sum(month.dumped_kWh for month in months) == pytest.approx(
        sum(energy.dumped_kWh.values())
    )
    assert max(month.peak_import_kW for month in months) == flows["grid_import_kW"].max()


def test_months_are_local() -> None:
    """The hour from 22 to 23 UTC on 31 July is already August in Berlin."""
    year = small_year()
    flows = idle_flows(year)
    flows.loc["2025-07-31 22:00+00:00", "grid_import_kW"] = 70.0

    months = month_flows(flows, year)

    assert months[6].peak_import_kW == 0.0
    assert months[7].grid_import_kWh == pytest.approx(70.0)


def test_separate_supply_runs_nothing() -> None:
    """Without a unit every share is zero and nothing is divided by zero."""
    year = small_year()

    run = running(idle_flows(year), year.step_h)

    assert np.all(np.array(list(run.model_dump().values())) == 0.0)

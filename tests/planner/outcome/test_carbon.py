"""CO2 along the grid's path."""

from typing import Any

import pytest

from planner.outcome.carbon import carbon
from planner.outcome.energy import energy_year
from planner.results.records import Carbon, EnergyYear
from tests.planner.market.small_study import RoundGas, idle_flows, small_study, small_year

YEAR = small_year()


def _energy(**flows: float) -> EnergyYear:
    """A steady year."""
    return energy_year(idle_flows(YEAR, **flows), 1.0)


SEPARATE = _energy(grid_import_kW=1000.0, heater_fuel_lhv_kW=2000.0)
OPTION = _energy(unit_fuel_lhv_kW=3500.0, heater_fuel_lhv_kW=300.0, grid_export_kW=100.0)


def _carbon(path: tuple[dict[str, Any], ...], credit: float = 0.0) -> Carbon:
    """The two years above along a path."""
    grid = {"path": path, "basis": "average", "source": "test", "export_credit_frac": credit}
    return carbon(small_study(grid_carbon=grid), RoundGas(), separate=SEPARATE, option=OPTION)


def test_path_is_straight_between_points_and_level_beyond() -> None:
    """0.4 in 2028 to 0.2 in 2032: 0.3 in 2030, 0.4 before and 0.2 after."""
    years = _carbon(({"year": 2028, "kg_per_kWh": 0.4}, {"year": 2032, "kg_per_kWh": 0.2})).by_year

    factors = {year.calendar_year: year.grid_kg_per_kWh for year in years}
    assert factors[2027] == pytest.approx(0.4)
    assert factors[2030] == pytest.approx(0.3)
    assert factors[2036] == pytest.approx(0.2)
    assert len(years) == 10


def test_export_credit_is_shared() -> None:
    """100 kW of export at half of 0.4 kg/kWh add 8,760 x 100 x 0.2 kg = 175.2 t a year."""
    path = ({"year": 2027, "kg_per_kWh": 0.4},)

    difference_t = _carbon(path, credit=0.5).first_year_saved_t - _carbon(path).first_year_saved_t

    assert difference_t == pytest.approx(175.2)


def test_option_that_saves_nothing_stops_in_its_first_year() -> None:
    """On a grid without carbon the option only burns more gas."""
    answer = _carbon(({"year": 2027, "kg_per_kWh": 0.0},))

    assert answer.stops_year == 2027
    assert answer.lifetime_saved_t == pytest.approx(-10 * 8760 * 1800 * 0.2 / 1000)


def test_saving_vanishes_at_the_break_even_factor() -> None:
    """Law: with the break-even factor as the grid's, nothing is saved in any year."""
    break_even = _carbon(({"year": 2027, "kg_per_kWh": 0.4},)).break_even_grid_kg_per_kWh

    assert break_even is not None
    answer = _carbon(({"year": 2027, "kg_per_kWh": break_even},))
    assert answer.lifetime_saved_t == pytest.approx(0.0, abs=1e-6)


def test_less_of_everything_has_no_break_even() -> None:
    """An option that burns less gas and imports less saves on any grid."""
    grid = small_study()
    less = _energy(grid_import_kW=500.0, heater_fuel_lhv_kW=1000.0)

    answer = carbon(grid, RoundGas(), separate=SEPARATE, option=less)

    assert answer.break_even_grid_kg_per_kWh is None
    assert answer.stops_year is None

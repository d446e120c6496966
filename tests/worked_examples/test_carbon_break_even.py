"""CO2 of a CHP against grid and boiler, and the grid factor at which it saves nothing.

Given   natural gas of 56.1 kg/GJ (LHV); a boiler of 90 % makes 2,000 kW of heat; a CHP of 30 %
        power and 45 % heat makes the same heat all year; its power replaces import.
Find    CO2 saved in a year at 0.400 kg/kWh, and the break-even factor.
Source  IPCC 2006 Guidelines, vol. 2, natural gas 56,100 kg/TJ (LHV) (*from memory*); energy
        balance in closed form.
By hand 56.1 kg/GJ is 0.20196 kg/kWh. CHP fuel 2,000/0.45 = 4,444.4 kW, power 1,333.3 kW, boiler
        fuel 2,222.2 kW. Saved at 0.400: 1,333.3 x 0.400 - 2,222.2 x 0.20196 = 84.53 kg/h, 740.5 t
        a year. Break-even: 0.20196 x 2,222.2/1,333.3 = 0.3366 kg/kWh.
Differs nothing; tolerance is the rounding of the hand calculation.
"""

import pytest

from planner.outcome.carbon import carbon
from planner.outcome.energy import energy_year
from tests.planner.market.small_study import RoundGas, idle_flows, small_study, small_year


def test_carbon_saved_and_break_even() -> None:
    """Saving of the first year and break-even factor, as worked above."""
    gas = RoundGas(co2_kg_per_lhv_kWh=0.20196)
    year = small_year()
    separate = idle_flows(year, grid_import_kW=5000.0, heater_fuel_lhv_kW=2000.0 / 0.9)
    option = idle_flows(
        year, grid_import_kW=5000.0 - 0.30 * 2000.0 / 0.45, unit_fuel_lhv_kW=2000.0 / 0.45
    )

    answer = carbon(
        small_study(), gas, separate=energy_year(separate, 1.0), option=energy_year(option, 1.0)
    )

    assert answer.first_year_saved_t == pytest.approx(740.5, abs=0.2)
    assert answer.break_even_grid_kg_per_kWh == pytest.approx(0.3366, abs=5e-5)
    assert answer.stops_year is None

"""The year in which a CHP stops saving CO2 while the grid's carbon falls.

Given   the plant of the break-even example (0.20196 kg/kWh LHV of gas, break-even at 0.3366), on a
        grid that falls from 0.420 kg/kWh in 2027 by 0.020 a year to 0.220 in 2037; ten years from
        2027.
Find    the first year without a saving, and the lifetime saving.
Source  straight line in closed form.
By hand 0.420, 0.400, 0.380, 0.360, 0.340 lie above 0.3366; 2032 with 0.320 is the first below. The
        ten factors 0.420 ... 0.240 have the mean 0.330, so the lifetime is
        10 x 8,760 h x 1,333.33 kW x (0.330 - 0.3366) = -770.9 t: over its life it adds CO2, though
        its first year saves 974.1 t.
Differs nothing.
"""

import pytest

from planner.outcome.carbon import carbon
from planner.outcome.energy import energy_year
from tests.planner.market.small_study import RoundGas, idle_flows, small_study, small_year


def test_carbon_saving_stops() -> None:
    """First year, year of the stop and lifetime, as worked above."""
    grid = {
        "path": ({"year": 2027, "kg_per_kWh": 0.42}, {"year": 2037, "kg_per_kWh": 0.22}),
        "basis": "average",
        "source": "invented straight line",
    }
    gas = RoundGas(co2_kg_per_lhv_kWh=0.20196)
    year = small_year()
    separate = idle_flows(year, grid_import_kW=5000.0, heater_fuel_lhv_kW=2000.0 / 0.9)
    option = idle_flows(year, grid_import_kW=5000.0 - 4000.0 / 3.0, unit_fuel_lhv_kW=2000.0 / 0.45)

    answer = carbon(
        small_study(grid_carbon=grid),
        gas,
        separate=energy_year(separate, 1.0),
        option=energy_year(option, 1.0),
    )

    assert answer.stops_year == 2032
    assert answer.first_year_saved_t == pytest.approx(974.1, abs=0.1)
    assert answer.lifetime_saved_t == pytest.approx(-770.9, abs=0.1)

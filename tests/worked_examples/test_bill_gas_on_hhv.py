"""A gas invoice in HHV, and its carbon, for a boiler known in LHV.

Given   1,000 kW (LHV) of methane all year; 0.030 a kWh (HHV) of commodity, 0.004 of transport;
        70 a tonne of CO2.
Find    invoiced energy, tonnes of CO2 and amounts.
Source  ISO 6976:2016, methane at 25 degC: superior 890.58, inferior 802.55 kJ/mol, ratio 1.10969;
        CO2 by atom balance, one mole of 44.009 g a mole of methane: 54.84 g/MJ (LHV), that is
        0.19741 kg/kWh.
By hand 8,760,000 kWh (LHV) are 9,720,900 kWh (HHV): 291,627 and 38,884. CO2 is 1,729.3 t: 121,051.
Differs at most 0.02 %: rounding of the hand calculation and of molar masses.
"""

import pytest

from planner.market import bill
from planner.plant.fuel import GasFuel
from tests.planner.market.small_study import idle_flows, small_study, small_year

GAS = {
    "commodity_per_hhv_kWh": 0.030,
    "transport_per_hhv_kWh": 0.004,
    "carbon_price_per_t": 70.0,
}


def test_gas_bill_of_methane() -> None:
    """Quantities and amounts, as worked above."""
    year = small_year()
    flows = idle_flows(year, heater_fuel_lhv_kW=1000.0)
    methane = GasFuel.from_composition("Methane", {"methane": 1.0})

    billed = bill(small_study(gas_tariff=GAS), year, flows, methane, unit=None, upkeep_per_year=0.0)

    lines = {line.line: line for line in billed.lines}
    assert lines["Commodity"].quantity == pytest.approx(9_720_900.0, rel=2e-4)
    assert lines["Commodity"].amount == pytest.approx(291_627.0, rel=2e-4)
    assert lines["Transport"].amount == pytest.approx(38_884.0, rel=2e-4)
    assert lines["Carbon price on gas"].quantity == pytest.approx(1_729.3, rel=2e-4)
    assert lines["Carbon price on gas"].amount == pytest.approx(121_051.0, rel=2e-4)

"""Hot exhaust straight into a dryer.

Given   a kilogram a second of methane's exhaust at an air ratio of 3.5; a dryer that counts heat
        above 60 degC, needs 250 degC and bears 400 degC.
Find    heat of an exhaust at 500 degC with tempering air of 60 and of 15 degC; of one at 240 degC.
Source  energy balance; enthalpies from a chemistry library (exhaust 500 to 60 degC 478.5, 500 to
        400 degC 112.75 kJ/kg) and a property library (air 400 to 15 degC 396.6, 60 to 15 degC 45.3
        kJ/kg).
By hand air at 60 degC only spreads the heat: 478.5 kW. Air at 15 degC: 112.75 / 396.6 = 0.2843
        kg/s, of which warming to 60 degC takes 0.2843 x 45.3 = 12.9 kW; 465.6 kW are left.
Differs humidity of the air, 0.1 kW.
"""

import numpy as np
import pytest

from planner.plant.air import humid_air
from planner.plant.drying import drying_heat_kW
from planner.study.sections import GasSystem
from tests.planner.plant.invented_gases import gas_flow, methane_exhaust

DRYER = GasSystem(reference_degC=60.0, required_degC=250.0, limit_degC=400.0)


def _heat_kW(exhaust_degC: float, air_degC: float) -> float:
    """Heat of a kilogram a second."""
    air_K = np.array([air_degC + 273.15])
    air = humid_air(air_K, np.array([101.325]), np.array([0.3]))
    exhaust = gas_flow(methane_exhaust(3.5), degC=exhaust_degC)
    return float(drying_heat_kW(exhaust, air, air_K, DRYER)[0])


@pytest.mark.parametrize(("air_degC", "heat_kW"), [(60.0, 478.5), (15.0, 465.6)])
def test_tempered_gas_keeps_its_heat(air_degC: float, heat_kW: float) -> None:
    """Heat with warm and with cold tempering air, as worked above."""
    assert _heat_kW(500.0, air_degC) == pytest.approx(heat_kW, abs=0.5)


def test_gas_below_the_limit_needs_no_air() -> None:
    """At 400 degC the air's temperature no longer matters: 478.5 - 112.75 = 365.8 kW."""
    assert _heat_kW(400.0, 15.0) == pytest.approx(365.8, abs=0.2)
    assert _heat_kW(400.0, 60.0) == pytest.approx(_heat_kW(400.0, 15.0), abs=1e-9)


def test_gas_colder_than_needed_gives_nothing() -> None:
    """An exhaust of 240 degC does not dry."""
    assert _heat_kW(240.0, 15.0) == 0.0

"""Primary-energy saving by grade of heat.

Given   a unit of 30 % power and 45 % heat (LHV); references of 53 % for power, 92 % for hot water,
        87 % for steam and 84 % for hot gas; and 53 % x 0.891 for power used on site at 0.45 to
        12 kV.
Find    the primary-energy saving for each form of heat.
Source  Directive 2012/27/EU, annex II (b): PES = 1 - 1/(eta_H/Ref_H + eta_E/Ref_E); references of
        Regulation (EU) 2015/2402 (*from memory*; the arithmetic does not depend on it).
By hand hot water 1 - 1/(0.45/0.92 + 0.30/0.53) = 5.23 %; steam 7.69 %; hot gas 9.24 %; steam with
        the grid-loss factor 13.23 %.
Differs nothing; tolerance is the last printed digit.
"""

import pytest

from planner.outcome.efficiency import primary_energy_saving_frac
from planner.study.sections import EmissionRules, HeatCarrier


@pytest.mark.parametrize(
    ("grade", "power_reference", "expected"),
    [
        ("hot_water", 0.53, 0.0523),
        ("steam", 0.53, 0.0769),
        ("hot_gas", 0.53, 0.0924),
        ("steam", 0.53 * 0.891, 0.1323),
    ],
)
def test_primary_energy_saving(grade: HeatCarrier, power_reference: float, expected: float) -> None:
    """One form of heat at a time, as worked above."""
    rules = EmissionRules(
        nox_regime="eu_mcp_new_turbine_gas", reference_power_efficiency_lhv_frac=power_reference
    )

    saving = primary_energy_saving_frac(
        rules, power_kWh=300.0, heat_kWh={grade: 450.0}, fuel_lhv_kWh=1000.0
    )

    assert saving == pytest.approx(expected, abs=5e-5)

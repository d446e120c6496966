"""Air for methane, and its dry flue gas at 15 % oxygen.

Given   CH4 + 2 O2, air with 20.95 % oxygen.
Find    air by mole, dry flue gas at 15 % O2 for a gigajoule of net calorific value.
Source  atom balance; any combustion text.
By hand air = 2 / 0.2095 = 9.5465 mol/mol. Dry stoichiometric gas = 1 + 9.5465 x 0.7905 = 8.5465;
        excess air = 8.5465 x 0.15 / 0.0595 = 21.546, together 30.09 mol/mol, and
        30.09 x 22.414e-3 m3 / 802.55e-6 GJ = 840.4 Nm3/GJ.
Differs nothing; the tolerance is the rounding of the hand calculation.
"""

import pytest

from planner.plant.fuel import GasFuel


def test_methane_in_air() -> None:
    """Air and flue gas, as worked above."""
    methane = GasFuel.from_composition("Methane", {"methane": 1.0})

    assert methane.air_need_mol_per_mol == pytest.approx(9.5465, rel=1e-5)
    flue_Nm3_per_GJ = methane.dry_flue_gas_15O2_Nm3_per_lhv_kWh / 3.6e-3
    assert flue_Nm3_per_GJ == pytest.approx(840.4, rel=2e-4)

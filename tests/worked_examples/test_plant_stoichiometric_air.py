"""Air for the complete combustion of pure gases.

Given   methane, ethane, propane, n-butane, hydrogen, carbon monoxide; air with 20.95 % oxygen,
        28.9647 kg/kmol.
Find    air by mole and by mass.
Source  atom balance, molar masses C 12.011, H 1.008, O 15.999; textbooks round to 17.2 kg/kg for
        methane, 15.7 for propane and 34.3 for hydrogen.
By hand propane takes 3 + 8/4 = 5 of oxygen, 5 / 0.2095 = 23.866 of air, and 23.866 x 28.9647 /
        44.097 = 15.676 kg/kg.
Differs nothing; the tolerance is the rounding of the table.
"""

import pytest

from planner.plant.fuel import AIR_MOLAR_MASS_kg_per_kmol, GasFuel


@pytest.mark.parametrize(
    ("gas", "air_mol_per_mol", "air_kg_per_kg"),
    [
        ("methane", 9.5465, 17.236),
        ("ethane", 16.706, 16.092),
        ("propane", 23.866, 15.676),
        ("n_butane", 31.026, 15.461),
        ("hydrogen", 2.3866, 34.29),
        ("carbon_monoxide", 2.3866, 2.468),
    ],
)
def test_air_need(gas: str, air_mol_per_mol: float, air_kg_per_kg: float) -> None:
    """A row of the table."""
    fuel = GasFuel.from_composition(gas, {gas: 1.0})

    by_mass = fuel.air_need_mol_per_mol * AIR_MOLAR_MASS_kg_per_kmol / fuel.molar_mass_kg_per_kmol
    assert fuel.air_need_mol_per_mol == pytest.approx(air_mol_per_mol, rel=5e-5)
    assert by_mass == pytest.approx(air_kg_per_kg, rel=3e-4)

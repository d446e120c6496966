"""What methane leaves in its exhaust.

Given   methane with 1 to 4 times its air; air dry, and of 15 degC and 60 % humidity.
Find    water by volume; oxygen and carbon dioxide by volume of the dry gas.
Source  atom balance with 20.946 % oxygen in dry air.
By hand twice the air, dry: CH4 + 4 O2 + 15.10 N2 and argon -> CO2 + 2 H2O + 2 O2 + 15.10. Water 2 /
        20.10 = 0.0995; oxygen 2 / 18.10 = 11.05 %, carbon dioxide 1 / 18.10 = 5.53 % of the dry.
Differs carbon dioxide of the air itself, 0.03 points; the multiple is counted from air with 20.95
        %.
"""

import pytest

from planner.plant.gas import SPECIES
from tests.planner.plant.invented_gases import methane_exhaust

#: By air ratio: water with dry air, water with humid air, dry oxygen and carbon dioxide [%].
TABLE = {
    1.0: (0.1896, 0.1971, 0.0, 11.70),
    2.0: (0.0995, 0.1082, 11.05, 5.53),
    3.0: (0.0675, 0.0766, 14.47, 3.62),
    3.5: (0.0581, 0.0674, 15.43, 3.09),
    4.0: (0.0510, 0.0604, 16.14, 2.69),
}


@pytest.mark.parametrize("air_ratio", TABLE)
def test_exhaust_of_methane(air_ratio: float) -> None:
    """A row of the table."""
    from_dry = methane_exhaust(air_ratio, humidity_frac=0.0).mol_frac[0]
    from_humid = methane_exhaust(air_ratio).mol_frac[0]
    dry_percent = 100.0 * from_dry / (1.0 - from_dry[SPECIES.index("water")])

    dry_air, humid_air, oxygen, carbon_dioxide = TABLE[air_ratio]
    assert from_dry[SPECIES.index("water")] == pytest.approx(dry_air, abs=2e-4)
    assert from_humid[SPECIES.index("water")] == pytest.approx(humid_air, abs=2e-4)
    assert dry_percent[SPECIES.index("oxygen")] == pytest.approx(oxygen, abs=0.03)
    assert dry_percent[SPECIES.index("carbon_dioxide")] == pytest.approx(carbon_dioxide, abs=0.045)


def test_fifteen_percent_oxygen() -> None:
    """Dry oxygen of 15 % is an air ratio of 3.257 for methane."""
    shares = methane_exhaust(3.257, humidity_frac=0.0).mol_frac[0]

    dry_oxygen = shares[SPECIES.index("oxygen")] / (1.0 - shares[SPECIES.index("water")])
    assert dry_oxygen == pytest.approx(0.15, abs=2e-4)
    assert shares.sum() == pytest.approx(1.0, abs=1e-12)

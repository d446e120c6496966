"""Steam that a deaerator takes for itself.

Given   steam at 1000 kPa gauge , 70 % of the site's steam back as condensate at 85
        degC, make-up at 12 degC, feedwater 105 degC, 3 % blowdown.
Find    site steam over steam made, useful heat of a kilogram of steam made.
Source  mass and energy balance of the deaerator; enthalpies of IAPWS-IF97: 2780.7 kJ/kg of steam at
        11.013 bar, liquid at 85, 12 and 105 degC 356.0, 50.4 and 440.9 kJ/kg.
By hand of a kilogram made, x goes to the site, 1 - x to the deaerator, 0.7 x comes back, make-up is
        1.03 - (1 - x) - 0.7 x = 0.03 + 0.3 x:
        (1 - x) 2780.7 + 0.7 x 356.0 + (0.03 + 0.3 x) 50.4 = 1.03 x 440.9
        2780.7 + 1.51 - 454.13 = x (2780.7 - 249.2 - 15.1), x = 2328.1 / 2516.4 = 0.9252,
        and 0.9252 x 2516.4 = 2328.1 kJ/kg.
Differs nothing; the tolerance is the rounding of the enthalpies.
"""

import pytest

from planner.plant.steam_boiler import steam_state
from planner.study.sections import SteamSystem


def test_deaerator() -> None:
    """Share of steam that reaches the site, and its worth, as worked above."""
    system = SteamSystem(
        pressure_kPa_gauge=1000.0,
        condensate_return_frac=0.7,
        condensate_degC=85.0,
        make_up_degC=12.0,
        feedwater_degC=105.0,
        blowdown_frac=0.03,
    )

    state = steam_state(system)

    assert state.site_per_steam == pytest.approx(0.9252, abs=2e-4)
    assert state.useful_per_made_kJ_per_kg == pytest.approx(2328.1, abs=0.6)

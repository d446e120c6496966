"""What a quarter-hour's peak adds to an hour's mean.

Given   an hour of 800, 1000, 900 and 700 kW and a quieter one of 600 kW throughout; a turbine that
        takes a steady 500 kW off the import.
Find    within-step excess, and the quarter-hour import peak with the turbine.
Source  arithmetic: the peak is the mean plus the excess, and a steady output takes off the mean.
By hand mean (800 + 1000 + 900 + 700) / 4 = 850 kW; excess 1000 - 850 = 150 kW; with the turbine
        850 - 500 + 150 = 500 kW, which is 1000 - 500. A factor of 1000 / 850 instead would give
        350 x 1.176 = 412 kW, too low by 88 kW.
Differs nothing.
"""

import numpy as np
import pytest

from load_profiles.resampling import step_means, within_step_excess


def test_within_step() -> None:
    """Excess, and the peak behind a turbine, as worked above."""
    quarters_kW = np.array([800.0, 1000.0, 900.0, 700.0, 600.0, 600.0, 600.0, 600.0])

    means_kW = step_means(quarters_kW, slots_per_step=4)
    excess_kW = within_step_excess(
        quarters_kW, np.zeros(8, dtype=bool), slots_per_step=4, month=np.array([1, 1])
    )

    assert excess_kW[1] == pytest.approx(150.0)
    assert means_kW.max() - 500.0 + excess_kW[1] == pytest.approx(quarters_kW.max() - 500.0)

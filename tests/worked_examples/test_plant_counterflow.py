"""Effectiveness of a counterflow exchanger.

Given   transfer units 0.5 to 5, ratio of capacity flows 0 to 1.
Find    effectiveness.
Source  closed form, any heat-transfer text.
By hand N = 2, C = 0.5: (1 - e^-1) / (1 - 0.5 e^-1) = 0.63212 / 0.81606 = 0.7746.
        C = 1: N / (1 + N).
Differs nothing; rounding of the table.
"""

import numpy as np
import pytest

from planner.plant.exchange import counterflow_effectiveness

TABLE = {
    0.5: (0.3935, 0.3776, 0.3623, 0.3475, 0.3333),
    1.0: (0.6321, 0.5983, 0.5647, 0.5319, 0.5000),
    2.0: (0.8647, 0.8228, 0.7746, 0.7218, 0.6667),
    3.0: (0.9502, 0.9188, 0.8744, 0.8171, 0.7500),
    5.0: (0.9933, 0.9823, 0.9572, 0.9088, 0.8333),
}


@pytest.mark.parametrize("units", TABLE)
def test_counterflow(units: float) -> None:
    """A row of the table."""
    ratios = np.array([0.0, 0.25, 0.5, 0.75, 1.0])

    found = counterflow_effectiveness(np.full(5, units), ratios)

    np.testing.assert_allclose(found, TABLE[units], atol=6e-5)

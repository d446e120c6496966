"""Net present value of published series.

Given   -40,000 now, then 5,000, 8,000, 12,000 and 30,000, at 8 % and at 28.1 % with -100, 39, 59,
        55, 20; and -10,000, 3,000, 4,200, 6,800 at 10 %, the first of them a year from now.
Find    net present values.
Source  documentation of numpy-financial 1.0, `npv` (year 0 not discounted); the third is a
        spreadsheet's NPV example, whose first flow is discounted (printed value *from memory*,
        recomputed in closed form).
By hand third: -10,000/1.1 + 3,000/1.21 + 4,200/1.331 + 6,800/1.4641 = 1,188.44.
Differs nothing; a spreadsheet's habit is met by a year 0 without a flow.
"""

import numpy as np
import pytest

from planner.outcome.worth import net_present_value


def test_npv_of_published_series() -> None:
    """The three values, to their printed digits."""
    project = np.array([-40_000.0, 5_000.0, 8_000.0, 12_000.0, 30_000.0])
    near_zero = np.array([-100.0, 39.0, 59.0, 55.0, 20.0])
    spreadsheet = np.array([0.0, -10_000.0, 3_000.0, 4_200.0, 6_800.0])

    assert net_present_value(project, 0.08) == pytest.approx(3_065.2227, abs=5e-5)
    assert net_present_value(near_zero, 0.281) == pytest.approx(-0.00848, abs=5e-6)
    assert net_present_value(spreadsheet, 0.10) == pytest.approx(1_188.44, abs=5e-3)

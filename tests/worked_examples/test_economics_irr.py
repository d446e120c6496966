"""Internal rate of return of published series.

Given   the series of the table below, year 0 first.
Find    internal rates.
Source  documentation of numpy-financial 1.0, `irr` (first five) and a spreadsheet's IRR example
        (last three; printed values *from memory*, recomputed with numpy-financial).
By hand -100, 0, 0, 74: the cube root of 0.74 is 0.90450, so -9.550 %.
Differs -5, 10.5, 1, -8, 1 changes its sign three times. The library picks one rate; flueprint finds
        it among several and therefore reports none.
"""

import numpy as np
import pytest

from planner.outcome.worth import internal_rate_frac, internal_rates

SERIES = [
    ([-100.0, 39.0, 59.0, 55.0, 20.0], 0.28095, 5e-6),
    ([-100.0, 0.0, 0.0, 74.0], -0.09550, 5e-6),
    ([-100.0, 100.0, 0.0, 7.0], 0.06206, 5e-6),
    ([-70_000.0, 12_000.0, 15_000.0, 18_000.0, 21_000.0], -0.0212, 5e-5),
    ([-70_000.0, 12_000.0, 15_000.0, 18_000.0, 21_000.0, 26_000.0], 0.0866, 5e-5),
    ([-70_000.0, 12_000.0, 15_000.0], -0.4435, 5e-5),
]


@pytest.mark.parametrize(("flows", "expected", "rounding"), SERIES)
def test_irr_of_published_series(flows: list[float], expected: float, rounding: float) -> None:
    """One change of sign, one rate, to its printed digits."""
    assert internal_rate_frac(np.array(flows)) == pytest.approx(expected, abs=rounding)


@pytest.mark.parametrize(
    ("flows", "printed"),
    [([-100.0, 100.0, 0.0, -7.0], -0.08330), ([-5.0, 10.5, 1.0, -8.0, 1.0], 0.08860)],
)
def test_printed_rate_is_one_of_several(flows: list[float], printed: float) -> None:
    """Several changes of sign: the printed rate is a root, and no single rate is reported."""
    rates = internal_rates(np.array(flows))

    assert len(rates) > 1
    assert np.abs(rates - printed).min() < 5e-6
    assert internal_rate_frac(np.array(flows)) is None

"""Intervals become steps without losing energy or hiding peaks."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from load_profiles.resampling import any_in_step, step_means, within_step_excess


@given(st.lists(st.floats(0.0, 1e5), min_size=4, max_size=400).filter(lambda x: len(x) % 4 == 0))
def test_energy_is_kept(values_kW: list[float]) -> None:
    """Hours hold the energy of their quarter-hours to 1e-12."""
    hours_kW = step_means(np.array(values_kW), slots_per_step=4)

    assert hours_kW.sum() == pytest.approx(sum(values_kW) * 0.25, rel=1e-12)


def test_excess_is_the_peak_less_its_hour() -> None:
    """January's quarter-hours 100, 180, 100, 100 kW: mean 120, so the peak adds 60 kW."""
    power_kW = np.array([100.0, 180.0, 100.0, 100.0] + [170.0] * 4 + [90.0, 80.0, 80.0, 90.0])
    month = np.array([1, 1, 2])

    excess_kW = within_step_excess(
        power_kW, np.zeros(12, dtype=bool), slots_per_step=4, month=month
    )

    assert excess_kW[1] == pytest.approx(60.0)
    assert excess_kW[2] == pytest.approx(5.0)  # 90 less the mean of 85
    assert excess_kW.index.tolist() == list(range(1, 13))
    assert excess_kW[3] == 0.0


def test_of_equal_peaks_the_one_that_adds_most_counts() -> None:
    """Two hours reach 200 kW; the one with the lower mean adds 75 kW, the other 25."""
    power_kW = np.array([200.0, 100.0, 100.0, 100.0, 200.0, 200.0, 200.0, 100.0])

    excess_kW = within_step_excess(
        power_kW, np.zeros(8, dtype=bool), slots_per_step=4, month=np.array([5, 5])
    )

    assert excess_kW[5] == pytest.approx(75.0)


def test_filled_slots_prove_no_peak() -> None:
    """A peak that was filled by rule does not count."""
    power_kW = np.array([100.0, 500.0, 100.0, 140.0])
    filled = np.array([False, True, False, False])

    excess_kW = within_step_excess(power_kW, filled, slots_per_step=4, month=np.array([7]))

    assert excess_kW[7] == 0.0  # 140 lies below the hour's mean of 210
    assert any_in_step(filled, slots_per_step=4).tolist() == [True]

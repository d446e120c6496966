"""A gas register becomes hourly heat in which every reading closes."""

from pathlib import Path
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from load_profiles import Finding, ProfileError
from load_profiles.arrays import BoolArray, FloatArray
from load_profiles.clock import SiteClock
from load_profiles.declarations import GasRegister
from load_profiles.readers.register import read_gas_register, spread_between

BERLIN = SiteClock("Europe/Berlin", 2025)
HEADER = "time;m3"


def read(folder: Path, rows: list[str], **changes: Any) -> tuple[FloatArray, BoolArray, list[str]]:
    """Hourly heat of a register with these rows."""
    (folder / "gas.csv").write_text("\n".join([HEADER, *rows]), encoding="utf-8")
    keys: dict[str, Any] = {
        "source": "gas_register",
        "file": "gas.csv",
        "delimiter": ";",
        "value_column": "m3",
        "calorific_value_hhv_kWh_per_m3": 10.0,
        "heater_efficiency_hhv_frac": 0.9,
        "shape": "even",
    }
    findings: tuple[Finding, ...]
    heat_kW, filled, findings = read_gas_register(
        GasRegister(**{**keys, **changes}),
        folder=folder,
        site=BERLIN,
        path="demand.steam",
        permitted_fill_frac=0.05,
    )
    return heat_kW, filled, [str(finding) for finding in findings]


@pytest.mark.parametrize("shape", ["even", "hospital_steam", "two_shift_drying"])
def test_every_reading_closes(tmp_path: Path, shape: str) -> None:
    """Between two readings, in summer time too, the hours come to difference x 10 x 0.9."""
    rows = ["2025-01-01 00:00;1000", "2025-03-30 01:00;3000", "2025-07-07 08:00;3500"]
    rows += ["2026-01-01 00:00;9500"]

    heat_kW, filled, _ = read(tmp_path, rows, shape=shape)

    # 30 March 01:00 is hour 88 x 24 + 1; 7 July 08:00 summer time is hour 187 x 24 + 7
    assert heat_kW[:2113].sum() == pytest.approx(18_000.0, rel=1e-12)
    assert heat_kW[2113:4495].sum() == pytest.approx(4_500.0, rel=1e-12)
    assert heat_kW[4495:].sum() == pytest.approx(54_000.0, rel=1e-12)
    assert heat_kW.min() >= 0.0
    assert not filled.any()


def test_readings_beyond_the_year_give_their_part(tmp_path: Path) -> None:
    """Two readings two years apart, even: one year of three holds 8760 of 26280 hours."""
    heat_kW, _, _ = read(tmp_path, ["2024-01-02 00:00;0", "2027-01-01 00:00;26280"])

    # 2 January 2024 to 1 January 2027 are 3 x 365 days, for 2024 has 366: 1 m3, so 9 kWh, an hour
    np.testing.assert_allclose(heat_kW, 9.0, rtol=1e-12)


def test_ends_without_readings_are_filled_at_the_nearest_rate(tmp_path: Path) -> None:
    """Readings from 3 January to 30 December of 1 m3 an hour: 9 kW all year, 72 h of it filled."""
    rows = ["2025-01-03 00:00;0", "2025-06-01 00:00;3575", "2025-12-31 00:00;8688"]
    # 1 June 00:00 in summer time is 149 x 24 - 1 = 3575 h after 3 January; the rest is 5113 h

    heat_kW, filled, findings = read(tmp_path, rows)

    np.testing.assert_allclose(heat_kW, 9.0, rtol=1e-12)
    assert filled.sum() == 72
    assert "72 h, 648 kWh" in findings[-1]


def test_register_that_falls_is_refused(tmp_path: Path) -> None:
    """A fall is named with its row; a fall from just below 100000 is asked about as a rollover."""
    rows = ["2025-01-01 00:00;99000", "2025-06-01 00:00;99900", "2025-09-01 00:00;300"]
    rows += ["2025-10-01 00:00;250", "2026-01-01 00:00;900"]

    with pytest.raises(ProfileError) as caught:
        read(tmp_path, rows)

    assert str(caught.value) == (
        "gas.csv row 4 = 300 m3 after 99900 m3: a register must not fall; "
        "if it rolled over at 100000, add that to the rest\n"
        "gas.csv row 5 = 250 m3 after 300 m3: a register must not fall; "
        "was the meter exchanged or a digit lost?"
    )


def test_register_that_leaves_months_open_is_refused(tmp_path: Path) -> None:
    """Readings that end in June leave half of the year open."""
    with pytest.raises(ProfileError, match=r"49\.6% of 2025 before the first or after the last"):
        read(tmp_path, ["2025-01-01 00:00;0", "2025-07-04 01:00;100"])  # 181 of 365 days


def test_two_readings_at_one_instant_are_refused(tmp_path: Path) -> None:
    """One instant cannot have two readings; the same reading twice is one."""
    rows = ["2025-01-01 00:00;0", "2025-06-01 00:00;50", "2025-06-01 00:00;60"]

    with pytest.raises(ProfileError, match="row 4 = 60 m3 after 50 m3: one instant, two readings"):
        read(tmp_path, [*rows, "2026-01-01 00:00;100"])
    heat_kW, _, _ = read(tmp_path, [*rows[:2], rows[1], "2026-01-01 00:00;100"])
    assert heat_kW.sum() == pytest.approx(900.0)


@settings(max_examples=50, deadline=None)
@given(
    instants=st.sets(st.integers(0, 72 * 3600), min_size=2, max_size=12),
    energy=st.lists(st.floats(0.0, 1e6), min_size=11, max_size=11),
    weights=st.lists(st.sampled_from([0.0, 0.3, 1.0, 2.5]), min_size=72, max_size=72),
)
def test_spread_keeps_each_span(
    instants: set[int], energy: list[float], weights: list[float]
) -> None:
    """For any readings at any second and any weights, the whole and no hour outside is touched."""
    bounds_s = np.array(sorted(instants), dtype=float)
    energy_kWh = np.array(energy[: bounds_s.size - 1])

    hours_kWh = spread_between(bounds_s, energy_kWh, np.array(weights))

    assert hours_kWh.sum() == pytest.approx(energy_kWh.sum(), rel=1e-9)
    assert hours_kWh.min() >= 0.0
    outside = (np.arange(72) + 1) * 3600 <= bounds_s[0]
    outside |= np.arange(72) * 3600 >= bounds_s[-1]
    assert not hours_kWh[outside].any()

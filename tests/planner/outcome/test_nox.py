"""The NOx band of a year and its status against a limit."""

from typing import Any

import numpy as np
import pandas as pd
import pytest

from planner.outcome.nox import nox
from planner.outcome.nox_limits import regime_faults, size_findings
from planner.results.records import Nox
from tests.planner.market.small_study import (
    RoundGas,
    idle_flows,
    small_option,
    small_study,
    small_unit,
    small_year,
)

GUARANTEE_MG = 25.0 * 46.0055 / 22.414


def _judged(flows: pd.DataFrame, emissions: dict[str, Any] | None = None, ppm: float = 25.0) -> Nox:
    """A unit with a guarantee from 60 % load, under a regime."""
    sheet = {
        **small_unit()["sheet"],
        "nox": {"nox_ppm_15O2": ppm, "from_load_frac": 0.6, "to_ambient_degC": 35.0},
    }
    option = {**small_study().option[0].model_dump(), "unit": small_unit(sheet=sheet)}
    rules = emissions or {"nox_regime": "eu_mcp_new_turbine_gas"}
    study = small_study(option=(option,), emissions=rules)
    return nox(study, study.option[0].unit, RoundGas(), flows, 1.0)[0]


def _running(load_frac: float = 1.0, **flows: Any) -> pd.DataFrame:
    """A unit that runs the whole year at one load."""
    running = {
        "unit_on": 1,
        "unit_maximum_kW": 2000.0,
        "unit_power_kW": 2000.0 * load_frac,
        "unit_fuel_lhv_kW": 6000.0,
    }
    return idle_flows(small_year(), **{**running, **flows})


def test_guarantee_is_a_ceiling() -> None:
    """Inside its range the band reaches from 0.6 to 1.0 of it, with the centre at 0.8."""
    judged = _judged(_running())

    assert judged.band_high_mg_per_Nm3 == pytest.approx(GUARANTEE_MG)
    assert judged.band_centre_mg_per_Nm3 == pytest.approx(0.8 * GUARANTEE_MG)
    assert judged.band_low_mg_per_Nm3 == pytest.approx(0.6 * GUARANTEE_MG)
    assert judged.hours_outside_guarantee == 0.0


@pytest.mark.parametrize(
    ("ppm", "status"), [(9.0, "met"), (24.0, "met"), (25.0, "at risk"), (42.0, "exceeded")]
)
def test_status_against_fifty_mg(ppm: float, status: str) -> None:
    """24.36 ppm is 50 mg/Nm3; 0.6 of 42 ppm, the low edge, is 51.7 and lies above it."""
    assert _judged(_running(), ppm=ppm).status == status


def test_local_limit_counts_where_stricter() -> None:
    """A local 30 mg/Nm3 replaces the regime's 50; a local 60 does not."""
    regime = "eu_mcp_new_turbine_gas"
    strict = {"nox_regime": regime, "local_nox_limit_mg_per_Nm3": 30.0}
    loose = {"nox_regime": regime, "local_nox_limit_mg_per_Nm3": 60.0}

    assert _judged(_running(), strict).limit_mg_per_Nm3 == 30.0
    assert _judged(_running(), strict).regime_source == "the study"
    assert _judged(_running(), loose).limit_mg_per_Nm3 == 50.0


def test_hot_hours_widen_the_band() -> None:
    """Ten hours at 38 degC, above the guarantee's 35: counted, and a quarter added on top."""
    flows = _running()
    flows.iloc[5000:5010, flows.columns.get_loc("ambient_degC")] = 38.0

    judged = _judged(flows, ppm=24.0)

    assert judged.hours_outside_guarantee == 10.0
    assert judged.band_high_mg_per_Nm3 == pytest.approx(1.25 * 24.0 * 46.0055 / 22.414)
    assert judged.status == "at risk"


def test_below_the_load_of_the_rule_no_limit_applies() -> None:
    """At half load the directive is silent: the hours count outside, the status does not move."""
    flows = _running()
    flows.iloc[:100, flows.columns.get_loc("unit_power_kW")] = 1000.0

    judged = _judged(flows, ppm=24.0)

    assert judged.hours_outside_guarantee == 100.0
    assert judged.status == "met"


def test_mass_of_the_year_by_hand() -> None:
    """6,000 kW x 8,760 h x 3 Nm3/kWh at 0.8 of 51.3 mg/Nm3 is 6.47 t."""
    judged = _judged(_running())

    expected_kg = 6000.0 * 8760.0 * 3.0 * 0.8 * GUARANTEE_MG / 1e6
    assert judged.annual_centre_kg == pytest.approx(expected_kg, rel=1e-9)
    assert judged.annual_high_kg == pytest.approx(expected_kg / 0.8, rel=1e-9)


def test_hourly_flow_is_the_year() -> None:
    """Law: grams per second over the hours add up to the year, starts included."""
    generator = np.random.default_rng(8)
    flows = _running(start_fuel_lhv_kW=generator.uniform(0.0, 50.0, 8760))
    study = small_study()

    record, flow_g_per_s = nox(study, study.option[0].unit, RoundGas(), flows, 1.0)

    assert flow_g_per_s.shape == (8760,)
    assert flow_g_per_s.sum() * 3.6 == pytest.approx(record.annual_centre_kg)


def test_idle_unit_emits_nothing() -> None:
    """Off all year: no mass, and the band is the guarantee's own."""
    judged = _judged(idle_flows(small_year()))

    assert judged.annual_high_kg == 0.0
    assert judged.band_high_mg_per_Nm3 == pytest.approx(GUARANTEE_MG)


def test_unknown_regime_names_the_nearest() -> None:
    """A slip of the pen is answered with the key that was meant."""
    (fault,) = regime_faults(small_study(emissions={"nox_regime": "eu_mcp_new_turbin_gas"}))

    assert fault.path == "emissions.nox_regime"
    assert fault.came == '"eu_mcp_new_turbin_gas"'
    assert "did you mean `eu_mcp_new_turbine_gas`?" in fault.must


@pytest.mark.parametrize(
    ("regime", "power_kW", "outside"),
    [
        ("eu_mcp_new_turbine_gas", 14_900.0, False),
        ("eu_mcp_new_turbine_gas", 15_000.0, True),
        ("eu_lcp_new_turbine_gas", 15_000.0, False),
        ("us_kkkk_upto_50_gas", 3_990.0, False),
        ("us_kkkk_upto_50_gas", 4_000.0, True),
    ],
)
def test_machine_outside_the_sizes_of_its_regime(
    regime: str, power_kW: float, outside: bool
) -> None:
    """At 30 % (LHV) 15 MW burn 50 MW; 50 MMBtu/h (HHV) are 14,654 kW, at 1.1 3,996 kW of power."""
    sheet = {**small_unit()["sheet"], "power_kW": power_kW}
    option = small_option(unit=small_unit(sheet=sheet))
    study = small_study(option=(option,), emissions={"nox_regime": regime})

    findings = size_findings(study, RoundGas())

    assert bool(findings) is outside

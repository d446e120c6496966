"""A plant over a year: pieces against the exact model, outages, findings, refusals."""

from pathlib import Path
from typing import Any

import numpy as np
import pandas as pd
import pytest

import load_profiles.demo_sites
from load_profiles import Finding, SiteYear
from planner.arrays import FloatArray
from planner.errors import StudyError
from planner.plant import GasFuel, Plant, build_plant
from planner.plant.envelope import UnitEnvelope
from planner.plant.envelope_fit import convex_slopes
from planner.plant.exhaust_paths import BYPASS, HOT_GAS, SHARE_COLUMNS
from planner.study.reading import load_study
from planner.study.study import Study

DEMO_SITES = Path(load_profiles.demo_sites.__file__).parent

#: Sites and options: guide vanes with steam and water, fuel only likewise, dryers with steam.
PLANTS = [("hospital", 0), ("hospital", 1), ("factory", 0), ("factory", 1)]


def _study(site: str) -> Study:
    """An invented site's study."""
    return load_study(DEMO_SITES / site).study


def _changed(
    study: Study, number: int, *, unit: dict[str, Any] | None = None, **sections: dict[str, Any]
) -> Study:
    """The study with one option only, fields of its sheet, unit and recovery and of heat moved."""
    option = study.option[number]
    sheet = option.unit.sheet.model_copy(update=sections.get("sheet", {}))
    machine = option.unit.model_copy(update={"sheet": sheet} | (unit or {}))
    recovery = option.recovery.model_copy(update=sections.get("recovery", {}))
    moved = option.model_copy(update={"unit": machine, "recovery": recovery})
    heat = study.heat.model_copy(
        update={
            grade: getattr(study.heat, grade).model_copy(update=fields)
            for grade, fields in sections.items()
            if grade in {"steam", "hot_water", "hot_gas"}
        }
    )
    return study.model_copy(update={"option": (moved,), "heat": heat})


def _site_year(hours: int = 21) -> SiteYear:
    """A year of -10 to 34 degC, one step in 21 hours, so that every hour of the day comes by."""
    index = pd.date_range("2025-01-01", "2025-12-31 23:00", freq=f"{hours}h", tz="UTC")
    day, hour = index.day_of_year.to_numpy(), index.hour.to_numpy()
    weather = {
        "ambient_degC": 12.0
        - 15.0 * np.cos(2 * np.pi * (day - 20) / 365)
        - 7.0 * np.cos(2 * np.pi * (hour - 3) / 24),
        "relative_humidity_frac": 0.7 + 0.2 * np.cos(2 * np.pi * (hour - 4) / 24),
        "pressure_kPa": 99.0 + 1.5 * np.sin(day),
    }
    demands = dict.fromkeys(("power_kW", "steam_kW", "hot_water_kW", "hot_gas_kW", "cooling_kW"), 0)
    return SiteYear(
        hourly=pd.DataFrame({**demands, **weather}, index=index),
        origins=pd.DataFrame(index=index),
        step_h=float(hours),
        time_zone="Europe/Berlin",
        within_step_excess_kW=pd.Series(0.0, index=range(1, 13)),
    )


def _plant(study: Study) -> Plant:
    """The plant of a study's first option."""
    gas = GasFuel.from_composition(study.fuel.name, study.fuel.composition_mol_frac)
    return build_plant(study, study.option[0], _site_year(), gas)


def _in_pieces(unit: UnitEnvelope, power_kW: FloatArray, slopes: FloatArray) -> FloatArray:
    """What further power adds, piece by piece."""
    starts = np.cumsum(unit.segment_power_kW, axis=1) - unit.segment_power_kW
    above = power_kW[:, None] - unit.minimum_power_kW[:, None] - starts
    return np.asarray((np.clip(above, 0.0, unit.segment_power_kW) * slopes).sum(axis=1))


def _about(findings: tuple[Finding, ...], words: str) -> list[Finding]:
    """Findings whose text has some words."""
    return [finding for finding in findings if words in finding.what]


@pytest.mark.parametrize(("site", "number"), PLANTS)
def test_pieces_against_the_exact_model(site: str, number: int) -> None:
    """Over a year of evenly spread loads pieces miss fuel by 0.1 % and heat by 0.3 % at most.

    Each hour by itself is exact at minimum and full load, and within 0.25 % of fuel between.
    """
    plant = _plant(_changed(_study(site), number))
    unit, year, full = plant.envelope.units[0], plant.year, plant.full
    steps = len(unit.maximum_power_kW)
    assert year is not None
    assert full is not None
    share = np.random.default_rng(8).permutation(np.linspace(0.0, 1.0, steps))
    power_kW = unit.minimum_power_kW + share * (unit.maximum_power_kW - unit.minimum_power_kW)

    point = year.exact(power_kW, full)

    exact_kW = year.fuel_lhv_kW(point)
    fuel_kW = unit.fuel_at_minimum_lhv_kW + _in_pieces(unit, power_kW, unit.fuel_slope_lhv)
    assert fuel_kW.sum() == pytest.approx(exact_kW.sum(), rel=1e-3)
    np.testing.assert_allclose(fuel_kW, exact_kW, rtol=2.5e-3)
    yields = year.paths.yields_kW(point, year.machine.hours)
    for path in unit.paths:
        whole_kW = sum(
            (
                path.yield_at_minimum_kW[grade]
                + _in_pieces(unit, power_kW, path.yield_slope[grade])
                for grade in path.yield_slope
            ),
            np.zeros(steps),
        )
        exact_heat_kW = sum(yields[path.name].values(), np.zeros(steps))
        assert whole_kW.sum() == pytest.approx(exact_heat_kW.sum(), rel=3e-3)


@pytest.mark.parametrize(("site", "number"), PLANTS)
def test_heat_is_what_the_exhaust_can_give(site: str, number: int) -> None:
    """Power and useful heat never exceed the fuel (LHV), and are most of it at full load."""
    plant = _plant(_changed(_study(site), number))
    unit, year, full = plant.envelope.units[0], plant.year, plant.full
    assert year is not None
    assert full is not None
    point = year.aged(full)
    fuel_kW = year.fuel_lhv_kW(point)

    for heat_kW in year.paths.yields_kW(point, year.machine.hours).values():
        total_frac = (unit.maximum_power_kW + sum(heat_kW.values(), np.zeros(1))) / fuel_kW
        assert (total_frac < 1.0).all()
        if heat_kW:
            assert (total_frac > 0.55).all()


def test_exact_year_of_a_schedule() -> None:
    """Off is nothing at all; half the exhaust on a path is half its heat."""
    plant = _plant(_changed(_study("factory"), 1))
    unit, index = plant.envelope.units[0], _site_year().hourly.index
    on = np.arange(len(index)) % 3 > 0
    schedule = pd.DataFrame(
        {
            "unit_on": on.astype(float),
            "unit_power_kW": np.where(on, unit.maximum_power_kW, 0.0),
            SHARE_COLUMNS[HOT_GAS]: 0.5 * on,
            SHARE_COLUMNS[BYPASS]: 0.5 * on,
        },
        index=index,
    )

    exact = plant.exact_year(schedule)

    assert (exact.loc[~on] == 0.0).all(axis=None)
    hot_gas = next(path for path in unit.paths if path.name == HOT_GAS)
    most_kW = hot_gas.yield_at_minimum_kW["hot_gas"]
    most_kW = most_kW + (hot_gas.yield_slope["hot_gas"] * unit.segment_power_kW).sum(axis=1)
    np.testing.assert_allclose(exact["unit_hot_gas_kW"][on], 0.5 * most_kW[on], rtol=1e-6)
    fuel_kW = unit.fuel_at_minimum_lhv_kW
    fuel_kW = fuel_kW + (unit.fuel_slope_lhv * unit.segment_power_kW).sum(axis=1)
    np.testing.assert_allclose(exact["unit_fuel_lhv_kW"][on], fuel_kW[on], rtol=1e-6)


def test_planned_outage_stops_the_unit() -> None:
    """It is unavailable on the local days of its outage, and on no other."""
    study = _changed(_study("factory"), 0)
    available = _plant(study).envelope.units[0].available

    local = _site_year().local_time.tz_localize(None)
    stopped = (local >= pd.Timestamp("2025-07-28")) & (local < pd.Timestamp("2025-08-11"))
    assert stopped.any()
    np.testing.assert_array_equal(available, ~stopped)


def test_generic_machine_is_told() -> None:
    """A class value is a finding, a guaranteed sheet is not."""
    study = _study("factory")

    assert len(_about(_plant(_changed(study, 1)).findings, "generic machine")) == 1
    offered = _plant(_changed(study, 1, unit={"generic": False}))
    assert _about(offered.findings, "generic machine") == []


def test_exhaust_too_cold_for_the_dryer_is_told() -> None:
    """A dryer that needs more than the exhaust has gets a finding, and no heat."""
    plant = _plant(
        _changed(_study("factory"), 1, hot_gas={"required_degC": 640.0, "limit_degC": 700.0})
    )

    (finding,) = _about(plant.findings, "the dryer needs 640 degC")
    assert finding.severity == "attention"
    hot_gas = next(path for path in plant.envelope.units[0].paths if path.name == HOT_GAS)
    assert (hot_gas.yield_at_minimum_kW["hot_gas"] == 0.0).all()


def test_recovery_that_the_exhaust_is_too_cold_for_is_told() -> None:
    """Steam of 50 bar and a pinch of 60 K leave nothing of an exhaust of 310 degC."""
    study = _changed(
        _study("hospital"),
        1,
        sheet={"exhaust_degC": 310.0, "audit_accepted_because": "a test"},
        steam={"pressure_kPa_gauge": 5000.0},
        recovery={"pinch_K": 60.0},
    )
    plant = _plant(study)

    assert len(_about(plant.findings, "too cold to make steam")) == 1
    assert "steam, then water" not in {path.name for path in plant.envelope.units[0].paths}


def test_stack_colder_than_allowed_is_told() -> None:
    """Cold feedwater and a stack that may not fall below 180 degC contradict each other."""
    study = _changed(_study("hospital"), 1, recovery={"minimum_stack_degC": 180.0})

    (finding,) = _about(_plant(study).findings, "coldest stack allowed is 180 degC")
    assert "colder stack" in finding.effect


def test_guarantee_raises_the_minimum_load() -> None:
    """The unit's minimum is the guarantee's lower end, and the reader is told."""
    plant = _plant(_changed(_study("factory"), 1, sheet={"minimum_load_frac": 0.4}))
    unit = plant.envelope.units[0]

    np.testing.assert_allclose(unit.minimum_power_kW, 0.6 * unit.maximum_power_kW, rtol=1e-12)
    assert len(_about(plant.findings, "begins at 60% load")) == 1


def test_sheet_on_the_wrong_calorific_value() -> None:
    """An efficiency on LHV entered as one on HHV is refused by name, at its place in the study."""
    with pytest.raises(StudyError) as refusal:
        _plant(_changed(_study("factory"), 1, sheet={"efficiency_basis": "HHV"}))
    assert "option[1].unit.sheet" in str(refusal.value)
    assert "the efficiency is LHV, not HHV" in str(refusal.value)


@pytest.mark.parametrize(
    ("fields", "words"),
    [
        ({"exhaust_flow_kg_per_s": 0.2}, "is it stated in kg/s?"),
        ({"exhaust_flow_kg_per_s": 46.8}, "cannot be true together"),
        ({"pressure_ratio": 3.0}, "polytropic efficiency"),
    ],
)
def test_impossible_sheets_are_refused(fields: dict[str, float], words: str) -> None:
    """Too little exhaust to burn in, four times too much, and a ratio too low for the power."""
    with pytest.raises(StudyError) as refusal:
        _plant(_changed(_study("factory"), 1, sheet=fields))
    assert "option[1].unit.sheet" in str(refusal.value)
    assert words in str(refusal.value)


def test_doubtful_pressure_ratio_is_told() -> None:
    """The first law does not see a pressure ratio of half the true one; the cycle does."""
    findings = _plant(_changed(_study("factory"), 0, sheet={"pressure_ratio": 6.1})).findings

    (finding,) = _about(findings, "polytropic efficiency")
    assert finding.severity == "attention"


def test_separate_supply_has_no_unit() -> None:
    """It has heaters and chillers, and refuses to be asked for a machine."""
    study = _study("hospital")
    gas = GasFuel.from_composition(study.fuel.name, study.fuel.composition_mol_frac)
    plant = build_plant(study, None, _site_year(), gas)

    assert plant.envelope.units == ()
    assert len(plant.envelope.heaters) == 2
    with pytest.raises(ValueError, match="has no machine"):
        plant.machine()


def test_slopes_that_fall_are_levelled() -> None:
    """By hand: 10 kW at 3 and 30 kW at 2 are 40 kW at 2.25; rising slopes stay."""
    slopes = np.array([[3.0, 2.0], [2.0, 3.0]])
    widths = np.array([[10.0, 30.0], [10.0, 30.0]])

    found = convex_slopes(slopes, widths)

    np.testing.assert_allclose(found, [[2.25, 2.25], [2.0, 3.0]])

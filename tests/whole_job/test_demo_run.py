"""Both demo sites through the command line, as a user runs them, and what must hold for them."""

import json
from pathlib import Path
from typing import Any

import jsonschema
import numpy as np
import pandas as pd
import pypdf
import pytest

from planner import cli
from planner.results.hourly_columns import HOURLY_COLUMNS
from planner.schemas import results_schema

pytestmark = [
    pytest.mark.slow,
    pytest.mark.solver,
    pytest.mark.pdf,
]

SITES = ("hospital", "factory")
GRADES = ("steam", "hot_water", "hot_gas")


@pytest.fixture(scope="session")
def demo(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Results of `flueprint demo`."""
    root = tmp_path_factory.mktemp("demo run")
    assert cli.run(["demo", "--into", str(root)]) == cli.DONE
    return root


def _results(demo: Path, site: str) -> dict[str, Any]:
    """Records of one site."""
    read: dict[str, Any] = json.loads((demo / site / "results.json").read_text(encoding="utf-8"))
    return read


def _hourly(demo: Path, site: str) -> list[tuple[dict[str, Any], pd.DataFrame]]:
    """Each option's records and hours."""
    return [
        (option, pd.read_csv(demo / site / f"hourly_{option['key']}.csv"))
        for option in _results(demo, site)["options"]
    ]


@pytest.mark.parametrize("site", SITES)
def test_folder_is_whole(demo: Path, site: str) -> None:
    """The folder holds what the contract names, and the records fit their schema."""
    results = _results(demo, site)

    jsonschema.Draft202012Validator(results_schema()).validate(results)
    names = {path.name for path in (demo / site).iterdir()}
    hours = {f"hourly_{option['key']}.csv" for option in results["options"]}
    assert names == {
        "results.json",
        "variants.csv",
        "study.toml",
        "report.pdf",
        "hourly_separate.csv",
        *hours,
    }
    assert not list(demo.glob(".*")), "a draft was left behind"


@pytest.mark.parametrize("site", SITES)
def test_report_has_ten_to_twenty_pages(demo: Path, site: str) -> None:
    """The client's report has the length that was promised."""
    pages = pypdf.PdfReader(demo / site / "report.pdf").pages

    assert 10 <= len(pages) <= 20


def test_hospital_pays_and_the_factory_s_obvious_option_does_not(demo: Path) -> None:
    """The two sites tell two stories: one plant pays, and the one sized on the peak loses."""
    hospital, factory = (_results(demo, site) for site in SITES)
    npv = {option["name"]: option["economics"]["npv_real"] for option in factory["options"]}

    assert hospital["verdict"]["recommended"] is not None
    assert npv["5.7 MW turbine sized on the peak"] < 0.0
    assert factory["verdict"]["best"] != factory["options"][0]["key"]


@pytest.mark.parametrize("site", SITES)
def test_schedules_are_proven_and_the_fit_is_close(demo: Path, site: str) -> None:
    """Gap to 0.1 %, fuel of the fit to 0.1 % and heat to 0.3 % over the year, as required."""
    for option in _results(demo, site)["options"]:
        proof = option["proof"]

        assert 0.0 <= proof["gap_frac"] <= 1e-3
        assert abs(proof["fit_fuel_frac"]) <= 1e-3
        assert abs(proof["fit_heat_frac"]) <= 3e-3


@pytest.mark.parametrize("site", SITES)
def test_hours_balance(demo: Path, site: str) -> None:
    """Heat and cooling balance in every hour of the file, to a millionth of the largest flow."""
    for _option, hours in _hourly(demo, site):
        assert list(hours.columns) == list(HOURLY_COLUMNS)
        for grade in GRADES:
            supplied = hours[f"unit_{grade}_kW"] - hours[f"dumped_{grade}_kW"]
            supplied = supplied + hours[f"heater_{grade}_kW"]
            if grade == "hot_water":
                supplied = supplied + hours["store_discharge_kW"] - hours["store_charge_kW"]
                supplied = supplied - hours["absorption_heat_kW"]
            largest = max(float(supplied.max()), 1.0)
            np.testing.assert_allclose(
                supplied, hours[f"{grade}_demand_kW"], atol=2e-6 * largest, rtol=0.0
            )
        cooling = hours["electric_cooling_kW"] + hours["absorption_cooling_kW"]
        np.testing.assert_allclose(cooling, hours["cooling_demand_kW"], atol=1e-2, rtol=0.0)


@pytest.mark.parametrize("site", SITES)
def test_bill_is_that_of_the_hours(demo: Path, site: str) -> None:
    """Import in the hourly file at its hourly price is what the bill asks for energy and levies."""
    for option, hours in _hourly(demo, site):
        paid = float((hours["grid_import_kW"] * hours["price_import_per_kWh"]).sum())

        lines = [line for line in option["bill"]["lines"] if line["section"] == "power"]
        energy = sum(line["amount"] for line in lines if line["quantity_unit"] == "kWh")
        assert energy == pytest.approx(paid, rel=1e-6)
        assert option["bill"]["total"] == pytest.approx(
            sum(line["amount"] for line in option["bill"]["lines"]), rel=1e-9
        )


@pytest.mark.parametrize("site", SITES)
def test_carbon_by_hand(demo: Path, site: str) -> None:
    """First year's carbon saved from fuel and import in the hourly files, factor by factor."""
    separate = pd.read_csv(demo / site / "hourly_separate.csv")
    for option, hours in _hourly(demo, site):
        carbon = option["carbon"]
        grid = carbon["by_year"][0]["grid_kg_per_kWh"]

        def emitted_t(frame: pd.DataFrame, carbon: Any = carbon, grid: float = grid) -> float:
            fuel = frame["unit_fuel_lhv_kW"] + frame["start_fuel_lhv_kW"]
            fuel = fuel + frame["heater_fuel_lhv_kW"]
            burnt_kg = float(fuel.sum()) * carbon["fuel_kg_per_lhv_kWh"]
            return (burnt_kg + float(frame["grid_import_kW"].sum()) * grid) / 1e3

        saved_t = emitted_t(separate) - emitted_t(hours)
        assert carbon["first_year_saved_t"] == pytest.approx(saved_t, rel=1e-6)
        assert carbon["lifetime_saved_t"] == pytest.approx(
            sum(year["saved_t"] for year in carbon["by_year"]), rel=1e-9
        )


@pytest.mark.parametrize("site", SITES)
def test_dearer_gas_never_helps(demo: Path, site: str) -> None:
    """A plant that burns more gas than the boilers saves less as gas grows dearer, within gaps."""
    for option in _results(demo, site)["options"]:
        steps = sorted(
            (v["change_frac"], v["annual_saving"], v["gap_frac"])
            for v in option["variants"]
            if v["factor"] in {"base", "fuel_price"}
        )
        slack = max(gap for _, _, gap in steps) * option["bill"]["total"]

        savings = np.array([saving for _, saving, _ in steps])
        assert (np.diff(savings) <= slack).all()


@pytest.mark.parametrize("site", SITES)
def test_saving_is_the_difference_of_the_bills(demo: Path, site: str) -> None:
    """Annual saving = today's lower bound less the option's bill and its outages (DEFINITIONS)."""
    results = _results(demo, site)
    today = results["separate_supply"]
    slack = today["proof"]["cost_per_year"] - today["proof"]["lower_bound_per_year"]
    for option in results["options"]:
        money = option["economics"]

        by_hand = today["bill"]["total"] - slack - option["bill"]["total"]
        by_hand -= money["expected_outage_cost"]
        assert money["annual_saving"] == pytest.approx(by_hand, rel=1e-6)


def test_report_again_from_the_folder_alone(demo: Path, tmp_path: Path) -> None:
    """A report can be made again from the results folder, byte for byte."""
    again = tmp_path / "again.pdf"

    assert cli.run(["report", str(demo / "factory"), "--into", str(again)]) == cli.DONE
    assert again.read_bytes() == (demo / "factory" / "report.pdf").read_bytes()

"""Data sheets of the invented machines close the first law, by Cantera alone."""

from pathlib import Path

import cantera as ct
import numpy as np
import pytest

import load_profiles.demo_sites
import planner.study
from planner.study.reading import load_study
from planner.study.sections import DataSheet
from planner.study.study import Study

DEMO_FOLDER = Path(load_profiles.demo_sites.__file__).parent
STARTER_FOLDER = Path(planner.study.__file__).parent / "starters"
FOLDERS = [
    base / kind for base in (DEMO_FOLDER, STARTER_FOLDER) for kind in ("hospital", "factory")
]

#: Names of the study file's gases in Cantera. Its mechanism has no butane; propane is alike in
#: heating value per kilogram within 2 % (46.35 and 45.75 MJ/kg), and there is under 0.4 % of it.
NAMES = {
    "methane": "CH4",
    "ethane": "C2H6",
    "propane": "C3H8",
    "n_butane": "C3H8",
    "i_butane": "C3H8",
    "nitrogen": "N2",
    "carbon_dioxide": "CO2",
}
DRY_AIR = {"N2": 0.78084, "O2": 0.20946, "AR": 0.00934, "CO2": 0.0004}

#: Unburnt fuel and heat of the casing, shares of fuel (LHV); common practice.
BURNER_AND_CASING_LOSS = 0.006

#: Gearbox, bearings and generator over size; common practice: 0.94 at 1 MW to 0.965 at 15 MW.
SIZES_kW, SHAFT_TO_TERMINALS = (1000.0, 5000.0, 15000.0), (0.94, 0.955, 0.965)


def burnt(gas: ct.Solution, fuel: dict[str, float]) -> tuple[float, float, dict[str, float]]:
    """Molar mass, LHV [kJ/kg], and kmol made (oxygen: used) by burning a kmol of fuel."""
    gas.TPX = 298.15, ct.one_atm, fuel
    molar_mass, shares = gas.mean_molecular_weight, gas.mole_fraction_dict()
    carbon = sum(share * gas.n_atoms(name, "C") for name, share in shares.items())
    hydrogen = sum(share * gas.n_atoms(name, "H") for name, share in shares.items())
    made = {"CO2": carbon, "H2O": hydrogen / 2, "N2": shares.get("N2", 0.0)}
    made["O2"] = -(carbon - shares.get("CO2", 0.0) + hydrogen / 4)
    before_J = gas.enthalpy_mole
    enthalpies_J = dict(zip(gas.species_names, gas.partial_molar_enthalpies, strict=True))
    after_J = sum(amount * enthalpies_J[name] for name, amount in made.items())
    return molar_mass, (before_J - after_J) / molar_mass / 1e3, made


def loss_frac(sheet: DataSheet, study: Study) -> float:
    """Fuel less power less exhaust, over fuel (LHV), all against the sheet's ambient."""
    gas = ct.Solution("gri30.yaml", "gri30")
    fuel: dict[str, float] = {}
    for component, share in study.fuel.composition_mol_frac.items():
        fuel[NAMES[component]] = fuel.get(NAMES[component], 0.0) + share
    molar_mass, lhv_kJ_per_kg, made = burnt(gas, fuel)
    fuel_kW = sheet.power_kW / sheet.efficiency_frac
    fuel_kg_per_s = fuel_kW / lhv_kJ_per_kg
    air_kg_per_s = sheet.exhaust_flow_kg_per_s - fuel_kg_per_s

    ambient_K, exhaust_K = sheet.ambient_degC + 273.15, sheet.exhaust_degC + 273.15
    vapour_kPa = 0.6112 * np.exp(17.62 * sheet.ambient_degC / (243.12 + sheet.ambient_degC))
    vapour = sheet.relative_humidity_frac * vapour_kPa / sheet.pressure_kPa
    air = {name: share * (1 - vapour) for name, share in DRY_AIR.items()} | {"H2O": vapour}
    gas.TPX = ambient_K, ct.one_atm, air
    air_kmol_per_s = air_kg_per_s / gas.mean_molecular_weight
    exhaust = {name: share * air_kmol_per_s for name, share in air.items()}
    for name, amount in made.items():
        exhaust[name] += amount * fuel_kg_per_s / molar_mass
    gas.TPX = exhaust_K, ct.one_atm, exhaust
    hot_J_per_kg = gas.enthalpy_mass
    gas.TPX = ambient_K, ct.one_atm, exhaust
    exhaust_kW = sheet.exhaust_flow_kg_per_s * (hot_J_per_kg - gas.enthalpy_mass) / 1e3
    return 1.0 - (sheet.power_kW + exhaust_kW) / fuel_kW


@pytest.mark.parametrize(
    "folder", FOLDERS, ids=lambda folder: f"{folder.parent.name} {folder.name}"
)
def test_invented_machines_obey_the_first_law(folder: Path) -> None:
    """What is neither power nor exhaust is the usual losses, and 0 to 2 % of fuel besides."""
    study = load_study(folder).study

    for option in study.option:
        sheet = option.unit.sheet
        terminals = np.interp(sheet.power_kW, SIZES_kW, SHAFT_TO_TERMINALS)
        usual = BURNER_AND_CASING_LOSS + sheet.efficiency_frac * (1.0 / terminals - 1.0)
        assert 0.0 < loss_frac(sheet, study) - usual < 0.02, option.name


def test_methane_burns_as_in_the_tables() -> None:
    """LHV of methane at 25 degC is 50.03 MJ/kg (ISO 6976), so the audit's fuel side is right."""
    molar_mass, lhv_kJ_per_kg, made = burnt(ct.Solution("gri30.yaml", "gri30"), {"CH4": 1.0})

    assert molar_mass == pytest.approx(16.043, abs=0.001)
    assert lhv_kJ_per_kg == pytest.approx(50030.0, rel=1e-3)
    assert made["O2"] == pytest.approx(-2.0)

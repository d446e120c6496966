"""Gas properties and combustion against a chemistry library."""

import cantera as ct
import numpy as np
import pytest

from planner.plant.air import humid_air, saturation_pressure_kPa
from planner.plant.combustion import burnable, burnt
from planner.plant.fuel import GasFuel
from planner.plant.gas import SPECIES, Mixture

LIBRARY_NAMES = {
    "nitrogen": "N2",
    "oxygen": "O2",
    "argon": "AR",
    "carbon_dioxide": "CO2",
    "water": "H2O",
}
FUEL_NAMES = {"methane": "CH4", "ethane": "C2H6", "propane": "C3H8", "nitrogen": "N2"}


@pytest.fixture(scope="module")
def library() -> ct.Solution:
    """GRI-Mech 3.0, whose polynomials are those of our table."""
    return ct.Solution("gri30.yaml")


@pytest.mark.parametrize("temperature_K", [220.0, 300.0, 700.0, 999.0, 1001.0, 1400.0, 2000.0])
def test_properties_of_a_mixture(library: ct.Solution, temperature_K: float) -> None:
    """Specific heat, enthalpy and entropy differences agree to 1e-9 from 220 to 2000 K."""
    shares = np.array([[0.72, 0.14, 0.012, 0.05, 0.078]])
    named = dict(zip((LIBRARY_NAMES[s] for s in SPECIES), shares[0], strict=True))
    library.TPY = temperature_K, ct.one_atm, named
    gas, t = Mixture(shares), np.array([temperature_K])
    cold = np.array([298.15])

    cp = gas.cp_kJ_per_kgK(t)[0]
    rise = gas.enthalpy_kJ_per_kg(t)[0] - gas.enthalpy_kJ_per_kg(cold)[0]
    entropy_rise = gas.entropy_kJ_per_kgK(t)[0] - gas.entropy_kJ_per_kgK(cold)[0]
    hot_h, hot_s, hot_cp = library.enthalpy_mass, library.entropy_mass, library.cp_mass
    library.TPY = 298.15, ct.one_atm, named

    assert cp == pytest.approx(hot_cp / 1e3, rel=1e-9)
    assert rise == pytest.approx((hot_h - library.enthalpy_mass) / 1e3, rel=1e-9, abs=1e-7)
    assert entropy_rise == pytest.approx((hot_s - library.entropy_mass) / 1e3, rel=1e-9, abs=1e-9)


@pytest.mark.parametrize("temperature_K", [240.0, 500.0, 1200.0, 1900.0])
def test_temperatures_come_back(temperature_K: float) -> None:
    """A temperature is found again from its enthalpy and from its entropy."""
    gas, t = Mixture(np.array([[0.72, 0.14, 0.012, 0.05, 0.078]])), np.array([temperature_K])

    from_enthalpy = gas.temperature_at_enthalpy_K(gas.enthalpy_kJ_per_kg(t), 700.0)
    from_entropy = gas.temperature_at_entropy_K(gas.entropy_kJ_per_kgK(t), 700.0)

    assert from_enthalpy[0] == pytest.approx(temperature_K, abs=1e-6)
    assert from_entropy[0] == pytest.approx(temperature_K, abs=1e-6)


def test_carbon_against_equilibrium(library: ct.Solution) -> None:
    """CO2 by atom balance is what a cold, lean equilibrium holds, to a millionth."""
    shares = {"methane": 0.93, "ethane": 0.04, "propane": 0.01, "nitrogen": 0.02}
    fuel = GasFuel.from_composition("Natural gas", shares)
    named = {FUEL_NAMES[name]: share for name, share in shares.items()}
    library.TPX = 298.15, ct.one_atm, named
    fuel_kg_per_kmol = library.mean_molecular_weight
    library.set_equivalence_ratio(0.5, named, "O2:0.21, N2:0.79")
    fuel_mass = library.mixture_fraction(named, "O2:0.21, N2:0.79")
    library.TP = 400.0, ct.one_atm
    library.equilibrate("TP")

    co2_kg_per_mol = library["CO2"].Y[0] / fuel_mass * fuel_kg_per_kmol * 1e-3
    of_ours = fuel.co2_kg_per_lhv_kWh * fuel.lhv_kJ_per_mol / 3600.0
    assert of_ours == pytest.approx(co2_kg_per_mol, rel=1e-6)


@pytest.mark.parametrize(
    ("name", "library_name"),
    [("methane", "CH4"), ("ethane", "C2H6"), ("propane", "C3H8"), ("hydrogen", "H2")],
)
def test_calorific_values_against_polynomials(
    library: ct.Solution, name: str, library_name: str
) -> None:
    """Net calorific values are the heat that the library's enthalpies of formation give, to 0.05 %.

    Heat of the reaction to carbon dioxide and water vapour at 25 degC.
    """
    fuel = GasFuel.from_composition(name, {name: 1.0})

    def enthalpy_kJ_per_mol(species: str) -> float:
        library.TPX = 298.15, ct.one_atm, {species: 1.0}
        return float(library.enthalpy_mole) * 1e-6

    made = fuel.carbon * enthalpy_kJ_per_mol("CO2") + 0.5 * fuel.hydrogen * enthalpy_kJ_per_mol(
        "H2O"
    )
    taken = enthalpy_kJ_per_mol(library_name)
    taken += fuel.oxygen_need_mol_per_mol * enthalpy_kJ_per_mol("O2")
    assert fuel.lhv_kJ_per_mol == pytest.approx(taken - made, rel=5e-4)


def test_flame_without_dissociation() -> None:
    """Methane in air from 25 degC burns to 2325.6 K where nothing dissociates.

    Source: computed with a chemistry library, complete combustion, O2 + 3.76 N2; our air has argon
    and 20.95 % oxygen, which moves the flame by less than 8 K.
    """
    methane = burnable(GasFuel.from_composition("Methane", {"methane": 1.0}))
    cold = np.array([298.15])
    air = humid_air(cold, np.array([101.325]), np.array([0.0]))
    far = np.array([1.0 / 17.236])
    gas = burnt(air, far, methane)

    brought = air.enthalpy_kJ_per_kg(cold) + far * methane.enthalpy_kJ_per_kg
    flame_K = gas.temperature_at_enthalpy_K(brought / (1.0 + far), 2000.0)
    assert flame_K[0] == pytest.approx(2325.6, abs=8.0)


def test_saturation_and_humidity() -> None:
    """Vapour pressure at 15 degC, and the humidity ratio of ISO air: 0.006372 kg/kg.

    Source: IAPWS (1.7058 kPa); the humidity ratio from a property library for humid air.
    """
    assert saturation_pressure_kPa(np.array([288.15]))[0] == pytest.approx(1.7058, rel=2e-4)
    air = humid_air(np.array([288.15]), np.array([101.325]), np.array([0.6]))
    water = air.mass_frac[0, SPECIES.index("water")]
    # The library knows that vapour in air is a little denser than ideal: 0.4 %.
    assert water / (1.0 - water) == pytest.approx(0.006372, rel=5e-3)

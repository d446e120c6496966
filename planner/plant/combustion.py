"""Complete combustion: what a fuel adds to air, and the heat that it brings."""

from dataclasses import dataclass

import numpy as np

from planner.arrays import FloatArray
from planner.plant.fuel import GasFuel
from planner.plant.gas import SPECIES, Mixture, molar_masses_kg_per_kmol


@dataclass(frozen=True)
class BurnableFuel:
    """A fuel as the energy balance of a combustor sees it, by kilogram.

    Parameters
    ----------
    made_kg_per_kg : array, shape (species,) [-]
        What complete combustion adds of each species for a kilogram of fuel; oxygen is taken away.
        Adds up to one.
    enthalpy_kJ_per_kg : float [kJ/kg]
        Absolute enthalpy at 25 degC, consistent with the net calorific value.
    lhv_kJ_per_kg : float [kJ/kg]
        Net calorific value.
    """

    made_kg_per_kg: FloatArray
    enthalpy_kJ_per_kg: float
    lhv_kJ_per_kg: float


def burnable(fuel: GasFuel) -> BurnableFuel:
    """A fuel for the energy balance of combustors.

    Parameters
    ----------
    fuel : GasFuel
        By composition.

    Returns
    -------
    BurnableFuel
        Its absolute enthalpy is that of its products at 25 degC plus its net calorific value. The
        fuel is taken to arrive at 25 degC: 30 K more bring 0.15 % of its heat.
    """
    masses = molar_masses_kg_per_kmol()
    per_mole = np.array(
        [fuel.nitrogen / 2, -fuel.oxygen_need_mol_per_mol, 0.0, fuel.carbon, fuel.hydrogen / 2]
    )
    made = per_mole * masses / fuel.molar_mass_kg_per_kmol
    made[0] += 1.0 - made.sum()  # atomic masses of two tables differ in the sixth digit
    pure = Mixture(np.eye(len(SPECIES)))
    products = pure.enthalpy_kJ_per_kg(np.full(len(SPECIES), 298.15))
    lhv_kJ_per_kg = fuel.lhv_MJ_per_kg * 1e3
    return BurnableFuel(made, float(made @ products) + lhv_kJ_per_kg, lhv_kJ_per_kg)


def burnt(air: Mixture, fuel_per_air: FloatArray, fuel: BurnableFuel) -> Mixture:
    """Gas after complete combustion.

    Parameters
    ----------
    air : Mixture
        Before the combustor.
    fuel_per_air : array, shape (hours,) [-]
        Mass of fuel over mass of air.
    fuel : BurnableFuel
        What is burnt.

    Returns
    -------
    Mixture
        Products and the air that is left.
    """
    masses = air.mass_frac + fuel_per_air[:, None] * fuel.made_kg_per_kg
    return Mixture(masses / masses.sum(axis=1, keepdims=True))

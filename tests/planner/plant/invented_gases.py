"""Gases for the tests of the plant."""

import numpy as np

from planner.arrays import FloatArray
from planner.plant.air import humid_air
from planner.plant.combustion import burnable, burnt
from planner.plant.exchange import GasFlow
from planner.plant.fuel import GasFuel
from planner.plant.gas import SPECIES, Mixture, molar_masses_kg_per_kmol

METHANE = GasFuel.from_composition("Methane", {"methane": 1.0})

#: Air for a kilogram of methane: 2 / 0.2095 mol x 28.9647 / 16.043.
DRY_AIR_PER_METHANE_kg_per_kg = 17.236


def gas_of(**mol_frac: float) -> Mixture:
    """A gas of stated mole fractions, scaled to one, in one hour."""
    moles = np.array([[mol_frac.get(name, 0.0) for name in SPECIES]])
    masses = moles * molar_masses_kg_per_kmol()
    return Mixture(masses / masses.sum())


def methane_exhaust(air_ratio: float, *, humidity_frac: float = 0.6) -> Mixture:
    """Gas of methane burnt with a multiple of its air of 15 degC, in one hour."""
    air = humid_air(np.array([288.15]), np.array([101.325]), np.array([humidity_frac]))
    dry_frac = 1.0 - air.mass_frac[:, SPECIES.index("water")]
    return burnt(air, dry_frac / (air_ratio * DRY_AIR_PER_METHANE_kg_per_kg), burnable(METHANE))


def gas_flow(
    gas: Mixture, *, degC: float | FloatArray, kg_per_s: float | FloatArray = 1.0
) -> GasFlow:
    """The same gas in some hours of different temperature and flow."""
    temperature, flow = np.broadcast_arrays(
        np.atleast_1d(np.asarray(degC, dtype=np.float64)),
        np.asarray(kg_per_s, dtype=np.float64),
    )
    rows = np.repeat(gas.mass_frac, len(temperature), axis=0)
    return GasFlow(Mixture(rows), flow.copy(), temperature + 273.15)

"""Ideal-gas mixtures of nitrogen, oxygen, argon, carbon dioxide and water, for all hours at once.

Properties are NASA polynomials per kilogram of mixture. A mixture is an array of mass fractions
with one row an hour; every property is an array of hours.
"""

from dataclasses import dataclass
from functools import cache

import numpy as np

from planner.arrays import FloatArray
from planner.constants import GAS_CONSTANT_J_per_molK
from planner.data.published import published_rows

SPECIES = ("nitrogen", "oxygen", "argon", "carbon_dioxide", "water")

#: Temperature at which the polynomials change over.
CHANGEOVER_K = 1000.0


@cache
def _coefficients() -> tuple[FloatArray, FloatArray, FloatArray]:
    """Molar masses [kg/kmol] and the low and high polynomials, each over the molar mass."""
    rows = published_rows("gas_polynomials.csv")
    masses = np.array([float(rows[name]["molar_mass"]) for name in SPECIES])
    low, high = (
        np.array([[float(rows[name][f"{part}_{n}"]) for n in range(1, 8)] for name in SPECIES])
        for part in ("low", "high")
    )
    per_kg = GAS_CONSTANT_J_per_molK / masses[:, None]  # kJ/(kg K)
    return masses, low * per_kg, high * per_kg


def molar_masses_kg_per_kmol() -> FloatArray:
    """Molar masses of `SPECIES`.

    Returns
    -------
    array, shape (species,) [kg/kmol]
        As the polynomials' source has them.
    """
    return _coefficients()[0]


@dataclass(frozen=True)
class Mixture:
    """A gas of one composition an hour.

    Parameters
    ----------
    mass_frac : array, shape (hours, species) [-]
        Mass fractions in the order of `SPECIES`; each row adds up to one.
    """

    mass_frac: FloatArray

    @property
    def gas_constant_kJ_per_kgK(self) -> FloatArray:
        """Specific gas constant, shape (hours,)."""
        return np.asarray(self.mass_frac @ (GAS_CONSTANT_J_per_molK / molar_masses_kg_per_kmol()))

    @property
    def mol_frac(self) -> FloatArray:
        """Mole fractions, shape (hours, species)."""
        moles = self.mass_frac / molar_masses_kg_per_kmol()
        return np.asarray(moles / moles.sum(axis=1, keepdims=True))

    def cp_kJ_per_kgK(self, temperature_K: FloatArray) -> FloatArray:
        """Specific heat at constant pressure.

        Parameters
        ----------
        temperature_K : array, shape (hours,) [K]
            Between 200 and 3500 K.

        Returns
        -------
        array, shape (hours,) [kJ/kgK]
            Mean of the species by mass.
        """
        return _specific_heat(self._polynomial(temperature_K), temperature_K)

    def enthalpy_kJ_per_kg(self, temperature_K: FloatArray) -> FloatArray:
        """Enthalpy, formation from the elements at 25 degC included.

        Parameters
        ----------
        temperature_K : array, shape (hours,) [K]
            Between 200 and 3500 K.

        Returns
        -------
        array, shape (hours,) [kJ/kg]
            Absolute, so that combustion needs no term of its own.
        """
        return _enthalpy(self._polynomial(temperature_K), temperature_K)

    def entropy_kJ_per_kgK(self, temperature_K: FloatArray) -> FloatArray:
        """Temperature part of the entropy, at one atmosphere and without mixing.

        Parameters
        ----------
        temperature_K : array, shape (hours,) [K]
            Between 200 and 3500 K.

        Returns
        -------
        array, shape (hours,) [kJ/kgK]
            Differences at one composition are what it serves for.
        """
        return _entropy(self._polynomial(temperature_K), temperature_K)

    def temperature_at_enthalpy_K(
        self, enthalpy_kJ_per_kg: FloatArray, guess_K: FloatArray | float
    ) -> FloatArray:
        """Temperature of an enthalpy, by Newton's method.

        Parameters
        ----------
        enthalpy_kJ_per_kg : array, shape (hours,) [kJ/kg]
            Absolute enthalpy.
        guess_K : float or array [K]
            Anywhere near.

        Returns
        -------
        array, shape (hours,) [K]
            To about 1e-9 K.
        """
        t = np.full_like(enthalpy_kJ_per_kg, 1.0) * guess_K
        for _ in range(NEWTON_STEPS):
            a = self._polynomial(t)
            step = (enthalpy_kJ_per_kg - _enthalpy(a, t)) / _specific_heat(a, t)
            t = np.clip(t + step, *TEMPERATURE_RANGE_K)
            if np.abs(step).max() < NEWTON_TOLERANCE_K:
                break
        return t

    def temperature_at_entropy_K(
        self, entropy_kJ_per_kgK: FloatArray, guess_K: FloatArray | float
    ) -> FloatArray:
        """Temperature of an entropy, by Newton's method in the logarithm.

        Parameters
        ----------
        entropy_kJ_per_kgK : array, shape (hours,) [kJ/kgK]
            Temperature part, as `entropy_kJ_per_kgK` gives it.
        guess_K : float or array [K]
            Anywhere near.

        Returns
        -------
        array, shape (hours,) [K]
            To about 1e-9 K.
        """
        t = np.full_like(entropy_kJ_per_kgK, 1.0) * guess_K
        for _ in range(NEWTON_STEPS):
            a = self._polynomial(t)
            step = (entropy_kJ_per_kgK - _entropy(a, t)) / _specific_heat(a, t)
            moved = np.clip(t * np.exp(step), *TEMPERATURE_RANGE_K)
            done = np.abs(moved - t).max() < NEWTON_TOLERANCE_K
            t = moved
            if done:
                break
        return t

    def _polynomial(self, temperature_K: FloatArray) -> FloatArray:
        """Coefficients of the mixture, shape (7, hours)."""
        _, low, high = _coefficients()
        hot = temperature_K > CHANGEOVER_K
        if not hot.any():
            return np.asarray((self.mass_frac @ low).T)
        if hot.all():
            return np.asarray((self.mass_frac @ high).T)
        return np.where(hot, (self.mass_frac @ high).T, (self.mass_frac @ low).T)


def _specific_heat(a: FloatArray, t: FloatArray) -> FloatArray:
    """Specific heat of polynomials, NASA's five terms [kJ/kgK]."""
    return np.asarray(a[0] + t * (a[1] + t * (a[2] + t * (a[3] + t * a[4]))))


def _enthalpy(a: FloatArray, t: FloatArray) -> FloatArray:
    """Integral of the specific heat, with the constant of formation [kJ/kg]."""
    inner = a[2] / 3.0 + t * (a[3] / 4.0 + t * a[4] / 5.0)
    return np.asarray(a[5] + t * (a[0] + t * (a[1] / 2.0 + t * inner)))


def _entropy(a: FloatArray, t: FloatArray) -> FloatArray:
    """Integral of the specific heat over temperature [kJ/kgK]."""
    inner = a[2] / 2.0 + t * (a[3] / 3.0 + t * a[4] / 4.0)
    return np.asarray(a[0] * np.log(t) + a[6] + t * (a[1] + t * inner))


def species_enthalpies_kJ_per_kg(temperature_K: FloatArray) -> FloatArray:
    """Enthalpies of the pure species.

    Parameters
    ----------
    temperature_K : array, shape (hours,) [K]
        Between 200 and 3500 K.

    Returns
    -------
    array, shape (hours, species) [kJ/kg]
        Absolute, in the order of `SPECIES`.
    """
    _, low, high = _coefficients()
    t = temperature_K[:, None]
    powers = np.concatenate([t, t**2 / 2, t**3 / 3, t**4 / 4, t**5 / 5, np.ones_like(t)], axis=1)
    return np.where(t > CHANGEOVER_K, powers @ high[:, :6].T, powers @ low[:, :6].T)


NEWTON_STEPS = 12
NEWTON_TOLERANCE_K = 1e-9
TEMPERATURE_RANGE_K = (180.0, 3200.0)

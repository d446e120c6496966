"""Humid air: dry air of the standard composition and water vapour."""

import numpy as np

from planner.arrays import FloatArray
from planner.plant.gas import SPECIES, Mixture, molar_masses_kg_per_kmol

#: Dry air by volume, CO2 of today left at the standard's value: ISO 2533 rounded.
DRY_AIR_mol_frac = (0.78084, 0.20946, 0.00934, 0.00036, 0.0)


#: Below this humidity of saturation nothing is left out: steam never fills more than half the air.
MOST_WATER_mol_frac = 0.5


def saturation_pressure_kPa(temperature_K: FloatArray) -> FloatArray:
    """Vapour pressure over water, and over ice below 0.01 degC.

    Parameters
    ----------
    temperature_K : array [K]
        From 190 K to the critical point.

    Returns
    -------
    array [kPa]
        Saturation pressure.

    References
    ----------
    Over water Wagner and Pruss (1993), equation 1; over ice Murphy and Koop (2005), equation 7.

    Examples
    --------
    >>> print(f"{saturation_pressure_kPa(np.array([288.15]))[0]:.4f}")
    1.7058
    """
    t = np.asarray(temperature_K, dtype=np.float64)
    tau = np.maximum(1.0 - t / 647.096, 1e-12)
    series = (
        -7.85951783 * tau
        + 1.84408259 * tau**1.5
        - 11.7866497 * tau**3
        + 22.6807411 * tau**3.5
        - 15.9618719 * tau**4
        + 1.80122502 * tau**7.5
    )
    over_water_kPa = 22064.0 * np.exp(647.096 / t * series)
    over_ice_Pa = np.exp(9.550426 - 5723.265 / t + 3.53068 * np.log(t) - 0.00728332 * t)
    return np.where(t < 273.16, over_ice_Pa * 1e-3, over_water_kPa)  # noqa: PLR2004 - triple point


def humid_air(
    temperature_K: FloatArray, pressure_kPa: FloatArray, relative_humidity_frac: FloatArray
) -> Mixture:
    """Air of a stated humidity.

    Parameters
    ----------
    temperature_K : array, shape (hours,) [K]
        Dry bulb.
    pressure_kPa : array, shape (hours,) [kPa]
        Total.
    relative_humidity_frac : array, shape (hours,) [-]
        Over saturation.

    Returns
    -------
    Mixture
        Dry air of the standard composition and water vapour.
    """
    share = relative_humidity_frac * saturation_pressure_kPa(temperature_K) / pressure_kPa
    water = np.clip(share, 0.0, MOST_WATER_mol_frac)
    dry = np.array(DRY_AIR_mol_frac) / sum(DRY_AIR_mol_frac)
    moles = (1.0 - water)[:, None] * dry
    moles[:, SPECIES.index("water")] += water
    masses = moles * molar_masses_kg_per_kmol()
    return Mixture(masses / masses.sum(axis=1, keepdims=True))

"""`GasFuel`: a gas by its composition, and what follows for heat, air, carbon and flue gas."""

import difflib
import math
from dataclasses import dataclass
from typing import Self

from load_profiles import Fault
from planner.constants import (
    ATOMIC_MASS_kg_per_kmol,
    NORMAL_MOLAR_VOLUME_m3_per_kmol,
    WATER_VAPORISATION_kJ_per_mol,
)
from planner.data.published import published_rows
from planner.errors import StudyError

#: Mole fractions may miss one by this much; they are then scaled to it.
SUM_TOLERANCE = 1e-4

#: Oxygen of dry air by volume; IPCC and EPA practice, rounded from 20.946 %.
AIR_OXYGEN_frac = 0.2095

#: Oxygen to which turbine emissions are referred; EU and US practice alike.
REFERENCE_OXYGEN_frac = 0.15

#: Mean molar mass of dry air, ISO 6976.
AIR_MOLAR_MASS_kg_per_kmol = 28.9647

KJ_PER_KWH = 3600.0


@dataclass(frozen=True)
class GasFuel:
    """A gas, per mole of it.

    Parameters
    ----------
    name : str
        Name as it stands in the report.
    composition_mol_frac : dict of str to float [-]
        Mole fractions by component; they add up to one.
    carbon, hydrogen, oxygen, nitrogen : float [-]
        Atoms in a mole of gas.
    hhv_kJ_per_mol : float [kJ/mol]
        Gross calorific value at 25 degC, ideal gas.
    """

    name: str
    composition_mol_frac: dict[str, float]
    carbon: float
    hydrogen: float
    oxygen: float
    nitrogen: float
    hhv_kJ_per_mol: float

    @classmethod
    def from_composition(cls, name: str, composition_mol_frac: dict[str, float]) -> Self:
        """Gas of a stated composition.

        Parameters
        ----------
        name : str
            Name as it stands in the report.
        composition_mol_frac : dict of str to float [-]
            Mole fractions by the names of `planner/data/fuel_components.csv`.

        Returns
        -------
        GasFuel
            The gas.

        Raises
        ------
        StudyError
            For each unknown component, with the nearest known one, or if the fractions do not add
            up to one.

        Notes
        -----
        Calorific values are those of the ideal gas at 25 degC: real-gas corrections move a
        volumetric value by some 0.2 %, a molar or mass-based one not at all.

        References
        ----------
        [ISO 6976]_, clause 5 and Table 3.

        Examples
        --------
        >>> methane = GasFuel.from_composition("Methane", {"methane": 1.0})
        >>> print(f"{methane.lhv_MJ_per_kg:.2f} {methane.hhv_over_lhv:.4f}")
        50.03 1.1097
        """
        rows = published_rows("fuel_components.csv")
        faults = _composition_faults(composition_mol_frac, list(rows))
        if faults:
            raise StudyError(faults)
        total = sum(composition_mol_frac.values())
        shares = {part: share / total for part, share in composition_mol_frac.items()}

        def sum_of(column: str) -> float:
            return sum(share * float(rows[part][column]) for part, share in shares.items())

        return cls(
            name=name,
            composition_mol_frac=shares,
            carbon=sum_of("carbon"),
            hydrogen=sum_of("hydrogen"),
            oxygen=sum_of("oxygen"),
            nitrogen=sum_of("nitrogen"),
            hhv_kJ_per_mol=sum_of("hhv_25degC"),
        )

    @property
    def molar_mass_kg_per_kmol(self) -> float:
        """Mass of a kilomole."""
        mass = ATOMIC_MASS_kg_per_kmol
        return (
            self.carbon * mass["C"]
            + self.hydrogen * mass["H"]
            + self.oxygen * mass["O"]
            + self.nitrogen * mass["N"]
        )

    @property
    def lhv_kJ_per_mol(self) -> float:
        """Net calorific value at 25 degC: the water made stays vapour."""
        return self.hhv_kJ_per_mol - 0.5 * self.hydrogen * WATER_VAPORISATION_kJ_per_mol

    @property
    def lhv_MJ_per_kg(self) -> float:
        """Net calorific value by mass."""
        return self.lhv_kJ_per_mol / self.molar_mass_kg_per_kmol

    @property
    def hhv_MJ_per_kg(self) -> float:
        """Gross calorific value by mass."""
        return self.hhv_kJ_per_mol / self.molar_mass_kg_per_kmol

    @property
    def hhv_over_lhv(self) -> float:
        """Gross over net calorific value."""
        return self.hhv_kJ_per_mol / self.lhv_kJ_per_mol

    @property
    def oxygen_need_mol_per_mol(self) -> float:
        """Oxygen for complete combustion."""
        return self.carbon + 0.25 * self.hydrogen - 0.5 * self.oxygen

    @property
    def air_need_mol_per_mol(self) -> float:
        """Dry air for complete combustion."""
        return self.oxygen_need_mol_per_mol / AIR_OXYGEN_frac

    @property
    def co2_kg_per_lhv_kWh(self) -> float:
        """Carbon dioxide of complete combustion, by atom balance."""
        mass = ATOMIC_MASS_kg_per_kmol
        co2_g_per_mol = self.carbon * (mass["C"] + 2.0 * mass["O"])
        return co2_g_per_mol * 1e-3 * KJ_PER_KWH / self.lhv_kJ_per_mol

    @property
    def dry_flue_gas_15O2_Nm3_per_lhv_kWh(self) -> float:
        """Dry flue gas at 15 % oxygen, at 0 degC and 101.325 kPa."""
        stoichiometric = self.carbon + 0.5 * self.nitrogen
        stoichiometric += self.air_need_mol_per_mol * (1.0 - AIR_OXYGEN_frac)
        excess = stoichiometric * REFERENCE_OXYGEN_frac / (AIR_OXYGEN_frac - REFERENCE_OXYGEN_frac)
        moles = stoichiometric + excess
        volume_Nm3_per_mol = NORMAL_MOLAR_VOLUME_m3_per_kmol * 1e-3
        return moles * volume_Nm3_per_mol * KJ_PER_KWH / self.lhv_kJ_per_mol

    @property
    def relative_density(self) -> float:
        """Density over that of dry air, both as ideal gases."""
        return self.molar_mass_kg_per_kmol / AIR_MOLAR_MASS_kg_per_kmol

    @property
    def wobbe_hhv_MJ_per_Nm3(self) -> float:
        """Gross Wobbe index of the ideal gas: combustion at 25 degC, volume at 0 degC."""
        volumetric = self.hhv_kJ_per_mol / NORMAL_MOLAR_VOLUME_m3_per_kmol
        return volumetric / math.sqrt(self.relative_density)


def _composition_faults(composition: dict[str, float], known: list[str]) -> tuple[Fault, ...]:
    """Unknown components, and fractions that do not add up."""
    path = "fuel.composition_mol_frac"
    faults = []
    for part, share in composition.items():
        if part not in known:
            near = difflib.get_close_matches(part, known, n=1, cutoff=0.0)
            must = f"is not a component known here; did you mean `{near[0]}`?"
            faults.append(Fault(f"{path}.{part}", f"{share:g}", must))
    total = sum(composition.values())
    if not abs(total - 1.0) <= SUM_TOLERANCE:
        must = "the mole fractions must add up to 1"
        faults.append(Fault(path, f"a sum of {total:.5f}", must))
    return tuple(faults)

"""NOx limits of named regimes, and the one that holds for a study."""

import difflib
import math
from dataclasses import dataclass

from load_profiles import Fault, Finding
from planner.data.published import published_rows
from planner.plant.fuel import GasFuel
from planner.study.sections import DataSheet
from planner.study.study import Study

#: File of limits under `planner/data`.
LIMITS_FILE = "nox_limits.csv"

#: Molar mass of NO2, as which NOx is expressed (IUPAC atomic weights 14.0067 + 2 x 15.9994).
NO2_KG_PER_KMOL = 46.0055

#: Molar volume of an ideal gas at 0 degC and 101.325 kPa, as emission rules use it.
NORMAL_M3_PER_KMOL = 22.414

#: Units in which rules state the size of a plant, in kW; the first is taken on LHV as permits are
#: (*common practice*), the second, of 1,055,055.85 kJ an hour, on HHV as the rule says.
KW_PER_SIZE_UNIT = {"MW thermal input": 1e3, "MMBtu/h HHV": 1_055_055.85 / 3600.0}


@dataclass(frozen=True)
class NoxLimit:
    """A limit, dry at 15 % oxygen, as NO2.

    Parameters
    ----------
    regime : str
        What it is, in words.
    source : str
        Where it stands, with edition and how well it is known.
    mg_per_Nm3 : float [mg/Nm3]
        The limit.
    above_load_frac : float [-]
        Holds above this load; zero for any load.
    """

    regime: str
    source: str
    mg_per_Nm3: float
    above_load_frac: float


def mg_per_Nm3_from_ppm(nox_ppm: float) -> float:
    """NOx as NO2 by mass, at the same state and oxygen.

    Parameters
    ----------
    nox_ppm : float [ppm]
        Parts per million by volume, dry.

    Returns
    -------
    float [mg/Nm3]
        Milligrams in a cubic metre at 0 degC and 101.325 kPa.

    Examples
    --------
    >>> print(f"{mg_per_Nm3_from_ppm(25.0):.1f} mg/Nm3")
    51.3 mg/Nm3
    """
    return nox_ppm * NO2_KG_PER_KMOL / NORMAL_M3_PER_KMOL


def nox_limit(study: Study) -> NoxLimit:
    """The limit that a study's exhaust is held to.

    Parameters
    ----------
    study : Study
        Its regime, and a local limit where there is one; checked by `regime_faults`.

    Returns
    -------
    NoxLimit
        The regime's, or the local one where that is stricter. A local limit is held at any load.
    """
    rules = study.emissions
    row = published_rows(LIMITS_FILE)[rules.nox_regime]
    published = float(row["limit"])
    by_volume = row["unit"].startswith("ppm")
    limit = NoxLimit(
        regime=row["what"],
        source=f"{row['source']}, {row['locator']} ({row['edition']}){_caution(row)}",
        mg_per_Nm3=mg_per_Nm3_from_ppm(published) if by_volume else published,
        above_load_frac=float(row["above_load_frac"]),
    )
    local = rules.local_nox_limit_mg_per_Nm3
    if local is None or local >= limit.mg_per_Nm3:
        return limit
    return NoxLimit("local limit, stricter than the regime", "the study", local, 0.0)


def _caution(row: dict[str, str]) -> str:
    """What a client must do about a limit that nobody has read in the law itself."""
    read = row["confidence"] == "read in the source"
    return "" if read else "; check against the law's text before relying on it"


def regime_faults(study: Study) -> tuple[Fault, ...]:
    """An unknown regime, with the nearest known one.

    Parameters
    ----------
    study : Study
        Its `emissions` section.

    Returns
    -------
    tuple of Fault
        Empty where the regime is known.
    """
    known = published_rows(LIMITS_FILE)
    regime = study.emissions.nox_regime
    if regime in known:
        return ()
    near = difflib.get_close_matches(regime, known, n=1, cutoff=0.4)
    must = f"is not known; did you mean `{near[0]}`?" if near else "is not known"
    return (
        Fault(
            "emissions.nox_regime", f'"{regime}"', f"{must} Known are {', '.join(sorted(known))}"
        ),
    )


def size_findings(study: Study, fuel: GasFuel) -> tuple[Finding, ...]:
    """Machines whose fuel input lies outside the sizes that the regime is for.

    Parameters
    ----------
    study : Study
        Its regime and options.
    fuel : GasFuel
        Calorific values, to compare on the regime's basis.

    Returns
    -------
    tuple of Finding
        One for each such option. The sizes of several plants on one site may have to be added,
        which only the permit decides; so this is no fault.
    """
    row = published_rows(LIMITS_FILE)[study.emissions.nox_regime]
    unit = row["size_unit"]
    regime = f"{study.emissions.nox_regime}: {row['what']}"
    smallest = float(row["size_from"] or 0.0)
    largest = float(row["size_below"] or math.inf)
    findings = []
    for number, option in enumerate(study.option, start=1):
        size = _fuel_input_kW(option.unit.sheet, fuel, unit) / KW_PER_SIZE_UNIT[unit]
        if not smallest <= size < largest:
            findings.append(
                Finding(
                    where=f"option[{number}].unit.sheet",
                    what=f"{size:.1f} {unit} is outside {regime}",
                    effect="another NOx limit may hold",
                    advice="Ask the permitting authority which limit and which aggregation hold.",
                    severity="attention",
                )
            )
    return tuple(findings)


def _fuel_input_kW(sheet: DataSheet, fuel: GasFuel, size_unit: str) -> float:
    """Fuel of the sheet's point, on the basis on which the regime states its sizes."""
    input_kW = sheet.power_kW / sheet.efficiency_frac
    wanted = "HHV" if size_unit.endswith("HHV") else "LHV"
    if wanted == sheet.efficiency_basis:
        return input_kW
    return input_kW * fuel.hhv_over_lhv if wanted == "HHV" else input_kW / fuel.hhv_over_lhv

"""What `flueprint check` says: what was understood, before anything is planned."""

from pathlib import Path

from load_profiles import CARRIERS, Finding, ProfileError, SiteYear, read_site_year
from planner.errors import StudyError
from planner.market import check_tariff
from planner.outcome.checks import outcome_faults
from planner.plant import GasFuel, build_plant
from planner.study.reading import StudyFile, load_study

MWH = 1e3


def check_study(path: Path) -> str:
    """Read a study and all its files, and calibrate its machines.

    Parameters
    ----------
    path : Path
        Study file or its folder.

    Returns
    -------
    str
        What was understood, line by line, with every finding.

    Raises
    ------
    StudyError
        With all faults of the study and of its raw files.
    """
    source = load_study(path)
    study = source.study
    site_year = read_year(source)
    fuel = GasFuel.from_composition(study.fuel.name, study.fuel.composition_mol_frac)
    findings = list(site_year.findings)
    machines = []
    for option in study.option:
        plant = build_plant(study, option, site_year, fuel)
        findings += plant.findings
        machines.append(
            f"  {option.name}: first-law audit {plant.machine().audit_residual_frac:+.2%} of fuel"
        )
    return "\n".join(
        [
            f"{study.site.name}, {study.site.place}, {study.site.year}: ready to plan",
            *(_carrier_line(site_year, carrier) for carrier in _wanted(site_year)),
            f"  {fuel.lhv_MJ_per_kg:.2f} MJ/kg LHV, HHV over LHV {fuel.hhv_over_lhv:.4f}",
            *machines,
            *_finding_lines(findings),
        ]
    )


def read_year(source: StudyFile) -> SiteYear:
    """Hold a study against its contracts' rules and read the raw files that it names.

    Parameters
    ----------
    source : StudyFile
        As read.

    Returns
    -------
    SiteYear
        One clean year.

    Raises
    ------
    StudyError
        With all faults of tariffs, regimes and raw files together.
    """
    study = source.study
    faults = (*check_tariff(study.power_tariff), *outcome_faults(study))
    try:
        site_year = read_site_year(
            study.demand,
            study.weather,
            folder=source.folder,
            year=study.site.year,
            time_zone=study.site.time_zone,
            altitude_m=study.site.altitude_m,
        )
    except ProfileError as error:
        raise StudyError((*faults, *error.faults)) from None
    if faults:
        raise StudyError(faults)
    return site_year


def _wanted(site_year: SiteYear) -> list[str]:
    """Carriers that the site wants."""
    return [name for name in CARRIERS if site_year.hourly[f"{name}_kW"].to_numpy().any()]


def _carrier_line(site_year: SiteYear, carrier: str) -> str:
    """One carrier's year: energy, peak, and how it came to be known."""
    demand_kW = site_year.hourly[f"{carrier}_kW"]
    annual_MWh = demand_kW.sum() * site_year.step_h / MWH
    origins = site_year.origins[f"{carrier}_kW"].value_counts(normalize=True)
    known = ", ".join(f"{share:.1%} {origin}" for origin, share in origins.items())
    return f"  {carrier:<10}{annual_MWh:>10,.0f} MWh, peak {demand_kW.max():>7,.0f} kW, {known}"


def _finding_lines(findings: list[Finding]) -> list[str]:
    """Every finding, heaviest first."""
    order = {"serious": 0, "attention": 1, "note": 2}
    ordered = sorted(findings, key=lambda finding: order[finding.severity])
    return [f"Findings ({len(ordered)})", *(f"  {f.severity}: {f}" for f in ordered)]

"""Cases, money and variants put together as the records of `results.json`."""

import re
from collections.abc import Sequence
from datetime import UTC, datetime
from importlib.metadata import PackageNotFoundError, version

import pandas as pd

from load_profiles import Finding, SiteYear
from planner.evaluate import Case
from planner.explore.sweep import Exploration
from planner.market import tariff_findings
from planner.outcome.energy import energy_year, month_flows
from planner.outcome.nox_limits import size_findings
from planner.plant import GasFuel
from planner.results import site_records
from planner.results.option_records import dispatch_proof, option_outcome
from planner.results.records import (
    Economics,
    FindingRecord,
    OptionOutcome,
    Results,
    SeparateOutcome,
    Verdict,
)
from planner.study.reading import StudyFile
from planner.study.study import Study

#: The rule by which one option is advised, in the words of the report.
RULE = "the option with the highest net present value, if that is above zero"


def assemble(
    source: StudyFile,
    site_year: SiteYear,
    *,
    separate: Case,
    cases: Sequence[Case],
    earned: Sequence[Economics],
    explorations: Sequence[Exploration],
) -> tuple[Results, dict[str, pd.DataFrame]]:
    """Put the whole answer together.

    Parameters
    ----------
    source : StudyFile
        As read.
    site_year : SiteYear
        As cleaned.
    separate : Case
        The year without CHP.
    cases, earned, explorations : sequence
        One an option, in the study's order.

    Returns
    -------
    tuple of Results and dict
        The records, and the hourly frames by key ("separate" among them).
    """
    study = source.study
    fuel = GasFuel.from_composition(study.fuel.name, study.fuel.composition_mol_frac)
    keys = option_keys([option.name for option in study.option])
    outcomes, hourly = [], {"separate": separate.hourly.assign(nox_g_per_s=0.0)}
    for key, case, money, exploration in zip(keys, cases, earned, explorations, strict=True):
        outcome, frame = option_outcome(
            study,
            site_year,
            fuel,
            separate=separate,
            case=case,
            earned=money,
            exploration=exploration,
            key=key,
        )
        outcomes.append(outcome)
        hourly[key] = frame
    results = Results(
        format=1,
        flueprint_version=_version(),
        made_at_utc=datetime.now(UTC).isoformat(timespec="seconds"),
        heading=site_records.heading(study),
        inputs=site_records.input_files(source),
        defaults=site_records.defaults(study),
        findings=_findings(study, fuel, site_year, (separate, *cases), outcomes),
        demand=site_records.demand(site_year),
        tariffs=site_records.tariffs(study, separate.prices, fuel),
        separate_supply=SeparateOutcome(
            bill=separate.bill,
            energy=energy_year(separate.hourly, site_year.step_h),
            months=month_flows(separate.hourly, site_year),
            proof=dispatch_proof(separate, separate.hourly),
        ),
        options=outcomes,
        verdict=_verdict(outcomes),
        weeks=site_records.weeks(site_year),
    )
    return results, hourly


def option_keys(names: Sequence[str]) -> list[str]:
    """Short keys for file names, unique among the options.

    Parameters
    ----------
    names : sequence of str
        Names as the study gives them.

    Returns
    -------
    list of str
        Lower-case letters, digits and underscores.

    Examples
    --------
    >>> option_keys(["4 MW turbine & store", "Größer"])
    ['option_1_4_mw_turbine_store', 'option_2_gr_er']
    """
    slugs = [re.sub(r"[^a-z0-9]+", "_", name.lower()).strip("_")[:40] for name in names]
    return [f"option_{number}_{slug}" for number, slug in enumerate(slugs, start=1)]


def _version() -> str:
    """Version of the installed package; a checkout that is not installed says so."""
    try:
        return version("flueprint")
    except PackageNotFoundError:
        return "not installed"


def _verdict(outcomes: Sequence[OptionOutcome]) -> Verdict:
    """Advice by the stated rule, and in how many variants its sign holds."""
    best = max(outcomes, key=lambda outcome: outcome.economics.npv_real)
    pays = best.economics.npv_real > 0.0
    tried = [v for v in best.variants if v.factor != "base" and v.npv_real is not None]
    held = [v for v in tried if v.npv_real is not None and (v.npv_real > 0.0) == pays]
    return Verdict(
        recommended=best.key if pays else None,
        best=best.key,
        rule=RULE,
        holds_in_variants=len(held),
        variants_tried=len(tried),
    )


def _findings(
    study: Study,
    fuel: GasFuel,
    site_year: SiteYear,
    all_cases: Sequence[Case],
    outcomes: Sequence[OptionOutcome],
) -> list[FindingRecord]:
    """Findings of every stage, each once."""
    staged: list[tuple[str, Finding]] = [("profiles", f) for f in site_year.findings]
    staged += [("market", f) for f in tariff_findings(study.power_tariff, site_year.step_h)]
    for case in all_cases:
        staged += [("plant", finding) for finding in case.plant.findings]
    staged += [("outcome", finding) for finding in size_findings(study, fuel)]
    staged += [("explore", finding) for finding in _failed_variants(outcomes)]
    once = dict.fromkeys(staged)
    return [
        FindingRecord.model_validate({"stage": stage, **vars(finding)}) for stage, finding in once
    ]


def _failed_variants(outcomes: Sequence[OptionOutcome]) -> list[Finding]:
    """Variants without an answer are findings, never silence."""
    return [
        Finding(
            where=f"{outcome.name}, {variant.key}",
            what="no schedule exists or none was found",
            effect=f"the variant is left out of the sensitivities: {variant.note}",
            severity="attention",
        )
        for outcome in outcomes
        for variant in outcome.variants
        if variant.status == "failed"
    ]

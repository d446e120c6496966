"""All planned variants of all options, and where each option stops paying."""

from dataclasses import dataclass, replace

from load_profiles import SiteYear
from planner.errors import PlannerError
from planner.evaluate import Case, evaluate, money
from planner.explore.break_even import break_even
from planner.explore.changes import BASE, Change, planned_changes
from planner.explore.workers import Workers
from planner.progress import Progress
from planner.results.records import BreakEven, Economics, Variant
from planner.study.study import Study


@dataclass(frozen=True)
class Exploration:
    """What moved assumptions do to one option.

    Parameters
    ----------
    variants : tuple of Variant
        The base first, then the planned ones; failures kept.
    break_even : BreakEven
        Where the option stops paying.
    """

    variants: tuple[Variant, ...]
    break_even: BreakEven


def explore(
    study: Study,
    separate: Case,
    cases: tuple[Case, ...],
    workers: Workers,
    progress: Progress,
) -> tuple[Exploration, ...]:
    """Put every option through the planned variants.

    Parameters
    ----------
    study : Study
        As stated.
    separate : Case
        Separate supply as metered.
    cases : tuple of Case
        The options, in the study's order.
    workers : Workers
        Where to run.
    progress : Progress
        Told after each finished variant.

    Returns
    -------
    tuple of Exploration
        One an option, in the study's order.
    """
    changes = planned_changes(study)
    dispatched = [change for change in changes if not change.leaves_dispatch]
    by_change: dict[str, tuple[Variant, ...]] = {
        change.key: _recounted(study, change, separate, cases)
        for change in (BASE, *changes)
        if change.leaves_dispatch
    }
    total = len(dispatched) + len(cases)
    for done, (number, variants) in enumerate(
        workers.run(dispatched_variants, [(change,) for change in dispatched]), start=1
    ):
        by_change[dispatched[number].key] = variants
        progress(f"variants: {dispatched[number].key}", done / total)

    rows = [
        tuple(by_change[change.key][option] for change in (BASE, *changes))
        for option in range(len(cases))
    ]
    zeros: dict[int, BreakEven] = {}
    searches = [(option, _fuel_points(row)) for option, row in enumerate(rows)]
    for done, (number, zero) in enumerate(workers.run(break_even, searches), start=1):
        zeros[number] = zero
        progress("break-even fuel price", (len(dispatched) + done) / total)
    return tuple(Exploration(row, zeros[option]) for option, row in enumerate(rows))


def dispatched_variants(study: Study, site_year: SiteYear, change: Change) -> tuple[Variant, ...]:
    """One change, dispatched anew for every option.

    Parameters
    ----------
    study : Study
        As stated.
    site_year : SiteYear
        As metered.
    change : Change
        What moves.

    Returns
    -------
    tuple of Variant
        One an option; failed where no schedule exists.
    """
    moved, year = change.study(study), change.site_year(site_year)
    try:
        separate = evaluate(moved, year, None)
    except PlannerError as error:
        return tuple(_failed(change, error) for _ in moved.option)
    variants = []
    for option in moved.option:
        try:
            case = evaluate(moved, year, option)
        except PlannerError as error:
            variants.append(_failed(change, error))
        else:
            variants.append(_solved(change, case, money(moved, separate, case)))
    return tuple(variants)


def _recounted(
    study: Study, change: Change, separate: Case, cases: tuple[Case, ...]
) -> tuple[Variant, ...]:
    """One change that leaves the schedules as they are: only money is counted anew."""
    moved = change.study(study)
    return tuple(
        _solved(change, case, money(moved, separate, replace(case, option=option)))
        for case, option in zip(cases, moved.option, strict=True)
    )


def _solved(change: Change, case: Case, earned: Economics) -> Variant:
    """A variant that has an answer."""
    return Variant(
        key=change.key,
        factor=change.factor,
        change_frac=change.change_frac,
        annual_saving=earned.annual_saving,
        npv_real=earned.npv_real,
        irr_real_frac=earned.irr_real_frac,
        simple_payback_years=earned.simple_payback_years,
        run_hours=float(case.schedule.hourly["unit_on"].sum() * case.prices.step_h),
        gap_frac=case.schedule.gap_frac,
        status="solved",
    )


def _failed(change: Change, error: PlannerError) -> Variant:
    """A variant without an answer, and why."""
    return Variant(
        key=change.key,
        factor=change.factor,
        change_frac=change.change_frac,
        annual_saving=None,
        npv_real=None,
        irr_real_frac=None,
        simple_payback_years=None,
        run_hours=None,
        gap_frac=None,
        status="failed",
        note=str(error),
    )


def _fuel_points(row: tuple[Variant, ...]) -> dict[float, tuple[float, float]]:
    """NPV and saving at the fuel prices already dispatched."""
    return {
        variant.change_frac: (variant.npv_real, variant.annual_saving)
        for variant in row
        if variant.factor in {"base", "fuel_price"}
        and variant.npv_real is not None
        and variant.annual_saving is not None
    }

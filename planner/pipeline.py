"""The stages in order, on one page: from a study file to a `StudyResult`."""

import os

from planner.check import read_year
from planner.evaluate import Case, money, report_case
from planner.explore.sweep import explore
from planner.explore.workers import Workers
from planner.progress import Progress, silent
from planner.results.assembly import assemble
from planner.results.study_result import StudyResult
from planner.study.reading import StudyFile

#: Share of the whole that is done after the options as stated; the variants are the rest.
BASE_SHARE_FRAC = 0.15


def plan(
    source: StudyFile, *, processes: int | None = None, progress: Progress = silent
) -> StudyResult:
    """Plan a study: which option, run in which hours, earning what, and how sure.

    Parameters
    ----------
    source : StudyFile
        What `load_study` returned.
    processes : int, optional
        Processes to spread the work over; all cores by default. The answer does not depend on it.
    progress : callable
        Told what is being done and the share that is finished.

    Returns
    -------
    StudyResult
        Complete; print it, or save it for the report.

    Raises
    ------
    ProfileError
        With all faults of the raw files.
    StudyError
        If a machine or the site cannot be as stated, or a demand cannot be met.
    SolveError
        If no solver gives a schedule that survives verification.
    """
    study = source.study
    progress("reading meters, bills and weather", 0.0)
    site_year = read_year(source)

    with Workers(study, site_year, processes or os.cpu_count() or 1) as workers:
        progress("dispatching the year; a first run compiles for a minute", 0.02)
        numbers: list[int | None] = [None, *range(len(study.option))]
        found: dict[int, Case] = {}
        for done, (place, case) in enumerate(
            workers.run(report_case, [(number,) for number in numbers]), start=1
        ):
            found[place] = case
            progress("dispatching the year as stated", BASE_SHARE_FRAC * done / len(numbers))
        separate, *cases = (found[place] for place in range(len(numbers)))
        earned = [money(study, separate, case) for case in cases]

        def later(what: str, done_frac: float) -> None:
            progress(what, BASE_SHARE_FRAC + (1.0 - BASE_SHARE_FRAC) * done_frac)

        explorations = explore(study, separate, tuple(cases), workers, later)

    results, hourly = assemble(
        source,
        site_year,
        separate=separate,
        cases=cases,
        earned=earned,
        explorations=explorations,
    )
    return StudyResult(results, hourly, source.path)

"""Faults of a study that only the outcome's rules and data show."""

from collections.abc import Iterator

from load_profiles import Fault
from planner.outcome.nox_limits import regime_faults
from planner.study.study import Study


def outcome_faults(study: Study) -> tuple[Fault, ...]:
    """Regimes that are not known, and capital avoided after the plan has ended.

    Parameters
    ----------
    study : Study
        Validated field by field.

    Returns
    -------
    tuple of Fault
        Empty where all is well.
    """
    return (*regime_faults(study), *_avoided_faults(study))


def _avoided_faults(study: Study) -> Iterator[Fault]:
    """A cost avoided beyond the plan's life would silently not count."""
    life_years = study.money.life_years
    for number, option in enumerate(study.option, start=1):
        for place, cost in enumerate(option.avoided, start=1):
            if cost.year > life_years:
                path = f"option[{number}].avoided[{place}].year"
                must = f"must be at most money.life_years = {life_years}"
                yield Fault(path, str(cost.year), must)

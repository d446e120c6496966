"""Faults of a power tariff: windows that overlap or leave gaps, export dearer than import."""

from collections import defaultdict
from collections.abc import Iterable, Iterator
from itertools import combinations

import numpy as np

from load_profiles import Fault, Finding
from planner.arrays import BoolArray
from planner.market.windows import calendar_of
from planner.study.sections import ALL_WEEKDAYS, PowerTariff

MONTH_NAMES = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
MINUTES_PER_HOUR = 60.0

Days = tuple[int, ...]


def check_tariff(tariff: PowerTariff) -> tuple[Fault, ...]:
    """Faults of a power tariff that no single field shows.

    Parameters
    ----------
    tariff : PowerTariff
        Validated field by field.

    Returns
    -------
    tuple of Fault
        Each names the months, weekdays and hours it is about; empty where all is well.

    Notes
    -----
    Export above import in any window would let the dispatch earn by importing and exporting at
    once, without end.
    """
    return (*_gaps(tariff), *_overlaps(tariff), *_export_faults(tariff), *_empty_faults(tariff))


def tariff_findings(tariff: PowerTariff, step_h: float) -> tuple[Finding, ...]:
    """What a reader must know about how a tariff is applied.

    Parameters
    ----------
    tariff : PowerTariff
        As it stands in the study.
    step_h : float [h]
        Length of a step of the site's year.

    Returns
    -------
    tuple of Finding
        One for each demand charge whose meter averages over more than a step.
    """
    return tuple(
        Finding(
            where=f"power_tariff.demand[{number}]",
            what=f"{rate.name} averages {rate.interval_minutes} min, a step {step_h * 60:g} min",
            effect="the highest step is billed, which is never below the contract's own peak",
        )
        for number, rate in enumerate(tariff.demand, start=1)
        if rate.interval_minutes > step_h * MINUTES_PER_HOUR
    )


def described_cells(cells: BoolArray) -> tuple[str, ...]:
    """Cells of the tariff calendar in words, one phrase for each block.

    Parameters
    ----------
    cells : array of bool, shape (12, 7, 24)
        By month, weekday and hour.

    Returns
    -------
    tuple of str
        Such as "Jan to Mar, Mon to Fri, 22:00 to 24:00".
    """
    by_day: dict[Days, dict[int, list[int]]] = defaultdict(lambda: defaultdict(list))
    for month, weekday in zip(*np.nonzero(cells.any(axis=2)), strict=True):
        hours = tuple(int(hour) for hour in np.flatnonzero(cells[month, weekday]))
        by_day[hours][int(month)].append(int(weekday))
    phrases = []
    for hours, months in by_day.items():
        by_week: dict[Days, list[int]] = defaultdict(list)
        for month, weekdays in months.items():
            by_week[tuple(weekdays)].append(month)
        phrases += [
            f"{_named(month, MONTH_NAMES)}, {_named(weekdays, _WEEKDAY_NAMES)}, {_clock(hours)}"
            for weekdays, month in by_week.items()
        ]
    return tuple(phrases)


_WEEKDAY_NAMES = tuple(day.capitalize() for day in ALL_WEEKDAYS)


def _gaps(tariff: PowerTariff) -> Iterator[Fault]:
    """Hours without an energy charge."""
    covered = np.any([calendar_of(charge) for charge in tariff.energy], axis=0)
    for hours in described_cells(~covered):
        must = "the energy charges must cover every hour exactly once"
        yield Fault("power_tariff.energy", f"no price for {hours}", must)


def _overlaps(tariff: PowerTariff) -> Iterator[Fault]:
    """Hours with two energy charges."""
    for (first, one), (second, other) in combinations(enumerate(tariff.energy, start=1), 2):
        for hours in described_cells(calendar_of(one) & calendar_of(other)):
            path = f"power_tariff.energy[{second}]"
            must = f"must not overlap energy[{first}], {one.name}"
            yield Fault(path, f"{other.name} on {hours}", must)


def _export_faults(tariff: PowerTariff) -> Iterator[Fault]:
    """Export that earns more than import costs."""
    if tariff.export_limit_kW == 0.0:
        return
    export = tariff.export_price_per_kWh
    for number, charge in enumerate(tariff.energy, start=1):
        imported = charge.price_per_kWh + tariff.levy_per_kWh
        if export > imported:
            must = f"must not exceed the import price {imported:g} of energy[{number}], levy added"
            yield Fault("power_tariff.export_price_per_kWh", f"{export:g}", must)


def _empty_faults(tariff: PowerTariff) -> Iterator[Fault]:
    """Windows that name no month or no weekday."""
    for kind in ("energy", "demand"):
        for number, window in enumerate(getattr(tariff, kind), start=1):
            for field in ("months", "weekdays"):
                if not getattr(window, field):
                    path = f"power_tariff.{kind}[{number}].{field}"
                    yield Fault(path, "an empty list", f"must name {field}; leave it out for all")


def _named(numbers: Iterable[int], names: tuple[str, ...]) -> str:
    """Months or weekdays, runs of three and more with "to"."""
    return ", ".join(
        f"{names[first]} to {names[last]}"
        if last > first + 1
        else ", ".join(names[number] for number in range(first, last + 1))
        for first, last in _runs(numbers)
    )


def _clock(hours: Iterable[int]) -> str:
    """Hours of the day as runs."""
    return ", ".join(f"{first:02d}:00 to {last + 1:02d}:00" for first, last in _runs(hours))


def _runs(numbers: Iterable[int]) -> list[tuple[int, int]]:
    """First and last of each run of consecutive numbers."""
    ordered = sorted(numbers)
    breaks = [place for place in range(1, len(ordered)) if ordered[place] > ordered[place - 1] + 1]
    firsts = [0, *breaks]
    lasts = [*(place - 1 for place in breaks), len(ordered) - 1]
    return [(ordered[first], ordered[last]) for first, last in zip(firsts, lasts, strict=True)]

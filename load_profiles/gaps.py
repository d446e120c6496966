"""Missing readings filled by stated rules, never beyond the share that the study permits."""

from dataclasses import dataclass

import numpy as np
import pandas as pd

from load_profiles.arrays import BoolArray, FloatArray
from load_profiles.clock import SiteClock, day_class
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding
from load_profiles.runs import runs_of, within_runs
from load_profiles.suspects import set_aside_suspects

#: Gaps up to this length are bridged by a straight line [h]. Common practice.
LINE_UP_TO_h = 3.0

#: Longer gaps take the mean of like days within so many days either way. Common practice.
LIKE_DAYS_WITHIN = 21

#: Gaps that a finding names before it counts the rest.
_NAMED_GAPS = 3


@dataclass(frozen=True)
class FilledYear:
    """A year without gaps.

    Parameters
    ----------
    values_kW : array, shape (slots,) [kW]
        Every slot with a value.
    filled : array of bool, shape (slots,)
        True where the value comes from a rule.
    findings : tuple of Finding
        What was set aside and what was filled.
    """

    values_kW: FloatArray
    filled: BoolArray
    findings: tuple[Finding, ...]


def fill_year(
    values_kW: FloatArray,
    *,
    site: SiteClock,
    slot_minutes: int,
    where: str,
    permitted_fill_frac: float,
) -> FilledYear:
    """Set aside what cannot be true, then fill what is missing.

    Parameters
    ----------
    values_kW : array, shape (slots,) [kW]
        As metered, NaN where missing.
    site : SiteClock
        Zone and year.
    slot_minutes : int [min]
        Length of a slot.
    where : str
        File, for faults and findings.
    permitted_fill_frac : float [-]
        Largest share of the year that may be filled.

    Returns
    -------
    FilledYear
        Gaps up to `LINE_UP_TO_h` by a straight line, longer ones by like days.

    Raises
    ------
    ProfileError
        If more is missing than may be filled.
    """
    slot_h = slot_minutes / 60.0
    wall = site.wall(site.slots(slot_minutes))
    started = np.asarray(wall.strftime("%Y-%m-%d %H:%M"))
    kept_kW, findings = set_aside_suspects(values_kW, slot_h=slot_h, where=where, started=started)
    missing = np.isnan(kept_kW)
    _check_share(missing, started, slot_h, where, permitted_fill_frac, set_aside=findings)
    by_line = within_runs(missing, longest=int(LINE_UP_TO_h / slot_h)) & _between(missing)
    filled_kW = np.where(by_line, _bridged(kept_kW), kept_kW)
    by_days = missing & ~by_line
    filled_kW[by_days] = _like_days(kept_kW, wall, by_days, where)
    line = f"a straight line (gaps up to {LINE_UP_TO_h:g} h)"
    days = f"the mean of like days within {LIKE_DAYS_WITHIN} days either way"
    for rule, mask in ((line, by_line), (days, by_days)):
        findings += _filled_finding(
            filled_kW, mask, rule, started=started, slot_h=slot_h, where=where
        )
    return FilledYear(filled_kW, missing, tuple(findings))


def bridge(values: FloatArray, *, longest: int) -> tuple[FloatArray, BoolArray]:
    """Gaps of a series up to a length, bridged by a straight line.

    Parameters
    ----------
    values : array, shape (slots,)
        NaN where missing.
    longest : int
        Longest gap that is bridged, in slots; one at either end of the series takes the
        nearest value.

    Returns
    -------
    array, shape (slots,)
        Values; longer gaps stay NaN.
    array of bool, shape (slots,)
        True where bridged.
    """
    mask = within_runs(np.isnan(values), longest=longest)
    if not mask.any() or mask.all():
        return values, np.zeros(values.size, dtype=bool)
    return np.where(mask, _bridged(values), values), mask


def _check_share(
    missing: BoolArray,
    started: np.ndarray,
    slot_h: float,
    where: str,
    permitted_frac: float,
    *,
    set_aside: list[Finding],
) -> None:
    """Refuse a year of which too much is missing."""
    share = float(missing.mean())
    if share <= permitted_frac and not missing.all():
        return
    starts, lengths = runs_of(missing)
    longest = int(np.argmax(lengths))
    came = (
        f"{share:.1%} of the year missing ({missing.sum() * slot_h:g} h; longest gap "
        f"{lengths[longest] * slot_h:g} h from {started[starts[longest]]})"
    )
    if set_aside:
        came += f", with what was set aside: {set_aside[0].what}"
    must = f"must not exceed demand.permitted_fill_frac = {permitted_frac:g}; ask for the rest"
    raise ProfileError((Fault(where, came, must),))


def _between(missing: BoolArray) -> BoolArray:
    """Slots that have a reading somewhere before and after them."""
    there = np.flatnonzero(~missing)
    inside = np.zeros(missing.size, dtype=bool)
    if there.size:
        inside[there[0] : there[-1]] = True
    return inside


def _bridged(values: FloatArray) -> FloatArray:
    """Every gap on the straight line between its neighbours."""
    there = np.flatnonzero(~np.isnan(values))
    return np.interp(np.arange(values.size), there, values[there])


def _like_days(
    values_kW: FloatArray, wall: pd.DatetimeIndex, wanted: BoolArray, where: str
) -> FloatArray:
    """Mean at the same wall-clock time of days of the same class, near each wanted slot."""
    days = np.asarray((wall.normalize() - wall[0].normalize()).days, dtype=np.int64)
    minutes = np.asarray(wall.hour * 60 + wall.minute, dtype=np.int64)
    kinds = day_class(wall) * 1440 + minutes
    answer = np.full(values_kW.size, np.nan)
    for day in np.unique(days[wanted]):
        near = np.abs(days - day) <= LIKE_DAYS_WITHIN
        mine = wanted & (days == day)
        for part in (near, np.ones_like(near)):  # the whole year where no like day is near
            open_slots = mine & np.isnan(answer)
            if open_slots.any():
                means = pd.Series(values_kW[part]).groupby(kinds[part]).mean()
                answer[open_slots] = means.reindex(kinds[open_slots]).to_numpy(dtype=float)
    if np.isnan(answer[wanted]).any():
        first = wall[int(np.flatnonzero(wanted & np.isnan(answer))[0])]
        came = f"no like day in the whole year for {first:%Y-%m-%d %H:%M}"
        raise ProfileError((Fault(where, came, "cannot be filled; ask for the missing readings"),))
    return answer[wanted]


def _filled_finding(
    values_kW: FloatArray,
    mask: BoolArray,
    rule: str,
    *,
    started: np.ndarray,
    slot_h: float,
    where: str,
) -> list[Finding]:
    """What one rule filled, in hours and energy."""
    starts, lengths = runs_of(mask)
    if starts.size == 0:
        return []
    order = np.argsort(-lengths, kind="stable")[:_NAMED_GAPS]
    named = "; ".join(f"{lengths[i] * slot_h:g} h from {started[starts[i]]}" for i in order)
    rest = "" if starts.size <= _NAMED_GAPS else f" and {starts.size - _NAMED_GAPS} more"
    what = f"{starts.size} gaps filled by {rule}: {named}{rest}"
    if starts.size == 1:
        what = f"one gap filled by {rule}: {named}"
    hours, energy_kWh = mask.sum() * slot_h, values_kW[mask].sum() * slot_h
    return [Finding(where, what, f"{hours:g} h and {energy_kWh:,.0f} kWh are not metered")]

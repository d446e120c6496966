"""The stamp column of a table as instants on the site's clock."""

from dataclasses import dataclass, replace

import numpy as np
import pandas as pd

from load_profiles.arrays import IntArray
from load_profiles.clock import Localised, SiteClock, to_utc
from load_profiles.declarations import Layout
from load_profiles.faults import Fault
from load_profiles.findings import Finding
from load_profiles.readers.text_table import TextTable
from load_profiles.row_faults import row_faults

_OFFSET = r"(?:Z|[+-]\d{2}:?\d{2})$"


@dataclass(frozen=True)
class ReadStamps:
    """When each readable row begins.

    Parameters
    ----------
    seconds : array of int, shape (kept,)
        From the beginning of the year to the beginning of the row's interval.
    places : array of int, shape (kept,)
        Places of these rows in the table, in rising time where the file ran backwards.
    findings : tuple of Finding
        What the change of the clock left open.
    """

    seconds: IntArray
    places: IntArray
    findings: tuple[Finding, ...] = ()


def read_stamps(
    table: TextTable, layout: Layout, site: SiteClock, *, interval_s: int, faults: list[Fault]
) -> ReadStamps:
    """Stamps of a table as seconds of the year; what cannot be read becomes a fault.

    Parameters
    ----------
    table : TextTable
        Rows as written.
    layout : Layout
        Format, clock and mark of the stamps.
    site : SiteClock
        Zone and year.
    interval_s : int [s]
        Length of an interval, taken off where stamps mark its end; zero for readings.
    faults : list of Fault
        Faults found are added here.

    Returns
    -------
    ReadStamps
        Rows with faults left out.
    """
    cells = table.columns[layout.stamp_column]
    zoned = layout.stamp_format == "ISO" or "%z" in layout.stamp_format
    parsed = _parsed(cells, layout.stamp_format)
    bad = np.flatnonzero(parsed.isna())
    must = "must be ISO 8601 with offset, such as 2025-03-30T01:00:00+01:00"
    if layout.stamp_format != "ISO":
        must = f"must have the form {layout.stamp_format}"
    faults += row_faults(table.file, table.rows[bad].tolist(), [cells[i] for i in bad], must)
    places = np.flatnonzero(parsed.notna())
    stamps = parsed[places]
    if len(stamps) > 1 and np.median(np.diff(stamps.asi8)) < 0:  # newest first
        places, stamps = places[::-1], stamps[::-1]
    length = pd.Timedelta(seconds=interval_s if layout.stamp_marks == "end" else 0)
    if zoned:
        return ReadStamps(site.seconds(stamps - length), places)
    faults += _contradictions(table.file, stamps, layout, site)
    read, by_label = _localised(stamps, length, layout, site)
    skipped = places[read.missing]
    must = f"does not exist in {site.time_zone}; is the file in standard time?"
    came = [cells[place] for place in skipped]
    faults += row_faults(table.file, table.rows[skipped].tolist(), came, must)
    kept = read.instants[~read.missing]
    findings = _clock_findings(table.file, read.once, by_label=by_label)
    return ReadStamps(site.seconds(kept), places[~read.missing], findings)


def year_faults(
    table: TextTable, stamps: ReadStamps, site: SiteClock, stamp_column: str
) -> list[Fault]:
    """A file none of whose rows is of the site's year.

    Parameters
    ----------
    table : TextTable
        Rows as written.
    stamps : ReadStamps
        When they begin.
    site : SiteClock
        Zone and year.
    stamp_column : str
        Header of the stamps.

    Returns
    -------
    list of Fault
        Empty where a row is, and where no stamp could be read at all.
    """
    inside = (stamps.seconds >= 0) & (stamps.seconds < site.hours * 3600)
    if inside.any() or stamps.places.size == 0:
        return []
    cells = table.columns[stamp_column]
    came = f"{cells[stamps.places[0]]} to {cells[stamps.places[-1]]}"
    return [Fault(table.file, came, f"must cover {site.year}, the study's year")]


def _parsed(cells: list[str], stamp_format: str) -> pd.DatetimeIndex:
    """Stamps as written; not a time where they do not have the form."""
    text = pd.Series(cells, dtype="str")
    if stamp_format == "ISO":
        text = text.where(text.str.contains(_OFFSET, regex=True))
        return pd.DatetimeIndex(pd.to_datetime(text, format="ISO8601", utc=True, errors="coerce"))
    zoned = "%z" in stamp_format
    parsed = pd.to_datetime(text, format=stamp_format, utc=zoned, errors="coerce")
    return pd.DatetimeIndex(parsed)


def _localised(
    stamps: pd.DatetimeIndex, length: pd.Timedelta, layout: Layout, site: SiteClock
) -> tuple[Localised, bool]:
    """Beginnings of the intervals, and whether ends are labels rather than clock times.

    At the change of the clock an end can be written as the clock shows it (01:45, then 03:00) or
    as its beginning's label plus the interval (01:45, 02:00, then 03:15). Only the second
    writes a time that does not exist, so the file itself proves which it is.
    """
    read = to_utc(stamps, layout.clock, site)
    if length and read.missing.any():
        labels = to_utc(stamps - length, layout.clock, site)
        if not labels.missing.any():
            return labels, True
    return replace(read, instants=read.instants - length), False


def _contradictions(
    file: str, stamps: pd.DatetimeIndex, layout: Layout, site: SiteClock
) -> list[Fault]:
    """A file that is said to keep one offset, yet follows the wall clock at both changes."""
    if layout.clock == "local":
        return []
    local = to_utc(stamps, "local", site)
    whole_year = pd.Timedelta(days=330)
    if local.missing.any() or not local.twice or stamps.max() - stamps.min() < whole_year:
        return []
    came = f"the hour of {local.twice[0]} that clocks in {site.time_zone} repeat, twice"
    must = f'cannot be on clock = "{layout.clock}"; declare clock = "local"'
    return [Fault(file, came, must)]


def _clock_findings(file: str, once: tuple[str, ...], *, by_label: bool) -> tuple[Finding, ...]:
    """What a reader must know about the file's clock."""
    findings = []
    if by_label:
        what = "ends of intervals are written as the beginning's clock time plus the interval"
        findings.append(Finding(file, what, "read so at both changes of the clock"))
    what = "the hour that the clock repeats comes once; taken as its first pass"
    effect = "the second pass counts as missing"
    advice = "Ask whether the export lost an hour, added both, or runs in standard time."
    findings += [Finding(f"{file} {day}", what, effect, advice, "attention") for day in once]
    return tuple(findings)

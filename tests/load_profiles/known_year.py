"""A known year written as a client's export: the truth that readers must return.

Local times come from the standard library's `datetime` and `zoneinfo`, not from the code that
is tested.
"""

import re
from collections.abc import Sequence
from dataclasses import dataclass, field
from datetime import UTC, datetime, timedelta
from functools import cache
from pathlib import Path
from zoneinfo import ZoneInfo

import numpy as np
from numpy.typing import NDArray

FloatArray = NDArray[np.float64]


def year_start(year: int, standard_offset_h: float) -> datetime:
    """First instant of a year in standard time."""
    return datetime(year, 1, 1, tzinfo=UTC) - timedelta(hours=standard_offset_h)


@dataclass(frozen=True)
class Export:
    """How a known series is written."""

    time_zone: str = "Europe/Berlin"
    standard_offset_h: float = 1.0
    year: int = 2025
    clock: str = "local"
    minutes: int = 15
    marks: str = "start"
    stamp_format: str = "%Y-%m-%d %H:%M"
    delimiter: str = ","
    decimal: str = "."
    header: tuple[str, ...] = ("time", "power")
    preamble: tuple[str, ...] = ()
    left_out: frozenset[int] = field(default_factory=frozenset)

    @cache  # noqa: B019 -- tests write the same few exports again and again
    def stamps(self, slots: int) -> list[str]:
        """The stamps of the slots from the beginning of the year."""
        first = year_start(self.year, self.standard_offset_h)
        late = timedelta(minutes=self.minutes if self.marks == "end" else 0)
        step = timedelta(minutes=self.minutes)
        return [self.stamp(first + step * slot + late) for slot in range(slots)]

    def stamp(self, instant: datetime) -> str:
        """One instant as the export's clock shows it."""
        if self.stamp_format == "ISO":
            return instant.astimezone(ZoneInfo(self.time_zone)).isoformat()
        if self.clock == "local":
            shown = instant.astimezone(ZoneInfo(self.time_zone))
        elif self.clock == "standard":
            shown = instant + timedelta(hours=self.standard_offset_h)
        else:
            shown = instant
        return shown.strftime(self.stamp_format)

    def write(self, path: Path, *columns: Sequence[float] | FloatArray) -> None:
        """Write the file; `nan` becomes an empty cell, slots in `left_out` no row at all."""
        texts = [[f"{value:.10g}" for value in np.asarray(column).tolist()] for column in columns]
        rows = list(zip(self.stamps(len(columns[0])), *texts, strict=True))
        kept = [row for slot, row in enumerate(rows) if slot not in self.left_out]
        body = "\n".join(map(self.delimiter.join, kept if self.left_out else rows))
        if self.decimal == ",":
            body = re.sub(r"(\d)\.(\d+)$", r"\1,\2", body, flags=re.MULTILINE)
        lines = [*self.preamble, self.delimiter.join(self.header), body.replace("nan", "")]
        path.write_text("\n".join(lines) + "\n", encoding="utf-8")


def known_power_kW(slots: int, *, seed: int = 1) -> FloatArray:
    """A load that never repeats a value, with one decimal."""
    noise = np.random.default_rng(seed).integers(0, 4000, slots)
    noise[1:] += noise[1:] == noise[:-1]
    return 1000.0 + noise / 10.0

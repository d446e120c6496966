"""Both demo sites planned and reported: seconds and peak memory of each stage.

Run as `python -m benchmarks.whole_job`. Required after set-up on two cores: both sites planned and
reported within 600 s and 1.5 GB; the PDF step within 8 s and 300 MB a site. Each stage runs in a
process of its own, so that its peak memory is its own; workers count with their parent. The total
counts whole processes; the PDF step is timed inside its process, after the imports.
"""

import json
import subprocess
import sys
import tempfile
import threading
import time
from pathlib import Path

SITES = ("hospital", "factory")

REQUIRED_TOTAL_S = 600.0
REQUIRED_PEAK_MB = 1500.0
REQUIRED_PDF_S = 8.0
REQUIRED_PDF_MB = 300.0

#: How often memory is looked at.
SAMPLE_S = 0.1

PLAN = """
import sys
from pathlib import Path
from planner import load_study, plan
from planner.study.starter import demo_study
with demo_study(sys.argv[1]) as study:
    plan(load_study(study)).save(Path(sys.argv[2]))
"""

REPORT = """
import sys
from pathlib import Path
import time
from reports.pdf import write_report
started = time.perf_counter()
write_report(Path(sys.argv[2]))
Path(sys.argv[2], "pdf_seconds").write_text(str(time.perf_counter() - started))
"""


def measured(code: str, site: str, folder: Path) -> tuple[float, float]:
    """Run one stage in a process of its own.

    Parameters
    ----------
    code : str
        Python to run, with site and folder as arguments.
    site : str
        Demo site.
    folder : Path
        Results folder.

    Returns
    -------
    tuple of float [s] and float [MB]
        Wall time, and the highest sum of resident memory of the process and its children.
    """
    started = time.perf_counter()
    with subprocess.Popen([sys.executable, "-c", code, site, str(folder)]) as process:  # noqa: S603 - our own code
        peak = _Peak(process.pid)
        peak.start()
        status = process.wait()
    seconds = time.perf_counter() - started
    peak.join()
    if status != 0:
        raise SystemExit(f"{site}: the stage ended with exit code {status}")
    return seconds, peak.highest_MB


class _Peak(threading.Thread):
    """Watches the resident memory of a process and all its descendants."""

    def __init__(self, pid: int) -> None:
        super().__init__(daemon=True)
        self._pid = pid
        self.highest_MB = 0.0

    def run(self) -> None:
        """Sample until the process is gone."""
        while Path(f"/proc/{self._pid}").exists():
            self.highest_MB = max(self.highest_MB, _resident_MB(self._pid))
            time.sleep(SAMPLE_S)


def _resident_MB(pid: int) -> float:
    """Resident memory of a process and its descendants, proportional share of shared pages."""
    total = 0.0
    try:
        rollup = Path(f"/proc/{pid}/smaps_rollup").read_text(encoding="ascii")
        total = (
            next(float(row.split()[1]) for row in rollup.splitlines() if row[:4] == "Pss:") / 1e3
        )
        children = Path(f"/proc/{pid}/task/{pid}/children").read_text(encoding="ascii").split()
    except (OSError, StopIteration):
        return total
    return total + sum(_resident_MB(int(child)) for child in children)


def main() -> int:
    """Measure, print the table and the line of figures, and judge them.

    Returns
    -------
    int
        0 where every required figure is met, else 1.
    """
    rows: list[tuple[str, str, float, float]] = []
    pdf_s: dict[str, float] = {}
    with tempfile.TemporaryDirectory() as place:
        for site in SITES:
            folder = Path(place) / site
            for stage, code in (("plan", PLAN), ("report", REPORT)):
                seconds, peak_MB = measured(code, site, folder)
                rows.append((site, stage, seconds, peak_MB))
            pdf_s[site] = float((folder / "pdf_seconds").read_text(encoding="ascii"))
    print(f"{'site':<12}{'stage':<10}{'seconds':>10}{'peak MB':>10}")
    for site, stage, seconds, peak_MB in rows:
        print(f"{site:<12}{stage:<10}{seconds:>10.1f}{peak_MB:>10.0f}")
    pdf = [row for row in rows if row[1] == "report"]
    for site, seconds in pdf_s.items():
        print(f"{site:<12}{'PDF step':<10}{seconds:>10.1f}")
    figures = {
        "total_s": sum(row[2] for row in rows),
        "peak_MB": max(row[3] for row in rows),
        "pdf_s": max(pdf_s.values()),
        "pdf_MB": max(row[3] for row in pdf),
    }
    met = (
        figures["total_s"] <= REQUIRED_TOTAL_S
        and figures["peak_MB"] <= REQUIRED_PEAK_MB
        and figures["pdf_s"] <= REQUIRED_PDF_S
        and figures["pdf_MB"] <= REQUIRED_PDF_MB
    )
    print(json.dumps({**{key: round(value, 2) for key, value in figures.items()}, "met": met}))
    return 0 if met else 1


if __name__ == "__main__":
    sys.exit(main())

"""Python is as good a door as the shell: five lines in a plain script, and an interrupted run."""

import os
import re
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from planner import cli
from planner.study.starter import write_starter

pytestmark = [pytest.mark.slow, pytest.mark.solver]

REPO = Path(__file__).parents[2]

FIVE_LINES = """
from planner import load_study, plan
study = load_study("wrenfield/study.toml")
result = plan(study)
print(result)
result.save("wrenfield/results")
"""


@pytest.fixture
def wrenfield(tmp_path: Path) -> Path:
    """A folder with a starter study whose sensitivities are cut short."""
    study = write_starter(tmp_path / "wrenfield", "factory")
    text = study.read_text(encoding="utf-8")
    text = re.sub(r"(?ms)^\[sensitivity\].*?(?=^\[|\Z)", "", text)
    study.write_text(text + "\n[sensitivity]\nfuel_price_steps_frac = [0.2]\n", encoding="utf-8")
    return tmp_path


def _environment() -> dict[str, str]:
    """The caller's environment with the checkout on the path."""
    return {**os.environ, "PYTHONPATH": str(REPO), "COLUMNS": "100"}


def test_five_lines_without_a_main_guard(wrenfield: Path) -> None:
    """A script of five lines plans with several processes, prints one screen and saves."""
    done = subprocess.run(
        [sys.executable, "-c", FIVE_LINES],
        cwd=wrenfield,
        env=_environment(),
        capture_output=True,
        text=True,
        check=False,
        timeout=400,
    )

    assert done.returncode == 0, done.stderr
    assert (wrenfield / "wrenfield" / "results" / "results.json").is_file()
    screen = done.stdout.splitlines()
    assert len(screen) <= 40
    assert all(len(line) <= 100 for line in screen)
    for word in ("power made", "heat recovered", "fuel (LHV)", "saves a year", "payback", "NOx"):
        assert word in done.stdout


def test_interrupt_leaves_nothing_half_done(wrenfield: Path) -> None:
    """Ctrl-C in the midst of planning ends with its own code and leaves no results folder."""
    study = wrenfield / "wrenfield"
    before = sorted(path.name for path in study.iterdir())
    with subprocess.Popen(
        [sys.executable, "-m", "planner.cli", "plan", str(study)],
        cwd=wrenfield,
        env=_environment(),
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        text=True,
        # A shell starts its background jobs with interrupts ignored, and they would inherit that.
        preexec_fn=lambda: signal.signal(signal.SIGINT, signal.default_int_handler),  # noqa: PLW1509
    ) as running:
        time.sleep(6.0)
        running.send_signal(signal.SIGINT)
        _, told = running.communicate(timeout=60)

    assert running.returncode == cli.INTERRUPTED, told
    assert "Traceback" not in told
    assert sorted(path.name for path in study.iterdir()) == before

"""The built wheel, installed into an empty environment, gives the whole command."""

import importlib.util
import os
import shutil
import subprocess
import sys
import sysconfig
import tomllib
import zipfile
from pathlib import Path

import pytest

from planner import cli

ROOT = Path(__file__).parents[2]
PACKAGES = ("load_profiles", "planner", "reports")

pytestmark = pytest.mark.slow


def _run(*command: str | Path, cwd: Path) -> str:
    """Run a program outside the checkout, without its paths, and answer what it printed."""
    environment = {name: value for name, value in os.environ.items() if name != "PYTHONPATH"}
    done = subprocess.run(
        command, cwd=cwd, env=environment, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, f"{command}\n{done.stdout}\n{done.stderr}"
    return done.stdout


@pytest.fixture(scope="module")
def wheel(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The wheel, built with what is installed, without any network."""
    folder = tmp_path_factory.mktemp("wheel")
    build = (sys.executable, "-m", "build", "--wheel", "--no-isolation", "--outdir", folder, ROOT)
    _run(*build, cwd=folder)
    (built,) = folder.glob("*.whl")
    return built


@pytest.fixture(scope="module")
def installed(wheel: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Programs of an environment that holds the wheel and sees only today's libraries."""
    home = tmp_path_factory.mktemp("an environment")
    _run(sys.executable, "-m", "venv", "--without-pip", home, cwd=home)
    python = home / "bin" / "python"
    if importlib.util.find_spec("pip"):
        pip = (sys.executable, "-m", "pip", "--python", python, "install", "--no-index")
    else:
        assert shutil.which("uv"), "neither pip nor uv is there to install the wheel"
        pip = ("uv", "pip", "install", "--python", python, "--offline")
    _run(*pip, "--no-deps", wheel, cwd=home)
    (library,) = home.glob("lib/python*/site-packages")
    # Path files below this one are not followed, so the checkout stays out of sight.
    (library / "libraries.pth").write_text(sysconfig.get_path("purelib") + "\n", encoding="utf-8")
    return home / "bin"


def test_wheel_holds_every_file(wheel: Path) -> None:
    """Templates, fonts, data, shapes, demo sites, starters and schema are all inside."""
    inside = set(zipfile.ZipFile(wheel).namelist())

    missing = [
        name
        for package in PACKAGES
        for path in (ROOT / package).rglob("*")
        if path.is_file() and "__pycache__" not in path.parts
        if (name := path.relative_to(ROOT).as_posix()) not in inside
    ]

    assert missing == []
    assert {
        "load_profiles/demo_sites/factory/study.toml",
        "load_profiles/demo_sites/hospital/study.toml",
        "load_profiles/shapes/even.csv",
        "planner/data/nox_limits.csv",
        "planner/study/starters/factory/study.toml",
        "planner/study/starters/hospital/study.toml",
        "reports/results.schema.json",
        "reports/templates/fonts/OFL-SofiaSans.txt",
        "reports/templates/fonts/sans-400.ttf",
    } <= inside
    assert [name for name in inside if name.startswith(("tests/", "benchmarks/"))] == []


def test_wheel_knows_its_version(installed: Path, tmp_path: Path) -> None:
    """The command names the version that `pyproject.toml` gives the project."""
    project = tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))["project"]

    assert _run(installed / "flueprint", "--version", cwd=tmp_path) == (
        f"flueprint {project['version']}\n"
    )


def test_wheel_runs_by_itself(installed: Path, tmp_path: Path) -> None:
    """From an empty folder, the command helps, makes a starter and reads it; not the checkout."""
    where = "import planner, reports; print(planner.__file__, reports.__file__)"
    assert str(ROOT) not in _run(installed / "python", "-c", where, cwd=tmp_path)

    helped = _run(installed / "flueprint", "--help", cwd=tmp_path)
    _run(installed / "flueprint", "new", "my site", "--kind", "hospital", cwd=tmp_path)
    understood = _run(installed / "flueprint", "check", "my site", cwd=tmp_path)

    assert [name for name in cli.cli.commands if name not in helped] == []
    assert (tmp_path / "my site" / "study.toml").is_file()
    assert "ready to plan" in understood

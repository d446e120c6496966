"""The walls between the rooms: who may import whom, read from the source itself."""

import ast
from collections.abc import Iterator
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]
PACKAGES = ("load_profiles", "planner", "reports")

#: What each room of the planner may import from the planner, besides itself. Data walks from
#: study to explore; nothing walks back.
SHARED = {
    "planner.arrays",
    "planner.constants",
    "planner.data",
    "planner.errors",
    "planner.progress",
}
UP_TO_STUDY = SHARED | {"planner.study", "planner.results.records"}
ROOMS = {
    "planner.study": SHARED,
    "planner.plant": UP_TO_STUDY,
    "planner.market": UP_TO_STUDY | {"planner.plant.fuel"},  # calorific values price the gas
    "planner.dispatch": UP_TO_STUDY | {"planner.plant", "planner.market"},
    "planner.outcome": UP_TO_STUDY | {"planner.plant", "planner.market", "planner.dispatch"},
}


def _modules(package: str) -> list[Path]:
    """Every module of a package."""
    found = sorted((ROOT / package).rglob("*.py"))
    assert found, f"{package} has no modules"
    return found


def _name(path: Path) -> str:
    """Dotted name of a module."""
    parts = path.relative_to(ROOT).with_suffix("").parts
    return ".".join(parts[:-1] if parts[-1] == "__init__" else parts)


def imported(path: Path) -> Iterator[str]:
    """Full name of everything that a module imports, at the top or inside functions."""
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path}: imports are absolute in this project"
            yield from (f"{node.module}.{alias.name}" for alias in node.names)


def _inside(name: str, roots: set[str]) -> bool:
    """Whether a dotted name is one of some packages or lies in one."""
    return any(name == root or name.startswith(f"{root}.") for root in roots)


def _breaches(path: Path, forbidden: set[str]) -> list[str]:
    """What a module imports from where it may not."""
    return [f"{_name(path)} imports {name}" for name in imported(path) if _inside(name, forbidden)]


@pytest.mark.parametrize("package", ["load_profiles", "reports"])
def test_cleaning_and_showing_stand_alone(package: str) -> None:
    """Neither load_profiles nor reports knows another package of the project."""
    others = set(PACKAGES) - {package}

    assert [line for path in _modules(package) for line in _breaches(path, others)] == []


def test_only_the_command_knows_reports() -> None:
    """Inside the planner, `planner/cli.py` alone imports reports."""
    knowing = [_name(path) for path in _modules("planner") if _breaches(path, {"reports"})]

    assert knowing == ["planner.cli"]


@pytest.mark.parametrize("room", sorted(ROOMS))
def test_data_walks_one_way(room: str) -> None:
    """A room of the planner imports only rooms that stand before it."""
    allowed = ROOMS[room] | {room}

    wrong = [
        f"{_name(path)} imports {name}"
        for path in _modules(room.replace(".", "/"))
        for name in imported(path)
        if _inside(name, {"planner"}) and not _inside(name, allowed)
    ]

    assert wrong == []


def test_records_depend_on_nothing_but_the_study() -> None:
    """The results' records import only the study's sections from the project."""
    path = ROOT / "planner" / "results" / "records.py"

    known = {name.rpartition(".")[0] for name in imported(path) if _inside(name, set(PACKAGES))}

    assert known <= {"planner.study.sections"}


def test_nobody_imports_the_command() -> None:
    """Nothing in the packages leans on the command line."""
    wrong = [
        line
        for package in PACKAGES
        for path in _modules(package)
        for line in _breaches(path, {"planner.cli"})
    ]

    assert wrong == []

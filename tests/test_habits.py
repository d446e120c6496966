"""The habits of the house, as far as a program can see them: sizes, names, docstrings, words."""

import ast
import re
import subprocess
import sys
import tomllib
from collections.abc import Iterator
from pathlib import Path

import pytest

from planner import cli

ROOT = Path(__file__).parents[1]
PACKAGES = ("benchmarks", "load_profiles", "planner", "reports")
MODULES = sorted(path for package in PACKAGES for path in (ROOT / package).rglob("*.py"))
TESTS = sorted((ROOT / "tests").rglob("test_*.py"))
PROSE = (".py", ".md", ".toml", ".csv", ".txt", ".html", ".j2", ".css", ".json")

#: One subject a module. Modules that only declare records, without a function, may be longer.
LONGEST_MODULE = 320
LONGEST_FUNCTION = 50
USUAL_FUNCTION = 25
SHARE_OF_USUAL_FUNCTIONS = 0.9

#: Names that say nothing about what is inside.
EMPTY_NAMES = {"utils", "util", "helpers", "helper", "common", "core", "misc"}

#: What a bracket must begin with after a name that ends so; longest suffix first.
UNITS = {
    "_lhv_kWh": "kWh",
    "_hhv_kWh": "kWh",
    "_frac": "-",
    "_kWh": "kWh",
    "_MWh": "MWh",
    "_kW": "kW",
    "_K": "K",
    "_degC": "degC",
    "_kPa": "kPa",
    "_h": "h",
    "_kg": "kg",
    "_kJ": "kJ",
    "_s": "s",
    "_Nm3": "Nm3",
    "_minutes": "min",
}

#: Libraries that take longer to load than a help text may take.
HEAVY = {
    "cantera",
    "highspy",
    "jinja2",
    "loky",
    "matplotlib",
    "numpy",
    "pandas",
    "pulp",
    "pydantic",
    "scipy",
    "weasyprint",
}

#: A place on somebody's machine, an address of a registry, work put off.
UNWANTED = re.compile(
    r"(?<![\w.])/(?:home|root|Users|tmp|work|mnt)/\w|(?:find|index)[-]?(?:links|url)"
    r"|\bTODO\b|\bFIXME\b|\bXXX\b"
)

Function = ast.FunctionDef | ast.AsyncFunctionDef


def _tree(path: Path) -> ast.Module:
    """Syntax tree of a module."""
    return ast.parse(path.read_text(encoding="utf-8"))


def _place(path: Path, node: Function | ast.ClassDef) -> str:
    """Where a function or class stands, as an editor opens it."""
    return f"{path.relative_to(ROOT)}:{node.lineno} {node.name}"


def _functions(tree: ast.Module) -> Iterator[Function]:
    """Every function and method of a module."""
    return (node for node in ast.walk(tree) if isinstance(node, Function))


def _public(tree: ast.Module) -> Iterator[Function]:
    """Functions of a module that others may call, commands of the shell left out."""
    for node in tree.body:
        if isinstance(node, Function) and not node.name.startswith("_") and not _is_command(node):
            yield node


def _is_command(function: Function) -> bool:
    """Whether a function is a command of the shell, whose docstring is its help text."""
    return any("command" in ast.unparse(mark) for mark in function.decorator_list)


def _section(docstring: str, name: str) -> str:
    """Body of one section of a NumPy docstring, from its underline to the next heading."""
    found = re.search(
        rf"^{name}\n-+\n(.*?)(?=^\w[\w ]*\n-+$|\Z)", docstring, re.MULTILINE | re.DOTALL
    )
    return found[1] if found else ""


def _entries(docstring: str) -> dict[str, str]:
    """Parameters of a docstring: what follows the colon, by name; `a, b : float` are two."""
    entries = re.findall(r"^([\w*, ]+?) : (.*)$", _section(docstring, "Parameters"), re.MULTILINE)
    return {name.strip(" *"): kind for names, kind in entries for name in names.split(",")}


def _length(function: Function) -> int:
    """Lines of a function without its decorators and docstring."""
    body = function.body[1:] if ast.get_docstring(function) else function.body
    last = function.end_lineno or function.lineno
    return last - body[0].lineno + 1 if body else 0


def _expected_unit(name: str) -> str | None:
    """Unit that a name's longest known suffix promises."""
    suffix = max((end for end in UNITS if name.endswith(end)), key=len, default=None)
    return UNITS[suffix] if suffix else None


def _disagrees(name: str, kind: str) -> bool:
    """Whether a documented quantity lacks the bracket that its name promises."""
    above, per, below = name.rpartition("_per_")
    unit = _expected_unit(f"_{below}")
    if not per:
        return unit is not None and f"[{unit}" not in kind
    if above.endswith(f"_{below}"):  # a ratio of like things is a pure number
        return "[-]" not in kind and f"[{unit}/{unit}" not in kind
    # Of a rate, the lower half must be there; what stands above it may be money or anything.
    over = _expected_unit(above)
    above_wrong = over not in {None, "-"} and f"[{over}" not in kind
    return above_wrong or (unit is not None and not re.search(rf"\[[^\]]*/{unit}", kind))


def test_modules_are_short() -> None:
    """No module with functions is longer than it may be."""
    long = [
        f"{path.relative_to(ROOT)}: {lines}"
        for path in MODULES
        if (lines := len(path.read_text(encoding="utf-8").splitlines())) > LONGEST_MODULE
        if any(_functions(_tree(path)))
    ]

    assert long == []


def test_functions_are_short() -> None:
    """No function is longer than fifty lines, and nine in ten have under twenty-five."""
    lengths = {
        _place(path, function): _length(function)
        for path in MODULES
        for function in _functions(_tree(path))
    }

    assert [place for place, lines in lengths.items() if lines > LONGEST_FUNCTION] == []
    usual = sum(lines < USUAL_FUNCTION for lines in lengths.values())
    assert usual >= SHARE_OF_USUAL_FUNCTIONS * len(lengths)


def test_modules_are_named_for_their_subject() -> None:
    """No module or package has a name that fits anything."""
    assert [
        path for path in [*MODULES, *TESTS] if EMPTY_NAMES & set(path.with_suffix("").parts)
    ] == []


def test_no_assert_outside_tests() -> None:
    """Checks in the packages raise an error that says what to do."""
    found = [
        f"{path.relative_to(ROOT)}:{node.lineno}"
        for path in MODULES
        for node in ast.walk(_tree(path))
        if isinstance(node, ast.Assert)
    ]

    assert found == []


def test_parameters_are_documented() -> None:
    """The docstring of a public function names every parameter, and no other.

    The small formatters and drawing steps of reports may do without the section.
    """
    wrong = []
    for path in MODULES:
        brief = path.is_relative_to(ROOT / "reports")
        for function in _public(_tree(path)):
            docstring = ast.get_docstring(function) or ""
            if brief and "Parameters" not in docstring:
                continue
            arguments = function.args
            names = {
                argument.arg
                for argument in (*arguments.posonlyargs, *arguments.args, *arguments.kwonlyargs)
            }
            documented = set(_entries(docstring))
            wrong += [f"{_place(path, function)}: {name}" for name in sorted(names ^ documented)]

    assert wrong == []


def test_units_agree_with_names() -> None:
    """Where a parameter's or field's name ends in a unit, its docstring's bracket says the same."""
    wrong = [
        f"{_place(path, node)}: {name} : {kind}"
        for path in MODULES
        for node in ast.walk(_tree(path))
        if isinstance(node, Function | ast.ClassDef)
        for name, kind in _entries(ast.get_docstring(node) or "").items()
        if _disagrees(name, kind)
    ]

    assert wrong == []


def test_returned_units_agree_with_names() -> None:
    """A public function whose name ends in a unit returns it, and its docstring says so."""
    wrong = [
        _place(path, function)
        for path in MODULES
        for function in _public(_tree(path))
        if (returned := _section(ast.get_docstring(function) or "", "Returns"))
        or not path.is_relative_to(ROOT / "reports")
        if _disagrees(function.name, returned)
    ]

    assert wrong == []


def test_docstring_rules_can_fail() -> None:
    """The parser behind the rules above sees a missing name, a wrong unit and a right one."""
    docstring = "Heat.\n\nParameters\n----------\nflow_kW, loss_kW : float [kW]\n    Both.\n"

    assert _entries(docstring) == {"flow_kW": "float [kW]", "loss_kW": "float [kW]"}
    assert _disagrees("flow_kW", "float [MW]")
    assert _disagrees("loss_frac", "float")
    assert _disagrees("cost_per_kWh", "float [currency]")
    assert not _disagrees("flow_kW", "array, shape (hours,) [kW]")
    assert not _disagrees("cost_per_kWh", "float [currency/kWh]")
    assert not _disagrees("loss_kW_per_K", "float [kW/K]")
    assert not _disagrees("steam_kg_per_kg", "float [-]")


def _texts() -> Iterator[Path]:
    """Every text of the project, this one left out because it holds the unwanted words."""
    rooms = [*PACKAGES, "docs", "requirements", "tests", ".ci"]
    found = [path for room in rooms for path in (ROOT / room).rglob("*") if path.is_file()]
    for path in [*found, *(path for path in ROOT.iterdir() if path.is_file())]:
        if path != Path(__file__) and (path.suffix in PROSE or path.name in {"start", "run"}):
            yield path


def test_no_unwanted_words() -> None:
    """No path of somebody's machine, no registry's address and no work put off in any text."""
    found = [
        f"{path.relative_to(ROOT)}:{number}: {line.strip()[:80]}"
        for path in _texts()
        for number, line in enumerate(path.read_text(encoding="utf-8").splitlines(), start=1)
        if UNWANTED.search(line)
    ]

    assert found == []


def test_worked_examples_have_their_form() -> None:
    """Each worked example says what is given, what is sought, the source, the hand calculation."""
    parts = ("Given", "Find", "Source", "By hand", "Differs")
    examples = sorted((ROOT / "tests" / "worked_examples").glob("test_*.py"))

    lacking = [
        f"{path.name}: {part}"
        for path in examples
        for part in parts
        if not re.search(rf"^{part}\b", ast.get_docstring(_tree(path)) or "", re.MULTILINE)
    ]

    assert len(examples) >= 10
    assert lacking == []


def _distribution(requirement: str) -> str:
    """Name of a requirement, without versions and markers."""
    return re.split(r"[^\w-]", requirement)[0].lower().replace("-", "_")


def test_imported_libraries_are_required() -> None:
    """What the packages import is what a user's install brings, not what the tests happen to."""
    project = tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))["project"]
    required = {_distribution(line) for line in project["dependencies"]}
    used = {
        name.partition(".")[0].lower()
        for path in MODULES
        if not path.is_relative_to(ROOT / "benchmarks")
        for node in ast.walk(_tree(path))
        for name in _imported(node)
    } - {*PACKAGES, *sys.stdlib_module_names, "pydantic_core"}  # the half of pydantic that is Rust

    assert "numpy" in used
    assert used - required == set()


def _imported(node: ast.AST) -> list[str]:
    """Modules that an import statement names."""
    if isinstance(node, ast.Import):
        return [alias.name for alias in node.names]
    return [node.module or ""] if isinstance(node, ast.ImportFrom) else []


def _checks(node: ast.AST, checking: set[str]) -> bool:
    """Whether something in a function can fail: an assertion, or a call that makes one."""
    for inner in ast.walk(node):
        if isinstance(inner, ast.Assert):
            return True
        if isinstance(inner, ast.Call):
            called = ast.unparse(inner.func)
            if called in checking or re.search(r"assert|raises|warns|check_|verify", called):
                return True
    return False


def test_every_test_can_fail() -> None:
    """Each test holds an assertion, or calls a function of its module that does."""
    idle = []
    for path in TESTS:
        functions = list(_functions(_tree(path)))
        checking = {function.name for function in functions if _checks(function, set())}
        idle += [
            _place(path, function)
            for function in functions
            if function.name.startswith("test_") and not _checks(function, checking)
        ]

    assert idle == []


@pytest.mark.parametrize("command", ["", *sorted(cli.cli.commands)])
def test_help_loads_nothing_heavy(command: str) -> None:
    """The help of every command answers before any large library is loaded."""
    code = (
        "import sys; from planner import cli; status = cli.run(sys.argv[1:]);"
        "print(*sorted({name.partition('.')[0] for name in sys.modules}), file=sys.stderr);"
        "sys.exit(status)"
    )
    arguments = [command, "--help"] if command else ["--help"]

    answer = subprocess.run(
        [sys.executable, "-c", code, *arguments],
        cwd=ROOT,
        capture_output=True,
        text=True,
        check=True,
    )

    assert "Usage: flueprint" in answer.stdout
    assert "click" in answer.stderr.split()
    assert HEAVY & set(answer.stderr.split()) == set()

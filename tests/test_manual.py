"""What is written about the study file, the results and the command is complete and current."""

import json
import re
import tomllib
import types
import typing
from collections.abc import Iterator
from pathlib import Path

import click
import jsonschema
import pytest
from pydantic import BaseModel

from planner import cli
from planner.schemas import schema_files
from planner.study.manual import current_manual
from planner.study.starter import demo_study
from planner.study.study import Study

ROOT = Path(__file__).parents[1]
MANUAL = (ROOT / "docs" / "study_file.md").read_text(encoding="utf-8")

#: Suffixes of keys, and how the unit that the manual prints must begin.
UNITS = {
    "_kW": "kW",
    "_kWh": "kWh",
    "_MWh": "MWh",
    "_degC": "degC",
    "_K": "K",
    "_m": "m",
    "_kPa": "kPa",
    "_kPa_gauge": "kPa gauge",
    "_kg_per_s": "kg/s",
    "_ppm_15O2": "ppm",
    "_mg_per_Nm3": "mg/Nm3",
    "_hhv_kWh": "kWh HHV",
    "_lhv_kWh": "kWh LHV",
    "_frac_per_h": "",
    "kg_per_kWh": "kg/kWh",
    "price_per_kWh": "currency/kWh",
    "levy_per_kWh": "currency/kWh",
    "_per_hhv_kWh": "currency/kWh HHV",
    "_per_kW_month": "currency/kW and month",
    "_per_run_hour": "currency/h",
    "_per_MWh": "currency/MWh",
    "_per_start": "currency/start",
    "_per_year": "currency",
    "_per_month": "currency",
    "_minutes": "min",
    "_h": "h",
}


def _models(annotation: object) -> Iterator[type[BaseModel]]:
    """Every model inside an annotation, through unions, tuples and `Annotated`."""
    if isinstance(annotation, type) and not isinstance(annotation, types.GenericAlias):
        if issubclass(annotation, BaseModel):
            yield annotation
        return
    for part in typing.get_args(annotation):
        yield from _models(part)


def _fields(model: type[BaseModel], path: str) -> Iterator[tuple[str, str]]:
    """Every field below a model as (path of its table, key), read from the models themselves."""
    for key, field in model.model_fields.items():
        yield path, key
        for inner in _models(field.annotation):
            yield from _fields(inner, f"{path}.{key}" if path else key)


def _documented() -> dict[str, dict[str, str]]:
    """What the manual says: unit by key, by the path of the table that stands there."""
    tables: dict[str, dict[str, str]] = {}
    for block in re.findall(r"<!-- record \w+ -->\n(.*?)<!-- end -->", MANUAL, re.DOTALL):
        rows = re.findall(r"^\| `(\w+)` \| ([^|]*?) ?\|", block, re.MULTILINE)
        where = re.findall(r"`\[+([a-z_.]+)\]+`", block.partition("\n")[0]) or [""]
        for path in where:
            tables.setdefault(path, {}).update(rows)
    return tables


def test_every_study_field_is_documented() -> None:
    """Each field of a study file has a row in the manual, under a heading that holds it."""
    tables = _documented()
    fields = set(_fields(Study, ""))

    missing = [f"{path}.{key}" for path, key in fields if key not in tables.get(path, {})]
    unknown = [f"{p}.{k}" for p, rows in tables.items() for k in rows if (p, k) not in fields]

    assert len(fields) > 150
    assert ("option.unit.sheet", "power_kW") in fields
    assert sorted(missing) == []
    assert sorted(unknown) == []


def test_units_in_the_manual_agree_with_the_keys() -> None:
    """The printed unit is the one that the key's suffix names."""
    wrong = []
    for path, rows in _documented().items():
        for key, unit in rows.items():
            suffix = max((s for s in UNITS if key.endswith(s)), key=len, default=None)
            if suffix is not None and not unit.startswith(UNITS[suffix]):
                wrong.append(f"{path}.{key}: {unit!r}")

    assert wrong == []


def test_manual_tables_are_current() -> None:
    """`python -m planner.study.manual` would change nothing."""
    assert current_manual(MANUAL) == MANUAL


@pytest.mark.parametrize("path", sorted(schema_files()))
def test_schema_is_current(path: Path) -> None:
    """`python -m planner.schemas` would change nothing, and what it writes is a valid schema."""
    text = (ROOT / path).read_text(encoding="utf-8")

    assert text == schema_files()[path]
    jsonschema.Draft202012Validator.check_schema(json.loads(text))


@pytest.mark.parametrize("kind", cli.KINDS)
def test_demo_study_obeys_the_schema(kind: str) -> None:
    """An independent validator takes the demo studies, and refuses one with a key too many."""
    schema = json.loads((ROOT / "docs" / "study.schema.json").read_text(encoding="utf-8"))
    validator = jsonschema.Draft202012Validator(schema)
    with demo_study(kind) as file:
        document = json.loads(json.dumps(_toml(file), default=str))

    assert [error.message for error in validator.iter_errors(document)] == []
    assert not validator.is_valid({**document, "colour": "red"})


def _toml(file: Path) -> dict[str, object]:
    """A study file as plain values."""
    return tomllib.loads(file.read_text(encoding="utf-8"))


def test_every_command_is_in_the_readme() -> None:
    """Each command of `flueprint` is explained in the README and listed by `./start`."""
    readme = (ROOT / "README.md").read_text(encoding="utf-8")
    start = (ROOT / "start").read_text(encoding="utf-8")
    assert isinstance(cli.cli, click.Group)

    missing = [name for name in cli.cli.commands if f"flueprint {name}" not in readme]
    unlisted = [name for name in cli.cli.commands if f"./start {name}" not in start]

    assert missing == []
    assert unlisted == []


def test_exit_codes_are_in_the_readme() -> None:
    """The README's table names each exit code of the command."""
    readme = (ROOT / "README.md").read_text(encoding="utf-8")
    codes = (cli.DONE, cli.OUR_FAULT, cli.BAD_INPUT, cli.NO_SCHEDULE, cli.INTERRUPTED)

    assert [code for code in codes if f"| {code} |" not in readme] == []

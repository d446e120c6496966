"""The tables of `docs/study_file.md`, made from the models, so that the manual cannot fall behind.

`python -m planner.study.manual`, typed in the project's folder, writes the tables anew between the
marks `<!-- record Name -->` and `<!-- end -->`; the prose around them is written by hand.
"""

import json
import re
from collections import defaultdict
from collections.abc import Iterator
from pathlib import Path
from typing import Any

from planner.study.study import Study

Schema = dict[str, Any]

MANUAL = Path("docs/study_file.md")
BLOCK = re.compile(r"<!-- record (\w+) -->\n.*?<!-- end -->", re.DOTALL)
UNIT = re.compile(r" ?\[([^\]]+)\]")


def current_manual(text: str) -> str:
    """Put today's tables into the manual.

    Parameters
    ----------
    text : str
        The manual as it stands, with its marks.

    Returns
    -------
    str
        The same prose with every table made anew.
    """
    schema = Study.model_json_schema()
    places = record_places(schema)

    def block(match: re.Match[str]) -> str:
        name = match[1]
        stands = ", ".join(places[name])
        table = _table(schema if name == "Study" else schema["$defs"][name], schema)
        return f"<!-- record {name} -->\nStands at {stands}.\n\n{table}\n<!-- end -->"

    return BLOCK.sub(block, text)


def record_places(schema: Schema) -> dict[str, list[str]]:
    """Where in a study file each kind of record may stand.

    Parameters
    ----------
    schema : dict
        JSON Schema of the study file.

    Returns
    -------
    dict of str to list of str
        TOML headings by the record's name, as the manual prints them: `[site]`, or `[[option]]`
        where several may stand.
    """
    places = defaultdict(list)
    for name, path, many in _records(schema, schema, ""):
        places[name].append(f"`[[{path}]]`" if many else f"`[{path}]`")
    return {"Study": ["the top of the file"], **places}


def _records(record: Schema, schema: Schema, path: str) -> Iterator[tuple[str, str, bool]]:
    """Every record below one: its name, its path, whether several may stand there."""
    for key, field in record["properties"].items():
        here = f"{path}.{key}" if path else key
        for name in _named(field):
            yield name, here, field.get("type") == "array"
            yield from _records(schema["$defs"][name], schema, here)


def _named(field: Schema) -> list[str]:
    """Names of the records that a field may hold."""
    if "$ref" in field:
        return [field["$ref"].rpartition("/")[2]]
    if "items" in field:
        return _named(field["items"])
    kinds: list[Schema] = field.get("anyOf") or field.get("oneOf") or []
    return [name for kind in kinds for name in _named(kind)]


def _table(record: Schema, schema: Schema) -> str:
    """A record's fields, one a row."""
    lines = ["| Key | Unit | Must be | Default | Meaning |", "|---|---|---|---|---|"]
    for key, field in record["properties"].items():
        said = _said(field, schema)
        unit = ", ".join(UNIT.findall(said))
        meaning = UNIT.sub("", said).replace("|", r"\|")
        default = "required" if key in record.get("required", ()) else _default(field)
        cells = (f"`{key}`", unit, _must(field, schema), default, meaning)
        lines.append(f"| {' | '.join(cells)} |".replace("|  |", "| |"))
    return "\n".join(lines)


def _said(field: Schema, schema: Schema) -> str:
    """The field's own sentence; the schema leaves it to the record where both are the same."""
    record = schema["$defs"].get(field.get("$ref", "").rpartition("/")[2], {})
    return str(field.get("description") or record.get("description", ""))


def _default(field: Schema) -> str:
    """What a field that was left out becomes."""
    value = field["default"]
    if value in (None, []):
        return "none"
    if isinstance(value, dict):
        return "its own defaults"
    return f"`{json.dumps(value)}`"


def _must(field: Schema, schema: Schema) -> str:
    """What a value must be, in words."""
    names = _named(field)
    if names:
        return _must_be_table(field, names, schema)
    if "anyOf" in field:
        return " or ".join(_must(kind, schema) for kind in field["anyOf"] if not _is_null(kind))
    if "const" in field or "enum" in field:
        values = field.get("enum", [field.get("const")])
        return " or ".join(f"`{json.dumps(value)}`" for value in values).replace("|", r"\|")
    if field["type"] == "array":
        return f"list of {_must(field['items'], schema)}"
    if field["type"] == "object":
        return f"table: name = {_must(field['additionalProperties'], schema)}"
    return _must_be_plain(field)


def _is_null(kind: Schema) -> bool:
    """Whether an alternative only says that the field may be left out."""
    return kind.get("type") == "null"


def _must_be_table(field: Schema, names: list[str], schema: Schema) -> str:
    """A record, one of several kinds told apart by `source`, or a list of records."""
    if len(names) > 1:
        sources = (schema["$defs"][name]["properties"]["source"]["const"] for name in names)
        return f"table; `source` is {' or '.join(f'`{json.dumps(source)}`' for source in sources)}"
    if field.get("type") != "array":
        return "table"
    least, most = field.get("minItems"), field.get("maxItems")
    return (
        "tables" + (f", at least {least}" if least else "") + (f", at most {most}" if most else "")
    )


def _must_be_plain(field: Schema) -> str:
    """A number, text, date or truth value with its bounds."""
    if field["type"] == "boolean":
        return "`true` or `false`"
    if field["type"] == "string":
        most = field.get("maxLength")
        noun = "date" if field.get("format") == "date" else "text"
        return noun + (f", at most {most} characters" if most else "")
    noun = "whole number" if field["type"] == "integer" else "number"
    if "minimum" in field and "maximum" in field:
        return f"{noun} {field['minimum']:g} to {field['maximum']:g}"
    bounds = (
        ("at least", field.get("minimum")),
        ("above", field.get("exclusiveMinimum")),
        ("at most", field.get("maximum")),
        ("below", field.get("exclusiveMaximum")),
    )
    said = ", ".join(f"{word} {bound:g}" for word, bound in bounds if bound is not None)
    return f"{noun} {said}".strip()


if __name__ == "__main__":
    MANUAL.write_text(current_manual(MANUAL.read_text(encoding="utf-8")), encoding="utf-8")

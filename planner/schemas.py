"""The JSON Schemas of the study file and of `results.json`, made from the models that hold them.

`python -m planner.schemas`, typed in the project's folder, writes both files anew; a test fails
while they are not current.
"""

import json
from pathlib import Path
from typing import Any

from pydantic.json_schema import GenerateJsonSchema

from planner.results.records import Results
from planner.study.study import Study

JSON_SCHEMA_DIALECT = "https://json-schema.org/draft/2020-12/schema"


class PlainSchema(GenerateJsonSchema):
    """Schema without the titles that would only repeat each key with its units in lower case."""

    def field_title_should_be_set(self, schema: object) -> bool:
        """Never: the key itself is the title."""
        del schema
        return False


def study_schema() -> dict[str, Any]:
    """JSON Schema of a study file, for editors that complete and check TOML.

    Returns
    -------
    dict
        Draft 2020-12. A date is an unquoted TOML date, which JSON Schema calls a string.
    """
    return {"$schema": JSON_SCHEMA_DIALECT, **Study.model_json_schema(schema_generator=PlainSchema)}


def results_schema() -> dict[str, Any]:
    """JSON Schema of `results.json`: the contract between planner and reports.

    Returns
    -------
    dict
        Draft 2020-12, of the file as it is written: every key is there.
    """
    return {
        "$schema": JSON_SCHEMA_DIALECT,
        **Results.model_json_schema(mode="serialization", schema_generator=PlainSchema),
    }


def schema_files() -> dict[Path, str]:
    """Both schemas as they stand in the project.

    Returns
    -------
    dict of Path to str
        Path below the project's folder, and the file's text.
    """
    schemas = {
        Path("docs/study.schema.json"): study_schema(),
        Path("reports/results.schema.json"): results_schema(),
    }
    return {path: json.dumps(schema, indent=2) + "\n" for path, schema in schemas.items()}


def _write(project: Path) -> None:
    """Write both files below the project's folder."""
    for path, text in schema_files().items():
        (project / path).write_text(text, encoding="utf-8")


if __name__ == "__main__":
    _write(Path.cwd())

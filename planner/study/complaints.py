"""pydantic's validation errors in the words of a study file."""

import difflib
import types
import typing
from typing import Any

from pydantic import BaseModel, ValidationError
from pydantic_core import ErrorDetails

from load_profiles import Fault
from planner.study.study import Study

Location = tuple[int | str, ...]

#: pydantic's error types for values of the wrong kind, and what must stand there instead.
KINDS = {
    "float_type": "must be a number",
    "int_type": "must be a whole number",
    "int_from_float": "must be a whole number",
    "string_type": "must be text in quotes",
    "bool_type": "must be true or false",
    "date_type": "must be a date such as 2025-08-04",
    "date_parsing": "must be a date such as 2025-08-04",
    "date_from_datetime_parsing": "must be a date such as 2025-08-04",
    "tuple_type": "must be a list",
    "model_type": "must be a section",
    "dict_type": "must be a section",
    "model_attributes_type": "must be a section",
    "finite_number": "must be a finite number",
}

#: Bounds of a share of one: a number between them and a hundred looks like a percentage.
LARGEST_SHARE = 1.5
LARGEST_PERCENT = 100.0


def faults_from_validation(error: ValidationError, document: dict[str, Any]) -> tuple[Fault, ...]:
    """All faults of a study file.

    Parameters
    ----------
    error : ValidationError
        What pydantic found.
    document : dict
        The file as parsed, to tell what came.

    Returns
    -------
    tuple of Fault
        In the order of the file's sections.
    """
    details = error.errors(include_url=False)
    # A list whose only entry is at fault is also called too short; that is not what came.
    return tuple(
        _fault(detail, document)
        for detail in details
        if not (detail["type"] == "too_short" and detail["input"])
    )


def _fault(detail: ErrorDetails, document: dict[str, Any]) -> Fault:
    """One error of pydantic as where, what came, what it must be."""
    location = _written(detail["loc"], document)
    path = dotted(location)
    kind = detail["type"]
    if kind == "extra_forbidden":
        return Fault(path, _shown(detail["input"]), _unknown_key(location))
    if kind == "missing":
        return Fault(path, "nothing", f"is needed: {_description(location)}")
    if kind in {"union_tag_not_found", "union_tag_invalid"}:
        known = str((detail.get("ctx") or {}).get("expected_tags", "")).replace("'", '"')
        return Fault(f"{path}.source", _tag(detail["input"]), f"must be one of {known}")
    return Fault(path, _shown(detail["input"]), _requirement(detail, path))


def dotted(location: Location) -> str:
    """Path as a reader counts: `option[1]` is the first option.

    Parameters
    ----------
    location : tuple of int and str
        Steps into the document, counted from zero.

    Returns
    -------
    str
        The same, counted from one.
    """
    path = ""
    for step in location:
        path += f"[{step + 1}]" if isinstance(step, int) else f".{step}" if path else str(step)
    return path


def _written(location: Location, document: dict[str, Any]) -> Location:
    """The location without the union tags that pydantic adds and the file does not have."""
    here: Any = document
    kept: list[int | str] = []
    for number, step in enumerate(location):
        last = number == len(location) - 1
        if isinstance(here, dict) and step not in here and here.get("source") == step and not last:
            continue
        kept.append(step)
        try:
            here = here[step]
        except (KeyError, IndexError, TypeError):
            here = None
    return tuple(kept)


def _requirement(detail: ErrorDetails, path: str) -> str:
    """What must stand there, with a hint where the mistake is a known one."""
    kind = detail["type"]
    context = detail.get("ctx") or {}
    if kind in KINDS:
        return KINDS[kind]
    if kind == "literal_error":
        return f"must be one of {context.get('expected')}".replace("'", '"')
    words = {"ge": "at least", "gt": "more than", "le": "at most", "lt": "less than"}
    for bound, word in words.items():
        if bound in context:
            sentence = f"must be {word} {context[bound]}"
            return sentence + _percent_hint(detail["input"], path, context[bound])
    return detail["msg"][:1].lower() + detail["msg"][1:]


def _percent_hint(came: object, path: str, bound: object) -> str:
    """Name a percentage where a share of one belongs."""
    if not path.endswith("_frac") or not isinstance(came, int | float):
        return ""
    if isinstance(bound, int | float) and bound <= LARGEST_SHARE < came <= LARGEST_PERCENT:
        return f"; in percent? write {came / 100:g}"
    return ""


def _unknown_key(location: Location) -> str:
    """Name the nearest known key of the same section."""
    known = _fields_at(location[:-1])
    near = difflib.get_close_matches(str(location[-1]), known, n=1, cutoff=0.4)
    if near:
        return f"is not a key here; did you mean `{near[0]}`?"
    return f"is not a key here; known are {', '.join(sorted(known))}"


def _description(location: Location) -> str:
    """The manual's sentence for a field."""
    name = location[-1]
    for model in _models_at(location[:-1]):
        if isinstance(name, str) and name in model.model_fields:
            return model.model_fields[name].description or "see docs/study_file.md"
    return "see docs/study_file.md"


def _fields_at(location: Location) -> list[str]:
    """Known keys of the section at a location."""
    return [name for model in _models_at(location) for name in model.model_fields]


def _models_at(location: Location) -> list[type[BaseModel]]:
    """Record types that may stand at a location."""
    models: list[type[BaseModel]] = [Study]
    for step in location:
        if isinstance(step, int):
            continue
        kinds = [m.model_fields[step].annotation for m in models if step in m.model_fields]
        models = [model for kind in kinds for model in _models_in(kind)]
    return models


def _models_in(annotation: Any) -> list[type[BaseModel]]:
    """Record types inside an annotation such as `tuple[Option, ...]` or `Store | None`."""
    if isinstance(annotation, type) and issubclass(annotation, BaseModel):
        return [annotation]
    if typing.get_origin(annotation) in {tuple, typing.Union, types.UnionType, typing.Annotated}:
        return [model for part in typing.get_args(annotation) for model in _models_in(part)]
    return []


def _tag(section: object) -> str:
    """What stands as the source of a demand."""
    return _shown(section.get("source")) if isinstance(section, dict) else _shown(section)


def _shown(value: object) -> str:
    """What came, short enough for one line."""
    if value is None:
        return "nothing"
    if isinstance(value, dict):
        return "a section"
    text = f'"{value}"' if isinstance(value, str) else str(value)
    return text if len(text) <= 60 else text[:57] + "…"  # noqa: PLR2004 - a line of a terminal

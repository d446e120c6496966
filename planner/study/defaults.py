"""Which defaults a study used: each is shown as such in the report."""

from dataclasses import dataclass

from pydantic import BaseModel

from planner.study.study import Study


@dataclass(frozen=True)
class DefaultField:
    """One field that was left out of the study file.

    Parameters
    ----------
    path : str
        Path into the study file.
    value : str
        What was taken instead.
    meaning : str
        The manual's sentence for the field.
    """

    path: str
    value: str
    meaning: str


def defaults_used(study: Study) -> tuple[DefaultField, ...]:
    """Every field of a study that was left out and has an effect.

    Parameters
    ----------
    study : Study
        As read.

    Returns
    -------
    tuple of DefaultField
        In the order of the manual. Optional parts that are simply absent are not listed.
    """
    return tuple(_walk(study, ""))


def _walk(record: BaseModel, path: str) -> list[DefaultField]:
    """Defaults of one record and of the records inside it."""
    found: list[DefaultField] = []
    for name, field in type(record).model_fields.items():
        value = getattr(record, name)
        here = f"{path}.{name}" if path else name
        inner = value if isinstance(value, tuple) else (value,)
        if inner and all(isinstance(part, BaseModel) for part in inner):
            for number, part in enumerate(inner, start=1):
                label = f"{here}[{number}]" if isinstance(value, tuple) else here
                found += _walk(part, label)
        elif name not in record.model_fields_set and _matters(value, field.description):
            found.append(DefaultField(here, _shown(value), field.description or ""))
    return found


def _matters(value: object, description: str | None) -> bool:
    """Whether leaving the field out took a value that works in the answer."""
    return value not in (None, ()) or "left out" in (description or "")


def _shown(value: object) -> str:
    """The value as the report prints it."""
    if value is None:
        return "computed"
    if isinstance(value, tuple):
        return ", ".join(str(part) for part in value)
    return str(value)

"""A `Finding`: something a reader must know about the inputs or the answer."""

from dataclasses import dataclass
from typing import Literal

Severity = Literal["note", "attention", "serious"]


@dataclass(frozen=True)
class Finding:
    """One fact that changes how far the answer can be trusted.

    Parameters
    ----------
    where : str
        File, row or study field it is about, as the user knows it.
    what : str
        What was found and, where something was repaired, by which rule.
    effect : str
        What it does to the answer, with hours and energy where they are known.
    advice : str
        What the reader can do about it; empty where nothing is needed.
    severity : {"note", "attention", "serious"}
        A note is a record, attention asks for a look, serious can flip the decision.
    """

    where: str
    what: str
    effect: str
    advice: str = ""
    severity: Severity = "note"

    def __str__(self) -> str:
        """One line, as the terminal prints it."""
        sentence = f"{self.where}: {self.what}; {self.effect}"
        return f"{sentence}. {self.advice}" if self.advice else sentence

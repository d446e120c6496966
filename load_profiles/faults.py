"""Faults of input files: where, what came, what it must be; all of a file at once."""

from dataclasses import dataclass


@dataclass(frozen=True)
class Fault:
    """One fault of one input.

    Parameters
    ----------
    path : str
        File and row, or path into the study file.
    came : str
        What was found there.
    must : str
        What it must be, and so what to do.
    """

    path: str
    came: str
    must: str

    def __str__(self) -> str:
        """`path = came: must`, as the terminal prints it."""
        return f"{self.path} = {self.came}: {self.must}"


class ProfileError(Exception):
    """Raw files that cannot be read as declared; carries every fault found.

    Parameters
    ----------
    faults : tuple of Fault
        At least one.
    """

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__(faults)
        self.faults = faults

    def __str__(self) -> str:
        """One fault a line."""
        return "\n".join(str(fault) for fault in self.faults)

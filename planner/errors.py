"""The planner's exceptions: each says where, what came and what to do."""

from load_profiles import Fault


class PlannerError(Exception):
    """Base of everything the planner raises on purpose."""


class StudyError(PlannerError):
    """A study that cannot be used; carries every fault found.

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


class UnmetDemandError(StudyError):
    """A demand that no plant of the study can meet: which hour, how much short."""


class SolveError(PlannerError):
    """A solver died, lied or returned nothing; the message names it and the part of the year."""


class ResultsError(PlannerError):
    """A results folder that cannot be read or written."""

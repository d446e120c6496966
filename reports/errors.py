"""What a report refuses, told so that the reader can mend it."""

from collections.abc import Sequence


class ReportError(Exception):
    """A results folder that cannot be reported, or a place that cannot be written.

    Parameters
    ----------
    *faults : str
        Each as `where = what came: what to do`.
    """

    def __init__(self, *faults: str) -> None:
        super().__init__(*faults)

    @property
    def faults(self) -> Sequence[str]:
        """All faults, each on one line."""
        return tuple(str(fault) for fault in self.args)

    def __str__(self) -> str:
        """One fault a line."""
        return "\n".join(self.faults)

"""What every family of the model of record shares: the problem, its steps, its names."""

from collections.abc import Callable, Iterable
from typing import Any

import pulp

from planner.dispatch.window import Window


class RecordRows:
    """A PuLP problem over the steps of a window.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    """

    def __init__(self, window: Window) -> None:
        self.window = window
        self.hours = range(window.steps)
        self.problem = pulp.LpProblem("dispatch", pulp.LpMinimize)
        self.cost: list[Any] = []

    def _variables(
        self,
        name: str,
        high: Callable[[int], float | None],
        *,
        low: Callable[[int], float] = lambda _: 0.0,
        binary: bool = False,
    ) -> list[Any]:
        """One variable a step."""
        category = pulp.LpInteger if binary else pulp.LpContinuous
        return [
            self.problem.add_variable(f"{name}_{h}", low(h), high(h), category) for h in self.hours
        ]

    def _require(self, name: str, rows: Iterable[Any]) -> None:
        """Add named constraints, one a step."""
        for h, row in enumerate(rows):
            self.problem.addConstraint(row, f"{name}_{h}")


def always(value: float | None) -> Callable[[int], float | None]:
    """The same bound in every step.

    Parameters
    ----------
    value : float or None
        None for no bound.

    Returns
    -------
    callable
        From the step to the bound.
    """
    return lambda _: value

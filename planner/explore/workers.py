"""Where evaluations run: in this process, or spread over processes that keep study and year."""

import warnings
from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import as_completed
from types import TracebackType
from typing import Any, Self, TypeVar

from loky import ProcessPoolExecutor

from load_profiles import SiteYear
from planner.study.study import Study

Answer = TypeVar("Answer")

#: What each worker process keeps from its start, so that a task carries only what differs.
_KEPT: dict[str, Any] = {}


class Workers:
    """A pool for evaluations of one study; use it as a context.

    Parameters
    ----------
    study : Study
        Kept by every process.
    site_year : SiteYear
        Kept by every process.
    processes : int
        One works in this process.
    """

    def __init__(self, study: Study, site_year: SiteYear, processes: int) -> None:
        self._filters = warnings.catch_warnings()
        self._study = study
        self._site_year = site_year
        # loky starts processes without running the user's script again, so that the five lines
        # of a plain script need no `if __name__ == "__main__"` around them.
        self._pool = (
            ProcessPoolExecutor(processes, initializer=_keep, initargs=(study, site_year))
            if processes > 1
            else None
        )

    def run(
        self, task: Callable[..., Answer], arguments: Sequence[tuple[Any, ...]]
    ) -> Iterator[tuple[int, Answer]]:
        """Call a task once for each set of arguments, in whatever order they finish.

        Parameters
        ----------
        task : callable
            Takes study, site year and then the arguments; must be importable by name.
        arguments : sequence of tuple
            One call each.

        Yields
        ------
        tuple of int and answer
            Number of the set of arguments, and what the task returned.

        Raises
        ------
        Exception
            Whatever a task raises; the rest is given up.
        """
        if self._pool is None:
            for number, extra in enumerate(arguments):
                yield number, task(self._study, self._site_year, *extra)
            return
        futures = {
            self._pool.submit(_call, task, extra): number for number, extra in enumerate(arguments)
        }
        for future in as_completed(futures):
            yield futures[future], future.result()

    def __enter__(self) -> Self:
        # loky starts a worker anew when it has grown, and says so; nothing is lost by it.
        self._filters.__enter__()
        warnings.filterwarnings("ignore", message="A worker stopped while some jobs")
        return self

    def __exit__(
        self,
        kind: type[BaseException] | None,
        error: BaseException | None,
        trace: TracebackType | None,
    ) -> None:
        if self._pool is not None:
            self._pool.shutdown(wait=error is None, kill_workers=error is not None)
        self._filters.__exit__(kind, error, trace)


def _keep(study: Study, site_year: SiteYear) -> None:
    """Hold what every task of this process needs."""
    _KEPT["study"] = study
    _KEPT["site_year"] = site_year


def _call(task: Callable[..., Answer], extra: tuple[Any, ...]) -> Answer:
    """Run a task on what this process keeps."""
    return task(_KEPT["study"], _KEPT["site_year"], *extra)

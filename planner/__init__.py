"""From a study to a proven answer.

In the order in which data passes: `study` (what the user states) and `load_profiles` (one clean
year) feed `plant` (what each machine can make) and `market` (what energy costs); `dispatch` finds
the cheapest year; `outcome` says what it means; `explore` moves the assumptions; `results` holds
the answer. `pipeline` calls them in that order.

>>> from planner import load_study, plan
"""

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from planner.pipeline import plan
    from planner.results.study_result import StudyResult
    from planner.study.reading import StudyFile, load_study

__all__ = ["StudyFile", "StudyResult", "load_study", "plan"]

_HOMES = {
    "StudyFile": "planner.study.reading",
    "StudyResult": "planner.results.study_result",
    "load_study": "planner.study.reading",
    "plan": "planner.pipeline",
}


def __getattr__(name: str) -> Any:
    """Import a public name when it is first used, so that `--help` need not wait for all."""
    if name in _HOMES:
        return getattr(import_module(_HOMES[name]), name)
    raise AttributeError(f"module 'planner' has no attribute {name!r}")

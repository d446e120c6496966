"""Compiling the fast engine's inner loops, once for each user and machine."""

import os
import sys
from collections.abc import Callable
from pathlib import Path
from typing import TypeVar, cast

import numba

Function = TypeVar("Function", bound=Callable[..., object])


def cache_folder() -> Path:
    """Where compiled loops are kept between runs.

    Returns
    -------
    Path
        `NUMBA_CACHE_DIR` where it is set, else a folder in the user's cache.
    """
    named = os.environ.get("NUMBA_CACHE_DIR")
    if named:
        return Path(named)
    if sys.platform == "darwin":
        base = Path.home() / "Library" / "Caches"
    elif sys.platform == "win32":
        base = Path(os.environ.get("LOCALAPPDATA", Path.home()))
    else:
        base = Path(os.environ.get("XDG_CACHE_HOME", Path.home() / ".cache"))
    return base / "flueprint" / "compiled"


def compiled(function: Function) -> Function:
    """Compile a function of numbers and arrays when it is first called.

    Parameters
    ----------
    function : callable
        Written in the part of Python that numba knows.

    Returns
    -------
    callable
        Called alike; other threads may run meanwhile.
    """
    setattr(numba.config, "CACHE_DIR", str(cache_folder()))  # noqa: B010 - its types do not know it
    return cast("Function", numba.njit(cache=True, nogil=True, error_model="numpy")(function))

"""Starter studies for `flueprint new`, and the demo sites, as they lie inside the package."""

import shutil
from collections.abc import Iterator
from contextlib import contextmanager
from importlib.resources import as_file, files
from pathlib import Path

from load_profiles import Fault
from planner.errors import StudyError


def write_starter(folder: Path, kind: str) -> Path:
    """Copy a starter study into a new folder.

    Parameters
    ----------
    folder : Path
        Must not exist yet, or be empty.
    kind : str
        "hospital" or "factory".

    Returns
    -------
    Path
        The study file.

    Raises
    ------
    StudyError
        If the folder holds something already, or cannot be made.
    """
    if folder.exists() and (not folder.is_dir() or any(folder.iterdir())):
        raise StudyError((Fault(str(folder), "taken", "name a folder that is new or empty"),))
    with as_file(files("planner.study") / "starters" / kind) as starter:
        try:
            shutil.copytree(
                starter,
                folder,
                dirs_exist_ok=True,
                copy_function=shutil.copyfile,
                ignore=shutil.ignore_patterns("__pycache__", "*.py"),
            )
        except OSError as error:
            came = error.strerror or "an error of the file system"
            raise StudyError((Fault(str(folder), came, "name a place you may write"),)) from None
    return folder / "study.toml"


@contextmanager
def demo_study(kind: str) -> Iterator[Path]:
    """Path of a demo site's study file, for as long as the context is open.

    Parameters
    ----------
    kind : str
        "hospital" or "factory".

    Yields
    ------
    Path
        The study file, its data files beside it.
    """
    with as_file(files("load_profiles.demo_sites") / kind) as folder:
        yield folder / "study.toml"

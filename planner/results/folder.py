"""A results folder, either whole or absent.

It holds `results.json`, one `hourly_<key>.csv` an option and `hourly_separate.csv`,
`variants.csv` and the study file. Everything is written under a temporary name and renamed.
"""

import shutil
import tempfile
from pathlib import Path

import pandas as pd

from planner.errors import ResultsError
from planner.results.hourly_columns import HOURLY_COLUMNS
from planner.results.records import Results

#: The file that makes a folder a results folder.
MARK = "results.json"


def write_folder(
    results: Results, hourly: dict[str, pd.DataFrame], study_path: Path, target: Path
) -> Path:
    """Write a whole results folder, replacing an older one.

    Parameters
    ----------
    results : Results
        Everything but the hourly flows.
    hourly : dict of key to DataFrame
        Frames with the columns of `HOURLY_COLUMNS`; keys are the options' and "separate".
    study_path : Path
        Study file, copied beside the results.
    target : Path
        Folder to make.

    Returns
    -------
    Path
        The folder.

    Raises
    ------
    ResultsError
        If the place cannot be written, or holds something that is not a results folder.
    """
    check_target(target)
    target.parent.mkdir(parents=True, exist_ok=True)
    draft = Path(tempfile.mkdtemp(prefix=f".{target.name}-", dir=target.parent))
    try:
        _fill(draft, results, hourly, study_path)
        _swap(draft, target)
    finally:
        shutil.rmtree(draft, ignore_errors=True)
    return target


def check_target(target: Path) -> None:
    """Refuse a place that cannot become a results folder, before hours of work go there.

    Parameters
    ----------
    target : Path
        Folder to make.

    Raises
    ------
    ResultsError
        If it is a file, holds something else, or cannot be written.
    """
    if target.exists() and not target.is_dir():
        raise ResultsError(f"{target} = a file: must be a folder, or a name not yet taken")
    if target.is_dir() and any(target.iterdir()) and not (target / MARK).is_file():
        raise ResultsError(f"{target} = a folder of other things: name an empty or a new one")
    parent = next(place for place in target.absolute().parents if place.exists())
    try:
        # Rights alone do not tell: a mount may be read-only, and root passes every other check.
        with tempfile.TemporaryDirectory(prefix=f".{target.name}-", dir=parent):
            pass
    except OSError as error:
        came = error.strerror or "an error of the file system"
        raise ResultsError(f"{parent} = {came}: name a folder that you may write") from None


def _fill(draft: Path, results: Results, hourly: dict[str, pd.DataFrame], study_path: Path) -> None:
    """Write every file of the folder."""
    draft.chmod(0o755)
    (draft / MARK).write_text(results.model_dump_json(indent=1) + "\n", encoding="utf-8")
    for key, frame in hourly.items():
        frame[list(HOURLY_COLUMNS)].to_csv(draft / f"hourly_{key}.csv", index=False)
    rows = [
        {"option": option.key, **variant.model_dump()}
        for option in results.options
        for variant in option.variants
    ]
    pd.DataFrame(rows).to_csv(draft / "variants.csv", index=False)
    shutil.copyfile(study_path, draft / "study.toml")


def _swap(draft: Path, target: Path) -> None:
    """Put the finished folder in its place; the older one goes only when the new one stands."""
    if not target.exists():
        draft.rename(target)
        return
    older = Path(tempfile.mkdtemp(prefix=f".{target.name}-old-", dir=target.parent))
    target.rename(older / target.name)
    draft.rename(target)
    shutil.rmtree(older, ignore_errors=True)

"""Day shapes: how a demand runs through the hours of a weekday, Saturday and Sunday."""

import csv
import difflib
from importlib import resources

import numpy as np
import pandas as pd

from load_profiles.arrays import FloatArray
from load_profiles.clock import DAY_CLASSES, day_class
from load_profiles.faults import Fault, ProfileError

#: Days of each class in a week, in the order of `DAY_CLASSES`.
_DAYS_IN_WEEK = np.array([5.0, 1.0, 1.0])


def shape_names() -> tuple[str, ...]:
    """Names of the shapes that come with the package.

    Returns
    -------
    tuple of str
        In alphabetical order.
    """
    folder = resources.files("load_profiles") / "shapes"
    names = (entry.name for entry in folder.iterdir())
    return tuple(sorted(name.removesuffix(".csv") for name in names if name.endswith(".csv")))


def day_shape(name: str, *, path: str) -> FloatArray:
    """A shape, normalised to a mean of one over the week.

    Parameters
    ----------
    name : str
        One of `shape_names`.
    path : str
        Where the study names it, for the fault.

    Returns
    -------
    array, shape (3, 24) [-]
        Factors of each hour of a weekday, Saturday and Sunday.

    Raises
    ------
    ProfileError
        If there is no such shape; the nearest is named.

    Examples
    --------
    >>> float(day_shape("even", path="demand.steam.shape")[0, 12])
    1.0
    """
    known = shape_names()
    if name not in known:
        near = difflib.get_close_matches(name, known, n=1, cutoff=0.3)
        advice = f'nearest is "{near[0]}"' if near else f"must be one of {', '.join(known)}"
        raise ProfileError((Fault(path, f'"{name}"', f"is no day shape; {advice}"),))
    text = (resources.files("load_profiles") / "shapes" / f"{name}.csv").read_text("utf-8")
    lines = [line for line in text.splitlines() if not line.startswith("#")]
    rows = list(csv.DictReader(lines))
    factors = np.array([[float(row[kind]) for row in rows] for kind in DAY_CLASSES])
    return np.asarray(factors / (_DAYS_IN_WEEK @ factors.mean(axis=1) / _DAYS_IN_WEEK.sum()))


def shape_in_hours(factors: FloatArray, wall: pd.DatetimeIndex) -> FloatArray:
    """A day shape at given wall-clock hours.

    Parameters
    ----------
    factors : array, shape (3, 24) [-]
        From `day_shape`.
    wall : DatetimeIndex, shape (hours,)
        Wall-clock times: people get up by the wall clock.

    Returns
    -------
    array, shape (hours,) [-]
        Factor of each hour.
    """
    return np.asarray(factors[day_class(wall), np.asarray(wall.hour)])

"""Runs of true values in a mask: gaps, stuck meters, spikes."""

import numpy as np

from load_profiles.arrays import BoolArray, IntArray


def runs_of(mask: BoolArray) -> tuple[IntArray, IntArray]:
    """Where runs of true values begin, and how long they are.

    Parameters
    ----------
    mask : array of bool, shape (slots,)
        True inside a run.

    Returns
    -------
    starts, lengths : arrays of int, shape (runs,)
        First slot of each run, and its number of slots.

    Examples
    --------
    >>> starts, lengths = runs_of(np.array([True, False, True, True]))
    >>> starts.tolist(), lengths.tolist()
    ([0, 2], [1, 2])
    """
    edges = np.diff(np.concatenate(([0], mask.astype(np.int64), [0])))
    starts = np.flatnonzero(edges == 1)
    return starts, np.flatnonzero(edges == -1) - starts


def within_runs(mask: BoolArray, *, shortest: int = 1, longest: int | None = None) -> BoolArray:
    """The part of a mask that lies in runs of a stated length.

    Parameters
    ----------
    mask : array of bool, shape (slots,)
        True inside a run.
    shortest, longest : int
        Permitted numbers of slots of a run, both included; no upper bound by default.

    Returns
    -------
    array of bool, shape (slots,)
        True inside the runs that qualify.

    Examples
    --------
    >>> within_runs(np.array([True, False, True, True]), shortest=2).tolist()
    [False, False, True, True]
    """
    starts, lengths = runs_of(mask)
    keep = lengths >= shortest
    if longest is not None:
        keep &= lengths <= longest
    steps = np.zeros(mask.size + 1, dtype=np.int64)
    np.add.at(steps, starts[keep], 1)
    np.add.at(steps, starts[keep] + lengths[keep], -1)
    return np.asarray(np.cumsum(steps)[:-1] > 0)

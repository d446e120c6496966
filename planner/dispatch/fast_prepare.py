"""A year made ready for the sweeps: states, prices of stored heat, conjugates."""

import numpy as np

from planner.arrays import FloatArray, IntArray
from planner.dispatch.fast_curves import Curves, all_curves
from planner.dispatch.fast_shape import KW_PER_MW, Steps, minimum_steps, start_costs
from planner.dispatch.fast_stage import Year, free_conjugates, least_imports
from planner.dispatch.window import Window
from planner.errors import SolveError

#: Prices of stored heat on the grid of a day.
PRICES = 40

#: Cells of a day's histogram of bends.
CELLS = 96

#: Share of a day's prices that lie evenly; the rest follow the bends of its steps.
EVEN_SHARE = 0.45

#: Bends count with their width to this power, so that none is forgotten.
BEND_POWER = 0.4

#: Weight of the next day's bends in a day's grid.
NEXT_DAY = 0.7


def prepare(window: Window, steps: Steps) -> Year:
    """Make a year ready.

    Parameters
    ----------
    window : Window
        All steps.
    steps : Steps
        The same as programmes.

    Returns
    -------
    Year
        For the sweeps.

    Raises
    ------
    SolveError
        If a step's programme failed.
    """
    curves = all_curves(steps)
    if (curves.count < 0).any():
        step = int(np.argwhere(curves.count < 0)[0, 0])
        raise SolveError(f"the tiny programme of step {step} failed")
    step_h, store = window.step_h, window.store
    a_day = max(round(24.0 / step_h), 1)
    place = np.arange(window.steps)
    day = place // a_day
    kept = 1.0 - store.loss_frac_per_h * step_h if store else 1.0
    scale = np.asarray(kept ** (a_day - 1.0 - place % a_day), dtype=np.float64)
    last = day == day[-1]
    scale[last] = kept ** (window.steps - 1.0 - place[last])
    grid = _grid(curves, day, scale, kept**a_day) if store else np.zeros((day[-1] + 1, 1))
    free, largest = free_conjugates(steps, curves, grid, day, scale)
    following, starts, running = chain_of_states(*minimum_steps(window))
    return Year(
        steps=steps,
        curves=curves,
        free=free,
        largest=largest,
        least=least_imports(steps, curves),
        grid=grid,
        day=day,
        scale=scale,
        first_of_day=(place % a_day == 0).astype(np.int64),
        kept=kept,
        capacity=store.capacity_kWh / KW_PER_MW / step_h if store else 0.0,
        following=following,
        starts=starts,
        running=running,
        start_cost=start_costs(window),
    )


def chain_of_states(up: int, down: int) -> tuple[IntArray, IntArray, IntArray]:
    """States of one unit with minimum times.

    Parameters
    ----------
    up, down : int
        Least steps of a run and of a stop, at least one.

    Returns
    -------
    following, starts : arrays of int, shape (states, 2)
        States that may follow each, -1 for none, and whether that is a start.
    running : array of int, shape (states,)
        1 for the first `up` states: steps on so far, the last one free to stop; then steps off.
    """
    states = up + down
    following = np.full((states, 2), -1, dtype=np.int64)
    starts = np.zeros((states, 2), dtype=np.int64)
    following[:up, 0] = np.minimum(np.arange(up) + 1, up - 1)
    following[up:, 0] = up + np.minimum(np.arange(down) + 1, down - 1)
    following[up - 1, 1] = up
    following[states - 1, 1] = 0
    starts[states - 1, 1] = 1
    running = (np.arange(states) < up).astype(np.int64)
    return following, starts, running


def _grid(curves: Curves, day: IntArray, scale: FloatArray, kept_a_day: float) -> FloatArray:
    """Prices of stored heat for each day, dense where its steps' costs bend.

    Any grid gives a valid bound; this one follows the bends of the day and the next, and reaches
    the dearest heat of the days about, a day's loss added.
    """
    width = np.diff(curves.corners[:, :, :, 0], axis=2)
    rise = np.diff(curves.corners[:, :, :, 1], axis=2)
    real = np.arange(width.shape[2]) < curves.count[:, :, None] - 1
    slope = np.where(real, rise / np.where(real, width, 1.0), 0.0) / scale[:, None, None]
    days = int(day[-1]) + 1
    dearest = np.zeros(days)
    np.maximum.at(dearest, day, slope.max(axis=(1, 2)))
    dearest = np.maximum(dearest, np.concatenate([dearest[1:], dearest[:1]]))
    top = np.maximum(dearest, 1e-3 * dearest.max(initial=1.0)) / kept_a_day * 1.01
    cell = np.clip(slope / top[day][:, None, None] * CELLS, 0, CELLS - 1).astype(np.int64)
    bends = np.zeros((days, CELLS))
    where = np.broadcast_to(day[:, None, None], cell.shape)[real]
    np.add.at(bends, (where, cell[real]), width[real])
    weight = (bends + NEXT_DAY * np.roll(bends, -1, axis=0)) ** BEND_POWER
    weight /= np.maximum(weight.sum(axis=1, keepdims=True), 1e-12)
    share = (1.0 - EVEN_SHARE) * weight + EVEN_SHARE / CELLS
    reached = np.concatenate([np.zeros((days, 1)), np.cumsum(share, axis=1)], axis=1)
    edges, wanted = np.linspace(0.0, 1.0, CELLS + 1), np.linspace(0.0, 1.0, PRICES)
    grid = np.array([np.interp(wanted * row[-1], row, edges) for row in reached]) * top[:, None]
    grid[:, 0] = 0.0
    return grid

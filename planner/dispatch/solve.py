"""The cheapest year and its proof.

Separate supply is a linear programme and solved as one. With a unit, months solved apart give a
bound that holds for the year and a state to try; with that state fixed, the year is a linear
programme whose solution is the schedule. The gap is between those two.
"""

import time
from collections.abc import Iterable

import numpy as np
import pandas as pd

from planner.arrays import BoolArray, FloatArray
from planner.dispatch.commitment import mended, starts_of
from planner.dispatch.months import borders, solve_months
from planner.dispatch.program import Answer
from planner.dispatch.read_back import hourly_flows
from planner.dispatch.record import certify
from planner.dispatch.schedule import Schedule
from planner.dispatch.shortfall import refuse_unmet_demand
from planner.dispatch.window import Window, whole_year
from planner.dispatch.year_program import WindowProgram, build
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope

#: Rounds of improving the prices of stored heat at the months' borders.
MOST_ROUNDS = 3

#: Share of the asked gap that a single month may leave.
MONTH_SHARE = 0.5


def solve_year(
    envelope: OperatingEnvelope,
    prices: Prices,
    hourly: pd.DataFrame,
    *,
    gap_frac: float = 5e-4,
    time_limit_s: float = 120.0,
    certified: bool = True,
) -> Schedule:
    """Find the cheapest way to run a plant through the year.

    Parameters
    ----------
    envelope : OperatingEnvelope
        Machines, at most one unit.
    prices : Prices
        What the dispatch pays and earns.
    hourly : DataFrame, one row a step
        Demands, columns as `SiteYear.hourly`.
    gap_frac : float [-]
        Proven gap that is good enough.
    time_limit_s : float [s]
        After about this long the best schedule so far is taken, with its honest gap.
    certified : bool
        Have the model of record, written row by row, find the same cost with the same state.

    Returns
    -------
    Schedule
        Flows, cost, bound and marginal prices.

    Raises
    ------
    UnmetDemandError
        If a demand cannot be met: which hour, how much short.
    SolveError
        If no solver gives a usable answer.
    """
    started = time.perf_counter()
    refuse_unmet_demand(envelope, prices, hourly)
    year = whole_year(envelope, prices, hourly)
    built = build(year)
    if year.unit is None:
        answer = built.program.solve(gap_frac=0.0, time_limit_s=time_limit_s)
        on, bound, path = np.zeros(year.steps, dtype=bool), answer.bound, "one linear programme"
    else:
        deadline = started + time_limit_s
        answer, on, bound, path = _with_unit(year, built, gap_frac=gap_frac, deadline=deadline)
    if certified:
        certify(year, on, answer.objective)
    return Schedule(
        name=envelope.name,
        hourly=hourly_flows(year, built, answer, on, hourly.index),
        cost_per_year=answer.objective,
        lower_bound_per_year=min(bound, answer.objective),
        path=path,
        seconds=time.perf_counter() - started,
    )


def _with_unit(
    year: Window, built: WindowProgram, *, gap_frac: float, deadline: float
) -> tuple[Answer, BoolArray, float, str]:
    """Bound and schedule of a year with a unit, improved until the gap is good enough."""
    cuts = borders(year)
    values = np.full(len(cuts), _plain_heat_value(year))
    best: tuple[Answer, BoolArray] | None = None
    bound = -np.inf
    for number in range(1, MOST_ROUNDS + 1):
        months = solve_months(
            year,
            values,
            gap_frac=MONTH_SHARE * gap_frac,
            time_limit_s=max(deadline - time.perf_counter(), 5.0),
        )
        bound = max(bound, months.bound)
        on = mended(months.on, year)
        answer = _with_state(built, on)
        if best is None or answer.objective < best[0].objective:
            best = answer, on
        gap = (best[0].objective - bound) / abs(best[0].objective)
        late = time.perf_counter() > deadline
        if gap <= gap_frac or year.store is None or late:
            break
        values = _level_values(built, best[0], year)
    path = f"{len(cuts) - 1} months apart, then the year with their states; {number} rounds"
    return (*best, bound, path) if best else _nothing()


def _nothing() -> tuple[Answer, BoolArray, float, str]:
    """Unreachable by construction: a first round always leaves an answer or raises."""
    raise RuntimeError("the first round left no schedule")


def _with_state(built: WindowProgram, on: BoolArray) -> Answer:
    """The year as a linear programme, the unit's state fixed."""
    if built.columns.on is None or built.columns.start is None:
        raise RuntimeError("a year with a unit has columns for its state")
    columns = np.concatenate([built.columns.on, built.columns.start])
    state = np.concatenate([on, starts_of(on)]).astype(np.float64)
    return built.program.solve(gap_frac=0.0, time_limit_s=600.0, fixed=(columns, state))


def _plain_heat_value(year: Window) -> float:
    """What the cheapest boiler's hot water costs, as a first guess of what stored heat is worth."""
    slopes: Iterable[float] = (
        heater.fuel_per_heat_lhv for heater in year.heaters if heater.carrier == "hot_water"
    )
    return min(slopes, default=0.0) * float(year.fuel_per_lhv_kWh.mean()) * 0.5


def _level_values(built: WindowProgram, answer: Answer, year: Window) -> FloatArray:
    """Value of stored heat at each border, from the last schedule's level balance."""
    rows = built.rows.level
    if rows is None:
        return np.zeros(len(borders(year)))
    # A further kWh at a step's end relaxes the balance of the step after it.
    duals = answer.row_duals[rows]
    return np.asarray(duals[np.append(borders(year)[:-1], 0)], dtype=np.float64)

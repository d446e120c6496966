"""The cheapest year and its proof.

Separate supply is a linear programme and solved as one. With a unit, months solved apart give a
bound that holds for the year and a state to try; with that state fixed, the year is a linear
programme whose solution is the schedule. The gap is between those two.
"""

import time
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
import pandas as pd

from planner.arrays import BoolArray, FloatArray
from planner.dispatch.commitment import mended
from planner.dispatch.fast_shape import why_unknown
from planner.dispatch.fast_year import solve_window
from planner.dispatch.fixed_state import FixedYear, solve_fixed
from planner.dispatch.months import borders, solve_months
from planner.dispatch.read_back import hourly_flows
from planner.dispatch.record import certify
from planner.dispatch.schedule import Schedule
from planner.dispatch.shortfall import locate_shortfall, refuse_unmet_demand
from planner.dispatch.solver import InfeasibleError
from planner.dispatch.window import Window, whole_year
from planner.dispatch.year_program import build
from planner.errors import SolveError
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope

#: Rounds of improving the prices of stored heat at the months' borders.
MOST_ROUNDS = 3

#: Share of the asked gap that a single month may leave.
MONTH_SHARE = 0.6

#: Share of the time left that one round may take, so that a better one can follow.
ROUND_SHARE = 0.6

#: The fast engine's gap is poor where it is this many times the asked one: months are tried too.
POOR_RATIO = 10.0

#: A bound may lie above a cost by this share: the solver's own tolerance.
ROUNDING_FRAC = 1e-6

#: What the faster way did, in the words of the report.
QUICK_PATH = (
    "a dynamic programme over unit states and prices of stored heat for bound and state, then the "
    "year as a linear programme with that state"
)

Told = Callable[[str, float], None]


def _silent(_what: str, _done_frac: float) -> None:
    """Tell nobody."""


@dataclass(frozen=True)
class _Found:
    """The best year so far, and its proof."""

    year: FixedYear
    bound: float
    path: str


def solve_year(
    envelope: OperatingEnvelope,
    prices: Prices,
    hourly: pd.DataFrame,
    *,
    time_limit_s: float = 120.0,
    gap_frac: float = 5e-4,
    duals: bool = True,
    processes: int = 1,
    progress: Told | None = None,
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
    time_limit_s : float [s]
        After about this long the best schedule so far is taken, with its honest gap.
    gap_frac : float [-]
        Proven gap that is good enough.
    duals : bool
        Have the model of record, written row by row, certify cost and marginal prices. Without
        it the same numbers stand in the schedule, from one statement of the problem only.
    processes : int
        Months solved at once; the answer is the same unless the time limit cuts in.
    progress : callable, optional
        Told what is being done and the share that is finished.

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
    told = progress or _silent
    refuse_unmet_demand(envelope, prices, hourly)
    year = whole_year(envelope, prices, hourly)
    search = _Search(
        year,
        gap_frac=gap_frac,
        deadline=started + time_limit_s,
        processes=processes,
        told=told,
    )
    try:
        found = search.separate() if year.unit is None else search.with_unit()
    except InfeasibleError:
        locate_shortfall(year, hourly.index)
        raise
    if found.bound > found.year.cost + ROUNDING_FRAC * abs(found.year.cost):
        raise SolveError(
            f"{envelope.name}: the bound {found.bound:.2f} lies above the cost "
            f"{found.year.cost:.2f}"
        )
    if duals:
        told("certifying the year by the model of record", 0.85)
        certify(found.year)
    told("dispatched", 1.0)
    return Schedule(
        name=envelope.name,
        hourly=hourly_flows(found.year, hourly.index),
        cost_per_year=found.year.cost,
        lower_bound_per_year=min(found.bound, found.year.cost),
        path=found.path,
        seconds=time.perf_counter() - started,
    )


class _Search:
    """One year being solved."""

    def __init__(
        self, year: Window, *, gap_frac: float, deadline: float, processes: int, told: Told
    ) -> None:
        self._year = year
        self._gap_frac = gap_frac
        self._deadline = deadline
        self._processes = processes
        self._told = told

    def separate(self) -> _Found:
        """A year without a unit."""
        year = solve_fixed(self._year, np.zeros(self._year.steps, dtype=bool))
        return _Found(year, year.cost, "one linear programme, for nothing is switched on or off")

    def with_unit(self) -> _Found:
        """Bound and schedule of a year with a unit, by the way that suits its shape."""
        unknown = why_unknown(self._year)
        if unknown is not None:
            return self._by_months(f"the faster way does not know {unknown}")
        try:
            found = self._by_prices()
        except SolveError as error:  # whatever it died of, months are tried
            return self._by_months(f"the faster way failed: {error}")
        poor = found.year.cost - found.bound > POOR_RATIO * self._gap_frac * abs(found.year.cost)
        if poor and time.perf_counter() < self._deadline:
            return _better(found, self._by_months("the faster way left a wide gap"))
        return found

    def _by_prices(self) -> _Found:
        """Bound and state from a dynamic programme over prices of stored heat."""
        self._told("the year by prices of stored heat", 0.1)
        quick = solve_window(self._year, self._gap_frac)
        self._told("the year with its state", 0.6)
        return _Found(self._tried(quick.on, quick.levels_kWh), quick.bound, QUICK_PATH)

    def _by_months(self, reason: str) -> _Found:
        """Bound and schedule from months solved apart, improved until the gap is good enough."""
        best: FixedYear | None = None
        bound, rounds = -np.inf, 0
        values = self._first_level_values()
        while True:
            rounds += 1
            months = solve_months(
                self._year,
                values,
                gap_frac=MONTH_SHARE * self._gap_frac,
                time_limit_s=ROUND_SHARE * max(self._deadline - time.perf_counter(), 5.0),
                processes=self._processes,
                progress=lambda done: self._told("months of the year", 0.1 + 0.5 * done),
            )
            bound = max(bound, months.bound)
            self._told("the year with its months' states", 0.6)
            tried = self._tried(months.on)
            best = tried if best is None or tried.cost < best.cost else best
            if self._good_enough(best.cost, bound) or rounds == MOST_ROUNDS:
                break
            values = best.level_values(borders(self._year))
        ended = "to the asked gap" if months.in_time else "until their time was over"
        path = (
            f"{len(borders(self._year)) - 1} months apart for bound and state, solved {ended}, "
            f"then the year as a linear programme with that state; {rounds} round(s); {reason}"
        )
        return _Found(best, bound, path)

    def _good_enough(self, cost: float, bound: float) -> bool:
        """Whether another round would be idle, or too late."""
        met = cost - bound <= self._gap_frac * abs(cost)
        late = time.perf_counter() > self._deadline
        return met or late or self._year.store is None

    def _first_level_values(self) -> FloatArray:
        """Prices of stored heat at the months' borders, from the relaxed year."""
        cuts = borders(self._year)
        if self._year.store is None:
            return np.zeros(len(cuts))
        self._told("the year without on/off decisions", 0.02)
        built = build(self._year)
        answer = built.program.solve_relaxed()
        return built.level_values(answer, cuts)

    def _tried(self, on: BoolArray, levels_kWh: FloatArray | None = None) -> FixedYear:
        """The year with a state, or where that cannot serve the site, with the unit always on.

        With the store's levels at the months' borders given, the months are solved apart.
        """
        unit = self._year.unit
        always = on if unit is None else unit.available
        states = [on] * (2 if levels_kWh is not None else 1) + [always, np.zeros_like(on)]
        for state in states[:-1]:
            try:
                return solve_fixed(self._year, mended(state, self._year), levels_kWh)
            except InfeasibleError:
                levels_kWh = None
        return solve_fixed(self._year, states[-1])


def _better(one: _Found, other: _Found) -> _Found:
    """The cheaper year of two ways, with the higher of their bounds."""
    cheaper = one if one.year.cost <= other.year.cost else other
    path = f"{one.path}; then {other.path}; the better of both"
    return _Found(cheaper.year, max(one.bound, other.bound), path)

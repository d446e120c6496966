"""The model of record: the dispatch written row by row in PuLP, as the manual states it.

It is read by people and it certifies schedules: with the unit's state fixed it must find the same
cost as the arrays of `year_program`. The symbols are in `docs/dispatch_model.md`. One code serves
both lines of PuLP, 3.3 and 4; what HiGHS itself says is read, not PuLP's word for it.
"""

import gc
from collections.abc import Callable, Iterable, Iterator
from contextlib import contextmanager
from typing import Any

import highspy
import numpy as np
import pulp

from planner.arrays import BoolArray
from planner.dispatch.commitment import starts_of
from planner.dispatch.fixed_state import FixedYear
from planner.dispatch.segment_order import SegmentOrder
from planner.dispatch.window import Window
from planner.dispatch.year_program import BYPASS, GRADES
from planner.errors import SolveError
from planner.plant.envelope import UnitEnvelope

#: The two statements of the problem must agree on the year's cost to this share.
AGREEMENT_FRAC = 1e-6


def certify(year: FixedYear) -> None:
    """Hold a year's cost against the model of record.

    Parameters
    ----------
    year : FixedYear
        Solved with its state fixed.

    Raises
    ------
    SolveError
        If the model of record does not find the same cost.
    """
    recorded = DispatchModel(year.window, on=year.on, order=year.order).solve()
    if not abs(recorded - year.cost) <= AGREEMENT_FRAC * abs(year.cost):
        raise SolveError(
            f"the model of record finds {recorded:.2f} where the schedule has {year.cost:.2f}"
        )


class DispatchModel:
    """The dispatch of a window as a PuLP problem; one method a family of constraints.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    on : array of bool, shape (steps,), optional
        The unit's state, to be fixed; left out, the model decides.
    order : SegmentOrder, optional
        Segments that must be full, or empty.
    """

    def __init__(
        self, window: Window, *, on: BoolArray | None = None, order: SegmentOrder | None = None
    ) -> None:
        self.window = window
        self.hours = range(window.steps)
        self.problem = pulp.LpProblem("dispatch", pulp.LpMinimize)
        self.cost: list[Any] = []
        self.path_on: dict[str, list[Any]] = {}
        self.path_segments: dict[str, list[list[Any]]] = {}
        self.used: dict[str, list[Any]] = {}
        with _without_collector():
            self._grid()
            if window.unit is not None:
                self._state(window.unit, on)
                self._minimum_times(window.unit)
                self._paths(window.unit)
                self._recovered_heat()
                self._segment_order(window.unit, order)
            self._heaters()
            self._chillers()
            self._store()
            self._heat_balances()
            self._power_balance()
            self._demand_charges()
            self.problem.setObjective(pulp.lpSum(self.cost))

    def solve(self, *, gap_frac: float = 0.0) -> float:
        """Solve with HiGHS.

        Parameters
        ----------
        gap_frac : float [-]
            Relative gap that is good enough.

        Returns
        -------
        float [currency]
            Cost of the window, fixed costs included.

        Raises
        ------
        SolveError
            If HiGHS does not end with an optimal solution.
        """
        with _without_collector():
            self.problem.solve(pulp.HiGHS(msg=False, threads=1, gapRel=gap_frac))
        highs: highspy.Highs = self.problem.solverModel
        status = highs.getModelStatus()
        if status != highspy.HighsModelStatus.kOptimal:
            said = highs.modelStatusToString(status)
            raise SolveError(f"the model of record ended with «{said}»")
        return float(highs.getInfo().objective_function_value) + self.window.fixed_cost

    def _variables(
        self,
        name: str,
        high: Callable[[int], float | None],
        *,
        low: Callable[[int], float] = lambda _: 0.0,
        binary: bool = False,
    ) -> list[Any]:
        """One variable a step."""
        category = pulp.LpInteger if binary else pulp.LpContinuous
        return [
            self.problem.add_variable(f"{name}_{h}", low(h), high(h), category) for h in self.hours
        ]

    def _require(self, name: str, rows: Iterable[Any]) -> None:
        """Add named constraints, one a step."""
        for h, row in enumerate(rows):
            self.problem.addConstraint(row, f"{name}_{h}")

    def _grid(self) -> None:
        """Import and export within the connection's limits."""
        window, prices, step_h = self.window, self.window.prices, self.window.step_h
        self.grid_import = self._variables("import", _always(prices.import_limit_kW))
        self.grid_export = self._variables("export", _always(prices.export_limit_kW))
        for h in self.hours:
            self.cost.append(float(window.import_per_kWh[h] * step_h) * self.grid_import[h])
            self.cost.append(float(-window.export_per_kWh[h] * step_h) * self.grid_export[h])

    def _state(self, unit: UnitEnvelope, fixed: BoolArray | None) -> None:
        """On, and starts, with the fuel and wear of running at minimum power."""
        step_h, fuel = self.window.step_h, self.window.fuel_per_lhv_kWh
        if fixed is None:
            self.on = self._variables("on", lambda h: float(unit.available[h]), binary=True)
            self.start = self._variables("start", _always(1.0))
        else:
            running, starting = fixed.astype(np.float64), starts_of(fixed).astype(np.float64)
            self.on = self._variables("on", running.__getitem__, low=running.__getitem__)
            self.start = self._variables("start", starting.__getitem__, low=starting.__getitem__)
        per_run_hour = (
            unit.fuel_at_minimum_lhv_kW * fuel
            + unit.cost_per_kWh * unit.minimum_power_kW
            + unit.cost_per_run_hour
        )
        for h in self.hours:
            per_start = unit.cost_per_start + unit.start_fuel_lhv_kWh * fuel[h]
            self.cost.append(float(per_run_hour[h] * step_h) * self.on[h])
            self.cost.append(float(per_start) * self.start[h])
        first, *later = self.hours
        # The state before the window is not known, so its first step is never a start.
        self._require("no_start_before_the_year", [self.start[first] <= 0])
        self._require(
            "start_where_state_rises",
            (self.start[h] >= self.on[h] - self.on[h - 1] for h in later),
        )

    def _minimum_times(self, unit: UnitEnvelope) -> None:
        """Once on, once off, for at least so long."""
        up = round(unit.minimum_up_h / self.window.step_h)
        down = round(unit.minimum_down_h / self.window.step_h)
        if up > 0:
            self._require(
                "minimum_up",
                (
                    pulp.lpSum(self.start[max(0, h - up + 1) : h + 1]) <= self.on[h]
                    for h in self.hours
                ),
            )
        if down > 1:
            self._require(
                "minimum_down",
                (
                    pulp.lpSum(self.start[h + 1 : h + down + 1]) <= 1 - self.on[h]
                    for h in self.hours[:-1]
                ),
            )

    def _paths(self, unit: UnitEnvelope) -> None:
        """A copy of state and segments for each exhaust path; together they are the unit."""
        paths = (*self.window.paths, BYPASS)
        for path in paths:
            alone = len(paths) == 1
            self.path_on[path.name] = (
                self.on if alone else self._variables(f"on path {path.name}", _always(1.0))
            )
            self.path_segments[path.name] = [
                self._segment(unit, path.name, k) for k in range(unit.segment_power_kW.shape[1])
            ]
        if self.window.paths:
            self._require(
                "paths_share_state",
                (
                    self.on[h] == pulp.lpSum(on[h] for on in self.path_on.values())
                    for h in self.hours
                ),
            )

    def _segment(self, unit: UnitEnvelope, path: str, k: int) -> list[Any]:
        """Power of one segment with its exhaust on one path, within the path's state."""
        window = self.window
        segment = self._variables(f"segment {k} path {path}", _always(None))
        further = unit.fuel_slope_lhv[:, k] * window.fuel_per_lhv_kWh + unit.cost_per_kWh
        self.cost += [float(further[h] * window.step_h) * segment[h] for h in self.hours]
        width_kW = unit.segment_power_kW[:, k]
        self._require(
            f"segment {k} on path {path}",
            (segment[h] <= float(width_kW[h]) * self.path_on[path][h] for h in self.hours),
        )
        return segment

    def _recovered_heat(self) -> None:
        """Heat used is no more than the paths yield; the rest is dumped."""
        for grade in self.window.recovered_grades:
            used = self._variables(f"used_{grade}", _always(None))
            self.used[grade] = used
            self._require(
                f"used_{grade}_is_yielded",
                (used[h] <= self._yield_kW(grade, h) for h in self.hours),
            )

    def _yield_kW(self, grade: str, h: int) -> Any:
        """Heat of one grade that the chosen paths yield in a step."""
        terms = []
        for path in self.window.paths:
            if grade in path.yield_at_minimum_kW:
                at_minimum_kW = float(path.yield_at_minimum_kW[grade][h])
                terms.append(at_minimum_kW * self.path_on[path.name][h])
                slope = path.yield_slope[grade][h]
                segments = self.path_segments[path.name]
                terms += [float(slope[k]) * segment[h] for k, segment in enumerate(segments)]
        return pulp.lpSum(terms)

    def _segment_order(self, unit: UnitEnvelope, order: SegmentOrder | None) -> None:
        """Where a later segment would be filled first: the earlier is full, or the later empty."""
        if order is None:
            return
        for h, k in np.argwhere(order.full):
            filled = pulp.lpSum(copy[k][h] for copy in self.path_segments.values())
            width_kW = float(unit.segment_power_kW[h, k])
            self.problem.addConstraint(filled >= width_kW * self.on[h], f"full_segment_{k}_{h}")
        for h, k in np.argwhere(order.empty):
            filled = pulp.lpSum(copy[k][h] for copy in self.path_segments.values())
            self.problem.addConstraint(filled <= 0, f"empty_segment_{k}_{h}")

    def _unit_power_kW(self, h: int) -> list[Any]:
        """Terms of the unit's net power in a step."""
        if self.window.unit is None:
            return []
        at_minimum = float(self.window.unit.minimum_power_kW[h]) * self.on[h]
        return [at_minimum, *(part[h] for copy in self.path_segments.values() for part in copy)]

    def _heaters(self) -> None:
        """Boilers and burners, their further fuel."""
        window = self.window
        self.heaters: list[tuple[str, list[Any]]] = []
        for number, heater in enumerate(window.heaters):
            heat = self._variables(f"heater_{number}", _always(heater.maximum_heat_kW))
            self.heaters.append((heater.carrier, heat))
            for h in self.hours:
                fuel = heater.fuel_per_heat_lhv * window.fuel_per_lhv_kWh[h] * window.step_h
                self.cost.append(float(fuel) * heat[h])

    def _chillers(self) -> None:
        """Chillers meet the cooling."""
        self.cooling: list[list[Any]] = []
        for number, chiller in enumerate(self.window.chillers):
            high = _always(chiller.maximum_cooling_kW)
            self.cooling.append(self._variables(f"chiller_{number}", high))
        if self.cooling:
            demand_kW = self.window.demand_kW["cooling"]
            self._require(
                "cooling_balance",
                (pulp.lpSum(c[h] for c in self.cooling) == float(demand_kW[h]) for h in self.hours),
            )

    def _drive_kW(self, drive: str, h: int) -> list[Any]:
        """Terms of what chillers take of a carrier in a step."""
        return [
            cooling[h] * (1.0 / chiller.cop)
            for chiller, cooling in zip(self.window.chillers, self.cooling, strict=True)
            if chiller.drive == drive
        ]

    def _store(self) -> None:
        """The level follows charge, discharge and loss, and ends where it began."""
        store = self.window.store
        if store is None:
            return
        self.charge = self._variables("charge", _always(store.maximum_charge_kW))
        self.discharge = self._variables("discharge", _always(store.maximum_discharge_kW))
        self.level = self._variables("level", _always(store.capacity_kWh))
        step_h = self.window.step_h
        kept = 1.0 - store.loss_frac_per_h * step_h
        self._require(
            "store_balance",
            (
                self.level[h]
                == kept * self.level[h - 1] + step_h * self.charge[h] - step_h * self.discharge[h]
                for h in self.hours
            ),
        )

    def _heat_balances(self) -> None:
        """Exhaust, heaters and store meet each grade's demand and the chillers that it drives."""
        for grade in GRADES:
            supplies = [heat for carrier, heat in self.heaters if carrier == grade]
            if grade in self.used:
                supplies.append(self.used[grade])
            stored = grade == "hot_water" and self.window.store is not None
            if stored:
                supplies.append(self.discharge)
            if not supplies:
                continue
            demand_kW = self.window.demand_kW[grade]
            self._require(
                f"{grade}_balance",
                (
                    pulp.lpSum(supply[h] for supply in supplies)
                    == float(demand_kW[h])
                    + pulp.lpSum(self._drive_kW(grade, h))
                    + (self.charge[h] if stored else 0)
                    for h in self.hours
                ),
            )

    def _power_balance(self) -> None:
        """Unit and import meet the site's power, its chillers' power and export."""
        demand_kW = self.window.demand_kW["power"]
        self._require(
            "power_balance",
            (
                pulp.lpSum([self.grid_import[h], *self._unit_power_kW(h)])
                == float(demand_kW[h])
                + pulp.lpSum([self.grid_export[h], *self._drive_kW("power", h)])
                for h in self.hours
            ),
        )

    def _demand_charges(self) -> None:
        """Each charge's peak is no lower than any import that it counts."""
        for number, charge in enumerate(self.window.prices.demand_charges):
            counted = self.window.cut(charge.counted)
            period = self.window.cut(charge.period)
            for month in np.unique(period[counted]):
                peak = self.problem.add_variable(f"peak_{number}_{month}", 0)
                self.cost.append(float(charge.rate_per_kW[month]) * peak)
                for h in np.flatnonzero(counted & (period == month)):
                    name = f"peak_{number}_{month}_counts_{h}"
                    self.problem.addConstraint(peak >= self.grid_import[h], name)


def _always(value: float | None) -> Callable[[int], float | None]:
    """The same bound in every step."""
    return lambda _: value


@contextmanager
def _without_collector() -> Iterator[None]:
    """Millions of small objects that all live on: looking for garbage takes half the time."""
    enabled = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if enabled:
            gc.enable()

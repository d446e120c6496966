"""The model of record: the dispatch written row by row in PuLP, as the manual states it.

It is read by people and it certifies schedules: with the unit's state fixed it must find the same
cost as the arrays of `year_program`. The symbols are in `docs/dispatch_model.md`.
"""

from collections.abc import Callable, Iterable
from typing import Any

import numpy as np
import pulp

from planner.arrays import BoolArray
from planner.dispatch.commitment import starts_of
from planner.dispatch.window import Window
from planner.errors import SolveError

#: The two statements of the problem must agree on the year's cost to this share.
AGREEMENT_FRAC = 1e-6


def certify(window: Window, on: BoolArray, cost: float) -> None:
    """Hold a cost against the model of record.

    Parameters
    ----------
    window : Window
        Any steps; cyclic in the store.
    on : array of bool, shape (steps,)
        State of the unit, fixed.
    cost : float [currency]
        What the arrays found.

    Raises
    ------
    SolveError
        If the model of record does not find the same cost.
    """
    model = DispatchModel(window)
    model.fix_state(on)
    recorded = model.solve()
    if not abs(recorded - cost) <= AGREEMENT_FRAC * abs(cost):
        raise SolveError(
            f"the model of record finds {recorded:.2f} where the schedule has {cost:.2f}"
        )


class DispatchModel:
    """The dispatch of a window as a PuLP problem; one method a family of constraints.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    """

    def __init__(self, window: Window) -> None:
        self.window = window
        self.hours = range(window.steps)
        self.problem = pulp.LpProblem("dispatch", pulp.LpMinimize)
        self.cost: list[Any] = []
        self._grid()
        self._unit()
        self._paths()
        self._heaters()
        self._chillers()
        self._store()
        self._heat_balances()
        self._power_balance()
        self._demand_charges()
        self.problem.setObjective(pulp.lpSum(self.cost))

    def fix_state(self, on: BoolArray) -> None:
        """Fix the unit's state, so that the rest is a linear programme.

        Parameters
        ----------
        on : array of bool, shape (steps,)
            State of each step.
        """
        if self.window.unit is None:
            return
        for h, (running, starting) in enumerate(zip(on, starts_of(on), strict=True)):
            for variable, value in ((self.on[h], running), (self.start[h], starting)):
                variable.lowBound = variable.upBound = float(value)

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
        solver = pulp.HiGHS(msg=False, threads=1, gapRel=gap_frac)
        self.problem.solve(solver)
        if self.problem.sol_status != pulp.LpSolutionOptimal:
            raise SolveError(f"the model of record ended «{pulp.LpStatus[self.problem.status]}»")
        return float(pulp.value(self.problem.objective)) + self.window.fixed_cost

    def _variables(
        self, name: str, high: Callable[[int], float | None], *, binary: bool = False
    ) -> list[Any]:
        """One variable a step, not below zero."""
        category = pulp.LpBinary if binary else pulp.LpContinuous
        return [self.problem.add_variable(f"{name}_{h}", 0, high(h), category) for h in self.hours]

    def _require(self, name: str, rows: Iterable[Any]) -> None:
        """Add named constraints, one a step."""
        for h, row in enumerate(rows):
            self.problem.addConstraint(row, f"{name}_{h}")

    def _grid(self) -> None:
        """Import and export within the connection's limits."""
        window, prices, step_h = self.window, self.window.prices, self.window.step_h
        self.grid_import = self._variables("import", lambda _: prices.import_limit_kW)
        self.grid_export = self._variables("export", lambda _: prices.export_limit_kW)
        for h in self.hours:
            self.cost.append(window.import_per_kWh[h] * step_h * self.grid_import[h])
            self.cost.append(-window.export_per_kWh[h] * step_h * self.grid_export[h])

    def _unit(self) -> None:
        """State, starts, minimum times, and power in segments above the minimum."""
        unit, window = self.window.unit, self.window
        if unit is None:
            return
        step_h, fuel = window.step_h, window.fuel_per_lhv_kWh
        self.on = self._variables("on", lambda h: float(unit.available[h]), binary=True)
        self.start = self._variables("start", lambda _: 1.0)
        self.segments = [
            self._variables(f"segment_{k}", lambda _: None)
            for k in range(unit.segment_power_kW.shape[1])
        ]
        for h in self.hours:
            fuel_lhv_kW = unit.fuel_at_minimum_lhv_kW[h] * self.on[h] + pulp.lpSum(
                unit.fuel_slope_lhv[h, k] * segment[h] for k, segment in enumerate(self.segments)
            )
            self.cost.append(fuel[h] * step_h * fuel_lhv_kW)
            self.cost.append(unit.cost_per_kWh * step_h * self._unit_power_kW(h))
            self.cost.append(unit.cost_per_run_hour * step_h * self.on[h])
            per_start = unit.cost_per_start + unit.start_fuel_lhv_kWh * fuel[h]
            self.cost.append(per_start * self.start[h])
        for k, segment in enumerate(self.segments):
            rows = (segment[h] <= unit.segment_power_kW[h, k] * self.on[h] for h in self.hours)
            self._require(f"segment_{k}_only_while_on", rows)
        first, *later = self.hours
        self._require("no_start_before_the_year", [self.start[first] <= 0])
        self._require(
            "start_where_state_rises",
            (self.start[h] >= self.on[h] - self.on[h - 1] for h in later),
        )
        self._minimum_times(round(unit.minimum_up_h / step_h), round(unit.minimum_down_h / step_h))

    def _minimum_times(self, up: int, down: int) -> None:
        """Once on, once off, for at least so long."""
        if 0 < up < len(self.hours):
            self._require(
                "minimum_up",
                (
                    pulp.lpSum(self.start[max(0, h - up + 1) : h + 1]) <= self.on[h]
                    for h in self.hours
                ),
            )
        if 0 < down < len(self.hours):
            self._require(
                "minimum_down",
                (
                    pulp.lpSum(self.start[h - down + 1 : h + 1]) <= 1 - self.on[h - down]
                    for h in self.hours[down:]
                ),
            )

    def _unit_power_kW(self, h: int) -> Any:
        """Net power of a step."""
        if self.window.unit is None:
            return 0
        minimum_kW = self.window.unit.minimum_power_kW[h] * self.on[h]
        return minimum_kW + pulp.lpSum(segment[h] for segment in self.segments)

    def _paths(self) -> None:
        """Paths share the exhaust; what they leave is bypassed; heat used is no more than yielded."""
        unit, paths = self.window.unit, self.window.paths
        self.used: dict[str, list[Any]] = {}
        if unit is None:
            return
        self.path_on = {p.name: self._variables(f"on path {p.name}", lambda _: 1.0) for p in paths}
        self.path_segments = {
            p.name: [
                self._variables(f"segment_{k} path {p.name}", lambda _: None)
                for k in range(len(self.segments))
            ]
            for p in paths
        }
        if not paths:
            return
        self._require(
            "paths_share_state",
            (pulp.lpSum(on[h] for on in self.path_on.values()) <= self.on[h] for h in self.hours),
        )
        for k, segment in enumerate(self.segments):
            self._paths_share_segment(k, segment)
        for grade in self.window.recovered_grades:
            self.used[grade] = self._variables(f"used_{grade}", lambda _: None)
            rows = (self.used[grade][h] <= self._yield_kW(grade, h) for h in self.hours)
            self._require(f"used_{grade}_is_yielded", rows)

    def _paths_share_segment(self, k: int, segment: list[Any]) -> None:
        """Parts of a segment's power, none wider than its path's share allows, bypass included."""
        parts = {name: segments[k] for name, segments in self.path_segments.items()}
        if self.window.unit is None:
            return
        width_kW = self.window.unit.segment_power_kW[:, k]
        for name, part in parts.items():
            rows = (part[h] <= width_kW[h] * self.path_on[name][h] for h in self.hours)
            self._require(f"segment_{k}_on_path_{name}", rows)
        left = [segment[h] - pulp.lpSum(part[h] for part in parts.values()) for h in self.hours]
        self._require(f"paths_share_segment_{k}", (left[h] >= 0 for h in self.hours))
        self._require(
            f"bypass_of_segment_{k}",
            (
                left[h]
                <= width_kW[h] * (self.on[h] - pulp.lpSum(on[h] for on in self.path_on.values()))
                for h in self.hours
            ),
        )

    def _yield_kW(self, grade: str, h: int) -> Any:
        """Heat of one grade that the chosen paths yield in a step."""
        return pulp.lpSum(
            path.yield_at_minimum_kW[grade][h] * self.path_on[path.name][h]
            + pulp.lpSum(
                path.yield_slope[grade][h, k] * segment[h]
                for k, segment in enumerate(self.path_segments[path.name])
            )
            for path in self.window.paths
            if grade in path.yield_at_minimum_kW
        )

    def _heaters(self) -> None:
        """Boilers and burners, their further fuel."""
        window = self.window
        self.heaters: list[tuple[str, list[Any]]] = []
        for number, heater in enumerate(window.heaters):
            high = heater.maximum_heat_kW
            heat = self._variables(f"heater_{number}", lambda _, high=high: high)
            self.heaters.append((heater.carrier, heat))
            for h in self.hours:
                fuel = heater.fuel_per_heat_lhv * window.fuel_per_lhv_kWh[h] * window.step_h
                self.cost.append(fuel * heat[h])

    def _chillers(self) -> None:
        """Chillers meet the cooling."""
        self.cooling: list[list[Any]] = []
        for number, chiller in enumerate(self.window.chillers):
            high = chiller.maximum_cooling_kW
            self.cooling.append(self._variables(f"chiller_{number}", lambda _, high=high: high))
        if self.cooling:
            demand_kW = self.window.demand_kW["cooling"]
            self._require(
                "cooling_balance",
                (pulp.lpSum(c[h] for c in self.cooling) == demand_kW[h] for h in self.hours),
            )

    def _drive_kW(self, drive: str, h: int) -> Any:
        """What chillers take of a carrier in a step."""
        return pulp.lpSum(
            cooling[h] * (1.0 / chiller.cop)
            for chiller, cooling in zip(self.window.chillers, self.cooling, strict=True)
            if chiller.drive == drive
        )

    def _store(self) -> None:
        """The level follows charge, discharge and loss, and ends where it began."""
        store = self.window.store
        if store is None:
            return
        self.charge = self._variables("charge", lambda _: store.maximum_charge_kW)
        self.discharge = self._variables("discharge", lambda _: store.maximum_discharge_kW)
        self.level = self._variables("level", lambda _: store.capacity_kWh)
        step_h = self.window.step_h
        kept = 1.0 - store.loss_frac_per_h * step_h
        self._require(
            "store_balance",
            (
                self.level[h]
                == kept * self.level[h - 1] + step_h * (self.charge[h] - self.discharge[h])
                for h in self.hours
            ),
        )

    def _heat_balances(self) -> None:
        """Exhaust, heaters and store meet each grade's demand and the chillers that it drives."""
        for grade in ("steam", "hot_water", "hot_gas"):
            supplies = [heat for carrier, heat in self.heaters if carrier == grade]
            if grade in self.used:
                supplies.append(self.used[grade])
            if not supplies:
                continue
            demand_kW = self.window.demand_kW[grade]
            stored = grade == "hot_water" and self.window.store is not None
            self._require(
                f"{grade}_balance",
                (
                    pulp.lpSum(supply[h] for supply in supplies)
                    + (self.discharge[h] - self.charge[h] if stored else 0)
                    == demand_kW[h] + self._drive_kW(grade, h)
                    for h in self.hours
                ),
            )

    def _power_balance(self) -> None:
        """Unit and import meet the site's power, its chillers' power and export."""
        demand_kW = self.window.demand_kW["power"]
        self._require(
            "power_balance",
            (
                self._unit_power_kW(h) + self.grid_import[h]
                == demand_kW[h] + self._drive_kW("power", h) + self.grid_export[h]
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

"""The unit's part of the model of record: state, minimum times, exhaust paths and their order."""

from typing import Any

import numpy as np
import pulp

from planner.arrays import BoolArray
from planner.dispatch.commitment import starts_of
from planner.dispatch.record_rows import RecordRows, always
from planner.dispatch.segment_order import SegmentOrder
from planner.dispatch.window import Window
from planner.dispatch.year_program import BYPASS
from planner.plant.envelope import UnitEnvelope


class RecordedUnit(RecordRows):
    """Families of constraints of the unit.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    """

    def __init__(self, window: Window) -> None:
        super().__init__(window)
        self.path_on: dict[str, list[Any]] = {}
        self.path_segments: dict[str, list[list[Any]]] = {}
        self.used: dict[str, list[Any]] = {}

    def _unit(
        self, unit: UnitEnvelope, fixed: BoolArray | None, order: SegmentOrder | None
    ) -> None:
        """All of them; the state fixed where one is given."""
        self._state(unit, fixed)
        self._minimum_times(unit)
        self._paths(unit)
        self._recovered_heat()
        self._segment_order(unit, order)

    def _state(self, unit: UnitEnvelope, fixed: BoolArray | None) -> None:
        """On, and starts, with the fuel and wear of running at minimum power."""
        step_h, fuel = self.window.step_h, self.window.fuel_per_lhv_kWh
        if fixed is None:
            self.on = self._variables("on", lambda h: float(unit.available[h]), binary=True)
            self.start = self._variables("start", always(1.0))
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
                self.on if alone else self._variables(f"on path {path.name}", always(1.0))
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
        segment = self._variables(f"segment {k} path {path}", always(None))
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
            used = self._variables(f"used_{grade}", always(None))
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

"""The model of record: the dispatch written row by row in PuLP, as the manual states it.

It is read by people and it certifies schedules: with the unit's state fixed it must find the same
cost as the arrays of `year_program`. The symbols are in `docs/dispatch_model.md`. One code serves
both lines of PuLP, 3.3 and 4; what HiGHS itself says is read, not PuLP's word for it.
"""

import gc
from collections.abc import Iterator
from contextlib import contextmanager
from itertools import pairwise
from typing import Any

import highspy
import numpy as np
import pulp

from planner.arrays import BoolArray
from planner.dispatch.commitment import starts_of
from planner.dispatch.fixed_state import FixedYear
from planner.dispatch.months import borders, months_are_apart
from planner.dispatch.record_rows import always
from planner.dispatch.record_unit import RecordedUnit
from planner.dispatch.segment_order import SegmentOrder
from planner.dispatch.window import Window, part_of
from planner.dispatch.year_program import GRADES
from planner.errors import SolveError

#: The two statements of the problem must agree on the year's cost to this share.
AGREEMENT_FRAC = 1e-6


def certify(year: FixedYear) -> None:
    """Hold a year's cost against the model of record, billing month by billing month.

    The months are handed the store's level at their borders, so that they add up to the year; a
    whole year in PuLP at once takes a gigabyte.

    Parameters
    ----------
    year : FixedYear
        Solved with its state fixed.

    Raises
    ------
    SolveError
        If the model of record does not find the same cost.
    """
    recorded = sum(_recorded_pieces(year))
    if not abs(recorded - year.cost) <= AGREEMENT_FRAC * abs(year.cost):
        raise SolveError(
            f"the model of record finds {recorded:.2f} where the schedule has {year.cost:.2f}"
        )


def _recorded_pieces(year: FixedYear) -> Iterator[float]:
    """Cost of each piece of the year by the model of record, starts at its border included."""
    window, unit, starts = year.window, year.window.unit, starts_of(year.on)
    levels = year.levels_kWh
    cuts = borders(window).tolist() if months_are_apart(window) else [0, window.steps]
    for first, after in pairwise(cuts):
        steps = slice(first, after)
        order = year.order
        if order is not None:
            order = SegmentOrder(order.full[steps], order.empty[steps])
        ends = None if levels is None else (float(levels[first - 1]), float(levels[after - 1]))
        piece = part_of(window, first, after - first)
        yield DispatchModel(piece, on=year.on[steps], order=order, levels_kWh=ends).solve()
        if unit is not None and starts[first]:
            fuel = float(window.fuel_per_lhv_kWh[first]) * unit.start_fuel_lhv_kWh
            yield unit.cost_per_start + fuel


class DispatchModel(RecordedUnit):
    """The dispatch of a window as a PuLP problem; one method a family of constraints.

    Parameters
    ----------
    window : Window
        Demands, prices and machines of some consecutive steps.
    on : array of bool, shape (steps,), optional
        The unit's state, to be fixed; left out, the model decides.
    order : SegmentOrder, optional
        Segments that must be full, or empty.
    levels_kWh : tuple of float, optional [kWh]
        Level of the store before the first step and after the last; left out, the store ends at
        the level at which it began.
    """

    def __init__(
        self,
        window: Window,
        *,
        on: BoolArray | None = None,
        order: SegmentOrder | None = None,
        levels_kWh: tuple[float, float] | None = None,
    ) -> None:
        super().__init__(window)
        self.levels_kWh = levels_kWh
        with _without_collector():
            self._grid()
            if window.unit is not None:
                self._unit(window.unit, on, order)
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

    def _grid(self) -> None:
        """Import and export within the connection's limits."""
        window, prices, step_h = self.window, self.window.prices, self.window.step_h
        self.grid_import = self._variables("import", always(prices.import_limit_kW))
        self.grid_export = self._variables("export", always(prices.export_limit_kW))
        for h in self.hours:
            self.cost.append(float(window.import_per_kWh[h] * step_h) * self.grid_import[h])
            self.cost.append(float(-window.export_per_kWh[h] * step_h) * self.grid_export[h])

    def _heaters(self) -> None:
        """Boilers and burners, their further fuel."""
        window = self.window
        self.heaters: list[tuple[str, list[Any]]] = []
        for number, heater in enumerate(window.heaters):
            heat = self._variables(f"heater_{number}", always(heater.maximum_heat_kW))
            self.heaters.append((heater.carrier, heat))
            for h in self.hours:
                fuel = heater.fuel_per_heat_lhv * window.fuel_per_lhv_kWh[h] * window.step_h
                self.cost.append(float(fuel) * heat[h])

    def _chillers(self) -> None:
        """Chillers meet the cooling."""
        self.cooling: list[list[Any]] = []
        for number, chiller in enumerate(self.window.chillers):
            high = always(chiller.maximum_cooling_kW)
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
        """The level follows charge, discharge and loss, between the levels at its ends."""
        store = self.window.store
        if store is None:
            return
        self.charge = self._variables("charge", always(store.maximum_charge_kW))
        self.discharge = self._variables("discharge", always(store.maximum_discharge_kW))
        self.level = self._variables("level", always(store.capacity_kWh))
        step_h = self.window.step_h
        kept = 1.0 - store.loss_frac_per_h * step_h
        before = [self.level[-1], *self.level[:-1]]
        if self.levels_kWh is not None:
            before[0], last_kWh = self.levels_kWh
            self._require("store_last_level", [self.level[-1] == last_kWh])
        self._require(
            "store_balance",
            (
                self.level[h]
                == kept * before[h] + step_h * self.charge[h] - step_h * self.discharge[h]
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

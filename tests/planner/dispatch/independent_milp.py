"""The dispatch stated a second time, for `scipy.optimize.milp`, sharing no code with the planner.

It differs on purpose: the unit is a mixture of its corners (path by path, each with its segments
filled in order) in place of copies of segments; stops are counted beside starts, and minimum times
are written for pairs of steps; heat that is not used is a column of its own.
"""

import numpy as np
import pandas as pd
from scipy.optimize import Bounds, LinearConstraint, milp
from scipy.sparse import coo_matrix

from planner.arrays import FloatArray
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope, UnitEnvelope

GRADES = ("steam", "hot_water", "hot_gas")


class Milp:
    """Columns and rows, one by one."""

    def __init__(self) -> None:
        self.cost: list[float] = []
        self.low: list[float] = []
        self.high: list[float] = []
        self.whole: list[int] = []
        self.rows: list[tuple[dict[int, float], float, float]] = []

    def column(
        self, *, cost: float = 0.0, high: float = np.inf, low: float = 0.0, whole: bool = False
    ) -> int:
        """A further column; returns its number."""
        self.cost.append(cost)
        self.low.append(low)
        self.high.append(high)
        self.whole.append(int(whole))
        return len(self.cost) - 1

    def row(self, terms: list[tuple[int, float]], low: float, high: float) -> None:
        """A further row; columns that come twice are added."""
        entries: dict[int, float] = {}
        for column, factor in terms:
            entries[column] = entries.get(column, 0.0) + factor
        self.rows.append((entries, low, high))

    def solve(self) -> tuple[float, FloatArray] | None:
        """Optimum and columns; None if there is no solution."""
        entries = [
            (number, column, factor)
            for number, (terms, _, _) in enumerate(self.rows)
            for column, factor in terms.items()
        ]
        rows, columns, factors = zip(*entries, strict=True)
        matrix = coo_matrix((factors, (rows, columns)), shape=(len(self.rows), len(self.cost)))
        found = milp(
            np.array(self.cost),
            constraints=LinearConstraint(
                matrix.tocsr(), [row[1] for row in self.rows], [row[2] for row in self.rows]
            ),
            bounds=Bounds(np.array(self.low), np.array(self.high)),
            integrality=np.array(self.whole),
            options={"mip_rel_gap": 1e-9},
        )
        return None if found.x is None else (float(found.fun), np.asarray(found.x))


def cheapest(envelope: OperatingEnvelope, prices: Prices, hourly: pd.DataFrame) -> float | None:
    """Least cost of the steps, the store ending as it began; None if nothing serves them."""
    model = Milp()
    steps, step_h = len(hourly), prices.step_h
    imports = []
    balances: list[dict[str, list[tuple[int, float]]]] = []
    for t in range(steps):
        bought = model.column(cost=prices.import_per_kWh[t] * step_h, high=prices.import_limit_kW)
        sold = model.column(cost=-prices.export_per_kWh[t] * step_h, high=prices.export_limit_kW)
        imports.append(bought)
        balances.append({grade: [] for grade in (*GRADES, "cooling")})
        balances[t]["power"] = [(bought, 1.0), (sold, -1.0)]
    for unit in envelope.units:
        _unit(model, unit, prices, balances)
    _supply(model, envelope, prices, balances)
    _store(model, envelope, prices, balances)
    _demand(model, envelope, hourly, balances)
    fixed = _charges(model, prices, imports) + prices.fixed_per_year
    fixed += sum(
        heater.standing_fuel_lhv_kW * prices.fuel_per_lhv_kWh[t] * step_h
        for heater in envelope.heaters
        for t in range(steps)
    )
    found = model.solve()
    return None if found is None else found[0] + fixed


def _unit(
    model: Milp,
    unit: UnitEnvelope,
    prices: Prices,
    balances: list[dict[str, list[tuple[int, float]]]],
) -> None:
    """State, starts, stops, and the corners of the operating range."""
    steps, step_h = len(balances), prices.step_h
    on, starts, stops = [], [], []
    for t in range(steps):
        fuel = prices.fuel_per_lhv_kWh[t]
        on.append(model.column(high=float(unit.available[t]), whole=True))
        per_start = unit.cost_per_start + unit.start_fuel_lhv_kWh * fuel
        starts.append(model.column(cost=per_start, high=float(t > 0), whole=True))
        stops.append(model.column(high=float(t > 0), whole=True))
        if t:
            terms = [(on[t], 1.0), (on[t - 1], -1.0), (starts[t], -1.0), (stops[t], 1.0)]
            model.row(terms, 0.0, 0.0)
            model.row([(starts[t], 1.0), (stops[t], 1.0)], 0.0, 1.0)
        _corners(model, unit, prices, t, running=on[t], balance=balances[t])
    for t in range(1, steps):
        for later in range(t, min(t + round(unit.minimum_up_h / step_h), steps)):
            model.row([(starts[t], 1.0), (on[later], -1.0)], -np.inf, 0.0)
        for later in range(t, min(t + round(unit.minimum_down_h / step_h), steps)):
            model.row([(stops[t], 1.0), (on[later], 1.0)], -np.inf, 1.0)


def _corners(
    model: Milp,
    unit: UnitEnvelope,
    prices: Prices,
    t: int,
    *,
    running: int,
    balance: dict[str, list[tuple[int, float]]],
) -> None:
    """A step of the unit as a mixture of corners."""
    step_h, fuel = prices.step_h, prices.fuel_per_lhv_kWh[t]
    widths = unit.segment_power_kW[t]
    shares = []
    heat: dict[str, list[tuple[int, float]]] = {grade: [] for grade in GRADES}
    for path in unit.paths:
        for filled in range(len(widths) + 1):
            power_kW = unit.minimum_power_kW[t] + widths[:filled].sum()
            fuel_lhv_kW = (
                unit.fuel_at_minimum_lhv_kW[t]
                + (unit.fuel_slope_lhv[t, :filled] * widths[:filled]).sum()
            )
            cost = (
                fuel_lhv_kW * fuel + unit.cost_per_kWh * power_kW + unit.cost_per_run_hour
            ) * step_h
            share = model.column(cost=cost)
            shares.append((share, 1.0))
            balance["power"].append((share, power_kW))
            for grade, at_minimum_kW in path.yield_at_minimum_kW.items():
                further_kW = (path.yield_slope[grade][t, :filled] * widths[:filled]).sum()
                heat[grade].append((share, at_minimum_kW[t] + further_kW))
    model.row([*shares, (running, -1.0)], 0.0, 0.0)
    for grade, offered in heat.items():
        if offered:
            dumped = model.column()
            model.row([*offered, (dumped, -1.0)], 0.0, np.inf)
            balance[grade] += [*offered, (dumped, -1.0)]


def _supply(
    model: Milp,
    envelope: OperatingEnvelope,
    prices: Prices,
    balances: list[dict[str, list[tuple[int, float]]]],
) -> None:
    """Heaters and chillers."""
    for t, balance in enumerate(balances):
        for heater in envelope.heaters:
            cost = heater.fuel_per_heat_lhv * prices.fuel_per_lhv_kWh[t] * prices.step_h
            heat = model.column(cost=cost, high=heater.maximum_heat_kW)
            balance[heater.carrier].append((heat, 1.0))
        for chiller in envelope.chillers:
            cold = model.column(high=chiller.maximum_cooling_kW)
            balance["cooling"].append((cold, 1.0))
            balance[chiller.drive].append((cold, -1.0 / chiller.cop))


def _store(
    model: Milp,
    envelope: OperatingEnvelope,
    prices: Prices,
    balances: list[dict[str, list[tuple[int, float]]]],
) -> None:
    """One net flow a step, into the store or out of it."""
    store = envelope.store
    if store is None:
        return
    levels = [model.column(high=store.capacity_kWh) for _ in balances]
    for t, balance in enumerate(balances):
        net = model.column(low=-store.maximum_discharge_kW, high=store.maximum_charge_kW)
        balance["hot_water"].append((net, -1.0))
        kept = 1.0 - store.loss_frac_per_h * prices.step_h
        terms = [(levels[t], 1.0), (levels[t - 1], -kept), (net, -prices.step_h)]
        model.row(terms, 0.0, 0.0)


def _demand(
    model: Milp,
    envelope: OperatingEnvelope,
    hourly: pd.DataFrame,
    balances: list[dict[str, list[tuple[int, float]]]],
) -> None:
    """Each carrier meets its demand; the meter of today includes today's chillers."""
    cop = next((c.cop for c in envelope.chillers if c.drive == "power"), np.inf)
    for t, balance in enumerate(balances):
        row = hourly.iloc[t]
        for carrier, terms in balance.items():
            wanted_kW = float(row[f"{carrier}_kW"])
            if carrier == "power":
                wanted_kW = max(wanted_kW - float(row["cooling_kW"]) / cop, 0.0)
            if terms:
                model.row(terms, wanted_kW, wanted_kW)


def _charges(model: Milp, prices: Prices, imports: list[int]) -> float:
    """A peak for each charge and period; returns what is paid whatever happens."""
    fixed = 0.0
    for charge in prices.demand_charges:
        for period in set(charge.period[charge.counted].tolist()):
            peak = model.column(cost=charge.rate_per_kW[period])
            fixed += charge.rate_per_kW[period] * charge.excess_kW[period]
            for t in np.flatnonzero(charge.counted & (charge.period == period)):
                model.row([(peak, 1.0), (imports[t], -1.0)], 0.0, np.inf)
    return fixed

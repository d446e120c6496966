"""A schedule held against balances, limits and prices, by code that knows nothing of solvers."""

import numpy as np
import pandas as pd

from planner.arrays import FloatArray
from planner.dispatch.machine_checks import machine_complaints
from planner.dispatch.schedule import Schedule
from planner.errors import SolveError
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope

#: Balances close to this share of the carrier's largest flow in the year, money of its cost.
TOLERANCE_FRAC = 1e-6

GRADES = ("steam", "hot_water", "hot_gas")


def verify(
    schedule: Schedule, envelope: OperatingEnvelope, prices: Prices, hourly: pd.DataFrame
) -> None:
    """Check a schedule from its flows alone.

    Parameters
    ----------
    schedule : Schedule
        What a solver made.
    envelope : OperatingEnvelope
        Machines.
    prices : Prices
        Money.
    hourly : DataFrame, one row a step
        Demands, columns as `SiteYear.hourly`.

    Raises
    ------
    SolveError
        If a balance is open, a limit is passed, a minimum time is broken, the cost is not that of
        the flows, or the bound lies above the cost.
    """
    flows = schedule.hourly
    complaints = [
        *_negative(flows),
        *_balances(flows, envelope, hourly, prices.step_h),
        *_limits(flows, envelope, prices),
        *machine_complaints(flows, envelope, prices.step_h),
        *_money(schedule, envelope, prices),
    ]
    if complaints:
        raise SolveError(f"{schedule.name}: " + "; ".join(complaints))


def _array(flows: pd.DataFrame, name: str) -> FloatArray:
    """One column as an array."""
    return flows[name].to_numpy(dtype=np.float64)


def _negative(flows: pd.DataFrame) -> list[str]:
    """Everything is a number; flows are never negative, prices may be."""
    unknown = [str(name) for name in flows.columns if not np.isfinite(_array(flows, name)).all()]
    if unknown:
        return [f"{name} is not a number in every step" for name in unknown]
    names = [n for n in flows.columns if not n.startswith("price_")]
    lowest = flows[names].min()
    largest = flows[names].abs().max()
    wrong = lowest < -TOLERANCE_FRAC * largest.clip(lower=1.0)
    return [f"{name} falls to {lowest[name]:.3g}" for name in lowest.index[wrong]]


def _balances(
    flows: pd.DataFrame, envelope: OperatingEnvelope, hourly: pd.DataFrame, step_h: float
) -> list[str]:
    """Supply less use of each carrier."""
    open_kW = {
        "power": _power_imbalance_kW(flows, envelope, hourly),
        "cooling": _array(flows, "electric_cooling_kW")
        + _array(flows, "absorption_cooling_kW")
        - hourly["cooling_kW"].to_numpy(),
        "store": _store_imbalance(flows, envelope, step_h),
    }
    driven = {c.drive for c in envelope.chillers}
    for grade in GRADES:
        supplied_kW = (
            _array(flows, f"unit_{grade}_kW")
            - _array(flows, f"dumped_{grade}_kW")
            + _array(flows, f"heater_{grade}_kW")
        )
        if grade == "hot_water":
            supplied_kW += _array(flows, "store_discharge_kW") - _array(flows, "store_charge_kW")
        drive_kW = _array(flows, "absorption_heat_kW") if grade in driven else 0.0
        open_kW[grade] = supplied_kW - drive_kW - hourly[f"{grade}_kW"].to_numpy()
    return [
        f"{carrier} does not balance: {np.abs(imbalance).max():.3g} kW at step "
        f"{int(np.abs(imbalance).argmax())}"
        for carrier, imbalance in open_kW.items()
        if not np.abs(imbalance).max() <= TOLERANCE_FRAC * _largest(carrier, flows, hourly)
    ]


def _largest(carrier: str, flows: pd.DataFrame, hourly: pd.DataFrame) -> float:
    """Largest flow of a carrier in the year, at least one kW."""
    if carrier == "store":
        return max(float(flows["store_level_kWh"].max()), 1.0)
    supplied = [n for n in flows.columns if carrier in n and n.endswith("_kW")]
    if carrier == "power":
        supplied += ["grid_import_kW", "grid_export_kW"]
    highest = max(float(flows[name].max()) for name in supplied)
    return max(highest, float(hourly[f"{carrier}_kW"].max()), 1.0)


def _power_imbalance_kW(
    flows: pd.DataFrame, envelope: OperatingEnvelope, hourly: pd.DataFrame
) -> FloatArray:
    """Power made and imported less power used and exported."""
    metered_kW = hourly["power_kW"].to_numpy(dtype=np.float64)
    cops = [c.cop for c in envelope.chillers if c.drive == "power"]
    today_kW = hourly["cooling_kW"].to_numpy(dtype=np.float64) / cops[0] if cops else 0.0
    used_kW = np.maximum(metered_kW - today_kW, 0.0) + _array(flows, "chiller_power_kW")
    supplied_kW = _array(flows, "unit_power_kW") + _array(flows, "grid_import_kW")
    return supplied_kW - used_kW - _array(flows, "grid_export_kW")


def _store_imbalance(flows: pd.DataFrame, envelope: OperatingEnvelope, step_h: float) -> FloatArray:
    """Level at a step's end less what the step before and the flows make of it; the year closes."""
    level, store = _array(flows, "store_level_kWh"), envelope.store
    if store is None:
        return level
    kept = 1.0 - store.loss_frac_per_h * step_h
    moved = step_h * (_array(flows, "store_charge_kW") - _array(flows, "store_discharge_kW"))
    return np.asarray(level - kept * np.roll(level, 1) - moved)


def _limits(flows: pd.DataFrame, envelope: OperatingEnvelope, prices: Prices) -> list[str]:
    """Connection, heaters, chillers and store within what they can do."""
    limits: list[tuple[str, float]] = [
        ("grid_import_kW", prices.import_limit_kW),
        ("grid_export_kW", prices.export_limit_kW),
    ]
    for grade in GRADES:
        heaters = [h.maximum_heat_kW for h in envelope.heaters if h.carrier == grade]
        limits.append((f"heater_{grade}_kW", sum(heaters)))
    for kind in ("electric", "absorption"):
        chillers = [c for c in envelope.chillers if (c.drive == "power") == (kind == "electric")]
        most_kW = sum((c.maximum_cooling_kW for c in chillers), 0.0)
        limits.append((f"{kind}_cooling_kW", most_kW))
    store = envelope.store
    limits += [
        ("store_level_kWh", store.capacity_kWh if store else 0.0),
        ("store_charge_kW", store.maximum_charge_kW if store else 0.0),
        ("store_discharge_kW", store.maximum_discharge_kW if store else 0.0),
    ]
    return [
        f"{name} reaches {flows[name].max():.6g}, limit {limit:.6g}"
        for name, limit in limits
        if not flows[name].max() <= limit + TOLERANCE_FRAC * max(limit, 1.0)
    ]


def _money(schedule: Schedule, envelope: OperatingEnvelope, prices: Prices) -> list[str]:
    """The cost is that of the flows, and no lower than its bound."""
    flows, step_h = schedule.hourly, prices.step_h
    grid_import_kW = _array(flows, "grid_import_kW")
    bought = grid_import_kW @ prices.import_per_kWh
    sold = _array(flows, "grid_export_kW") @ prices.export_per_kWh
    fuels = ("unit_fuel_lhv_kW", "start_fuel_lhv_kW", "heater_fuel_lhv_kW")
    burnt = sum(_array(flows, name) @ prices.fuel_per_lhv_kWh for name in fuels)
    cost = (bought - sold + burnt) * step_h + prices.fixed_per_year
    for unit in envelope.units:
        cost += unit.cost_per_run_hour * step_h * _array(flows, "unit_on").sum()
        cost += unit.cost_per_kWh * step_h * _array(flows, "unit_power_kW").sum()
        cost += unit.cost_per_start * _array(flows, "unit_start").sum()
    for charge in prices.demand_charges:
        for period in np.unique(charge.period[charge.counted]):
            counted = charge.counted & (charge.period == period)
            billed_kW = grid_import_kW[counted].max() + charge.excess_kW[period]
            cost += charge.rate_per_kW[period] * billed_kW
    tolerance = TOLERANCE_FRAC * abs(schedule.cost_per_year)
    complaints = []
    if not abs(cost - schedule.cost_per_year) <= tolerance:
        complaints.append(f"flows cost {cost:.2f}, the schedule says {schedule.cost_per_year:.2f}")
    if not schedule.lower_bound_per_year <= schedule.cost_per_year + tolerance:
        complaints.append("the lower bound lies above the cost")
    return complaints

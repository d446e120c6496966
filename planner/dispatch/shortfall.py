"""Demands that nothing on the site could meet, told before any solver is asked."""

from collections.abc import Iterator

import numpy as np
import pandas as pd

from load_profiles import Fault
from planner.arrays import FloatArray
from planner.dispatch.window import power_without_chillers_kW
from planner.errors import UnmetDemandError
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope

#: Less than this share of a demand is rounding, not a shortfall.
TOLERANCE_FRAC = 1e-9


def refuse_unmet_demand(envelope: OperatingEnvelope, prices: Prices, hourly: pd.DataFrame) -> None:
    """Raise where a carrier's demand exceeds all that could serve it.

    Parameters
    ----------
    envelope : OperatingEnvelope
        Machines.
    prices : Prices
        Its import limit.
    hourly : DataFrame, one row a step
        Demands.

    Raises
    ------
    UnmetDemandError
        For each carrier: the worst hour, how much short, and in how many hours.
    """
    faults = tuple(_shortfalls(envelope, prices, hourly))
    if faults:
        raise UnmetDemandError(faults)


def _shortfalls(
    envelope: OperatingEnvelope, prices: Prices, hourly: pd.DataFrame
) -> Iterator[Fault]:
    """One fault a carrier that falls short."""
    steps = len(hourly)
    unit_kW = np.zeros(steps)
    for unit in envelope.units:
        unit_kW += np.where(unit.available, unit.maximum_power_kW, 0.0)
    electric_kW = sum(c.maximum_cooling_kW for c in envelope.chillers if c.drive == "power")
    driven_kW = sum(c.maximum_cooling_kW for c in envelope.chillers if c.drive != "power")
    cop = next((c.cop for c in envelope.chillers if c.drive == "power"), np.inf)
    cooling_kW = hourly["cooling_kW"].to_numpy(dtype=np.float64)
    least_chiller_kW = np.maximum(cooling_kW - driven_kW, 0.0) / cop
    power_kW = power_without_chillers_kW(hourly, envelope) + least_chiller_kW
    yield from _one("power", power_kW, prices.import_limit_kW + unit_kW, hourly.index)
    yield from _one("cooling", cooling_kW, np.full(steps, electric_kW + driven_kW), hourly.index)
    for grade in ("steam", "hot_water", "hot_gas"):
        most_kW = _most_heat_kW(envelope, grade, steps)
        if grade == "hot_water" and envelope.store is not None:
            most_kW = most_kW + envelope.store.maximum_discharge_kW
        demand_kW = hourly[f"{grade}_kW"].to_numpy(dtype=np.float64)
        yield from _one(grade, demand_kW, most_kW, hourly.index)


def _most_heat_kW(envelope: OperatingEnvelope, grade: str, steps: int) -> FloatArray:
    """All heaters and the best path at full load."""
    most_kW = np.full(
        steps, sum(h.maximum_heat_kW for h in envelope.heaters if h.carrier == grade), dtype=float
    )
    for unit in envelope.units:
        best_kW = np.zeros(steps)
        for path in unit.paths:
            if grade in path.yield_at_minimum_kW:
                further_kW = (path.yield_slope[grade] * unit.segment_power_kW).sum(axis=1)
                best_kW = np.maximum(best_kW, path.yield_at_minimum_kW[grade] + further_kW)
        most_kW += np.where(unit.available, best_kW, 0.0)
    return most_kW


def _one(
    carrier: str, demand_kW: FloatArray, most_kW: FloatArray, index: pd.Index
) -> Iterator[Fault]:
    """The fault of one carrier, if it falls short anywhere."""
    short_kW = demand_kW - most_kW
    where = short_kW > TOLERANCE_FRAC * np.maximum(demand_kW, 1.0)
    if where.any():
        worst = int(short_kW.argmax())
        came = f"{demand_kW[worst]:,.0f} kW at {index[worst]:%Y-%m-%d %H:%M} UTC"
        must = (
            f"at most {most_kW[worst]:,.0f} kW can be served, {short_kW[worst]:,.0f} kW short, and "
            f"short in {int(where.sum())} steps; raise a capacity or mend the demand"
        )
        yield Fault(f"{carrier} demand", came, must)

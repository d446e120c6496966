"""Demands that nothing on the site could meet, told by their hour and by how much.

Capacities are compared with demands before any solver is asked. What only shows when all balances
are taken together (an empty store, heat that is made only with power that nobody takes) is found
after a solve that failed, by the least supply that would have to be added from outside.
"""

from collections.abc import Iterator

import numpy as np
import pandas as pd

from load_profiles import Fault
from planner.arrays import FloatArray
from planner.dispatch.places import WindowProgram
from planner.dispatch.solver import Answer
from planner.dispatch.window import Window, power_without_chillers_kW
from planner.dispatch.year_program import build
from planner.errors import UnmetDemandError
from planner.market.prices import Prices
from planner.plant.envelope import OperatingEnvelope

#: Less than this share of a demand is rounding, not a shortfall.
TOLERANCE_FRAC = 1e-9

#: And less than this share of the largest demand where a solver found it.
LOCATED_FRAC = 1e-6

#: Whole numbers in the search for a shortfall are decided no closer and no longer than this.
LOCATED_GAP_FRAC = 0.01
LOCATED_LIMIT_S = 60.0


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


def locate_shortfall(year: Window, index: pd.Index) -> None:
    """Raise where the least supply from outside is needed, if any is.

    Parameters
    ----------
    year : Window
        All steps, known to have no solution.
    index : Index
        Of the site's year.

    Raises
    ------
    UnmetDemandError
        For each carrier that falls short: the worst hour, how much, in how many hours.
    """
    built = build(year, outside_supply=True)
    faults = _located(year, index, built, built.program.solve_relaxed())
    if not faults:  # only a unit that is half on could serve the site
        answer = built.program.solve(gap_frac=LOCATED_GAP_FRAC, time_limit_s=LOCATED_LIMIT_S)
        faults = _located(year, index, built, answer)
    if faults:
        raise UnmetDemandError(tuple(faults))


def _located(year: Window, index: pd.Index, built: WindowProgram, answer: Answer) -> list[Fault]:
    """A fault for each carrier that a solution takes from outside."""
    faults = []
    for carrier, columns in built.columns.outside.items():
        short_kW = answer.column_values[columns] if answer.found else np.zeros(year.steps)
        least_kW = LOCATED_FRAC * max(float(year.demand_kW[carrier].max()), 1.0)
        if short_kW.max() > least_kW:
            worst = int(short_kW.argmax())
            came = f"{year.demand_kW[carrier][worst]:,.0f} kW at {index[worst]:%Y-%m-%d %H:%M} UTC"
            must = (
                f"{short_kW[worst]:,.0f} kW short with all balances taken together, and short in "
                f"{int((short_kW > least_kW).sum())} steps; raise a capacity or mend the demand"
            )
            faults.append(Fault(f"{carrier} demand", came, must))
    return faults


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

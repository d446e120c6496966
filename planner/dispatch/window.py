"""`Window`: some consecutive steps of a year, cut out of plant, prices and demand."""

from dataclasses import dataclass, replace
from typing import TypeVar

import numpy as np
import pandas as pd
from numpy.typing import NDArray

from planner.arrays import FloatArray
from planner.errors import PlannerError
from planner.market.prices import Prices
from planner.plant.envelope import (
    ChillerEnvelope,
    ExhaustPath,
    HeaterEnvelope,
    OperatingEnvelope,
    StoreEnvelope,
    UnitEnvelope,
)

Scalar = TypeVar("Scalar", bound=np.generic)

CARRIERS = ("power", "steam", "hot_water", "hot_gas", "cooling")


@dataclass(frozen=True)
class Window:
    """What the dispatch of some steps needs, and nothing that it does not.

    Heaters, chillers and paths that nothing asks for are left out.

    Parameters
    ----------
    first, steps : int
        Place in the year.
    prices : Prices
        Of the whole year.
    unit : UnitEnvelope or None
        Cut to the window.
    paths : tuple of ExhaustPath
        Paths that yield something wanted, cut to the window; the bypass is what they leave.
    heaters, chillers, store
        Of the envelope.
    demand_kW : dict of carrier to array, shape (steps,) [kW]
        Power without today's chillers, steam, hot water, hot gas, cooling.
    standing_fuel_lhv_kW : float [kW LHV]
        Burnt by all heaters in every step.
    fixed_cost : float [currency]
        Standing fuel of the window, demand charges on within-step excess, and the window's part
        of the standing charges.
    """

    first: int
    steps: int
    prices: Prices
    unit: UnitEnvelope | None
    paths: tuple[ExhaustPath, ...]
    heaters: tuple[HeaterEnvelope, ...]
    chillers: tuple[ChillerEnvelope, ...]
    store: StoreEnvelope | None
    demand_kW: dict[str, FloatArray]
    standing_fuel_lhv_kW: float
    fixed_cost: float

    @property
    def step_h(self) -> float:
        """Length of a step [h]."""
        return self.prices.step_h

    @property
    def import_per_kWh(self) -> FloatArray:
        """Import price of each step."""
        return self.cut(self.prices.import_per_kWh)

    @property
    def export_per_kWh(self) -> FloatArray:
        """Export price of each step."""
        return self.cut(self.prices.export_per_kWh)

    @property
    def fuel_per_lhv_kWh(self) -> FloatArray:
        """Fuel price of each step."""
        return self.cut(self.prices.fuel_per_lhv_kWh)

    @property
    def recovered_grades(self) -> tuple[str, ...]:
        """Grades that some path yields."""
        found = {grade: None for path in self.paths for grade in path.yield_at_minimum_kW}
        return tuple(found)

    def cut(self, yearly: NDArray[Scalar]) -> NDArray[Scalar]:
        """The window's part of a yearly array."""
        return yearly[self.first : self.first + self.steps]


def whole_year(envelope: OperatingEnvelope, prices: Prices, hourly: pd.DataFrame) -> Window:
    """The year as one window.

    Parameters
    ----------
    envelope : OperatingEnvelope
        Machines, at most one unit.
    prices : Prices
        Of the year.
    hourly : DataFrame, one row a step
        Demands, columns as `SiteYear.hourly`.

    Returns
    -------
    Window
        All steps.

    Raises
    ------
    PlannerError
        If an option has more than one unit.
    """
    if len(envelope.units) > 1:
        raise PlannerError(f"{envelope.name} has {len(envelope.units)} units: must be at most one")
    demand_kW = {name: hourly[f"{name}_kW"].to_numpy(dtype=np.float64) for name in CARRIERS}
    cooled = bool(demand_kW["cooling"].any())
    chillers = envelope.chillers if cooled else ()
    demand_kW["power"] = power_without_chillers_kW(hourly, envelope)
    unit = envelope.units[0] if envelope.units else None
    wanted = {grade for grade in ("steam", "hot_water", "hot_gas") if demand_kW[grade].any()}
    wanted |= {chiller.drive for chiller in chillers}
    paths = () if unit is None else tuple(_wanted_path(path, wanted) for path in unit.paths)
    return Window(
        first=0,
        steps=len(hourly),
        prices=prices,
        unit=unit,
        paths=tuple(path for path in paths if path.yield_at_minimum_kW),
        heaters=tuple(heater for heater in envelope.heaters if heater.carrier in wanted),
        chillers=chillers,
        store=envelope.store,
        demand_kW=demand_kW,
        standing_fuel_lhv_kW=sum(h.standing_fuel_lhv_kW for h in envelope.heaters),
        fixed_cost=_fixed_cost(envelope, prices),
    )


def power_without_chillers_kW(hourly: pd.DataFrame, envelope: OperatingEnvelope) -> FloatArray:
    """Metered power less what today's electric chillers took of it.

    Parameters
    ----------
    hourly : DataFrame, one row a step
        Columns `power_kW` and `cooling_kW`.
    envelope : OperatingEnvelope
        Its first chiller driven by power is today's.

    Returns
    -------
    array, shape (steps,) [kW]
        Never below zero: where the chillers would have taken more than was metered, nothing else
        ran.
    """
    metered_kW = hourly["power_kW"].to_numpy(dtype=np.float64)
    cop = next((c.cop for c in envelope.chillers if c.drive == "power"), None)
    if cop is None:
        return metered_kW
    return np.maximum(metered_kW - hourly["cooling_kW"].to_numpy(dtype=np.float64) / cop, 0.0)


def part_of(year: Window, first: int, steps: int) -> Window:
    """Some consecutive steps of a year.

    Parameters
    ----------
    year : Window
        All steps.
    first, steps : int
        Which.

    Returns
    -------
    Window
        Its fixed cost is the same share of the year's as its steps.
    """
    part = slice(first, first + steps)
    unit = year.unit
    if unit is not None:
        unit = replace(
            unit,
            available=unit.available[part],
            minimum_power_kW=unit.minimum_power_kW[part],
            maximum_power_kW=unit.maximum_power_kW[part],
            segment_power_kW=unit.segment_power_kW[part],
            fuel_at_minimum_lhv_kW=unit.fuel_at_minimum_lhv_kW[part],
            fuel_slope_lhv=unit.fuel_slope_lhv[part],
        )
    return replace(
        year,
        first=first,
        steps=steps,
        unit=unit,
        paths=tuple(_cut_path(path, part) for path in year.paths),
        demand_kW={name: demand[part] for name, demand in year.demand_kW.items()},
        fixed_cost=year.fixed_cost * steps / year.steps,
    )


def _wanted_path(path: ExhaustPath, wanted: set[str]) -> ExhaustPath:
    """A path with the grades that something asks for."""
    return ExhaustPath(
        path.name,
        {g: heat for g, heat in path.yield_at_minimum_kW.items() if g in wanted},
        {g: slope for g, slope in path.yield_slope.items() if g in wanted},
    )


def _cut_path(path: ExhaustPath, part: slice) -> ExhaustPath:
    """A path's yields in some steps."""
    return ExhaustPath(
        path.name,
        {grade: heat[part] for grade, heat in path.yield_at_minimum_kW.items()},
        {grade: slope[part] for grade, slope in path.yield_slope.items()},
    )


def _fixed_cost(envelope: OperatingEnvelope, prices: Prices) -> float:
    """What is paid whatever runs: standing fuel, excess demand, standing charges."""
    standing_lhv_kW = sum(heater.standing_fuel_lhv_kW for heater in envelope.heaters)
    standing_fuel = standing_lhv_kW * float(prices.fuel_per_lhv_kWh.sum()) * prices.step_h
    excess = sum(
        float(
            (charge.rate_per_kW * charge.excess_kW)[np.unique(charge.period[charge.counted])].sum()
        )
        for charge in prices.demand_charges
    )
    return prices.fixed_per_year + standing_fuel + excess

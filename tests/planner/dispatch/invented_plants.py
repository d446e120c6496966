"""Invented plants, prices and demands for the tests of the dispatch."""

from dataclasses import dataclass, field

import numpy as np
import pandas as pd

from planner.arrays import BoolArray, FloatArray
from planner.market.prices import DemandCharge, Prices
from planner.plant.envelope import (
    ChillerEnvelope,
    ExhaustPath,
    HeaterEnvelope,
    OperatingEnvelope,
    StoreEnvelope,
    UnitEnvelope,
)

#: One value for all steps, or one a step.
Steps = float | list[float] | FloatArray

CARRIERS = ("power", "steam", "hot_water", "hot_gas", "cooling")


def steady(value: Steps, steps: int) -> FloatArray:
    """An array of one value a step."""
    return np.array(np.broadcast_to(np.asarray(value, dtype=np.float64), (steps,)))


def demands(steps: int, *, first: str = "2025-01-01", **kW: Steps) -> pd.DataFrame:
    """An hourly frame of demands; carriers that are not named are zero."""
    index = pd.date_range(first, periods=steps, freq="h", tz="UTC")
    columns = {f"{name}_kW": steady(kW.get(name, 0.0), steps) for name in CARRIERS}
    return pd.DataFrame(columns, index=index)


def money(
    steps: int,
    *,
    import_price: Steps = 0.10,
    export_price: Steps = 0.0,
    fuel_price: Steps = 0.03,
    import_limit_kW: float = 1e5,
    export_limit_kW: float = 0.0,
    charges: tuple[DemandCharge, ...] = (),
    fixed: float = 0.0,
) -> Prices:
    """Prices of an hourly window."""
    return Prices(
        step_h=1.0,
        import_per_kWh=steady(import_price, steps),
        export_per_kWh=steady(export_price, steps),
        import_limit_kW=import_limit_kW,
        export_limit_kW=export_limit_kW,
        fuel_per_lhv_kWh=steady(fuel_price, steps),
        demand_charges=charges,
        fixed_per_year=fixed,
    )


def charge(
    steps: int,
    rate: float | FloatArray,
    *,
    counted: BoolArray | None = None,
    excess_kW: float = 0.0,
    first: str = "2025-01-01",
    name: str = "demand",
) -> DemandCharge:
    """A demand charge by calendar month."""
    index = pd.date_range(first, periods=steps, freq="h", tz="UTC")
    return DemandCharge(
        name=name,
        counted=np.ones(steps, dtype=bool) if counted is None else counted,
        period=(index.month.to_numpy() - 1).astype(np.int64),
        rate_per_kW=steady(rate, 12),
        excess_kW=steady(excess_kW, 12),
    )


@dataclass(frozen=True)
class Machine:
    """A unit in round numbers; every field has one value for all steps and segments."""

    minimum_kW: float = 50.0
    segment_kW: tuple[float, ...] = (50.0,)
    fuel_at_minimum_kW: float = 200.0
    fuel_slope: tuple[float, ...] = (3.0,)
    #: By path: heat at minimum and slope, by carrier.
    paths: dict[str, dict[str, tuple[float, float]]] = field(default_factory=dict)
    start_fuel_kWh: float = 0.0
    up_h: float = 0.0
    down_h: float = 0.0
    per_run_hour: float = 0.0
    per_kWh: float = 0.0
    per_start: float = 0.0
    available: BoolArray | None = None

    def over(self, steps: int, *, scale: FloatArray | float = 1.0) -> UnitEnvelope:
        """The unit over some steps, its power, fuel and heat scaled alike in each step."""
        factor = steady(scale, steps)
        widths = np.outer(factor, self.segment_kW)
        paths = tuple(
            ExhaustPath(
                name,
                {carrier: heat * factor for carrier, (heat, _) in yields.items()},
                {
                    carrier: np.full((steps, len(self.segment_kW)), slope)
                    for carrier, (_, slope) in yields.items()
                },
            )
            for name, yields in self.paths.items()
        )
        minimum_kW = self.minimum_kW * factor
        return UnitEnvelope(
            name="Machine",
            available=np.ones(steps, bool) if self.available is None else self.available,
            minimum_power_kW=minimum_kW,
            maximum_power_kW=minimum_kW + widths.sum(axis=1),
            segment_power_kW=widths,
            fuel_at_minimum_lhv_kW=self.fuel_at_minimum_kW * factor,
            fuel_slope_lhv=np.tile(self.fuel_slope, (steps, 1)),
            paths=(*paths, ExhaustPath("bypass", {}, {})),
            start_fuel_lhv_kWh=self.start_fuel_kWh,
            minimum_up_h=self.up_h,
            minimum_down_h=self.down_h,
            cost_per_run_hour=self.per_run_hour,
            cost_per_kWh=self.per_kWh,
            cost_per_start=self.per_start,
        )


def boiler(
    carrier: str = "hot_water",
    *,
    maximum_kW: float = 1e5,
    efficiency: float = 0.9,
    standing_kW: float = 0.0,
) -> HeaterEnvelope:
    """A boiler or burner."""
    return HeaterEnvelope(f"{carrier} heater", carrier, maximum_kW, 1.0 / efficiency, standing_kW)


def plant(
    *units: UnitEnvelope,
    heaters: tuple[HeaterEnvelope, ...] = (),
    chillers: tuple[ChillerEnvelope, ...] = (),
    store: StoreEnvelope | None = None,
) -> OperatingEnvelope:
    """An envelope."""
    return OperatingEnvelope("Plant", units, heaters, chillers, store)


def hospital_year(
    *, store: bool, seed: int = 1, steps: int = 8760
) -> tuple[OperatingEnvelope, Prices, pd.DataFrame]:
    """A hospital of about 5 MW with a 5 MW turbine, cascade of steam and water, and cooling."""
    random = np.random.default_rng(seed)
    hour = np.arange(steps)
    of_day, weekday = hour % 24, (hour // 24) % 7
    degC = 10.0 - 10.0 * np.cos(2 * np.pi * (hour - 360) / 8760)
    degC += -4.0 * np.cos(2 * np.pi * (of_day - 3) / 24) + _drifting(random, steps, 0.97, 0.7)
    busy = np.clip(np.sin(np.pi * (of_day - 6) / 14), 0.0, None)
    working = np.where(weekday < 5, 1.0, 0.6)
    cooling_kW = np.clip(degC - 15.0, 0.0, None) * 180.0 + 250.0
    power_kW = 3400.0 + 1700.0 * busy * working + 200.0 * _drifting(random, steps, 0.8, 0.5)
    steam_kW = 1500.0 + 1300.0 * busy * working + 150.0 * _drifting(random, steps, 0.7, 0.5)
    water_kW = 900.0 + 330.0 * np.clip(17.0 - degC, 0.0, None)
    water_kW += 900.0 * np.exp(-(((of_day - 7) / 2.0) ** 2))
    hourly = demands(
        steps,
        power=np.maximum(power_kW, 500.0) + cooling_kW / 4.0,
        steam=np.maximum(steam_kW, 200.0),
        hot_water=water_kW,
        cooling=cooling_kW,
    )
    out = np.ones(steps, dtype=bool)
    out[3000:3168] = False
    unit = Machine(
        minimum_kW=2300.0,
        segment_kW=(1200.0, 1100.0),
        fuel_at_minimum_kW=9400.0,
        fuel_slope=(2.35, 2.62),
        paths={
            "steam, then water": {"steam": (2900.0, 0.75), "hot_water": (1500.0, 0.20)},
            "water only": {"hot_water": (5000.0, 1.15)},
        },
        start_fuel_kWh=1500.0,
        up_h=4.0,
        down_h=3.0,
        per_run_hour=18.0,
        per_kWh=0.006,
        per_start=150.0,
        available=out,
    ).over(steps, scale=np.clip(1.0 - 0.0055 * (degC - 15.0), 0.88, 1.12))
    peak = (weekday < 5) & (of_day >= 16) & (of_day < 21)
    day = (of_day >= 7) & (of_day < 23)
    prices = money(
        steps,
        import_price=np.where(peak, 0.150, np.where(day, 0.112, 0.074)),
        export_price=0.045,
        fuel_price=0.040,
        export_limit_kW=2000.0,
        charges=(
            charge(steps, 6.5, excess_kW=150.0),
            charge(steps, 4.0, counted=np.asarray(peak), name="peak window"),
        ),
        fixed=30000.0,
    )
    envelope = plant(
        unit,
        heaters=(
            boiler("steam", maximum_kW=8000.0, efficiency=0.90, standing_kW=80.0),
            boiler("hot_water", maximum_kW=18000.0, efficiency=0.93, standing_kW=60.0),
        ),
        chillers=(
            ChillerEnvelope("electric", "power", 8000.0, 4.0),
            ChillerEnvelope("absorption", "hot_water", 1500.0, 0.7),
        ),
        store=StoreEnvelope(28000.0, 8000.0, 8000.0, 0.004) if store else None,
    )
    return envelope, prices, hourly


def _drifting(random: np.random.Generator, steps: int, memory: float, noise: float) -> FloatArray:
    """A first-order autoregressive series."""
    shocks = random.normal(0.0, noise, steps)
    series = np.zeros(steps)
    for step in range(1, steps):
        series[step] = memory * series[step - 1] + shocks[step]
    return series

"""Random small sites over all features that the fast engine knows."""

import numpy as np
import pandas as pd

from planner.market.prices import DemandCharge, Prices
from planner.plant.envelope import (
    ChillerEnvelope,
    HeaterEnvelope,
    OperatingEnvelope,
    StoreEnvelope,
    UnitEnvelope,
)
from tests.planner.dispatch.invented_plants import Machine, boiler, demands, money, plant

Site = tuple[OperatingEnvelope, Prices, pd.DataFrame]


def random_site(seed: int, *, store: bool | None = None) -> Site:
    """A site of 24 to 96 hours; the same seed always gives the same one."""
    random = np.random.default_rng(seed)
    steps = int(random.integers(24, 97))
    stored = bool(random.random() < 0.6) if store is None else store
    hourly = _demands(random, steps, hot_water=stored)
    unit = _unit(random, steps)
    wanted = [g for g in ("steam", "hot_water", "hot_gas") if hourly[f"{g}_kW"].any()]
    heaters = _heaters(random, hourly, wanted)
    chillers = _chillers(random, hourly, wanted)
    tank = None
    if stored:
        power_kW = float(random.uniform(300.0, 2500.0))
        loss = float(random.choice([0.0, 0.005, 0.03]))
        tank = StoreEnvelope(float(random.uniform(500, 12000)), power_kW, 1.2 * power_kW, loss)
    envelope = plant(unit, heaters=heaters, chillers=chillers, store=tank)
    return envelope, _prices(random, steps, hourly), hourly


def _demands(random: np.random.Generator, steps: int, *, hot_water: bool) -> pd.DataFrame:
    """Demands with a day's shape and noise; carriers come and go with the seed."""
    hour = np.arange(steps) % 24

    def shape(mean: float, depth: float, noise: float) -> np.ndarray:
        wave = 1.0 + depth * np.sin(2 * np.pi * (hour - random.uniform(0, 24)) / 24)
        return np.maximum(mean * wave * (1.0 + noise * random.normal(size=steps)), 0.0)

    cooling_kW = shape(random.uniform(300, 1500), 0.9, 0.2) * (random.random() < 0.4)
    power_kW = shape(random.uniform(1500, 5500), random.uniform(0, 0.6), 0.08) + cooling_kW / 4.0
    heat_kW = {
        grade: shape(random.uniform(500, 4500), random.uniform(0, 0.8), 0.1)
        * (random.random() < likely)
        for grade, likely in (("steam", 0.6), ("hot_gas", 0.3), ("hot_water", 0.7))
    }
    if hot_water or not any(demand.any() for demand in heat_kW.values()):
        heat_kW["hot_water"] = shape(random.uniform(500, 5000), 0.6, 0.1)
    return demands(steps, power=power_kW, cooling=cooling_kW, **heat_kW)


def _unit(random: np.random.Generator, steps: int) -> UnitEnvelope:
    """A unit with one to three segments and some of the paths; heat slopes may rise."""
    count = int(random.integers(1, 4))
    size_kW = float(random.uniform(1000, 5000))
    minimum_kW = size_kW * float(random.uniform(0.3, 0.7))
    widths_kW = (size_kW - minimum_kW) * random.dirichlet(np.ones(count))
    slopes = np.sort(random.uniform(1.9, 3.2, count))
    full = float(random.uniform(0.35, 0.6))
    heat = (full * minimum_kW * 3.2, float(random.uniform(0.2, 1.4)))
    water_kW = float(random.uniform(0.1, 0.5)) * heat[0]
    paths = {
        "hot gas": {"hot_gas": heat},
        "steam, then water": {"steam": (0.75 * heat[0], heat[1]), "hot_water": (water_kW, 0.15)},
        "water only": {"hot_water": (1.1 * heat[0], 1.1 * heat[1])},
    }
    kept = {name: heats for name, heats in paths.items() if random.random() < 0.75}
    available = np.ones(steps, dtype=bool)
    if random.random() < 0.3:
        out = int(random.integers(0, steps - 6))
        available[out : out + 6] = False
    return Machine(
        minimum_kW=minimum_kW,
        segment_kW=tuple(widths_kW),
        fuel_at_minimum_kW=minimum_kW * float(random.uniform(2.9, 4.2)),
        fuel_slope=tuple(slopes),
        paths=kept,
        start_fuel_kWh=float(random.choice([0.0, 800.0])),
        up_h=float(random.integers(0, 7)),
        down_h=float(random.integers(0, 6)),
        per_run_hour=float(random.uniform(0, 20)),
        per_kWh=0.005,
        per_start=float(random.uniform(0, 300)),
        available=available,
    ).over(steps, scale=1.0 + 0.05 * np.sin(np.arange(steps) / 9.0))


def _heaters(
    random: np.random.Generator, hourly: pd.DataFrame, wanted: list[str]
) -> tuple[HeaterEnvelope, ...]:
    """Enough heaters for every grade, sometimes a good small one before a poor large one."""
    heaters = []
    for grade in wanted:
        most_kW = float(hourly[f"{grade}_kW"].max()) + 1500.0
        if random.random() < 0.4:
            heaters.append(boiler(grade, maximum_kW=0.4 * most_kW, efficiency=0.95))
        efficiency = float(random.uniform(0.8, 0.92))
        heaters.append(boiler(grade, maximum_kW=most_kW, efficiency=efficiency, standing_kW=20.0))
    return tuple(heaters)


def _chillers(
    random: np.random.Generator, hourly: pd.DataFrame, wanted: list[str]
) -> tuple[ChillerEnvelope, ...]:
    """An electric chiller where there is cooling, and sometimes an absorption chiller."""
    if not hourly["cooling_kW"].any():
        return ()
    most_kW = float(hourly["cooling_kW"].max())
    chillers = [ChillerEnvelope("electric", "power", 1.05 * most_kW, 4.0)]
    drives = [grade for grade in wanted if grade != "hot_gas"]
    if drives and random.random() < 0.7:
        drive = str(random.choice(drives))
        chillers.append(ChillerEnvelope("absorption", drive, 0.5 * most_kW, 0.7))
    return tuple(chillers)


def _prices(random: np.random.Generator, steps: int, hourly: pd.DataFrame) -> Prices:
    """Hourly prices, export or none, and up to three demand charges over two periods."""
    hour = np.arange(steps) % 24
    import_price = random.uniform(0.06, 0.16) * (1.0 + 0.4 * (hour > 7) * (hour < 21))
    import_price = import_price * (1.0 + 0.15 * random.normal(size=steps))
    import_price = np.where(random.random(steps) < 0.03, -0.02, import_price)
    period = (np.arange(steps) >= steps * random.uniform(0.3, 0.7)).astype(np.int64)
    windows = (np.ones(steps, bool), (hour >= 16) & (hour < 21), (hour >= 8) & (hour < 16))
    count = int(random.integers(0, 4))
    charges = tuple(
        DemandCharge(f"charge {n}", windows[n], period, random.uniform(0, 2.0, 2), np.zeros(2))
        for n in range(count)
    )
    most_kW = float(hourly["power_kW"].max())
    return money(
        steps,
        import_price=import_price,
        export_price=np.minimum(import_price, 0.6 * import_price),
        fuel_price=random.uniform(0.02, 0.05) * (1.0 + 0.1 * random.random(steps)),
        import_limit_kW=1.2 * most_kW,
        export_limit_kW=float(random.choice([0.0, 800.0, 5000.0])),
        charges=charges,
        fixed=100.0,
    )

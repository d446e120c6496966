"""Random small sites over all features of the dispatch, each made from its seed."""

import numpy as np
import pandas as pd

from planner.market.prices import Prices
from planner.plant.envelope import ChillerEnvelope, OperatingEnvelope, StoreEnvelope
from tests.planner.dispatch.invented_plants import Machine, boiler, charge, demands, money, plant


def random_site(
    seed: int, *, steps: int | None = None
) -> tuple[OperatingEnvelope, Prices, pd.DataFrame]:
    """A site of a day or two, whose unit, grades of heat, store and charges are drawn."""
    draw = np.random.default_rng(seed)
    steps = int(draw.integers(24, 49)) if steps is None else steps
    hour = np.arange(steps)
    shape = 1.0 + 0.4 * np.sin(2 * np.pi * (hour - draw.integers(24)) / 24)
    grades = [grade for grade in ("steam", "hot_water", "hot_gas") if draw.random() < 0.6]
    cooled = draw.random() < 0.4
    hourly = demands(
        steps,
        power=draw.uniform(60, 160) * shape * draw.uniform(0.7, 1.3, steps),
        cooling=draw.uniform(10, 60) * draw.random(steps) if cooled else 0.0,
        **{
            grade: draw.uniform(20, 200) * np.roll(shape, 5) * draw.uniform(0.6, 1.4, steps)
            for grade in grades
        },
    )
    return _plant(draw, steps, cooled=cooled), _prices(draw, steps), hourly


def _plant(draw: np.random.Generator, steps: int, *, cooled: bool) -> OperatingEnvelope:
    """A unit with one to three segments and concave yields, heaters, perhaps store and chillers."""
    segments = int(draw.integers(1, 4))
    widths = draw.uniform(10, 40, segments)
    available = np.ones(steps, dtype=bool)
    if draw.random() < 0.3:
        first = int(draw.integers(steps - 6))
        available[first : first + 6] = False
    paths: dict[str, dict[str, tuple[float, float]]] = {
        "hot gas": {"hot_gas": (draw.uniform(60, 120), draw.uniform(0.5, 1.2))},
        "steam, then water": {
            "steam": (draw.uniform(40, 80), draw.uniform(0.3, 0.8)),
            "hot_water": (draw.uniform(10, 40), draw.uniform(0.1, 0.4)),
        },
        "water only": {"hot_water": (draw.uniform(70, 120), draw.uniform(0.5, 1.2))},
    }
    unit = Machine(
        minimum_kW=draw.uniform(25, 60),
        segment_kW=tuple(widths),
        fuel_at_minimum_kW=draw.uniform(140, 230),
        fuel_slope=tuple(np.sort(draw.uniform(1.8, 3.5, segments))),
        paths={name: yields for name, yields in paths.items() if draw.random() < 0.7},
        start_fuel_kWh=draw.uniform(0, 100),
        up_h=float(draw.integers(0, 7)),
        down_h=float(draw.integers(0, 6)),
        per_run_hour=draw.uniform(0, 1),
        per_kWh=draw.uniform(0, 0.01),
        per_start=draw.uniform(0, 8),
        available=available,
    ).over(steps, scale=draw.uniform(0.9, 1.1, steps))
    chillers = [ChillerEnvelope("electric", "power", 100.0, draw.uniform(3, 5))] if cooled else []
    if cooled and draw.random() < 0.7:
        chillers.append(ChillerEnvelope("absorption", "hot_water", draw.uniform(10, 60), 0.7))
    store = StoreEnvelope(draw.uniform(100, 600), draw.uniform(30, 120), 100.0, 0.01)
    return plant(
        unit,
        heaters=tuple(
            boiler(grade, maximum_kW=900.0, efficiency=draw.uniform(0.8, 0.95), standing_kW=2.0)
            for grade in ("steam", "hot_water", "hot_gas")
        ),
        chillers=tuple(chillers),
        store=store if draw.random() < 0.6 else None,
    )


def _prices(draw: np.random.Generator, steps: int) -> Prices:
    """Prices by the hour, export below import, none to two demand charges in periods of a day."""
    bought = draw.uniform(0.05, 0.16, steps)
    charges = []
    for name in ("any time", "window"):
        if draw.random() < 0.5:
            counted = np.ones(steps, dtype=bool) if name == "any time" else draw.random(steps) < 0.4
            one = charge(steps, draw.uniform(0.1, 0.8), counted=counted, excess_kW=3.0, name=name)
            periods = np.arange(steps) // int(draw.choice([18, 24, 1000]))
            charges.append(type(one)(name, counted, periods, one.rate_per_kW, one.excess_kW))
    return money(
        steps,
        import_price=bought,
        export_price=draw.uniform(0.2, 0.95) * bought,
        fuel_price=draw.uniform(0.02, 0.05),
        import_limit_kW=400.0,
        export_limit_kW=float(draw.choice([0.0, 30.0, 200.0])),
        charges=tuple(charges),
        fixed=5.0,
    )

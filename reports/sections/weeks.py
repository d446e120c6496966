"""A typical winter and a typical summer week, power and heat."""

from typing import Any

import numpy as np
import pandas as pd

from reports.charts import palette
from reports.charts.week import Band, draw_week
from reports.errors import ReportError
from reports.figures import Figure, Figures
from reports.flows import column, direct_kW, heat_demand_kW, heaters_kW
from reports.numbers import energy, number, percent
from reports.results_folder import ResultsFolder
from reports.wording import GRADES, exhaust_heat, heaters_name, upper_first

DAYS = 7


def weeks(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """Four figures."""
    days = results.facts["weeks"]
    drawn: list[Figure] = []
    for season, key in (("winter", "winter_monday"), ("summer", "summer_monday")):
        frame = _week(results, str(days[key]))
        names = [
            stamp.strftime("%a\u202f%-d\u202f%b")
            for stamp in pd.date_range(days[key], periods=DAYS)
        ]
        drawn.append(_power(frame, season, names, figures, results.step_h))
        drawn += _heat(results, frame, season, names, figures)
    return {"title": "A winter and a summer week, and the months", "figures": drawn}


def _week(results: ResultsFolder, monday: str) -> pd.DataFrame:
    """Steps of one week on the local clock."""
    frame = results.hourly[results.subject["key"]]
    first = pd.to_datetime(monday, errors="coerce", format="%Y-%m-%d")
    week = frame[(frame.index >= first) & (frame.index < first + pd.Timedelta(days=DAYS))]
    if len(week) < (DAYS - 1) * results.steps_a_day:
        raise ReportError(f"results.json: weeks = {monday}: must begin a week of the hourly files")
    return week


def _power(
    frame: pd.DataFrame, season: str, days: list[str], figures: Figures, step_h: float
) -> Figure:
    """Power of one week."""
    made, grid_import = column(frame, "unit_power_kW"), column(frame, "grid_import_kW")
    export = column(frame, "grid_export_kW")
    own = np.clip(made - export, 0, None)
    svg = draw_week(
        [Band("Own power", own, palette.POWER), Band("Grid import", grid_import, palette.IMPORT)],
        own + grid_import,
        days,
        below=Band("Export", export, palette.EXPORT),
        what="power",
    )
    share = float(own.sum() / max((own + grid_import).sum(), 1e-9))
    hours = float(column(frame, "unit_on").sum()) * step_h
    title = f"{upper_first(season)} power: {percent(share)} is made on the site"
    return figures.add(
        svg,
        title=title,
        see=(
            f"What to see: the unit runs {number(hours)} of {number(len(frame) * step_h)} "
            "hours; the grid fills the rest."
        ),
        alt=f"{title}; import {energy(float(grid_import.sum()) * step_h)} in the week.",
    )


def _heat(
    results: ResultsFolder, frame: pd.DataFrame, season: str, days: list[str], figures: Figures
) -> list[Figure]:
    """Heat of one week; nothing for a site without heat."""
    demand_kW = heat_demand_kW(frame)
    if not demand_kW.any():
        return []
    bands = [
        Band(exhaust_heat(grade), direct_kW(frame, grade), palette.RECOVERED[grade])
        for grade in GRADES
    ]
    bands.append(Band("Store", column(frame, "store_discharge_kW"), palette.STORE))
    bands.append(Band(upper_first(heaters_name(results.facts)), heaters_kW(frame), palette.HEATERS))
    share = 1.0 - float(heaters_kW(frame).sum() / demand_kW.sum())
    title = f"{upper_first(season)} heat: {percent(max(share, 0.0))} comes from the exhaust"
    charged = float(column(frame, "store_charge_kW").sum()) * results.step_h
    store = f" The store took in {energy(charged)}." if charged > 0.0 else ""
    svg = draw_week(bands, demand_kW, days, what="heat")
    return [
        figures.add(
            svg,
            title=title,
            see=f"What to see: exhaust heat below, {heaters_name(results.facts)} on top.{store}",
            alt=f"{title}; heat of the week {energy(float(demand_kW.sum()) * results.step_h)}.",
        )
    ]

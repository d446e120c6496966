"""The year ribbon: daily mean heat of the whole year, in the head of every page."""

import numpy as np

from reports.charts.drawing import Drawing
from reports.charts.palette import HEAT_SCALE
from reports.charts.raster import coloured_png_base64


def draw_ribbon(daily_mean_kW: list[float], width_mm: float = 174.0, height_mm: float = 2.0) -> str:
    """Draw the ribbon.

    Parameters
    ----------
    daily_mean_kW : list of float, one a day [kW]
        January first.
    width_mm, height_mm : float [mm]
        Size on paper.

    Returns
    -------
    str
        SVG.
    """
    days = np.asarray(daily_mean_kW, dtype=np.float64)
    span = float(np.ptp(days)) if days.size else 0.0
    shares = (days - days.min()) / span if span > 0.0 else np.full(max(days.size, 1), 0.3)
    drawing = Drawing(width_mm, height_mm)
    drawing.image(0, 0, width_mm, height_mm, coloured_png_base64(shares[None, :], HEAT_SCALE))
    return drawing.svg()

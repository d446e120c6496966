"""Cooling known only as a yearly total, spread by cooling degree-hours and a day shape."""

import numpy as np

from load_profiles.arrays import FloatArray
from load_profiles.clock import SiteClock
from load_profiles.day_shapes import day_shape, shape_in_hours
from load_profiles.declarations import CoolingDegrees
from load_profiles.degree_days import cooling_degree_hours
from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding


def spread_cooling(
    cooling: CoolingDegrees, ambient_degC: FloatArray, *, path: str, site: SiteClock
) -> tuple[FloatArray, Finding]:
    """Yearly cooling over the hours, closing on the total.

    Parameters
    ----------
    cooling : CoolingDegrees
        As declared.
    ambient_degC : array, shape (hours,) [degC]
        Weather of the year.
    path : str
        Section of the study file.
    site : SiteClock
        Zone and year.

    Returns
    -------
    array, shape (hours,) [kW]
        The base share by the day shape, the rest by degree-hours times the day shape.
    Finding
        That the hours are synthesised.

    Raises
    ------
    ProfileError
        If the shape is unknown or no hour is warm enough.
    """
    wall = site.wall(site.slots(60))
    shape = shape_in_hours(day_shape(cooling.shape, path=f"{path}.shape"), wall)
    warm = cooling_degree_hours(ambient_degC, cooling.base_temperature_degC) * shape
    if cooling.base_share_frac < 1.0 and not warm.sum() > 0.0:
        came = f"{cooling.base_temperature_degC:g}"
        must = f"must be below the warmest hour, {ambient_degC.max():.1f} degC"
        raise ProfileError((Fault(f"{path}.base_temperature_degC", came, must),))
    total_kWh = cooling.annual_cooling_MWh * 1000.0
    base_kW = cooling.base_share_frac * shape / shape.sum()
    warm_kW = (1.0 - cooling.base_share_frac) * warm / max(warm.sum(), np.finfo(float).tiny)
    hours = int((warm > 0.0).sum())
    finding = Finding(
        path,
        f"cooling is synthesised: {cooling.base_share_frac:.0%} by the day shape, the rest over "
        f"{hours} h above {cooling.base_temperature_degC:g} degC",
        f"{total_kWh:,.0f} kWh; no hour of it is metered",
        "Meter the chilled water through a summer before an absorption chiller is decided.",
        "attention",
    )
    return np.asarray(total_kWh * (base_kW + warm_kW)), finding

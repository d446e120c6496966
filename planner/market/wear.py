"""What running wears out: maintenance and the overhaul reserve, by hour, energy and start."""

from typing import NamedTuple

from planner.study.sections import Unit

KWH_PER_MWH = 1e3


class Wear(NamedTuple):
    """Cost of running a unit, without fuel.

    Parameters
    ----------
    cost_per_run_hour : float [currency/h]
        Maintenance by run hour and the overhaul reserve.
    cost_per_kWh : float [currency/kWh]
        Maintenance by net power made.
    cost_per_start : float [currency]
        Maintenance by start.
    """

    cost_per_run_hour: float
    cost_per_kWh: float
    cost_per_start: float


def wear(unit: Unit) -> Wear:
    """Cost of running a unit, for the dispatch.

    Parameters
    ----------
    unit : Unit
        Maintenance rates and overhaul.

    Returns
    -------
    Wear
        The overhaul is spread evenly over the run hours between two of them.
    """
    return Wear(
        cost_per_run_hour=unit.maintenance_per_run_hour + overhaul_reserve_per_run_hour(unit),
        cost_per_kWh=unit.maintenance_per_MWh / KWH_PER_MWH,
        cost_per_start=unit.maintenance_per_start,
    )


def overhaul_reserve_per_run_hour(unit: Unit) -> float:
    """What each run hour puts aside for the next overhaul.

    Parameters
    ----------
    unit : Unit
        Cost of an overhaul and run hours between two.

    Returns
    -------
    float [currency/h]
        Cost over interval; real money, so that a reserve needs no interest.
    """
    return unit.overhaul_cost / unit.overhaul_every_run_hours

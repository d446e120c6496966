"""A schedule's machines held against what they can do, from the flows alone."""

import numpy as np
import pandas as pd

from planner.arrays import BoolArray, FloatArray
from planner.plant.envelope import OperatingEnvelope, UnitEnvelope

#: Flows keep limits to this share of the machine's largest.
TOLERANCE_FRAC = 1e-6

#: Shares of the exhaust are quotients of solver values.
SHARE_TOLERANCE = 1e-5

GRADES = ("steam", "hot_water", "hot_gas")


def machine_complaints(
    flows: pd.DataFrame, envelope: OperatingEnvelope, step_h: float
) -> list[str]:
    """Everything that a unit, heater or chiller is made to do and cannot.

    Parameters
    ----------
    flows : DataFrame, one row a step
        `Schedule.hourly`.
    envelope : OperatingEnvelope
        Machines.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    list of str
        Empty where all is well.
    """
    return [
        *(complaint for unit in envelope.units for complaint in _unit_limits(flows, unit)),
        *_heat_offered(flows, envelope),
        *_fuel_of_heaters(flows, envelope),
        *_drives(flows, envelope),
        *_minimum_times(flows, envelope, step_h),
    ]


def _array(flows: pd.DataFrame, name: str) -> FloatArray:
    """One column as an array."""
    return flows[name].to_numpy(dtype=np.float64)


def _unit_limits(flows: pd.DataFrame, unit: UnitEnvelope) -> list[str]:
    """The unit between its minimum and maximum while on and available, at zero while off."""
    on, power_kW = _array(flows, "unit_on"), _array(flows, "unit_power_kW")
    slack_kW = TOLERANCE_FRAC * float(unit.maximum_power_kW.max())
    complaints = []
    if ((on > 0) & ~unit.available).any():
        complaints.append("the unit runs in an outage")
    if (power_kW > on * unit.maximum_power_kW + slack_kW).any():
        complaints.append("the unit makes more than it can, or makes power while off")
    if (power_kW < on * unit.minimum_power_kW - slack_kW).any():
        complaints.append("the unit runs below its minimum")
    least_lhv_kW = _least_fuel_lhv_kW(unit, on, power_kW)
    if (np.abs(_array(flows, "unit_fuel_lhv_kW") - least_lhv_kW) > slack_kW).any():
        complaints.append("the unit's fuel is not that of its power")
    return complaints


def _least_fuel_lhv_kW(unit: UnitEnvelope, on: FloatArray, power_kW: FloatArray) -> FloatArray:
    """Fuel of a power, its segments filled in order."""
    left_kW = np.maximum(power_kW - on * unit.minimum_power_kW, 0.0)
    fuel_lhv_kW = on * unit.fuel_at_minimum_lhv_kW
    for k in range(unit.segment_power_kW.shape[1]):
        taken_kW = np.minimum(left_kW, unit.segment_power_kW[:, k])
        fuel_lhv_kW = fuel_lhv_kW + unit.fuel_slope_lhv[:, k] * taken_kW
        left_kW = left_kW - taken_kW
    return np.asarray(fuel_lhv_kW)


def _heat_offered(flows: pd.DataFrame, envelope: OperatingEnvelope) -> list[str]:
    """Shares add up to the state; heat is no more than the best path could yield."""
    complaints = []
    shares = [name for name in flows.columns if name.startswith("share_")]
    split_frac = flows[shares].sum(axis=1).to_numpy()
    whole_frac = (_array(flows, "unit_fuel_lhv_kW") > 0.0).astype(np.float64)
    if not np.abs(split_frac - whole_frac).max() <= SHARE_TOLERANCE:
        complaints.append("the shares of the exhaust do not add up to one while the unit runs")
    for grade in GRADES:
        offered_kW = _array(flows, f"unit_{grade}_kW")
        if (
            _array(flows, f"dumped_{grade}_kW") > offered_kW + TOLERANCE_FRAC * _top(offered_kW)
        ).any():
            complaints.append(f"more {grade} is dumped than offered")
        most_kW = np.zeros(len(flows))
        for unit in envelope.units:
            most_kW = most_kW + _most_heat_kW(unit, grade) * _array(flows, "unit_on")
        if (offered_kW > most_kW + TOLERANCE_FRAC * _top(most_kW)).any():
            complaints.append(f"the unit offers more {grade} than any path yields")
    return complaints


def _top(flow_kW: FloatArray) -> float:
    """Largest value, at least one."""
    return max(float(flow_kW.max()), 1.0)


def _most_heat_kW(unit: UnitEnvelope, grade: str) -> FloatArray:
    """Most heat of a grade that a path yields anywhere between minimum and maximum."""
    most_kW = np.zeros(len(unit.available))
    for path in unit.paths:
        if grade in path.yield_at_minimum_kW:
            further_kW = np.maximum(path.yield_slope[grade], 0.0) * unit.segment_power_kW
            most_kW = np.maximum(most_kW, path.yield_at_minimum_kW[grade] + further_kW.sum(axis=1))
    return most_kW


def _fuel_of_heaters(flows: pd.DataFrame, envelope: OperatingEnvelope) -> list[str]:
    """Heaters burn no less than the best of each grade would, filled in order of efficiency."""
    least_lhv_kW = np.full(len(flows), sum(h.standing_fuel_lhv_kW for h in envelope.heaters))
    for grade in GRADES:
        left_kW = _array(flows, f"heater_{grade}_kW")
        heaters = [h for h in envelope.heaters if h.carrier == grade]
        for heater in sorted(heaters, key=lambda h: h.fuel_per_heat_lhv):
            taken_kW = np.minimum(left_kW, heater.maximum_heat_kW)
            least_lhv_kW = least_lhv_kW + heater.fuel_per_heat_lhv * taken_kW
            left_kW = left_kW - taken_kW
    burnt_lhv_kW = _array(flows, "heater_fuel_lhv_kW")
    if not np.abs(burnt_lhv_kW - least_lhv_kW).max() <= TOLERANCE_FRAC * _top(burnt_lhv_kW):
        return ["the heaters' fuel is not that of their heat"]
    return []


def _drives(flows: pd.DataFrame, envelope: OperatingEnvelope) -> list[str]:
    """Chillers take no less drive than the best of their kind would."""
    complaints = []
    for cooling, drive, electric in (
        ("electric_cooling_kW", "chiller_power_kW", True),
        ("absorption_cooling_kW", "absorption_heat_kW", False),
    ):
        cops = [c.cop for c in envelope.chillers if (c.drive == "power") == electric]
        least_kW = _array(flows, cooling) / max(cops, default=1.0)
        taken_kW = _array(flows, drive)
        if not (taken_kW >= least_kW - TOLERANCE_FRAC * _top(taken_kW)).all():
            complaints.append(f"{drive} is less than {cooling} needs")
    return complaints


def _minimum_times(flows: pd.DataFrame, envelope: OperatingEnvelope, step_h: float) -> list[str]:
    """Runs and stops that begin and end within the year are long enough."""
    if not envelope.units:
        return []
    unit = envelope.units[0]
    on = _array(flows, "unit_on") > 0
    lengths, running = _inner_runs(on)
    complaints = []
    for kind, wanted_h, state in (
        ("run", unit.minimum_up_h, True),
        ("stop", unit.minimum_down_h, False),
    ):
        kept = lengths[running == state] * step_h
        if kept.size and kept.min() < wanted_h - 0.5 * step_h:
            complaints.append(f"a {kind} of {kept.min():g} h is shorter than {wanted_h:g} h")
    started = np.concatenate([[False], on[1:] & ~on[:-1]])
    if not np.array_equal(started, _array(flows, "unit_start") > 0):
        complaints.append("the starts are not those of the state")
    return complaints


def _inner_runs(on: BoolArray) -> tuple[np.ndarray, BoolArray]:
    """Lengths in steps of all runs and stops but the first and the last, and which they are."""
    changes = np.flatnonzero(np.diff(on.astype(np.int8))) + 1
    return np.diff(changes), on[changes[:-1]]

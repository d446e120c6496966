"""NOx of a year, anchored on the maker's guarantee, beside the limit of a named regime."""

from dataclasses import dataclass

import numpy as np
import pandas as pd

from planner.arrays import BoolArray, FloatArray
from planner.outcome.nox_limits import NoxLimit, mg_per_Nm3_from_ppm, nox_limit
from planner.plant.fuel import GasFuel
from planner.results.records import Nox, Status
from planner.study.sections import GuaranteedNox, Unit
from planner.study.study import Study

#: Share of the load below which a combustor is taken to have left its low-NOx mode: pilot switch
#: at 50 to 60 % (*common practice*).
PILOT_LOAD_FRAC = 0.6

#: A load this little below the guarantee's is at it: the solver's tolerance.
LOAD_TOLERANCE_FRAC = 1e-6

SECONDS_PER_HOUR = 3600.0
MG_PER_G = 1e3
G_PER_KG = 1e3


@dataclass(frozen=True)
class _Band:
    """Emission over the guarantee: low edge, centre, high edge."""

    low: float
    centre: float
    high: float

    def edges(self) -> tuple[float, float, float]:
        """From low to high."""
        return self.low, self.centre, self.high


#: Where the guarantee holds it is a ceiling: the centre lies at 0.8, the low edge at 0.6 of it
#: (*common practice*).
INSIDE = _Band(0.6, 0.8, 1.0)

#: Outside, but in low-NOx mode, the ceiling is the best estimate and holds to a quarter
#: (*common practice*); the low edge stays where it was.
OUTSIDE = _Band(0.6, 1.0, 1.25)

#: Below the pilot switch, and for the fuel of a start: a factor of two either way
#: (*common practice*).
BELOW_PILOT = _Band(0.5, 1.0, 2.0)


def nox(
    study: Study, unit: Unit, fuel: GasFuel, hourly: pd.DataFrame, step_h: float
) -> tuple[Nox, FloatArray]:
    """NOx indicator of a unit's year.

    Parameters
    ----------
    study : Study
        Its regime and local limit.
    unit : Unit
        The maker's guarantee.
    fuel : GasFuel
        Its dry flue gas at 15 % oxygen.
    hourly : DataFrame, one row a step
        `unit_on`, `unit_power_kW`, `unit_maximum_kW`, `unit_fuel_lhv_kW`, `start_fuel_lhv_kW` and
        `ambient_degC`, with the exact plant model.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    tuple of Nox and array, shape (steps,) [g/s]
        The record, and the centre of the band in each step, as NO2.

    Notes
    -----
    The band holds nine cases in ten. It spans the lowest and highest edge of the hours in which
    the limit applies; the centre is their mean by fuel. Without an anchor no absolute value would
    be given: lean premix doubles its NOx within some 50 K of a flame temperature that only the
    maker knows. The year's mass counts every hour and the fuel of each start.
    """
    on = hourly["unit_on"].to_numpy() > 0
    load_frac = _load_frac(hourly, on)
    inside = _inside_guarantee(unit.sheet.nox, load_frac, hourly["ambient_degC"].to_numpy())
    factors = _factors(inside, load_frac)
    fuel_kW = np.where(on, hourly["unit_fuel_lhv_kW"].to_numpy(), 0.0)
    guarantee = mg_per_Nm3_from_ppm(unit.sheet.nox.nox_ppm_15O2)
    at_guarantee_g_per_kWh = guarantee * fuel.dry_flue_gas_15O2_Nm3_per_lhv_kWh / MG_PER_G
    flows_g_per_s = [
        (fuel_kW * running + hourly["start_fuel_lhv_kW"].to_numpy() * starting)
        * (at_guarantee_g_per_kWh / SECONDS_PER_HOUR)
        for running, starting in zip(factors, BELOW_PILOT.edges(), strict=True)
    ]
    limit = nox_limit(study)
    band = _band_where_limited(factors, fuel_kW, on & (load_frac >= limit.above_load_frac))
    low_kg, centre_kg, high_kg = (_annual_kg(flow, step_h) for flow in flows_g_per_s)
    record = Nox(
        guarantee_ppm_15O2=unit.sheet.nox.nox_ppm_15O2,
        guarantee_mg_per_Nm3=guarantee,
        band_low_mg_per_Nm3=band.low * guarantee,
        band_centre_mg_per_Nm3=band.centre * guarantee,
        band_high_mg_per_Nm3=band.high * guarantee,
        limit_mg_per_Nm3=limit.mg_per_Nm3,
        regime=limit.regime,
        regime_source=limit.source,
        status=_status(band, guarantee, limit),
        annual_low_kg=low_kg,
        annual_centre_kg=centre_kg,
        annual_high_kg=high_kg,
        hours_outside_guarantee=float((on & ~inside).sum()) * step_h,
    )
    return record, flows_g_per_s[1]


def _annual_kg(flow_g_per_s: FloatArray, step_h: float) -> float:
    """Mass of a year."""
    return float(flow_g_per_s.sum()) * step_h * SECONDS_PER_HOUR / G_PER_KG


def _load_frac(hourly: pd.DataFrame, on: BoolArray) -> FloatArray:
    """Load of each step over what the unit could make in it; zero while off."""
    power_kW = hourly["unit_power_kW"].to_numpy()
    maximum_kW = hourly["unit_maximum_kW"].to_numpy()
    running = on & (maximum_kW > 0.0)
    return np.divide(power_kW, maximum_kW, out=np.zeros(len(power_kW)), where=running)


def _inside_guarantee(
    guarantee: GuaranteedNox, load_frac: FloatArray, ambient_degC: FloatArray
) -> BoolArray:
    """Steps whose load and ambient lie in the guarantee's range."""
    loaded = load_frac >= guarantee.from_load_frac - LOAD_TOLERANCE_FRAC
    warm = ambient_degC >= guarantee.from_ambient_degC
    return np.asarray(loaded & warm & (ambient_degC <= guarantee.to_ambient_degC))


def _factors(inside: BoolArray, load_frac: FloatArray) -> list[FloatArray]:
    """Low, centre and high over the guarantee, step by step."""
    premixed = load_frac >= PILOT_LOAD_FRAC - LOAD_TOLERANCE_FRAC
    bands = zip(INSIDE.edges(), OUTSIDE.edges(), BELOW_PILOT.edges(), strict=True)
    return [
        np.where(inside, within, np.where(premixed, outside, below))
        for within, outside, below in bands
    ]


def _band_where_limited(
    factors: list[FloatArray], fuel_kW: FloatArray, limited: BoolArray
) -> _Band:
    """Band over the hours in which the limit applies; the guarantee's own where there are none."""
    weight_kW = fuel_kW[limited]
    if weight_kW.sum() <= 0.0:
        return INSIDE
    low, centre, high = (factor[limited] for factor in factors)
    return _Band(float(low.min()), float(np.average(centre, weights=weight_kW)), float(high.max()))


def _status(band: _Band, guarantee_mg_per_Nm3: float, limit: NoxLimit) -> Status:
    """Met, at risk where the band crosses the limit, exceeded where all of it lies above."""
    if band.high * guarantee_mg_per_Nm3 <= limit.mg_per_Nm3:
        return "met"
    return "exceeded" if band.low * guarantee_mg_per_Nm3 > limit.mg_per_Nm3 else "at risk"

"""Exhaust heat to steam: designed by pinch, run off design by conductances.

The evaporator boils at the drum's temperature, so its gas falls towards it exponentially; the
economiser is counterflow, and its water is kept just below boiling.
"""

from dataclasses import dataclass

import numpy as np

from load_profiles import Fault
from planner.arrays import FloatArray
from planner.constants import ZERO_CELSIUS_K, STANDARD_PRESSURE_kPa
from planner.errors import StudyError
from planner.plant.exchange import (
    FLOW_EXPONENT,
    GasFlow,
    conductance_kW_per_K,
    counterflow_effectiveness,
)
from planner.plant.steam import (
    liquid_enthalpy_kJ_per_kg,
    saturation_degC,
    vapour_enthalpy_kJ_per_kg,
)
from planner.study.sections import SteamSystem

ITERATIONS = 40

#: An exhaust that falls by less than this to the pinch makes no steam worth a boiler.
LEAST_DROP_K = 5.0

#: Water of the economiser stays this far below boiling, or steam forms in it.
STEAMING_MARGIN_K = 1.0


@dataclass(frozen=True)
class SteamState:
    """Enthalpies of one steam system [kJ/kg], and what its feed costs.

    Parameters
    ----------
    pressure_kPa : float [kPa]
        At the drum, absolute.
    boiling_degC : float [degC]
        At the drum.
    steam, boiling, feed : float [kJ/kg]
        Dry saturated steam, boiling water and feedwater.
    blowdown_frac : float [-]
        Over steam made.
    site_per_steam : float [-]
        Steam that reaches the site over steam made; the rest heats the deaerator.
    useful_kJ_per_kg : float [kJ/kg]
        Worth of steam at the site's valve over returned condensate and make-up.
    """

    pressure_kPa: float
    boiling_degC: float
    steam: float
    boiling: float
    feed: float
    blowdown_frac: float
    site_per_steam: float
    useful_kJ_per_kg: float

    @property
    def useful_per_made_kJ_per_kg(self) -> float:
        """Useful heat of a kilogram of steam made."""
        return self.site_per_steam * self.useful_kJ_per_kg


def steam_state(system: SteamSystem) -> SteamState:
    """Enthalpies and deaerator of a steam system.

    Parameters
    ----------
    system : SteamSystem
        Pressure, condensate, make-up, feedwater and blowdown.

    Returns
    -------
    SteamState
        The deaerator takes live steam to bring condensate and make-up to the feedwater's
        temperature; blowdown is made up cold.

    Raises
    ------
    StudyError
        If the feedwater would boil at the drum's pressure.
    """
    pressure_kPa = system.pressure_kPa_gauge + STANDARD_PRESSURE_kPa
    boiling_degC = saturation_degC(pressure_kPa)
    if system.feedwater_degC >= boiling_degC:
        must = (
            f"must be below boiling, {boiling_degC:.1f} degC at "
            f"{system.pressure_kPa_gauge:g} kPa gauge"
        )
        fault = Fault("heat.steam.feedwater_degC", f"{system.feedwater_degC:g}", must)
        raise StudyError((fault,))
    steam = vapour_enthalpy_kJ_per_kg(pressure_kPa)
    feed = liquid_enthalpy_kJ_per_kg(system.feedwater_degC, pressure_kPa)
    returned = liquid_enthalpy_kJ_per_kg(system.condensate_degC)
    fresh = liquid_enthalpy_kJ_per_kg(system.make_up_degC)
    water = 1.0 + system.blowdown_frac
    # Per kilogram of steam made: site steam x, deaerator steam 1 - x, returned r x, the rest
    # fresh; the deaerator's balance (1 - x) steam + r x returned + fresh water = feed is linear.
    r = system.condensate_return_frac
    x = (steam + (water - 1.0) * fresh - water * feed) / (steam - r * returned - (1.0 - r) * fresh)
    useful = steam - r * returned - (1.0 - r) * fresh
    return SteamState(
        pressure_kPa=pressure_kPa,
        boiling_degC=boiling_degC,
        steam=steam,
        boiling=liquid_enthalpy_kJ_per_kg(boiling_degC, pressure_kPa),
        feed=feed,
        blowdown_frac=system.blowdown_frac,
        site_per_steam=float(np.clip(x, 0.0, 1.0)),
        useful_kJ_per_kg=useful,
    )


@dataclass(frozen=True)
class SteamBoiler:
    """A heat-recovery steam generator of one pressure, designed.

    Parameters
    ----------
    state : SteamState
        Water side.
    loss_frac : float [-]
        Casing loss over heat given up.
    feedwater_degC : float [degC]
        Water into the economiser.
    approach_K : float [K]
        Water below boiling out of the economiser at the design point.
    evaporator_kW_per_K, economiser_kW_per_K : float [kW/K]
        Conductances at the design flow.
    design_flow_kg_per_s : float [kg/s]
        Gas at the design point.
    """

    state: SteamState
    loss_frac: float
    feedwater_degC: float
    approach_K: float
    evaporator_kW_per_K: float
    economiser_kW_per_K: float
    design_flow_kg_per_s: float


@dataclass(frozen=True)
class SteamRun:
    """What a steam generator does in some hours; arrays of shape (hours,).

    Parameters
    ----------
    steam_kg_per_s : array [kg/s]
        Steam made, deaerator steam included.
    after_evaporator_K, stack_K : array [K]
        Gas between the banks and behind them.
    steaming : array of bool
        Whether the economiser boils.
    """

    steam_kg_per_s: FloatArray
    after_evaporator_K: FloatArray
    stack_K: FloatArray
    steaming: np.ndarray


def design_steam_boiler(
    exhaust: GasFlow, system: SteamSystem, *, pinch_K: float, approach_K: float, loss_frac: float
) -> SteamBoiler | None:
    """Size a steam generator for one exhaust.

    Parameters
    ----------
    exhaust : GasFlow
        One hour: the design point.
    system : SteamSystem
        Water side.
    pinch_K, approach_K : float [K]
        Gas above boiling behind the evaporator; water below boiling behind the economiser, and
        never below the feedwater.
    loss_frac : float [-]
        Casing loss over heat given up.

    Returns
    -------
    SteamBoiler or None
        With the conductances that the design needs; None where the gas is hardly hotter than
        boiling and pinch together.

    Raises
    ------
    StudyError
        If the feedwater would boil at the drum's pressure.
    """
    state = steam_state(system)
    boiling_K = state.boiling_degC + ZERO_CELSIUS_K
    pinch_gas_K = np.array([boiling_K + pinch_K])
    if not exhaust.temperature_K[0] > pinch_gas_K[0] + LEAST_DROP_K:
        return None
    evaporator_kW = exhaust.cooled_to_kW(pinch_gas_K) * (1.0 - loss_frac)
    # With low-pressure steam the feedwater may stand within the approach: no economiser then.
    leaving_degC = max(state.boiling_degC - approach_K, system.feedwater_degC)
    leaving = liquid_enthalpy_kJ_per_kg(leaving_degC, state.pressure_kPa)
    steam = evaporator_kW / _evaporation(state, leaving)
    economiser_kW = steam * (1.0 + state.blowdown_frac) * (leaving - state.feed)
    behind = exhaust.at(pinch_gas_K)
    stack_K = behind.after_kW(economiser_kW / (1.0 - loss_frac))
    feed_K = system.feedwater_degC + ZERO_CELSIUS_K
    return SteamBoiler(
        state=state,
        loss_frac=loss_frac,
        feedwater_degC=system.feedwater_degC,
        approach_K=approach_K,
        evaporator_kW_per_K=conductance_kW_per_K(
            evaporator_kW, exhaust.temperature_K - boiling_K, np.array([pinch_K])
        ),
        economiser_kW_per_K=conductance_kW_per_K(
            economiser_kW, pinch_gas_K - ZERO_CELSIUS_K - leaving_degC, stack_K - feed_K
        ),
        design_flow_kg_per_s=float(exhaust.flow_kg_per_s[0]),
    )


def run_steam_boiler(boiler: SteamBoiler, exhaust: GasFlow) -> SteamRun:
    """Steam of a generator in some hours.

    Parameters
    ----------
    boiler : SteamBoiler
        Designed.
    exhaust : GasFlow
        Gas of each hour.

    Returns
    -------
    SteamRun
        Zero steam where the gas is no hotter than boiling.
    """
    state, kept = boiler.state, 1.0 - boiler.loss_frac
    boiling_K = state.boiling_degC + ZERO_CELSIUS_K
    relative = (exhaust.flow_kg_per_s / boiler.design_flow_kg_per_s) ** FLOW_EXPONENT
    usable = exhaust.temperature_K > boiling_K
    hot_K = np.maximum(exhaust.temperature_K, boiling_K + 1e-3)
    gas = exhaust.at(hot_K)
    after_K = np.full_like(hot_K, boiling_K) + 0.1 * (hot_K - boiling_K)
    for _ in range(ITERATIONS):
        capacity = gas.cooled_to_kW(after_K) / (hot_K - after_K) * kept
        decay = np.exp(-boiler.evaporator_kW_per_K * relative / capacity)
        moved = boiling_K + (hot_K - boiling_K) * decay
        done = np.abs(moved - after_K).max() < 1e-9  # noqa: PLR2004 - a tolerance in K
        after_K = moved
        if done:
            break
    evaporator_kW = gas.cooled_to_kW(after_K) * kept
    run = _with_economiser(boiler, exhaust.at(after_K), evaporator_kW, relative)
    return SteamRun(
        steam_kg_per_s=np.where(usable, run.steam_kg_per_s, 0.0),
        after_evaporator_K=np.where(usable, run.after_evaporator_K, exhaust.temperature_K),
        stack_K=np.where(usable, run.stack_K, exhaust.temperature_K),
        steaming=run.steaming & usable,
    )


def _with_economiser(
    boiler: SteamBoiler, behind: GasFlow, evaporator_kW: FloatArray, relative: FloatArray
) -> SteamRun:
    """Steam and stack with the economiser's preheating, found together."""
    state, kept = boiler.state, 1.0 - boiler.loss_frac
    feed_K = boiler.feedwater_degC + ZERO_CELSIUS_K
    # Feedwater that is as good as boiling goes past the economiser.
    margin_K = state.boiling_degC + ZERO_CELSIUS_K - STEAMING_MARGIN_K
    hottest_K = max(margin_K, feed_K + 1e-3)
    hottest = liquid_enthalpy_kJ_per_kg(hottest_K - ZERO_CELSIUS_K, state.pressure_kPa)
    heat_per_K = (hottest - state.feed) / (hottest_K - feed_K)
    water_K = np.full_like(evaporator_kW, max(hottest_K - boiler.approach_K, feed_K))
    stack_K = behind.temperature_K - 30.0
    for _ in range(ITERATIONS):
        steam = evaporator_kW / _evaporation(state, state.feed + heat_per_K * (water_K - feed_K))
        water = np.maximum(steam * (1.0 + state.blowdown_frac) * heat_per_K, 1e-12)
        drop = np.maximum(behind.temperature_K - stack_K, 1e-6)
        gas = np.maximum(behind.cooled_to_kW(stack_K) / drop * kept, 1e-12)
        least = np.minimum(water, gas)
        ntu = boiler.economiser_kW_per_K * relative / least
        share = counterflow_effectiveness(ntu, least / np.maximum(water, gas))
        heat_kW = share * least * (behind.temperature_K - feed_K)
        reached_K = feed_K + heat_kW / water
        moved_K = np.minimum(reached_K, hottest_K)
        heat_kW = water * (moved_K - feed_K)
        stack_K = behind.after_kW(heat_kW / kept)
        done = np.abs(moved_K - water_K).max() < 1e-9  # noqa: PLR2004 - a tolerance in K
        water_K = moved_K
        if done:
            break
    return SteamRun(steam, behind.temperature_K, stack_K, reached_K > hottest_K)


def _evaporation(state: SteamState, entering: FloatArray | float) -> FloatArray:
    """Heat in the evaporator for a kilogram of steam, its blowdown included."""
    per_steam = state.steam - entering
    return np.asarray(per_steam + state.blowdown_frac * (state.boiling - entering))

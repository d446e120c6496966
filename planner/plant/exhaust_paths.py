"""The named ways of using an exhaust, each with its heat by grade."""

from dataclasses import dataclass

from planner.arrays import FloatArray
from planner.plant.drying import drying_heat_kW
from planner.plant.exchange import GasFlow
from planner.plant.running import Ambient, RunningPoint
from planner.plant.steam_boiler import SteamBoiler, design_steam_boiler, run_steam_boiler
from planner.plant.water_heater import WaterHeater, design_water_heater, run_water_heater
from planner.study.sections import Heat, Recovery

HOT_GAS, STEAM_THEN_WATER, WATER_ONLY, BYPASS = (
    "hot gas",
    "steam, then water",
    "water only",
    "bypass",
)

#: Column of `Schedule.hourly` with each path's share of the exhaust.
SHARE_COLUMNS = {
    HOT_GAS: "share_hot_gas_frac",
    STEAM_THEN_WATER: "share_steam_then_water_frac",
    WATER_ONLY: "share_water_only_frac",
    BYPASS: "share_bypass_frac",
}


@dataclass(frozen=True)
class HeatPaths:
    """Recovery of one option, designed for one exhaust.

    Parameters
    ----------
    heat : Heat
        Grades of the site.
    recovery : Recovery
        What the exhaust may be used for.
    boiler : SteamBoiler or None
        Where steam is made.
    behind_boiler, alone : WaterHeater or None
        Water heater behind the steam generator, and for the whole exhaust.
    """

    heat: Heat
    recovery: Recovery
    boiler: SteamBoiler | None
    behind_boiler: WaterHeater | None
    alone: WaterHeater | None

    @property
    def names(self) -> tuple[str, ...]:
        """Paths that this recovery allows; the bypass always."""
        offered = [
            (HOT_GAS, self.recovery.hot_gas),
            (STEAM_THEN_WATER, self.boiler is not None),
            (WATER_ONLY, self.alone is not None),
            (BYPASS, True),
        ]
        return tuple(name for name, allowed in offered if allowed)

    def yields_kW(self, point: RunningPoint, hours: Ambient) -> dict[str, dict[str, FloatArray]]:
        """Useful heat with the whole exhaust on each path.

        Parameters
        ----------
        point : RunningPoint
            The machine in some hours.
        hours : Ambient
            Their air.

        Returns
        -------
        dict of path to dict of grade to array, shape (hours,) [kW]
            Empty for the bypass.
        """
        exhaust = exhaust_of(point)
        found: dict[str, dict[str, FloatArray]] = {name: {} for name in self.names}
        if HOT_GAS in found and self.heat.hot_gas is not None:
            drying_kW = drying_heat_kW(exhaust, hours.air, hours.temperature_K, self.heat.hot_gas)
            found[HOT_GAS] = {"hot_gas": drying_kW}
        if self.boiler is not None:
            run = run_steam_boiler(self.boiler, exhaust)
            useful = self.boiler.state.useful_per_made_kJ_per_kg
            found[STEAM_THEN_WATER] = {"steam": run.steam_kg_per_s * useful}
            if self.behind_boiler is not None:
                water_kW, _ = run_water_heater(self.behind_boiler, exhaust.at(run.stack_K))
                found[STEAM_THEN_WATER]["hot_water"] = water_kW
        if self.alone is not None:
            found[WATER_ONLY] = {"hot_water": run_water_heater(self.alone, exhaust)[0]}
        return found


def exhaust_of(point: RunningPoint) -> GasFlow:
    """Exhaust of a running machine.

    Parameters
    ----------
    point : RunningPoint
        The machine in some hours.

    Returns
    -------
    GasFlow
        At the turbine's flange.
    """
    return GasFlow(point.gas, point.exhaust_kg_per_s, point.exhaust_K)


def design_paths(heat: Heat, recovery: Recovery, design: RunningPoint) -> HeatPaths:
    """Size a recovery for the exhaust at one design point.

    Parameters
    ----------
    heat : Heat
        Grades of the site.
    recovery : Recovery
        What the exhaust may be used for, and how closely.
    design : RunningPoint
        One hour: full load in the design ambient.

    Returns
    -------
    HeatPaths
        Banks with the conductances that the design needs; none where the exhaust is too cold.
    """
    exhaust = exhaust_of(design)
    boiler = behind = alone = None
    water = heat.hot_water if recovery.hot_water else None
    if recovery.steam and heat.steam is not None:
        boiler = design_steam_boiler(
            exhaust,
            heat.steam,
            pinch_K=recovery.pinch_K,
            approach_K=recovery.approach_K,
            loss_frac=recovery.loss_frac,
        )
    if boiler is not None and water is not None:
        stack = exhaust.at(run_steam_boiler(boiler, exhaust).stack_K)
        behind = design_water_heater(stack, water, recovery)
    if water is not None:
        alone = design_water_heater(exhaust, water, recovery)
    return HeatPaths(heat, recovery, boiler, behind, alone)

"""`OperatingEnvelope`: for every step what each machine can make and what it burns."""

from dataclasses import dataclass

from load_profiles import Finding
from planner.arrays import BoolArray, FloatArray


@dataclass(frozen=True)
class ExhaustPath:
    """One named way of using an exhaust, with what it yields.

    The paths of a unit share its exhaust: the dispatch sends a share of it along each. Yields are
    piecewise linear in net power over the same segments as the unit's fuel.

    Parameters
    ----------
    name : str
        "hot gas", "steam, then water", "water only" or "bypass".
    yield_at_minimum_kW : dict of carrier to array, shape (steps,) [kW]
        Useful heat by carrier ("hot_gas", "steam", "hot_water") with the whole exhaust on this
        path and the unit at its minimum power. Empty for the bypass.
    yield_slope : dict of carrier to array, shape (steps, segments) [kW/kW]
        Further useful heat for each further kW of net power, segment by segment.
    """

    name: str
    yield_at_minimum_kW: dict[str, FloatArray]
    yield_slope: dict[str, FloatArray]


@dataclass(frozen=True)
class UnitEnvelope:
    """One machine over the year, ready for the dispatch.

    Parameters
    ----------
    name : str
        As the study calls it.
    available : array, shape (steps,)
        False in planned outages.
    minimum_power_kW, maximum_power_kW : array, shape (steps,) [kW]
        Net power at the site's busbar; the minimum is the highest of mechanical minimum, emission
        guarantee and permit.
    segment_power_kW : array, shape (steps, segments) [kW]
        Widths of the segments between minimum and maximum; they add up to the difference.
    fuel_at_minimum_lhv_kW : array, shape (steps,) [kW LHV]
        Fuel at minimum power.
    fuel_slope_lhv : array, shape (steps, segments) [kW LHV/kW]
        Further fuel for each further kW, never falling from one segment to the next.
    paths : tuple of ExhaustPath
        At least the bypass.
    start_fuel_lhv_kWh : float [kWh LHV]
        Burnt at each start before any power is delivered.
    minimum_up_h, minimum_down_h : float [h]
        Once on, once off, for at least so long.
    cost_per_run_hour : float [currency/h]
        Maintenance and overhaul reserve, without fuel.
    cost_per_kWh, cost_per_start : float [currency/kWh], [currency/start]
        The same by net power made and by start.
    """

    name: str
    available: BoolArray
    minimum_power_kW: FloatArray
    maximum_power_kW: FloatArray
    segment_power_kW: FloatArray
    fuel_at_minimum_lhv_kW: FloatArray
    fuel_slope_lhv: FloatArray
    paths: tuple[ExhaustPath, ...]
    start_fuel_lhv_kWh: float
    minimum_up_h: float
    minimum_down_h: float
    cost_per_run_hour: float
    cost_per_kWh: float
    cost_per_start: float


@dataclass(frozen=True)
class HeaterEnvelope:
    """A boiler or burner of the separate supply.

    Parameters
    ----------
    name : str
        As the study calls it.
    carrier : str
        "steam", "hot_water" or "hot_gas".
    maximum_heat_kW : float [kW]
        Useful heat at full load.
    fuel_per_heat_lhv : float [kW LHV/kW]
        Further fuel for each further kW of useful heat.
    standing_fuel_lhv_kW : float [kW LHV]
        Burnt in every hour, since heaters are kept hot in separate supply and beside CHP alike.
    """

    name: str
    carrier: str
    maximum_heat_kW: float
    fuel_per_heat_lhv: float
    standing_fuel_lhv_kW: float


@dataclass(frozen=True)
class StoreEnvelope:
    """A hot-water store.

    Parameters
    ----------
    capacity_kWh : float [kWh]
        Usable heat between the two temperatures.
    maximum_charge_kW, maximum_discharge_kW : float [kW]
        Limits of pumps and exchangers.
    loss_frac_per_h : float [1/h]
        Share of the level lost each hour.
    """

    capacity_kWh: float
    maximum_charge_kW: float
    maximum_discharge_kW: float
    loss_frac_per_h: float


@dataclass(frozen=True)
class ChillerEnvelope:
    """A chiller: electric, or driven by heat.

    Parameters
    ----------
    name : str
        As the study calls it.
    drive : str
        "power", "hot_water" or "steam".
    maximum_cooling_kW : float [kW]
        Cooling at full load.
    cop : float [-]
        Cooling over drive.
    """

    name: str
    drive: str
    maximum_cooling_kW: float
    cop: float


@dataclass(frozen=True)
class OperatingEnvelope:
    """Everything that can serve the site under one option, or under separate supply.

    Parameters
    ----------
    name : str
        The option's name, or "Separate supply".
    units : tuple of UnitEnvelope
        Empty for separate supply.
    heaters : tuple of HeaterEnvelope
        Boilers and burners, present in separate supply and beside CHP.
    chillers : tuple of ChillerEnvelope
        Electric chillers, and absorption chillers where the option has them.
    store : StoreEnvelope or None
        Hot-water store of the option.
    findings : tuple of Finding
        Sheet audit, guarantee limits, anything the reader must know.
    """

    name: str
    units: tuple[UnitEnvelope, ...]
    heaters: tuple[HeaterEnvelope, ...]
    chillers: tuple[ChillerEnvelope, ...]
    store: StoreEnvelope | None
    findings: tuple[Finding, ...] = ()

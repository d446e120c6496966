"""One machine through one year: exact at any power, and as piecewise-linear functions of it."""

from dataclasses import dataclass, replace

import numpy as np
import pandas as pd

from load_profiles import SiteYear
from planner.arrays import BoolArray, FloatArray
from planner.constants import ZERO_CELSIUS_K
from planner.plant.audit import refuse_impossible_sheet
from planner.plant.exhaust_paths import SHARE_COLUMNS, HeatPaths, design_paths
from planner.plant.fuel import GasFuel
from planner.plant.gas_compressor import compression_kJ_per_kg
from planner.plant.load import NetMachine
from planner.plant.running import Ambient, RunningPoint, ambient
from planner.plant.turbine import GasTurbine, calibrate
from planner.study.sections import Option, Unit
from planner.study.study import Study

#: Cap of generator or gearbox over the sheet's power where the sheet is silent: common practice.
USUAL_CAP = 1.15


GRADES = ("steam", "hot_water", "hot_gas")


@dataclass(frozen=True)
class UnitYear:
    """A machine with its recovery, calibrated and placed in the site's weather.

    Parameters
    ----------
    unit : Unit
        As stated.
    turbine : GasTurbine
        Calibrated.
    machine : NetMachine
        In the year's weather.
    paths : HeatPaths
        Recovery.
    available : array of bool, shape (steps,)
        False in planned outages.
    """

    unit: Unit
    turbine: GasTurbine
    machine: NetMachine
    paths: HeatPaths
    available: BoolArray

    @property
    def minimum_load_frac(self) -> float:
        """Highest of mechanical minimum and the guarantee's lower end."""
        return max(self.unit.sheet.minimum_load_frac, self.unit.sheet.nox.from_load_frac)

    def aged(self, point: RunningPoint) -> RunningPoint:
        """The point as fouling and ageing leave it, on average over the life.

        Flows and power fall alike; the further fuel for each kilowatt-hour leaves with the exhaust,
        so that the energy balance stays closed.
        """
        kept = 1.0 - self.unit.average_power_loss_frac
        fuel = point.fuel_kg_per_s * kept
        further_kW = self.unit.average_fuel_rise_frac * fuel * self.turbine.fuel.lhv_kJ_per_kg
        flow = point.exhaust_kg_per_s * kept
        enthalpy = point.gas.enthalpy_kJ_per_kg(point.exhaust_K) + further_kW / flow
        return replace(
            point,
            terminal_power_kW=point.terminal_power_kW * kept,
            fuel_kg_per_s=fuel * (1.0 + self.unit.average_fuel_rise_frac),
            exhaust_kg_per_s=flow,
            exhaust_K=point.gas.temperature_at_enthalpy_K(enthalpy, point.exhaust_K),
        )

    def net_kW(self, aged: RunningPoint) -> FloatArray:
        """Net power of an aged point; its gas compressor carries the further fuel."""
        work = self.machine.compression_kJ_per_kg / (1.0 + self.unit.average_fuel_rise_frac)
        compressor_kW = aged.fuel_kg_per_s * work
        return np.asarray(aged.terminal_power_kW - self.machine.auxiliary_kW - compressor_kW)

    def clean_net_kW(self, net_kW: FloatArray) -> FloatArray:
        """Net power of the clean machine that ages to a net power; auxiliaries do not fall."""
        kept = 1.0 - self.unit.average_power_loss_frac
        return np.asarray((net_kW + (1.0 - kept) * self.machine.auxiliary_kW) / kept)

    def fuel_lhv_kW(self, aged: RunningPoint) -> FloatArray:
        """Fuel of an aged point."""
        return np.asarray(aged.fuel_kg_per_s * self.turbine.fuel.lhv_kJ_per_kg)

    def full_load(self) -> RunningPoint:
        """Full load of the clean machine in every hour."""
        return self.machine.full_load()

    def exact(self, net_kW: FloatArray, full: RunningPoint) -> RunningPoint:
        """The aged machine at a net power."""
        return self.aged(self.machine.at_net_power(self.clean_net_kW(net_kW), full))


def unit_year(study: Study, option: Option, site_year: SiteYear, fuel: GasFuel) -> UnitYear:
    """Calibrate an option's machine and place it in a site's year.

    Parameters
    ----------
    study : Study
        Site, grades of heat and fuel supply.
    option : Option
        Machine and recovery.
    site_year : SiteYear
        Weather.
    fuel : GasFuel
        The gas.

    Returns
    -------
    UnitYear
        Exact model of every hour.

    Raises
    ------
    StudyError
        If the data sheet or the steam system cannot be true.
    """
    unit, hourly = option.unit, site_year.hourly
    number = [each.name for each in study.option].index(option.name) + 1
    path = f"option[{number}].unit.sheet"
    turbine = calibrate(unit.sheet, fuel, path)
    refuse_impossible_sheet(turbine, fuel, path)
    pressure_kPa = hourly["pressure_kPa"].to_numpy(dtype=np.float64)
    hours = ambient(
        hourly["ambient_degC"].to_numpy(dtype=np.float64),
        hourly["relative_humidity_frac"].to_numpy(dtype=np.float64),
        pressure_kPa,
        inlet_loss_kPa=unit.inlet_loss_kPa,
        exhaust_loss_kPa=unit.exhaust_loss_kPa,
    )
    machine = net_machine(
        study, unit, turbine, hours, fuel=fuel, ambient_kPa=float(pressure_kPa.mean())
    )
    bare = UnitYear(
        unit,
        turbine,
        machine,
        HeatPaths(study.heat, option.recovery, None, None, None),
        _available(unit, site_year),
    )
    return replace(
        bare, paths=design_paths(study.heat, option.recovery, _design_point(bare, study, fuel))
    )


def net_machine(
    study: Study,
    unit: Unit,
    turbine: GasTurbine,
    hours: Ambient,
    *,
    fuel: GasFuel,
    ambient_kPa: float,
) -> NetMachine:
    """A machine with what lies between its terminals and the busbar.

    Parameters
    ----------
    study : Study
        Its gas pressure.
    unit : Unit
        Auxiliaries and caps.
    turbine : GasTurbine
        Calibrated.
    hours : Ambient
        Air of each hour.
    fuel : GasFuel
        The gas.
    ambient_kPa : float [kPa]
        Air pressure at the gas compressor.

    Returns
    -------
    NetMachine
        Ready to run; its gas compressor carries the further fuel of the aged machine.
    """
    work = compression_kJ_per_kg(
        fuel,
        supply_kPa_gauge=study.fuel.supply_pressure_kPa_gauge,
        needed_kPa_gauge=unit.sheet.fuel_gas_pressure_kPa_gauge,
        ambient_kPa=ambient_kPa,
    )
    cap_kW = unit.sheet.generator_limit_kW or USUAL_CAP * unit.sheet.power_kW
    return NetMachine(
        turbine=turbine,
        hours=hours,
        auxiliary_kW=unit.auxiliary_kW,
        compression_kJ_per_kg=work * (1.0 + unit.average_fuel_rise_frac),
        terminal_limit_kW=cap_kW,
    )


def _design_point(year: UnitYear, study: Study, fuel: GasFuel) -> RunningPoint:
    """Aged full load at the sheet's ambient and the site's mean pressure."""
    pressure_kPa = float(year.machine.hours.inlet_kPa.mean()) + year.unit.inlet_loss_kPa
    sheet = year.unit.sheet
    hour = ambient(
        np.array([sheet.ambient_degC]),
        np.array([sheet.relative_humidity_frac]),
        np.array([pressure_kPa]),
        inlet_loss_kPa=year.unit.inlet_loss_kPa,
        exhaust_loss_kPa=year.unit.exhaust_loss_kPa,
    )
    one = net_machine(study, year.unit, year.turbine, hour, fuel=fuel, ambient_kPa=pressure_kPa)
    return year.aged(one.full_load())


def _available(unit: Unit, site_year: SiteYear) -> BoolArray:
    """False on the local days of planned outages."""
    days = pd.DatetimeIndex(site_year.local_time.tz_localize(None)).normalize()
    stopped = np.zeros(len(days), dtype=bool)
    for outage in unit.planned_outage:
        first = pd.Timestamp(outage.first_day)
        stopped |= (days >= first) & (days < first + pd.Timedelta(days=outage.days))
    return ~stopped


def exact_hours(year: UnitYear, full: RunningPoint, hourly: pd.DataFrame) -> pd.DataFrame:
    """The exact model at the power and the exhaust split of a schedule.

    Parameters
    ----------
    year : UnitYear
        Exact model.
    full : RunningPoint
        Clean full load of every hour.
    hourly : DataFrame, one row a step
        `unit_on`, `unit_power_kW` and the `share_…` columns of a schedule.

    Returns
    -------
    DataFrame, one row a step
        `unit_fuel_lhv_kW`, heat by grade, exhaust flow and temperature; zero while off.
    """
    on = hourly["unit_on"].to_numpy() > 0.0
    aged_full = year.aged(full)
    maximum_kW = year.net_kW(aged_full)
    asked_kW = np.where(on, hourly["unit_power_kW"].to_numpy(dtype=np.float64), maximum_kW)
    asked_kW = np.clip(asked_kW, year.minimum_load_frac * maximum_kW, maximum_kW)
    point = year.exact(asked_kW, full)
    columns = {
        "unit_fuel_lhv_kW": year.fuel_lhv_kW(point),
        "exhaust_flow_kg_per_s": point.exhaust_kg_per_s,
        "exhaust_degC": point.exhaust_K - ZERO_CELSIUS_K,
    }
    heat = {grade: np.zeros(len(on)) for grade in GRADES}
    for path, grades in year.paths.yields_kW(point, year.machine.hours).items():
        share = hourly[SHARE_COLUMNS[path]].to_numpy(dtype=np.float64)
        for grade, whole_kW in grades.items():
            heat[grade] = heat[grade] + share * whole_kW
    columns |= {f"unit_{grade}_kW": heat_kW for grade, heat_kW in heat.items()}
    return pd.DataFrame(
        {name: np.where(on, column, 0.0) for name, column in columns.items()}, index=hourly.index
    )

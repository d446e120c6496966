"""The machine in figures for the report: sheet, audit, cycle, part load, composite curve."""

import numpy as np

from planner.constants import ZERO_CELSIUS_K
from planner.plant.envelope_fit import NODES
from planner.plant.exchange import GasFlow
from planner.plant.exhaust_paths import exhaust_of
from planner.plant.load import NetMachine
from planner.plant.running import RunningPoint, ambient
from planner.plant.steam_boiler import run_steam_boiler
from planner.plant.turbine import COMBUSTOR_PRESSURE_LOSS_FRAC
from planner.plant.unit_year import UnitYear
from planner.plant.water_heater import run_water_heater
from planner.results.records import Machine, OperatingPoint, Station

#: Ambients and loads of the part-load table.
AMBIENTS_degC = {"cold": -5.0, "ISO": 15.0, "hot": 35.0}
LOADS_FRAC = (1.0, 0.75, 0.5)


def machine_record(year: UnitYear) -> Machine:
    """Figures of a machine.

    Parameters
    ----------
    year : UnitYear
        Exact model.

    Returns
    -------
    Machine
        At the site's mean pressure, aged, with the site's losses.
    """
    turbine, sheet = year.turbine, year.unit.sheet
    design_machine = _at(year, AMBIENTS_degC["ISO"])
    clean = design_machine.full_load()
    design = year.aged(clean)
    gas_side, sink_side, stack_degC = _composite(year, exhaust_of(design))
    return Machine(
        name=year.unit.name,
        generic=year.unit.generic,
        sheet_power_kW=sheet.power_kW,
        sheet_efficiency_lhv_frac=turbine.sheet_efficiency_lhv,
        sheet_exhaust_flow_kg_per_s=sheet.exhaust_flow_kg_per_s,
        sheet_exhaust_degC=sheet.exhaust_degC,
        pressure_ratio=sheet.pressure_ratio,
        audit_residual_frac=turbine.audit_residual_frac,
        polytropic_efficiency=turbine.polytropic_efficiency,
        firing_degC=turbine.firing_K - ZERO_CELSIUS_K,
        gas_compressor_kW=turbine.fuel_kg_per_s * year.machine.compression_kJ_per_kg,
        auxiliary_kW=year.unit.auxiliary_kW,
        minimum_load_frac=year.minimum_load_frac,
        stations=_stations(design_machine, clean),
        points=_points(year),
        paths=list(year.paths.names),
        fit_segments=len(NODES) - 1,
        recovery_heat_degC=gas_side,
        recovery_sink_degC=sink_side,
        stack_degC=stack_degC,
    )


def _at(year: UnitYear, ambient_degC: float) -> NetMachine:
    """The machine in one hour of a stated ambient at the site's mean pressure."""
    unit, machine = year.unit, year.machine
    site_kPa = float(machine.hours.inlet_kPa.mean()) + unit.inlet_loss_kPa
    hour = ambient(
        np.array([ambient_degC]),
        np.array([unit.sheet.relative_humidity_frac]),
        np.array([site_kPa]),
        inlet_loss_kPa=unit.inlet_loss_kPa,
        exhaust_loss_kPa=unit.exhaust_loss_kPa,
    )
    return NetMachine(
        machine.turbine,
        hour,
        machine.auxiliary_kW,
        machine.compression_kJ_per_kg,
        machine.terminal_limit_kW,
    )


def _stations(machine: NetMachine, point: RunningPoint) -> list[Station]:
    """Gas through the cycle of the clean machine in one hour."""
    hours = machine.hours
    inlet_kPa, outlet_kPa = float(hours.inlet_kPa[0]), float(hours.outlet_kPa[0])
    compressed_kPa = inlet_kPa * float(point.pressure_ratio[0])
    air = float(point.exhaust_kg_per_s[0] - point.fuel_kg_per_s[0])
    gas = float(point.exhaust_kg_per_s[0])
    fired_kPa = compressed_kPa * (1.0 - COMBUSTOR_PRESSURE_LOSS_FRAC)
    rows = [
        ("compressor inlet", hours.temperature_K, inlet_kPa, air),
        ("compressor outlet", point.compressed_K, compressed_kPa, air),
        ("turbine inlet, mixed", point.firing_K, fired_kPa, gas),
        ("turbine outlet", point.exhaust_K, outlet_kPa, gas),
    ]
    return [
        Station(
            station=name,
            temperature_degC=float(temperature_K[0]) - ZERO_CELSIUS_K,
            pressure_kPa=pressure_kPa,
            flow_kg_per_s=flow,
        )
        for name, temperature_K, pressure_kPa, flow in rows
    ]


def _points(year: UnitYear) -> list[OperatingPoint]:
    """The aged machine in three ambients at three loads."""
    points = []
    for label, ambient_degC in AMBIENTS_degC.items():
        machine = _at(year, ambient_degC)
        full = machine.full_load()
        most_kW = year.net_kW(year.aged(full))
        for load_frac in LOADS_FRAC:
            clean_kW = year.clean_net_kW(load_frac * most_kW)
            point = year.aged(machine.at_net_power(clean_kW, full))
            fuel_lhv_kW = year.fuel_lhv_kW(point)
            net_kW = year.net_kW(point)
            points.append(
                OperatingPoint(
                    label=label,
                    ambient_degC=ambient_degC,
                    load_frac=load_frac,
                    net_power_kW=float(net_kW[0]),
                    fuel_lhv_kW=float(fuel_lhv_kW[0]),
                    efficiency_lhv_frac=float((net_kW / fuel_lhv_kW)[0]),
                    exhaust_flow_kg_per_s=float(point.exhaust_kg_per_s[0]),
                    exhaust_degC=float(point.exhaust_K[0]) - ZERO_CELSIUS_K,
                )
            )
    return points


def _composite(
    year: UnitYear, exhaust: GasFlow
) -> tuple[list[tuple[float, float]], list[tuple[float, float]], float]:
    """Gas and water sides of the recovery at the design point, and the stack."""
    paths = year.paths
    hot_K = exhaust.temperature_K
    cold_K, sinks, given_kW = hot_K, list[tuple[float, float]](), 0.0
    if paths.boiler is not None:
        run = run_steam_boiler(paths.boiler, exhaust)
        boiling_degC = paths.boiler.state.boiling_degC
        boiling_kW = float(exhaust.cooled_to_kW(run.after_evaporator_K)[0])
        given_kW = float(exhaust.cooled_to_kW(run.stack_K)[0])
        sinks += [(0.0, boiling_degC), (boiling_kW, boiling_degC)]
        sinks.append((given_kW, paths.boiler.feedwater_degC))
        cold_K = run.stack_K
    heater = paths.behind_boiler if paths.boiler is not None else paths.alone
    if heater is not None:
        _, stack_K = run_water_heater(heater, exhaust.at(cold_K))
        sinks.append((given_kW, heater.flow_degC))
        given_kW = float(exhaust.cooled_to_kW(stack_K)[0])
        sinks.append((given_kW, heater.return_degC))
        cold_K = stack_K
    dryer = paths.heat.hot_gas
    if not sinks and dryer is not None and paths.recovery.hot_gas:
        cold_K = np.array([dryer.reference_degC + ZERO_CELSIUS_K])
        given_kW = float(exhaust.cooled_to_kW(cold_K)[0])
        sinks += [(0.0, dryer.required_degC), (given_kW, dryer.reference_degC)]
    gas = [(0.0, float(hot_K[0]) - ZERO_CELSIUS_K), (given_kW, float(cold_K[0]) - ZERO_CELSIUS_K)]
    return gas, sinks, float(cold_K[0]) - ZERO_CELSIUS_K

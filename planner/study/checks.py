"""Sections of a study that must agree with each other."""

import zoneinfo
from collections.abc import Iterator

from load_profiles import Fault
from planner.study.sections import DataSheet, Option
from planner.study.study import Study

#: Carriers that heaters make.
HEAT_CARRIERS = ("steam", "hot_water", "hot_gas")


def study_faults(study: Study) -> tuple[Fault, ...]:
    """Faults that no single field shows.

    Parameters
    ----------
    study : Study
        Validated field by field.

    Returns
    -------
    tuple of Fault
        Empty where the sections agree.
    """
    faults = [
        *_clock_faults(study),
        *_heat_faults(study),
        *_temperature_faults(study),
        *_name_faults(study),
        *_path_faults(study),
    ]
    for number, option in enumerate(study.option, start=1):
        faults += _option_faults(study, option, f"option[{number}]")
        faults += _sheet_faults(option.unit.sheet, f"option[{number}].unit.sheet")
    return tuple(faults)


def _clock_faults(study: Study) -> Iterator[Fault]:
    """The site's clock must be a known zone."""
    zone = study.site.time_zone
    try:
        zoneinfo.ZoneInfo(zone)
    except (KeyError, ValueError, OSError):
        yield Fault("site.time_zone", zone, "must be an IANA name such as Europe/Berlin")


def _heat_faults(study: Study) -> Iterator[Fault]:
    """Each heat that is wanted needs its state and a heater."""
    heaters = {heater.serves for heater in study.separate_supply.heater}
    for carrier in HEAT_CARRIERS:
        if getattr(study.demand, carrier) is None:
            continue
        if getattr(study.heat, carrier) is None:
            yield Fault(f"heat.{carrier}", "nothing", f"is needed: [demand.{carrier}] is given")
        if carrier not in heaters:
            must = f"one must serve {carrier}: separate supply has to meet [demand.{carrier}]"
            yield Fault("separate_supply.heater", ", ".join(sorted(heaters)), must)
    if study.demand.cooling is not None and study.separate_supply.chiller is None:
        yield Fault("separate_supply.chiller", "nothing", "is needed: [demand.cooling] is given")
    for number, heater in enumerate(study.separate_supply.heater, start=1):
        if heater.largest_unit_kW > heater.capacity_kW:
            must = f"must not exceed capacity_kW = {heater.capacity_kW:g}"
            path = f"separate_supply.heater[{number}].largest_unit_kW"
            yield Fault(path, f"{heater.largest_unit_kW:g}", must)


def _temperature_faults(study: Study) -> Iterator[Fault]:
    """Temperatures of the networks must stand in the order in which heat flows."""
    water = study.heat.hot_water
    if water is not None and water.return_degC >= water.flow_degC:
        must = f"must be below flow_degC = {water.flow_degC:g}"
        yield Fault("heat.hot_water.return_degC", f"{water.return_degC:g}", must)
    gas = study.heat.hot_gas
    if gas is not None and not gas.reference_degC < gas.required_degC <= gas.limit_degC:
        came = f"{gas.reference_degC:g}, {gas.required_degC:g}, {gas.limit_degC:g}"
        yield Fault("heat.hot_gas", came, "reference, required and limit must rise in this order")


def _name_faults(study: Study) -> Iterator[Fault]:
    """Options are told apart by their names."""
    names = [option.name for option in study.option]
    for number, name in enumerate(names, start=1):
        if name in names[: number - 1]:
            yield Fault(f"option[{number}].name", f'"{name}"', "must differ from the others")


def _path_faults(study: Study) -> Iterator[Fault]:
    """The grid-carbon path must go forward."""
    years = [point.year for point in study.grid_carbon.path]
    if years != sorted(set(years)):
        came = ", ".join(str(year) for year in years)
        yield Fault("grid_carbon.path", came, "years must rise from point to point")


def _option_faults(study: Study, option: Option, path: str) -> Iterator[Fault]:
    """An option can only serve what the site has."""
    recovery = option.recovery
    for carrier in HEAT_CARRIERS:
        if getattr(recovery, carrier) and getattr(study.demand, carrier) is None:
            must = f"the site has no [demand.{carrier}] for it to serve"
            yield Fault(f"{path}.recovery.{carrier}", "true", must)
    if not (recovery.steam or recovery.hot_water or recovery.hot_gas):
        yield Fault(f"{path}.recovery", "no use of the exhaust", "at least one must be true")
    if option.store is not None and not recovery.hot_water:
        yield Fault(f"{path}.store", "a hot-water store", "needs recovery.hot_water = true")
    chiller = option.absorption_chiller
    if chiller is not None and study.demand.cooling is None:
        yield Fault(f"{path}.absorption_chiller", "given", "the site has no [demand.cooling]")
    if chiller is not None and not getattr(recovery, chiller.drive):
        must = f"needs recovery.{chiller.drive} = true"
        yield Fault(f"{path}.absorption_chiller.drive", f'"{chiller.drive}"', must)


def _sheet_faults(sheet: DataSheet, path: str) -> Iterator[Fault]:
    """Ranges of a data sheet must not be upside down."""
    guarantee = sheet.nox
    if guarantee.from_ambient_degC >= guarantee.to_ambient_degC:
        came = f"{guarantee.from_ambient_degC:g} to {guarantee.to_ambient_degC:g}"
        yield Fault(f"{path}.nox", came, "the ambient range is upside down")
    if guarantee.from_load_frac >= 1.0:
        must = "the load range is upside down: must begin below full load"
        yield Fault(f"{path}.nox.from_load_frac", f"{guarantee.from_load_frac:g}", must)
    if sheet.minimum_load_frac >= 1.0:
        must = "the part-load range is upside down: must be below 1"
        yield Fault(f"{path}.minimum_load_frac", f"{sheet.minimum_load_frac:g}", must)
    if sheet.generator_limit_kW is not None and sheet.generator_limit_kW < sheet.power_kW:
        must = f"must not be below power_kW = {sheet.power_kW:g}"
        yield Fault(f"{path}.generator_limit_kW", f"{sheet.generator_limit_kW:g}", must)

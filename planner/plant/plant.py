"""`Plant`: everything that can serve the site under one option, exact and as envelope."""

from dataclasses import dataclass, field
from functools import lru_cache

import pandas as pd

from load_profiles import Finding, SiteYear
from load_profiles.site_year import WEATHER_COLUMNS
from planner.plant.audit import audit_findings
from planner.plant.envelope import OperatingEnvelope, StoreEnvelope, UnitEnvelope
from planner.plant.envelope_fit import unit_envelope
from planner.plant.fuel import GasFuel
from planner.plant.heaters import chiller_envelopes, heater_envelope
from planner.plant.machine_record import machine_record
from planner.plant.plant_findings import site_findings, unit_findings
from planner.plant.running import RunningPoint
from planner.plant.unit_year import UnitYear, exact_hours, unit_year
from planner.results.records import Machine
from planner.study.sections import Heat, Option
from planner.study.study import Study

SEPARATE_SUPPLY = "Separate supply"

#: Without prices a machine's wear costs nothing.
NO_WEAR = (0.0, 0.0, 0.0)


@dataclass(frozen=True)
class Plant:
    """An option's machines, or separate supply's, over one year.

    Parameters
    ----------
    envelope : OperatingEnvelope
        What the dispatch sees.
    findings : tuple of Finding
        Audit, limits, anything the reader must know.
    year : UnitYear or None
        Exact model of the unit; None for separate supply.
    full : RunningPoint or None
        Clean full load of every hour.
    """

    envelope: OperatingEnvelope
    findings: tuple[Finding, ...]
    year: UnitYear | None
    full: RunningPoint | None

    def exact_year(self, hourly: pd.DataFrame) -> pd.DataFrame:
        """Evaluate a schedule with the exact model.

        Parameters
        ----------
        hourly : DataFrame, one row a step
            `Schedule.hourly`: state, power and exhaust split.

        Returns
        -------
        DataFrame, one row a step
            `unit_fuel_lhv_kW`, `unit_steam_kW`, `unit_hot_water_kW`, `unit_hot_gas_kW`,
            `exhaust_flow_kg_per_s`, `exhaust_degC`; zero while off.

        Raises
        ------
        ValueError
            For separate supply, which has no unit.
        """
        if self.year is None or self.full is None:
            raise ValueError("separate supply has no unit to evaluate")
        return exact_hours(self.year, self.full, hourly)

    def machine(self) -> Machine:
        """What the sheet says and what the model makes of it, for the report.

        Returns
        -------
        Machine
            Audit, cycle, part load, recovery.

        Raises
        ------
        ValueError
            For separate supply, which has no unit.
        """
        if self.year is None:
            raise ValueError("separate supply has no machine")
        return machine_record(self.year)


@dataclass(frozen=True)
class _Placed:
    """A machine at a place: what its year depends on, to tell one from another.

    Variants of prices, demand and boilers leave it as it is; working it out again for each would
    take longer than their dispatch.
    """

    option: Option
    heat: Heat
    composition: tuple[tuple[str, float], ...]
    supply_kPa_gauge: float
    clock: tuple[str, str]
    weather: bytes
    wear: tuple[float, float, float]
    study: Study = field(compare=False)
    site_year: SiteYear = field(compare=False)
    fuel: GasFuel = field(compare=False)

    @classmethod
    def of(
        cls,
        study: Study,
        option: Option,
        site_year: SiteYear,
        fuel: GasFuel,
        wear: tuple[float, float, float],
    ) -> "_Placed":
        """The machine of an option of a study."""
        hourly = site_year.hourly
        return cls(
            option=option.model_copy(update={"capital": (), "avoided": ()}),
            heat=study.heat,
            composition=tuple(sorted(study.fuel.composition_mol_frac.items())),
            supply_kPa_gauge=study.fuel.supply_pressure_kPa_gauge,
            clock=(site_year.time_zone, str(hourly.index[0])),
            weather=hourly[list(WEATHER_COLUMNS)].to_numpy().tobytes(),
            wear=wear,
            study=study,
            site_year=site_year,
            fuel=fuel,
        )


@lru_cache(maxsize=8)
def _worked_out(
    placed: _Placed,
) -> tuple[UnitYear, UnitEnvelope, RunningPoint, tuple[Finding, ...]]:
    """Exact model, envelope, clean full load and findings of a machine at a place."""
    year = unit_year(placed.study, placed.option, placed.site_year, placed.fuel)
    unit, full, lowest = unit_envelope(year, placed.wear)
    findings = (
        *audit_findings(year.turbine, placed.option.name),
        *unit_findings(
            placed.study, placed.option, year, placed.site_year, full=full, lowest=lowest
        ),
    )
    return year, unit, full, findings


def build_plant(
    study: Study,
    option: Option | None,
    site_year: SiteYear,
    fuel: GasFuel,
    *,
    wear: tuple[float, float, float] = NO_WEAR,
) -> Plant:
    """Calibrate and place the machines of one option.

    Parameters
    ----------
    study : Study
        Site, heat, separate supply.
    option : Option or None
        None for separate supply.
    site_year : SiteYear
        Weather, and demands for the findings.
    fuel : GasFuel
        The gas.
    wear : tuple of float [currency]
        Cost by run hour, by kWh and by start, without fuel.

    Returns
    -------
    Plant
        Envelope and exact model.

    Raises
    ------
    StudyError
        If a data sheet or the steam system cannot be true.
    """
    heaters = tuple(heater_envelope(heater, fuel) for heater in study.separate_supply.heater)
    driven = None if option is None else option.absorption_chiller
    chillers = chiller_envelopes(study.separate_supply.chiller, driven)
    if option is None:
        findings = site_findings(study, site_year)
        envelope = OperatingEnvelope(SEPARATE_SUPPLY, (), heaters, chillers, None, findings)
        return Plant(envelope, findings, None, None)
    placed = _Placed.of(study, option, site_year, fuel, wear)
    year, unit, full, findings = _worked_out(placed)
    store = option.store
    envelope = OperatingEnvelope(
        name=option.name,
        units=(unit,),
        heaters=heaters,
        chillers=chillers,
        store=None
        if store is None
        else StoreEnvelope(
            store.capacity_kWh,
            store.maximum_charge_kW,
            store.maximum_discharge_kW,
            store.loss_frac_per_h,
        ),
        findings=findings,
    )
    return Plant(envelope, findings, year, full)

"""What a reader must know about the machines at this site."""

from collections.abc import Iterator

import numpy as np

from load_profiles import Finding, SiteYear
from planner.constants import ZERO_CELSIUS_K
from planner.plant.exhaust_paths import exhaust_of
from planner.plant.running import RunningPoint
from planner.plant.steam_boiler import run_steam_boiler
from planner.plant.unit_year import UnitYear
from planner.study.sections import Option
from planner.study.study import Study

#: Hours of a year in which an economiser may boil before a reader is told.
STEAMING_HOURS = 100


def site_findings(study: Study, site_year: SiteYear) -> tuple[Finding, ...]:
    """Doubts about the site's own plant.

    Parameters
    ----------
    study : Study
        Chillers of today.
    site_year : SiteYear
        Power and cooling.

    Returns
    -------
    tuple of Finding
        One where the chillers would have taken more power than was metered.
    """
    chiller = study.separate_supply.chiller
    if chiller is None:
        return ()
    taken_kW = site_year.hourly["cooling_kW"] / chiller.cop
    hours = float((taken_kW > site_year.hourly["power_kW"]).sum() * site_year.step_h)
    if hours == 0.0:
        return ()
    return (
        Finding(
            where="demand.cooling",
            what=f"in {hours:,.0f} h the chillers would have taken more power than was metered",
            effect="cooling, or the chillers' COP, is wrong; power is taken as zero beside them",
            advice="Meter the chilled water, or correct the COP.",
            severity="attention",
        ),
    )


def unit_findings(
    study: Study,
    option: Option,
    year: UnitYear,
    site_year: SiteYear,
    *,
    full: RunningPoint,
    lowest: RunningPoint,
) -> tuple[Finding, ...]:
    """Doubts about an option's machine and recovery.

    Parameters
    ----------
    study : Study
        Site.
    option : Option
        As stated.
    year : UnitYear
        Exact model.
    site_year : SiteYear
        Weather.
    full : RunningPoint
        Clean full load of every hour.
    lowest : RunningPoint
        Aged machine at its minimum load in every hour.

    Returns
    -------
    tuple of Finding
        Generic machine, minimum load by guarantee, recovery that the exhaust is too cold for,
        boiling economiser, cold stack, unused hot gas.
    """
    return (
        *_about_sheet(option, year),
        *_about_cold_exhaust(option, year),
        *_about_boiler(option, year, lowest, site_year.step_h),
        *_about_drying(study, option, full),
    )


def _about_sheet(option: Option, year: UnitYear) -> Iterator[Finding]:
    """A class value is not an offer; a guarantee may bind before the machine does."""
    if option.unit.generic:
        yield Finding(
            where=f"{option.name}, data sheet",
            what="a generic machine of its class, not a maker's offer",
            effect="power, heat and NOx are indicative",
            advice="Replace the sheet by a maker's guarantee before deciding.",
            severity="attention",
        )
    sheet = option.unit.sheet
    if sheet.nox.from_load_frac > sheet.minimum_load_frac:
        yield Finding(
            where=f"{option.name}, minimum load",
            what=f"the NOx guarantee begins at {year.minimum_load_frac:.0%} load, the machine "
            f"could go down to {sheet.minimum_load_frac:.0%}",
            effect="the dispatch never runs it below the guarantee",
        )


def _about_cold_exhaust(option: Option, year: UnitYear) -> Iterator[Finding]:
    """Heat that was asked for and that the exhaust is too cold to give."""
    paths, recovery = year.paths, option.recovery
    missing = []
    if recovery.steam and paths.heat.steam is not None and paths.boiler is None:
        missing.append("steam")
    if recovery.hot_water and paths.heat.hot_water is not None:
        if paths.alone is None:
            missing.append("hot water")
        elif paths.boiler is not None and paths.behind_boiler is None:
            missing.append("hot water behind the steam generator")
    for heat in missing:
        yield Finding(
            where=f"{option.name}, recovery",
            what=f"at the design point the exhaust is too cold to make {heat}",
            effect="the option is planned without it",
            advice="Lower the pressure or the flow temperature, or take it out of the option.",
            severity="attention",
        )


def _about_boiler(
    option: Option, year: UnitYear, lowest: RunningPoint, step_h: float
) -> Iterator[Finding]:
    """An economiser that boils at the lowest load, and a stack colder than allowed there."""
    boiler = year.paths.boiler
    if boiler is None:
        return
    run = run_steam_boiler(boiler, exhaust_of(lowest))
    coldest_degC, allowed_degC = (
        float(run.stack_K.min()) - ZERO_CELSIUS_K,
        option.recovery.minimum_stack_degC,
    )
    if coldest_degC < allowed_degC:
        yield Finding(
            where=f"{option.name}, steam generator",
            what=f"behind the economiser the gas falls to {coldest_degC:.0f} degC, the coldest "
            f"stack allowed is {allowed_degC:.0f} degC",
            effect="steam is counted as if the colder stack were allowed",
            advice="Raise the feedwater's temperature or the pinch.",
            severity="attention",
        )
    hours = float(np.count_nonzero(run.steaming) * step_h)
    if hours > STEAMING_HOURS:
        yield Finding(
            where=f"{option.name}, steam generator",
            what=f"at minimum load the economiser would boil in {hours:,.0f} h of the year's "
            "weather",
            effect="steam is counted with the water held just below boiling",
            advice="Ask for a steaming economiser or a larger approach.",
        )


def _about_drying(study: Study, option: Option, full: RunningPoint) -> Iterator[Finding]:
    """Exhaust that is too cold for the dryer even at full load."""
    dryer = study.heat.hot_gas
    if not option.recovery.hot_gas or dryer is None:
        return
    coldest_degC = float(full.exhaust_K.min()) - ZERO_CELSIUS_K
    if coldest_degC < dryer.required_degC:
        yield Finding(
            where=f"{option.name}, hot gas",
            what=f"the exhaust falls to {coldest_degC:.0f} degC at full load, the dryer needs "
            f"{dryer.required_degC:.0f} degC",
            effect="in those hours nothing goes to the dryer",
            advice="Fire the dryer's burner behind the exhaust, or lower the dryer's need.",
            severity="attention",
        )

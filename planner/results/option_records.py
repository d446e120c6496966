"""The record of one option, from its case, its money and its variants."""

import pandas as pd

from load_profiles import SiteYear
from planner.evaluate import Case
from planner.explore.sweep import Exploration
from planner.outcome.carbon import carbon
from planner.outcome.efficiency import efficiency
from planner.outcome.energy import GRADES, energy_year, month_flows, running
from planner.outcome.nox import nox
from planner.outcome.security import security
from planner.plant import GasFuel
from planner.results.records import DispatchProof, Economics, OptionOutcome
from planner.study.sections import Option
from planner.study.study import Study

#: What the schedule knows beforehand; marked wherever a saving is printed.
CONTROL = "perfect foresight"


def option_outcome(
    study: Study,
    site_year: SiteYear,
    fuel: GasFuel,
    *,
    separate: Case,
    case: Case,
    earned: Economics,
    exploration: Exploration,
    key: str,
) -> tuple[OptionOutcome, pd.DataFrame]:
    """Everything about one option.

    Parameters
    ----------
    study : Study
        As stated.
    site_year : SiteYear
        As cleaned.
    fuel : GasFuel
        The gas.
    separate, case : Case
        The year without CHP, and with this option.
    earned : Economics
        Its money.
    exploration : Exploration
        Its variants.
    key : str
        Names its hourly file.

    Returns
    -------
    tuple of OptionOutcome and DataFrame
        The record, and the hourly flows with NOx.
    """
    if case.option is None:
        raise ValueError("separate supply has a record of its own; name an option")
    step_h = site_year.step_h
    energy = energy_year(case.hourly, step_h)
    indicator, nox_g_per_s = nox(study, case.option.unit, fuel, case.hourly, step_h)
    outcome = OptionOutcome(
        key=key,
        name=case.option.name,
        description=_description(case.option),
        machine=case.plant.machine(),
        running=running(case.hourly, step_h),
        energy=energy,
        months=month_flows(case.hourly, site_year),
        bill=case.bill,
        proof=dispatch_proof(case, case.hourly),
        economics=earned,
        carbon=carbon(study, fuel, separate=energy_year(separate.hourly, step_h), option=energy),
        nox=indicator,
        efficiency=efficiency(study, case.option, energy, fuel),
        security=security(study, site_year),
        variants=list(exploration.variants),
        break_even=exploration.break_even,
    )
    return outcome, case.hourly.assign(nox_g_per_s=nox_g_per_s)


def dispatch_proof(case: Case, exact: pd.DataFrame) -> DispatchProof:
    """How good a schedule is, and what the plant's piecewise fit cost.

    Parameters
    ----------
    case : Case
        The year.
    exact : DataFrame
        Its flows with the exact plant model.

    Returns
    -------
    DispatchProof
        Gap in money, and the fit's error in fuel, heat and money.
    """
    schedule, fitted = case.schedule, case.schedule.hourly
    fuels = ["unit_fuel_lhv_kW", "start_fuel_lhv_kW", "heater_fuel_lhv_kW"]
    more_fuel_lhv_kW = (exact[fuels] - fitted[fuels]).sum(axis=1)
    fit_money = float((more_fuel_lhv_kW * case.prices.fuel_per_lhv_kWh).sum() * case.prices.step_h)
    heats = [f"unit_{grade}_kW" for grade in GRADES]
    return DispatchProof(
        control=CONTROL,
        path=schedule.path,
        cost_per_year=schedule.cost_per_year,
        lower_bound_per_year=schedule.lower_bound_per_year,
        gap_frac=schedule.gap_frac,
        gap_money=schedule.cost_per_year - schedule.lower_bound_per_year,
        exact_cost_per_year=schedule.cost_per_year + fit_money,
        fit_fuel_frac=_excess_frac(exact, fitted, ["unit_fuel_lhv_kW"]),
        fit_heat_frac=_excess_frac(exact, fitted, heats),
        fit_money=fit_money,
    )


def _excess_frac(exact: pd.DataFrame, fitted: pd.DataFrame, columns: list[str]) -> float:
    """Exact over fitted, less one; zero where there is nothing to fit."""
    base = float(fitted[columns].to_numpy().sum())
    return float(exact[columns].to_numpy().sum()) / base - 1.0 if base > 0.0 else 0.0


def _description(option: Option) -> str:
    """Machine, recovery and store in one phrase."""
    grades = [grade.replace("_", " ") for grade in GRADES if getattr(option.recovery, grade)]
    parts = [f"{option.unit.sheet.power_kW:,.0f} kW gas turbine", f"exhaust to {', '.join(grades)}"]
    if option.store is not None:
        parts.append(f"{option.store.capacity_kWh / 1e3:,.0f} MWh hot-water store")
    if option.absorption_chiller is not None:
        parts.append(f"{option.absorption_chiller.capacity_kW:,.0f} kW absorption chiller")
    return "; ".join(parts)

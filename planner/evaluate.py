"""One option under one set of assumptions, from plant to money.

The pipeline evaluates each option once with everything that the report needs; the variants of
`explore` go the same way.
"""

from dataclasses import dataclass

import pandas as pd

from load_profiles import SiteYear
from planner.dispatch import Schedule, solve_year, verify
from planner.market import bill, prices, wear
from planner.market.prices import Prices
from planner.outcome.flows import exact_flows
from planner.outcome.money import economics
from planner.plant import GasFuel, Plant, build_plant
from planner.results.records import Bill, Economics
from planner.study.sections import Option
from planner.study.study import Study

#: Asked gap of a schedule that a report is made from, and of one that only moves a bar in a chart.
REPORT_GAP_FRAC = 5e-4
VARIANT_GAP_FRAC = 1e-3


@dataclass(frozen=True)
class Case:
    """An option, or separate supply, worked out for one year.

    Parameters
    ----------
    option : Option or None
        None for separate supply.
    plant : Plant
        Machines and heaters over the year.
    prices : Prices
        What the dispatch paid.
    schedule : Schedule
        The cheapest year, with its proof.
    hourly : DataFrame
        Flows with the exact plant model.
    bill : Bill
        Recomputed from those flows.
    """

    option: Option | None
    plant: Plant
    prices: Prices
    schedule: Schedule
    hourly: pd.DataFrame
    bill: Bill


def evaluate(
    study: Study, site_year: SiteYear, option: Option | None, *, for_report: bool = False
) -> Case:
    """Work out one option for one year.

    Parameters
    ----------
    study : Study
        Prices and machines.
    site_year : SiteYear
        Demands and weather.
    option : Option or None
        None for separate supply.
    for_report : bool
        Ask the tighter gap and the marginal prices that a report prints.

    Returns
    -------
    Case
        The year, verified.

    Raises
    ------
    StudyError
        If the machine or the site cannot be as stated, or a demand cannot be met.
    SolveError
        If no solver gives a schedule that survives verification.
    """
    fuel = GasFuel.from_composition(study.fuel.name, study.fuel.composition_mol_frac)
    rates = None if option is None else wear(option.unit)
    plant = build_plant(
        study,
        option,
        site_year,
        fuel,
        wear=(0.0, 0.0, 0.0)
        if rates is None
        else (rates.cost_per_run_hour, rates.cost_per_kWh, rates.cost_per_start),
    )
    year_prices = prices(study, site_year, fuel)
    schedule = solve_year(
        plant.envelope,
        year_prices,
        site_year.hourly,
        gap_frac=REPORT_GAP_FRAC if for_report else VARIANT_GAP_FRAC,
        duals=for_report,
    )
    verify(schedule, plant.envelope, year_prices, site_year.hourly)
    flows = exact_flows(
        schedule.hourly,
        plant.exact_year(schedule.hourly) if option is not None else None,
        envelope=plant.envelope,
        site_year=site_year,
        prices=year_prices,
    )
    yearly = bill(
        study,
        site_year,
        flows,
        fuel,
        unit=None if option is None else option.unit,
        upkeep_per_year=0.0 if option is None else option.upkeep_per_year,
    )
    return Case(option, plant, year_prices, schedule, flows, yearly)


def report_case(study: Study, site_year: SiteYear, number: int | None) -> Case:
    """Work out one option as stated, with everything that a report prints.

    Parameters
    ----------
    study : Study
        As stated.
    site_year : SiteYear
        As metered.
    number : int or None
        Which option; None for separate supply.

    Returns
    -------
    Case
        The year, verified.
    """
    option = None if number is None else study.option[number]
    return evaluate(study, site_year, option, for_report=True)


def money(study: Study, separate: Case, case: Case) -> Economics:
    """What an option earns against separate supply.

    Parameters
    ----------
    study : Study
        Rates, life and price paths.
    separate : Case
        The year without CHP under the same assumptions.
    case : Case
        The option's year.

    Returns
    -------
    Economics
        Saving, capital and cash flow.
    """
    if case.option is None:
        raise ValueError("separate supply is what options are compared with; name an option")
    slack = separate.schedule.cost_per_year - separate.schedule.lower_bound_per_year
    return economics(
        study,
        case.option,
        separate_bill=separate.bill,
        option_bill=case.bill,
        separate_slack=slack,
    )

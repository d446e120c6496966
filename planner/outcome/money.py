"""What an option earns: annual saving, capital, cash flow over its life, NPV, IRR, paybacks."""

from collections.abc import Callable
from dataclasses import dataclass
from functools import partial
from itertools import accumulate

import numpy as np

from planner.market.invoice import DEMAND_UNIT, MAINTENANCE_LINES, OVERHAUL_LINE, STANDING_UNIT
from planner.outcome.worth import (
    discounted,
    discounted_payback_years,
    internal_rate_frac,
    simple_payback_years,
)
from planner.results.records import Bill, BillLine, Capital, CapitalItem, CashYear, Economics
from planner.study.sections import Option, PricePaths, Unit
from planner.study.study import Study

MONTHS = 12


@dataclass(frozen=True)
class _YearParts:
    """Saving of one full year by the price path that moves it; positive helps the client."""

    power_energy: float
    power_demand: float
    power_standing: float
    gas: float
    carbon: float
    maintenance: float
    overhaul_reserve: float
    upkeep: float

    def moved(self, paths: PricePaths, years: int) -> "_YearParts":
        """The same after so many years along the price paths."""
        power = (1.0 + paths.power_real_growth_frac) ** years
        gas = (1.0 + paths.gas_real_growth_frac) ** years
        carbon = (1.0 + paths.carbon_price_real_growth_frac) ** years
        upkeep = (1.0 + paths.upkeep_real_growth_frac) ** years
        return _YearParts(
            power_energy=self.power_energy * power,
            power_demand=self.power_demand * power,
            power_standing=self.power_standing * power,
            gas=self.gas * gas,
            carbon=self.carbon * carbon,
            maintenance=self.maintenance * upkeep,
            overhaul_reserve=self.overhaul_reserve * upkeep,
            upkeep=self.upkeep * upkeep,
        )

    @property
    def power(self) -> float:
        """All that is saved on the power contract."""
        return self.power_energy + self.power_demand + self.power_standing

    def outage_cost(self, unit: Unit) -> float:
        """Expected cost of forced outages in this year; see `economics`."""
        while_running = (
            self.power_energy + self.gas + self.carbon + self.maintenance + self.overhaul_reserve
        )
        lost_frac = unit.demand_saving_lost_months / MONTHS
        return unit.forced_outage_frac * max(while_running, 0.0) + lost_frac * max(
            self.power_demand, 0.0
        )


def economics(
    study: Study, option: Option, *, separate_bill: Bill, option_bill: Bill, separate_slack: float
) -> Economics:
    r"""What an option earns against separate supply; real money, before tax.

    The expected cost of forced outages of a year is

    .. math:: C = f \max(S_e, 0) + \frac{m}{12} \max(S_d, 0)

    with :math:`f` the unit's `forced_outage_frac`, :math:`S_e` the saving on energy charges,
    levies, export, gas, carbon, maintenance and overhaul reserve, :math:`m` its
    `demand_saving_lost_months` and :math:`S_d` the saving on demand charges.

    Parameters
    ----------
    study : Study
        Rate, life, first year and price paths.
    option : Option
        Capital, what it avoids, and the unit's availability.
    separate_bill, option_bill : Bill
        A full year each, before outages, from `planner.market.bill`.
    separate_slack : float [currency]
        What the proven lower bound of separate supply lies below its bill, at least zero.

    Returns
    -------
    Economics
        The annual saving is the first operating year's flow, without capital avoided in it.

    Notes
    -----
    Growth starts from the first operating year; capital falls in year 0, which is not discounted;
    later flows fall at the ends of their years. The slack of separate supply is taken from the
    saving on power, so that the gap of its solution can never overstate a saving. Outages are
    taken from the first year's schedule, moved along the price paths; a trip never earns money.
    Capital avoided after the plan's life is not counted; `outcome_faults` refuses it.
    """
    parts = _year_parts(separate_bill, option_bill, separate_slack)
    capital = _capital(study, option)
    flow = _cash_flow(study, option, parts, capital)
    net = np.array([year.net for year in flow])
    rate_frac = study.money.discount_rate_real_frac
    annual_saving = flow[1].net - flow[1].capital - flow[1].avoided_capital
    return Economics(
        annual_saving=annual_saving,
        saving_share_of_bill_frac=annual_saving / separate_bill.total,
        expected_outage_cost=-flow[1].outage_cost,
        capital=capital,
        npv_real=flow[-1].cumulative_discounted,
        irr_real_frac=internal_rate_frac(net),
        simple_payback_years=simple_payback_years(capital.net, annual_saving),
        discounted_payback_years=discounted_payback_years(net, rate_frac),
        cash_flow=flow,
    )


def _year_parts(separate: Bill, option: Bill, slack: float) -> _YearParts:
    """Saving of the first full year, part by part."""
    saved = partial(_saved, separate, option)
    return _YearParts(
        power_energy=saved(_is_power_energy) - slack,
        power_demand=saved(lambda line: line.quantity_unit == DEMAND_UNIT),
        power_standing=saved(_is_power_standing),
        gas=saved(lambda line: line.section == "gas"),
        carbon=saved(lambda line: line.section == "carbon"),
        maintenance=saved(lambda line: line.line in MAINTENANCE_LINES),
        overhaul_reserve=saved(lambda line: line.line == OVERHAUL_LINE),
        upkeep=saved(_is_fixed_upkeep),
    )


def _saved(separate: Bill, option: Bill, wanted: Callable[[BillLine], bool]) -> float:
    """Separate supply's amount less the option's, over the lines wanted."""
    separate_amount = sum(line.amount for line in separate.lines if wanted(line))
    return separate_amount - sum(line.amount for line in option.lines if wanted(line))


def _is_power_standing(line: BillLine) -> bool:
    """Standing charge of power."""
    return line.section == "power" and line.quantity_unit == STANDING_UNIT


def _is_power_energy(line: BillLine) -> bool:
    """Energy charges, levies and export."""
    fixed = line.quantity_unit in {DEMAND_UNIT, STANDING_UNIT}
    return line.section == "export" or (line.section == "power" and not fixed)


def _is_fixed_upkeep(line: BillLine) -> bool:
    """Upkeep that does not follow the unit's running."""
    return line.section == "upkeep" and line.line not in {*MAINTENANCE_LINES, OVERHAUL_LINE}


def _capital(study: Study, option: Option) -> Capital:
    """Capital by line, and what it avoids within the plan's life."""
    total = sum(line.cost for line in option.capital)
    counted = [cost for cost in option.avoided if cost.year <= study.money.life_years]
    rate_frac = study.money.discount_rate_real_frac
    return Capital(
        lines=[CapitalItem(line=line.line, cost=line.cost) for line in option.capital],
        total=total,
        accuracy_frac=option.capital_accuracy_frac,
        accuracy_class=option.capital_class,
        avoided=[
            CapitalItem(line=f"{cost.what}, year {cost.year}", cost=cost.cost) for cost in counted
        ],
        avoided_present_value=sum(c.cost / (1.0 + rate_frac) ** c.year for c in counted),
        net=total - sum(cost.cost for cost in counted),
    )


def _cash_flow(study: Study, option: Option, first: _YearParts, capital: Capital) -> list[CashYear]:
    """Every year's flow: capital in year 0, operation from year 1 to the end of life."""
    years = range(study.money.life_years + 1)
    avoided = [sum(cost.cost for cost in option.avoided if cost.year == year) for year in years]
    rows = [
        {
            "capital": -capital.total if year == 0 else 0.0,
            "avoided_capital": avoided[year],
            **_operation(study, option, first, year),
        }
        for year in years
    ]
    net = np.array([sum(row.values()) for row in rows])
    present = discounted(net, study.money.discount_rate_real_frac)
    return [
        CashYear(
            year=year,
            calendar_year=study.money.first_operating_year - 1 + year,
            **row,
            net=float(net[year]),
            discounted=float(present[year]),
            cumulative=balance,
            cumulative_discounted=discounted_balance,
        )
        for year, row, balance, discounted_balance in zip(
            years, rows, accumulate(net.tolist()), accumulate(present.tolist()), strict=True
        )
    ]


def _operation(study: Study, option: Option, first: _YearParts, year: int) -> dict[str, float]:
    """Columns of one operating year; all zero in the year of building."""
    if year == 0:
        columns = ("power_saving", "gas_saving", "carbon_saving", "maintenance")
        return dict.fromkeys((*columns, "overhaul_reserve", "upkeep", "outage_cost"), 0.0)
    parts = first.moved(study.price_paths, year - 1)
    return {
        "power_saving": parts.power,
        "gas_saving": parts.gas,
        "carbon_saving": parts.carbon,
        "maintenance": parts.maintenance,
        "overhaul_reserve": parts.overhaul_reserve,
        "upkeep": parts.upkeep,
        "outage_cost": -parts.outage_cost(option.unit),
    }

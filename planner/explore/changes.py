"""`Change`: one set of moved assumptions, applied to a study and to its year."""

import math
from dataclasses import dataclass, replace
from typing import Literal, TypeVar

from load_profiles import SiteYear
from planner.study.sections import Section
from planner.study.study import Study

Factor = Literal[
    "base",
    "fuel_price",
    "power_price",
    "heat_demand",
    "capital",
    "boiler_efficiency",
    "combined_bad",
    "break_even",
]

Record = TypeVar("Record", bound=Section)

#: Columns of a site year that a change of heat demand moves.
HEAT_COLUMNS = ("steam_kW", "hot_water_kW", "hot_gas_kW")

#: Nothing turns more than all of its fuel into heat, on the basis of HHV; LHV may read above one.
LARGEST_EFFICIENCY = 1.09


@dataclass(frozen=True)
class Change:
    """Multipliers on a study's assumptions; one leaves an assumption as it is.

    Parameters
    ----------
    key : str
        Names the variant in tables.
    factor : str
        Which assumption moves.
    change_frac : float [-]
        By how much, as a share; for the combined variant the fuel's.
    fuel_price : float [-]
        On the gas commodity price, CHP and boilers alike; transport, levies and carbon stay.
    power_price : float [-]
        On energy, demand and export prices; levies and standing charges stay.
    heat_demand : float [-]
        On steam, hot water and hot gas alike.
    capital : float [-]
        On every capital line.
    boiler_efficiency : float [-]
        On every heater's efficiency.
    """

    key: str
    factor: Factor
    change_frac: float
    fuel_price: float = 1.0
    power_price: float = 1.0
    heat_demand: float = 1.0
    capital: float = 1.0
    boiler_efficiency: float = 1.0

    @property
    def leaves_dispatch(self) -> bool:
        """Whether the schedule stays as it is, so that only money is counted anew."""
        moved = (self.fuel_price, self.power_price, self.heat_demand, self.boiler_efficiency)
        return all(multiplier == 1.0 for multiplier in moved)

    def study(self, study: Study) -> Study:
        """The study under this change.

        Parameters
        ----------
        study : Study
            As the user wrote it.

        Returns
        -------
        Study
            With prices, capital and efficiencies moved.
        """
        gas = study.gas_tariff
        power = study.power_tariff
        supply = study.separate_supply
        moved_power = {
            "energy": _scaled(power.energy, "price_per_kWh", self.power_price),
            "demand": _scaled(power.demand, "rate_per_kW_month", self.power_price),
            "export_price_per_kWh": power.export_price_per_kWh * self.power_price,
        }
        commodity = gas.commodity_per_hhv_kWh * self.fuel_price
        heaters = _scaled(
            supply.heater, "efficiency_frac", self.boiler_efficiency, LARGEST_EFFICIENCY
        )
        options = tuple(
            option.model_copy(update={"capital": _scaled(option.capital, "cost", self.capital)})
            for option in study.option
        )
        return study.model_copy(
            update={
                "gas_tariff": gas.model_copy(update={"commodity_per_hhv_kWh": commodity}),
                "power_tariff": power.model_copy(update=moved_power),
                "separate_supply": supply.model_copy(update={"heater": heaters}),
                "option": options,
            }
        )

    def site_year(self, site_year: SiteYear) -> SiteYear:
        """The year under this change.

        Parameters
        ----------
        site_year : SiteYear
            As metered.

        Returns
        -------
        SiteYear
            With heat demands moved.
        """
        if self.heat_demand == 1.0:
            return site_year
        hourly = site_year.hourly.copy()
        hourly[list(HEAT_COLUMNS)] *= self.heat_demand
        return replace(site_year, hourly=hourly)


def _scaled(
    records: tuple[Record, ...], field: str, factor: float, largest: float = math.inf
) -> tuple[Record, ...]:
    """Records with one field multiplied, and capped where nature caps it."""
    return tuple(
        record.model_copy(update={field: min(getattr(record, field) * factor, largest)})
        for record in records
    )


#: The assumptions as they stand.
BASE = Change("base", "base", 0.0)


def planned_changes(study: Study) -> tuple[Change, ...]:
    """The variants that every option is put through.

    Parameters
    ----------
    study : Study
        Its `sensitivity` section gives the steps.

    Returns
    -------
    tuple of Change
        Fuel price steps, one step each way of the others, and the combined bad variant.
    """
    steps = study.sensitivity
    changes = [
        Change(f"fuel price {step:+.0%}", "fuel_price", step, fuel_price=1.0 + step)
        for step in sorted(steps.fuel_price_steps_frac)
    ]
    for sign in (-1.0, 1.0):
        power = sign * steps.power_price_step_frac
        heat = sign * steps.heat_demand_step_frac
        capital = sign * steps.capital_step_frac
        boiler = sign * steps.boiler_efficiency_step_frac
        changes += [
            Change(f"power price {power:+.0%}", "power_price", power, power_price=1 + power),
            Change(f"heat demand {heat:+.0%}", "heat_demand", heat, heat_demand=1 + heat),
            Change(f"capital {capital:+.0%}", "capital", capital, capital=1 + capital),
            Change(
                f"boiler efficiency {boiler:+.0%}",
                "boiler_efficiency",
                boiler,
                boiler_efficiency=1 + boiler,
            ),
        ]
    changes.append(
        Change(
            "combined bad variant",
            "combined_bad",
            steps.bad_fuel_price_frac,
            fuel_price=1.0 + steps.bad_fuel_price_frac,
            power_price=1.0 - steps.bad_power_price_frac,
            heat_demand=1.0 - steps.bad_heat_demand_frac,
            capital=1.0 + steps.bad_capital_frac,
        )
    )
    return tuple(changes)

"""A year's bill, line by line, straight from tariff and metered flows.

The dispatch's objective is summed from `Prices`. This module takes no part of that way: it reads
the tariff again and sorts the flows by their local stamps, so that a mistake in either shows as a
difference between the two totals.
"""

from collections.abc import Iterator

import pandas as pd

from load_profiles import SiteYear
from planner.market.wear import overhaul_reserve_per_run_hour
from planner.plant.fuel import GasFuel
from planner.results.records import Bill, BillLine
from planner.study.sections import DemandRate, EnergyCharge, Unit, Window
from planner.study.study import Study

#: Unit of the sum of the months' billed peaks, by which demand charges are known in a bill.
DEMAND_UNIT = "kW-month"

#: Unit of standing charges, which no way of running moves.
STANDING_UNIT = "month"

#: Lines of the unit's maintenance, by run hour, energy and start.
MAINTENANCE_LINES = (
    "Maintenance by run hour",
    "Maintenance by power made",
    "Maintenance by start",
)

#: Line that puts the next overhaul aside.
OVERHAUL_LINE = "Overhaul reserve"

MONTHS = 12
WEEKDAY_NAMES = ("mon", "tue", "wed", "thu", "fri", "sat", "sun")


def bill(
    study: Study,
    site_year: SiteYear,
    hourly: pd.DataFrame,
    fuel: GasFuel,
    *,
    unit: Unit | None,
    upkeep_per_year: float,
) -> Bill:
    """A year's bill from metered flows.

    Parameters
    ----------
    study : Study
        Tariffs and heaters.
    site_year : SiteYear
        Its clock, and the within-step excess of its power.
    hourly : DataFrame, one row a step
        `grid_import_kW`, `grid_export_kW`, `heater_fuel_lhv_kW`, `unit_fuel_lhv_kW`,
        `start_fuel_lhv_kW`, `unit_on`, `unit_power_kW`, `unit_start`.
    fuel : GasFuel
        Calorific values and carbon of the gas.
    unit : Unit or None
        The machine whose wear is billed; None for separate supply.
    upkeep_per_year : float [currency]
        Staff, insurance and inspection of the option.

    Returns
    -------
    Bill
        Lines whose rate is zero in the tariff are left out.
    """
    step_h = site_year.step_h
    lines = [
        *_power_lines(study, site_year, hourly["grid_import_kW"]),
        *_export_lines(study, float(hourly["grid_export_kW"].sum()) * step_h),
        *_gas_lines(study, fuel, _gas_lhv_kWh(hourly, step_h)),
        *_upkeep_lines(study, upkeep_per_year),
    ]
    if unit is not None:
        lines += _wear_lines(unit, hourly, step_h)
    kept = [line for line in lines if line.rate != 0.0]
    return Bill(lines=kept, total=sum(line.amount for line in kept))


def _power_lines(
    study: Study, site_year: SiteYear, grid_import_kW: pd.Series
) -> Iterator[BillLine]:
    """Energy charges, levies, demand charges and standing charge of power."""
    tariff = study.power_tariff
    local = _local_calendar(site_year)
    import_kWh = pd.Series(grid_import_kW.to_numpy() * site_year.step_h, index=local.index)
    for charge in tariff.energy:
        yield _energy_line(charge, import_kWh[_within(charge, local)])
    yield _line("power", "Levies", (float(import_kWh.sum()), "kWh"), tariff.levy_per_kWh)
    for rate in tariff.demand:
        yield _demand_line(rate, site_year, grid_import_kW, local)
    yield _line("power", "Standing charge", (MONTHS, STANDING_UNIT), tariff.standing_per_month)


def _energy_line(charge: EnergyCharge, import_kWh: pd.Series) -> BillLine:
    """One energy charge."""
    return _line("power", charge.name, (float(import_kWh.sum()), "kWh"), charge.price_per_kWh)


def _demand_line(
    rate: DemandRate, site_year: SiteYear, grid_import_kW: pd.Series, local: pd.DataFrame
) -> BillLine:
    """One demand charge: the months' highest counted imports, added up."""
    counted = _within(rate, local)
    seen_kW = pd.Series(grid_import_kW.to_numpy(), index=local.index)[counted]
    peak_kW = seen_kW.groupby(local["month"][counted]).max()
    if rate.interval_minutes / 60.0 < site_year.step_h:
        peak_kW = peak_kW + site_year.within_step_excess_kW.loc[peak_kW.index]
    return _line("power", rate.name, (float(peak_kW.sum()), DEMAND_UNIT), rate.rate_per_kW_month)


def _export_lines(study: Study, export_kWh: float) -> Iterator[BillLine]:
    """What export earns, as a negative amount."""
    tariff = study.power_tariff
    if tariff.export_limit_kW > 0.0:
        yield _line("export", "Export", (export_kWh, "kWh"), -tariff.export_price_per_kWh)


def _gas_lines(study: Study, fuel: GasFuel, gas_lhv_kWh: float) -> Iterator[BillLine]:
    """Gas on HHV as invoiced, its standing charge, and the carbon of burning it."""
    gas = study.gas_tariff
    gas_hhv = (gas_lhv_kWh * fuel.hhv_over_lhv, "kWh HHV")
    yield _line("gas", "Commodity", gas_hhv, gas.commodity_per_hhv_kWh)
    yield _line("gas", "Transport", gas_hhv, gas.transport_per_hhv_kWh)
    yield _line("gas", "Levies", gas_hhv, gas.levy_per_hhv_kWh)
    yield _line("gas", "Standing charge", (MONTHS, STANDING_UNIT), gas.standing_per_month)
    carbon_t = gas_lhv_kWh * fuel.co2_kg_per_lhv_kWh / 1e3
    yield _line("carbon", "Carbon price on gas", (carbon_t, "t CO2"), gas.carbon_price_per_t)


def _upkeep_lines(study: Study, upkeep_per_year: float) -> Iterator[BillLine]:
    """Upkeep of the heaters, which stay beside CHP, and of the option."""
    for heater in study.separate_supply.heater:
        yield _line("upkeep", f"Upkeep of {heater.name}", (1.0, "year"), heater.upkeep_per_year)
    yield _line("upkeep", "Staff, insurance and inspection", (1.0, "year"), upkeep_per_year)


def _wear_lines(unit: Unit, hourly: pd.DataFrame, step_h: float) -> Iterator[BillLine]:
    """Maintenance of the unit and the reserve for its overhaul."""
    run_hours = float(hourly["unit_on"].sum()) * step_h
    power_MWh = float(hourly["unit_power_kW"].sum()) * step_h / 1e3
    starts = float(hourly["unit_start"].sum())
    by_hour, by_power, by_start = MAINTENANCE_LINES
    yield _line("upkeep", by_hour, (run_hours, "h"), unit.maintenance_per_run_hour)
    yield _line("upkeep", by_power, (power_MWh, "MWh"), unit.maintenance_per_MWh)
    yield _line("upkeep", by_start, (starts, "start"), unit.maintenance_per_start)
    yield _line("upkeep", OVERHAUL_LINE, (run_hours, "h"), overhaul_reserve_per_run_hour(unit))


def _line(section: str, line: str, quantity: tuple[float, str], rate: float) -> BillLine:
    """One line; the rate is the tariff's, so that a quantity of zero still shows it."""
    number, unit = quantity
    return BillLine.model_validate(
        {
            "section": section,
            "line": line,
            "quantity": number,
            "quantity_unit": unit,
            "rate": rate,
            "amount": number * rate,
        }
    )


def _gas_lhv_kWh(hourly: pd.DataFrame, step_h: float) -> float:
    """All gas of the site: running, starting and heating."""
    burners = ["heater_fuel_lhv_kW", "unit_fuel_lhv_kW", "start_fuel_lhv_kW"]
    return float(hourly[burners].to_numpy().sum()) * step_h


def _local_calendar(site_year: SiteYear) -> pd.DataFrame:
    """Month, weekday and hour of each step on the local clock."""
    local = site_year.local_time
    return pd.DataFrame(
        {
            "month": local.month,
            "weekday": [WEEKDAY_NAMES[number] for number in local.day_of_week],
            "hour": local.hour,
        }
    )


def _within(window: Window, local: pd.DataFrame) -> pd.Series:
    """Steps of a window, by their own stamps; one that ends before it begins spans midnight."""
    begun = local["hour"] >= window.from_hour
    ended = local["hour"] >= window.to_hour
    hours = begun & ~ended if window.from_hour < window.to_hour else begun | ~ended
    return hours & local["month"].isin(window.months) & local["weekday"].isin(window.weekdays)

"""CO2 of an option against separate supply, along the path of the grid's carbon."""

import numpy as np

from planner.arrays import FloatArray
from planner.plant.fuel import GasFuel
from planner.results.records import Carbon, CarbonYear, EnergyYear
from planner.study.sections import GridCarbon
from planner.study.study import Study

KG_PER_T = 1e3


def carbon(study: Study, fuel: GasFuel, *, separate: EnergyYear, option: EnergyYear) -> Carbon:
    r"""CO2 saved in each year of the plan.

    .. math:: m = f_{gas} F + f_{grid} (I - c X)

    for both ways of supply, with fuel :math:`F`, import :math:`I`, export :math:`X` and the
    credited share :math:`c`.

    Parameters
    ----------
    study : Study
        Grid-carbon path, credit for exports, first year and life.
    fuel : GasFuel
        Carbon of the gas from its composition.
    separate, option : EnergyYear
        Flows of a full year each.

    Returns
    -------
    Carbon
        One factor set on both sides; every operating year the same schedule.

    Notes
    -----
    Combustion at the site and power from the grid only; making and bringing the gas are left out
    on both sides. Outages are not taken off.
    """
    grid = study.grid_carbon
    first_year = study.money.first_operating_year
    years = np.arange(first_year, first_year + study.money.life_years)
    factors_kg_per_kWh = grid_factor_kg_per_kWh(grid, years)
    credit_frac = grid.export_credit_frac
    separate_t = _emitted_t(separate, fuel, factors_kg_per_kWh, credit_frac)
    option_t = _emitted_t(option, fuel, factors_kg_per_kWh, credit_frac)
    saved_t = separate_t - option_t
    stopped = np.flatnonzero(saved_t <= 0.0)
    return Carbon(
        fuel_kg_per_lhv_kWh=fuel.co2_kg_per_lhv_kWh,
        fuel_kg_per_hhv_kWh=fuel.co2_kg_per_lhv_kWh / fuel.hhv_over_lhv,
        basis=grid.basis,
        source=grid.source,
        export_credit_frac=credit_frac,
        by_year=[
            CarbonYear(
                calendar_year=int(year),
                grid_kg_per_kWh=float(factor),
                separate_t=float(without),
                option_t=float(with_option),
                saved_t=float(saved),
            )
            for year, factor, without, with_option, saved in zip(
                years, factors_kg_per_kWh, separate_t, option_t, saved_t, strict=True
            )
        ],
        lifetime_saved_t=float(saved_t.sum()),
        first_year_saved_t=float(saved_t[0]),
        stops_year=int(years[stopped[0]]) if stopped.size else None,
        break_even_grid_kg_per_kWh=_break_even(fuel, separate, option, credit_frac),
    )


def grid_factor_kg_per_kWh(grid: GridCarbon, years: np.ndarray) -> FloatArray:
    """Carbon of imported power by year.

    Parameters
    ----------
    grid : GridCarbon
        Points of the path.
    years : array of int, shape (years,)
        Calendar years.

    Returns
    -------
    array, shape (years,) [kg/kWh]
        Straight lines between the points, level beyond them.
    """
    points = [point.year for point in grid.path]
    factors = [point.kg_per_kWh for point in grid.path]
    return np.interp(years, points, factors)


def _emitted_t(
    flows: EnergyYear, fuel: GasFuel, grid_kg_per_kWh: FloatArray, credit_frac: float
) -> FloatArray:
    """CO2 of one way of supply in each year."""
    fuel_t = _fuel_lhv_kWh(flows) * fuel.co2_kg_per_lhv_kWh / KG_PER_T
    return np.asarray(fuel_t + _credited_kWh(flows, credit_frac) * grid_kg_per_kWh / KG_PER_T)


def _break_even(
    fuel: GasFuel, separate: EnergyYear, option: EnergyYear, credit_frac: float
) -> float | None:
    """Grid factor at which nothing is saved; None where the sign never turns."""
    more_fuel_kWh = _fuel_lhv_kWh(option) - _fuel_lhv_kWh(separate)
    less_power_kWh = _credited_kWh(separate, credit_frac) - _credited_kWh(option, credit_frac)
    if less_power_kWh == 0.0 or more_fuel_kWh / less_power_kWh < 0.0:
        return None
    return fuel.co2_kg_per_lhv_kWh * more_fuel_kWh / less_power_kWh


def _fuel_lhv_kWh(flows: EnergyYear) -> float:
    """All gas burnt on the site, start fuel included."""
    return flows.unit_fuel_lhv_kWh + flows.heater_fuel_lhv_kWh


def _credited_kWh(flows: EnergyYear, credit_frac: float) -> float:
    """Import less the credited share of export."""
    return flows.grid_import_kWh - credit_frac * flows.grid_export_kWh

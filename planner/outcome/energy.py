"""Energy of a year and of its months, and how the unit runs, from the hourly flows."""

import pandas as pd

from load_profiles import SiteYear
from planner.results.records import EnergyYear, MonthFlows, Running
from planner.study.sections import ALL_MONTHS, HeatCarrier

#: Grades of heat, as the hourly columns name them.
GRADES: tuple[HeatCarrier, ...] = ("steam", "hot_water", "hot_gas")


def energy_year(hourly: pd.DataFrame, step_h: float) -> EnergyYear:
    """Flows of the year, added up.

    Parameters
    ----------
    hourly : DataFrame, one row a step
        Columns of `planner.results.hourly_columns`.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    EnergyYear
        What the exhaust loses is the unit's fuel less its power and the heat offered by the
        chosen paths: stack, casing, generator and gas compressor together.
    """
    energy_kWh = hourly.select_dtypes("number").sum() * step_h
    recovered = {grade: float(energy_kWh[f"unit_{grade}_kW"]) for grade in GRADES}
    start_fuel = float(energy_kWh["start_fuel_lhv_kW"])
    unit_fuel = float(energy_kWh["unit_fuel_lhv_kW"]) + start_fuel
    power_made = float(energy_kWh["unit_power_kW"])
    return EnergyYear(
        power_made_kWh=power_made,
        grid_import_kWh=float(energy_kWh["grid_import_kW"]),
        grid_export_kWh=float(energy_kWh["grid_export_kW"]),
        unit_fuel_lhv_kWh=unit_fuel,
        start_fuel_lhv_kWh=start_fuel,
        heater_fuel_lhv_kWh=float(energy_kWh["heater_fuel_lhv_kW"]),
        recovered_kWh=recovered,
        dumped_kWh={grade: float(energy_kWh[f"dumped_{grade}_kW"]) for grade in GRADES},
        heater_heat_kWh={grade: float(energy_kWh[f"heater_{grade}_kW"]) for grade in GRADES},
        electric_cooling_kWh=float(energy_kWh["electric_cooling_kW"]),
        absorption_cooling_kWh=float(energy_kWh["absorption_cooling_kW"]),
        store_charged_kWh=float(energy_kWh["store_charge_kW"]),
        store_discharged_kWh=float(energy_kWh["store_discharge_kW"]),
        exhaust_loss_kWh=unit_fuel - power_made - sum(recovered.values()),
    )


def month_flows(hourly: pd.DataFrame, site_year: SiteYear) -> list[MonthFlows]:
    """Main flows by month of the local calendar.

    Parameters
    ----------
    hourly : DataFrame, one row a step
        Columns of `planner.results.hourly_columns`.
    site_year : SiteYear
        Its clock and steps.

    Returns
    -------
    list of MonthFlows
        January to December. The peak is the highest mean of a step, without the within-step
        excess that a demand charge may add.
    """
    step_h = site_year.step_h
    flows_kW = pd.DataFrame(
        {
            "power_demand_kWh": hourly["power_demand_kW"],
            "power_made_kWh": hourly["unit_power_kW"],
            "grid_import_kWh": hourly["grid_import_kW"],
            "grid_export_kWh": hourly["grid_export_kW"],
            "heat_demand_kWh": _all_grades(hourly, "{}_demand_kW"),
            "recovered_used_kWh": _all_grades(hourly, "unit_{}_kW")
            - _all_grades(hourly, "dumped_{}_kW"),
            "heater_heat_kWh": _all_grades(hourly, "heater_{}_kW"),
            "dumped_kWh": _all_grades(hourly, "dumped_{}_kW"),
            "run_hours": hourly["unit_on"],
        }
    )
    month = site_year.local_time.month
    monthly = flows_kW.groupby(month).sum().reindex(ALL_MONTHS, fill_value=0.0) * step_h
    peaks_kW = hourly["grid_import_kW"].groupby(month).max().reindex(ALL_MONTHS, fill_value=0.0)
    sums = [dict(zip(monthly.columns, row, strict=True)) for row in monthly.to_numpy().tolist()]
    return [
        MonthFlows(month=number, peak_import_kW=peak_kW, **flows)
        for number, peak_kW, flows in zip(ALL_MONTHS, peaks_kW.to_list(), sums, strict=True)
    ]


def running(hourly: pd.DataFrame, step_h: float) -> Running:
    """How the unit runs over the year.

    Parameters
    ----------
    hourly : DataFrame, one row a step
        Columns of `planner.results.hourly_columns`.
    step_h : float [h]
        Length of a step.

    Returns
    -------
    Running
        Full-load hours are counted against the mean of the hours in which the unit is available;
        the mean load against what it could have made in the hours it ran. The power covered is
        what the unit leaves on the site over what the site takes; the heat covered is recovered
        heat used over all heat used.
    """
    on = hourly["unit_on"].to_numpy() > 0
    power_kW = hourly["unit_power_kW"].to_numpy()
    maximum_kW = hourly["unit_maximum_kW"].to_numpy()
    available_kW = maximum_kW[maximum_kW > 0.0]
    mean_maximum_kW = float(available_kW.mean()) if available_kW.size else 0.0
    made_kWh = float(power_kW.sum()) * step_h
    imported_kW = float(hourly["grid_import_kW"].to_numpy().sum())
    kept_kW = float(power_kW.sum() - hourly["grid_export_kW"].to_numpy().sum())
    dumped_kW = float(_all_grades(hourly, "dumped_{}_kW").to_numpy().sum())
    used_kW = float(_all_grades(hourly, "unit_{}_kW").to_numpy().sum()) - dumped_kW
    heater_kW = float(_all_grades(hourly, "heater_{}_kW").to_numpy().sum())
    return Running(
        run_hours=float(on.sum()) * step_h,
        starts=int(hourly["unit_start"].sum()),
        full_load_hours=_ratio(made_kWh, mean_maximum_kW),
        mean_load_frac=_ratio(float(power_kW[on].sum()), float(maximum_kW[on].sum())),
        power_covered_frac=_ratio(kept_kW, kept_kW + imported_kW),
        heat_covered_frac=_ratio(used_kW, used_kW + heater_kW),
    )


def _all_grades(hourly: pd.DataFrame, column: str) -> pd.Series:
    """Sum of one kind of column over the grades of heat."""
    return hourly[[column.format(grade) for grade in GRADES]].sum(axis=1)


def _ratio(part: float, whole: float) -> float:
    """Part over whole; nothing of nothing is zero."""
    return part / whole if whole > 0.0 else 0.0

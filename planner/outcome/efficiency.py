"""Efficiency of a year as dispatched, and the legal test of high efficiency."""

from planner.data.published import published_rows
from planner.plant.fuel import GasFuel
from planner.results.records import Efficiency, EnergyYear
from planner.study.sections import EmissionRules, HeatCarrier, Option
from planner.study.study import Study

#: File of tests under `planner/data`.
TESTS_FILE = "efficiency_tests.csv"

KW_PER_MW = 1e3
PERCENT = 100.0


def efficiency(study: Study, option: Option, energy: EnergyYear, fuel: GasFuel) -> Efficiency:
    r"""Efficiencies of a unit with its heat, and the primary energy that it saves.

    .. math:: PES = 1 - \frac{F}{E / \eta_{E,ref} + \sum_g H_g / \eta_{H,ref,g}}

    Parameters
    ----------
    study : Study
        Reference efficiencies and the test asked for.
    option : Option
        Its unit's size decides which saving is required.
    energy : EnergyYear
        A full year, with the exact plant model.
    fuel : GasFuel
        Calorific values.

    Returns
    -------
    Efficiency
        Fuel includes starts; heat is what was recovered and used, store losses taken off.

    Notes
    -----
    Power is net, which the directive would let stand before auxiliaries: the test errs on the
    safe side. Below the overall efficiency that the directive asks, only a part of the power
    counts as cogenerated; the test is then called failed and the saving of the whole is printed.
    The reference for power is the study's: climate and grid-loss corrections belong into it.

    References
    ----------
    Directive 2012/27/EU, annex II, point (b), multiplied by fuel over fuel.
    """
    heat_kWh = useful_heat_kWh(energy)
    power_kWh, fuel_kWh = energy.power_made_kWh, energy.unit_fuel_lhv_kWh
    overall = _ratio(power_kWh + sum(heat_kWh.values()), fuel_kWh)
    saving = primary_energy_saving_frac(
        study.emissions, power_kWh=power_kWh, heat_kWh=heat_kWh, fuel_lhv_kWh=fuel_kWh
    )
    tested = study.emissions.efficiency_test == "eu_high_efficiency"
    required_overall = _required("eu_high_efficiency_overall") / PERCENT
    required_saving = _required_saving_frac(option)
    return Efficiency(
        electrical_lhv_frac=_ratio(power_kWh, fuel_kWh),
        overall_lhv_frac=overall,
        overall_hhv_frac=overall / fuel.hhv_over_lhv,
        primary_energy_saving_frac=saving,
        test=study.emissions.efficiency_test,
        required_overall_frac=required_overall if tested else None,
        required_saving_frac=required_saving if tested else None,
        met=_met(overall, saving, required_overall, required_saving) if tested else None,
    )


def primary_energy_saving_frac(
    rules: EmissionRules,
    *,
    power_kWh: float,
    heat_kWh: dict[HeatCarrier, float],
    fuel_lhv_kWh: float,
) -> float:
    """Fuel saved against making the same power and heat apart.

    Parameters
    ----------
    rules : EmissionRules
        Reference efficiencies.
    power_kWh : float [kWh]
        Power of the unit.
    heat_kWh : dict of carrier to float [kWh]
        Useful heat of the unit by grade.
    fuel_lhv_kWh : float [kWh LHV]
        Fuel of the unit.

    Returns
    -------
    float [-]
        Share of the fuel of separate production; zero where nothing was made.
    """
    references = {
        "steam": rules.reference_steam_efficiency_lhv_frac,
        "hot_water": rules.reference_water_efficiency_lhv_frac,
        "hot_gas": rules.reference_gas_efficiency_lhv_frac,
    }
    apart_kWh = power_kWh / rules.reference_power_efficiency_lhv_frac + sum(
        heat / references[grade] for grade, heat in heat_kWh.items()
    )
    return 1.0 - fuel_lhv_kWh / apart_kWh if apart_kWh > 0.0 else 0.0


def useful_heat_kWh(energy: EnergyYear) -> dict[HeatCarrier, float]:
    """Heat of the exhaust that the site used.

    Parameters
    ----------
    energy : EnergyYear
        A full year.

    Returns
    -------
    dict of carrier to float [kWh]
        Recovered less dumped, and less what the hot-water store lost.
    """
    used = {
        grade: offered - energy.dumped_kWh[grade] for grade, offered in energy.recovered_kWh.items()
    }
    lost_kWh = max(energy.store_charged_kWh - energy.store_discharged_kWh, 0.0)
    used["hot_water"] = max(used["hot_water"] - lost_kWh, 0.0)
    return used


def _required_saving_frac(option: Option) -> float:
    """Saving that the directive asks of a unit of this size."""
    small_below_kW = _required("eu_high_efficiency_small_below") * KW_PER_MW
    small = option.unit.sheet.power_kW < small_below_kW
    return _required(f"eu_high_efficiency_{'small_' if small else ''}saving") / PERCENT


def _met(overall: float, saving: float, required_overall: float, required_saving: float) -> bool:
    """Both conditions; a small unit's saving must be above zero, not at it."""
    enough = saving >= required_saving if required_saving > 0.0 else saving > 0.0
    return enough and overall >= required_overall


def _required(key: str) -> float:
    """A published requirement, in its published unit."""
    return float(published_rows(TESTS_FILE)[key]["value"])


def _ratio(part: float, whole: float) -> float:
    """Part over whole; nothing of nothing is zero."""
    return part / whole if whole > 0.0 else 0.0

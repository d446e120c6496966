"""Whether boilers and grid carry the peak of every carrier while the CHP is off."""

from collections.abc import Iterator

from load_profiles import SiteYear
from planner.results.records import SecurityLine
from planner.study.sections import HeatCarrier, Heater
from planner.study.study import Study

GRADES: tuple[HeatCarrier, ...] = ("steam", "hot_water", "hot_gas")


def security(study: Study, site_year: SiteYear) -> list[SecurityLine]:
    """Peaks against what stands there without the CHP.

    Parameters
    ----------
    study : Study
        Heaters, chillers and connection; they stay beside every option.
    site_year : SiteYear
        Demands of the year.

    Returns
    -------
    list of SecurityLine
        One for each carrier with a demand. For heat also with the largest heater out; met means
        with every heater in.

    Notes
    -----
    The peak of power is that of the shortest metered interval: the month's highest mean and its
    within-step excess. It includes the electric chillers, as metered. A store is not counted: it
    may be empty when the unit trips.
    """
    return [
        *_power_line(study, site_year),
        *_heat_lines(study, site_year),
        *_cooling_line(study, site_year),
    ]


def _power_line(study: Study, site_year: SiteYear) -> Iterator[SecurityLine]:
    """Grid connection against the peak of power."""
    monthly_kW = site_year.hourly["power_kW"].groupby(site_year.local_time.month).max()
    peak_kW = (monthly_kW + site_year.within_step_excess_kW.loc[monthly_kW.index]).max()
    if peak_kW > 0.0:
        capacity_kW = study.power_tariff.import_limit_kW
        margin_kW = capacity_kW - float(peak_kW)
        yield SecurityLine(
            carrier="power",
            peak_kW=float(peak_kW),
            capacity_kW=capacity_kW,
            margin_kW=margin_kW,
            margin_one_heater_out_kW=None,
            met=margin_kW >= 0.0,
        )


def _heat_lines(study: Study, site_year: SiteYear) -> Iterator[SecurityLine]:
    """Heaters of each grade against its peak."""
    for grade in GRADES:
        peak_kW = float(site_year.hourly[f"{grade}_kW"].max())
        if peak_kW > 0.0:
            yield _heat_line(study, grade, peak_kW)


def _heat_line(study: Study, grade: HeatCarrier, peak_kW: float) -> SecurityLine:
    """One grade, with all heaters and with the largest one out."""
    heaters = [heater for heater in study.separate_supply.heater if heater.serves == grade]
    capacity_kW = sum(heater.capacity_kW for heater in heaters)
    margin_kW = capacity_kW - peak_kW
    return SecurityLine(
        carrier=grade,
        peak_kW=peak_kW,
        capacity_kW=capacity_kW,
        margin_kW=margin_kW,
        margin_one_heater_out_kW=margin_kW - _largest_kW(heaters),
        met=margin_kW >= 0.0,
    )


def _largest_kW(heaters: list[Heater]) -> float:
    """Useful heat of the largest single heater."""
    return max((heater.largest_unit_kW for heater in heaters), default=0.0)


def _cooling_line(study: Study, site_year: SiteYear) -> Iterator[SecurityLine]:
    """Electric chillers against the peak of cooling."""
    peak_kW = float(site_year.hourly["cooling_kW"].max())
    if peak_kW > 0.0:
        chiller = study.separate_supply.chiller
        capacity_kW = chiller.capacity_kW if chiller is not None else 0.0
        yield SecurityLine(
            carrier="cooling",
            peak_kW=peak_kW,
            capacity_kW=capacity_kW,
            margin_kW=capacity_kW - peak_kW,
            margin_one_heater_out_kW=None,
            met=capacity_kW >= peak_kW,
        )

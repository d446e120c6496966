"""Carbon year by year, NOx beside its limit, and the legal test of efficiency."""

from typing import Any

from reports.charts.carbon_years import draw_carbon_years
from reports.charts.nox_band import draw_nox_band
from reports.figures import Figure, Figures
from reports.numbers import number, percent, significant
from reports.results_folder import Facts, ResultsFolder
from reports.wording import TESTS, printed

NOTHING = "–"

VERDICTS = {None: "not asked for", True: "met", False: "not met"}


def emissions(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """Carbon and NOx of the option that the report follows."""
    option = results.subject
    carbon, nox = option["carbon"], option["nox"]
    return {
        "title": _title(carbon),
        "carbon_figure": _carbon_figure(results, figures),
        "carbon": _carbon_facts(carbon),
        "years": [
            (
                year["calendar_year"],
                number(year["grid_kg_per_kWh"], 3),
                number(year["separate_t"]),
                number(year["option_t"]),
                number(year["saved_t"]),
            )
            for year in carbon["by_year"]
        ],
        "nox_figure": _nox_figure(nox, figures),
        "nox": _nox_facts(nox),
        "efficiency": _efficiency(option["efficiency"]),
    }


def _title(carbon: Facts) -> str:
    """Lifetime carbon with its end."""
    saved, stops = carbon["lifetime_saved_t"], carbon["stops_year"]
    if saved <= 0.0:
        return f"Over its life it emits {significant(-saved)}\u202ft of CO₂ more than today"
    end = "in every year" if stops is None else f"until {stops - 1}"
    return (
        f"It saves {significant(saved)}\u202ft of CO₂ over its life, {end}"
        if stops is None
        else (
            f"It saves {significant(saved)}\u202ft of CO₂ over its life; the yearly saving "
            f"ends after {stops - 1}"
        )
    )


def _carbon_figure(results: ResultsFolder, figures: Figures) -> Figure:
    """CO₂ by year."""
    carbon = results.subject["carbon"]
    years, point = carbon["by_year"], carbon["break_even_grid_kg_per_kWh"]
    level = (
        ""
        if point is None
        else f" It saves while the grid is above {number(point, 3)}\u202fkg/kWh."
    )
    return figures.add(
        draw_carbon_years(years, carbon["stops_year"]),
        title=_years_title(years),
        see="What to see: the plant’s own CO₂ stays, that of the grid power it replaces falls."
        + level,
        alt="CO2 saved by year in tonnes: "
        + "; ".join(f"{y['calendar_year']}: {number(y['saved_t'])}" for y in years),
    )


def _years_title(years: list[Facts]) -> str:
    """What the bars of all years show."""
    saving = sum(year["saved_t"] > 0.0 for year in years)
    if not saving:
        return "Against this grid it saves in no year"
    if saving == len(years):
        return "It saves in every year"
    return "The cleaner the grid, the less is saved"


def _carbon_facts(carbon: Facts) -> list[tuple[str, str]]:
    """What the carbon figures rest on."""
    point = carbon["break_even_grid_kg_per_kWh"]
    years = carbon["by_year"]
    return [
        (
            "Fuel",
            (
                f"{number(carbon['fuel_kg_per_lhv_kWh'], 4)} kg/kWh (LHV), "
                f"{number(carbon['fuel_kg_per_hhv_kWh'], 4)} kg/kWh (HHV), from its composition"
            ),
        ),
        (
            "Grid",
            (
                f"{carbon['basis']} factors, {number(years[0]['grid_kg_per_kWh'], 3)} kg/kWh in "
                f"{years[0]['calendar_year']}, {number(years[-1]['grid_kg_per_kWh'], 3)} in "
                f"{years[-1]['calendar_year']}; {printed(carbon['source'])}"
            ),
        ),
        (
            "Export",
            "no credit is taken"
            if carbon["export_credit_frac"] == 0.0
            else f"credited with {percent(carbon['export_credit_frac'])} of the grid’s factor",
        ),
        (
            "Break-even factor",
            "none: the sign does not depend on the grid"
            if point is None
            else f"{number(point, 3)} kg/kWh",
        ),
        (
            "First year",
            (
                f"{number(carbon['first_year_saved_t'])}\u202ft of a lifetime’s "
                f"{number(carbon['lifetime_saved_t'])}\u202ft"
            ),
        ),
    ]


def _nox_figure(nox: Facts, figures: Figures) -> Figure:
    """NOx beside its limit."""
    titles = {
        "met": "The limit is met with the whole band",
        "at risk": "The band crosses the limit",
        "exceeded": "The whole band lies above the limit",
    }
    low, high = number(nox["band_low_mg_per_Nm3"]), number(nox["band_high_mg_per_Nm3"])
    return figures.add(
        draw_nox_band(nox),
        title=titles[nox["status"]],
        see="What to see: the band holds nine cases in ten. A guarantee is a ceiling; the "
        "plant usually "
        "runs below it.",
        alt=(
            f"NOx band {low} to {high} mg/Nm3, limit {number(nox['limit_mg_per_Nm3'])}: "
            f"{nox['status']}."
        ),
    )


def _nox_facts(nox: Facts) -> list[tuple[str, str]]:
    """What the NOx figures rest on."""
    return [
        (
            "Guarantee",
            (
                f"{number(nox['guarantee_ppm_15O2'], 1)} ppm at 15\u202f% O₂, that is "
                f"{number(nox['guarantee_mg_per_Nm3'], 1)} mg/Nm³"
            ),
        ),
        (
            "Limit",
            f"{number(nox['limit_mg_per_Nm3'], 1)} mg/Nm³: {nox['regime']}; {nox['regime_source']}",
        ),
        (
            "Year",
            (
                f"{significant(nox['annual_centre_kg'] / 1e3)} t as NO₂ (band "
                f"{significant(nox['annual_low_kg'] / 1e3)} to "
                f"{significant(nox['annual_high_kg'] / 1e3)} t), starts included"
            ),
        ),
        (
            "Outside the guarantee",
            (
                f"{number(nox['hours_outside_guarantee'])} running hours lie outside its load "
                "or ambient range"
            ),
        ),
    ]


def _efficiency(efficiency: Facts) -> list[tuple[str, str, str]]:
    """Efficiencies of the year: what, value, asked."""
    overall, saving = efficiency["required_overall_frac"], efficiency["required_saving_frac"]
    return [
        ("Electrical (LHV)", percent(efficiency["electrical_lhv_frac"], 1), NOTHING),
        ("Overall (LHV)", percent(efficiency["overall_lhv_frac"], 1), _asked(overall)),
        ("Overall (HHV)", percent(efficiency["overall_hhv_frac"], 1), NOTHING),
        (
            "Primary energy saved",
            percent(efficiency["primary_energy_saving_frac"], 1),
            _asked(saving),
        ),
        (
            "Legal test"
            if efficiency["met"] is None
            else TESTS.get(efficiency["test"], str(efficiency["test"])),
            VERDICTS[efficiency["met"]],
            NOTHING,
        ),
    ]


def _asked(required: float | None) -> str:
    """What a test asks, or a dash where there is none."""
    return NOTHING if required is None else percent(required)

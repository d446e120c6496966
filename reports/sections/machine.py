"""The machine: its sheet, the model made of it, part load, and heat recovery."""

from typing import Any

from reports.charts.composite import draw_composite
from reports.figures import Figure, Figures
from reports.numbers import number, percent, power
from reports.results_folder import Facts, ResultsFolder
from reports.wording import upper_first

#: A sheet's books are taken to close within this range (share of fuel, LHV).
AUDIT_FROM_FRAC, AUDIT_TO_FRAC = 0.0, 0.02


def machine(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """The unit of the option that the report follows."""
    record = results.subject["machine"]
    residual = record["audit_residual_frac"]
    closes = AUDIT_FROM_FRAC <= residual <= AUDIT_TO_FRAC
    verdict = "closes" if closes else "does not close"
    return {
        "title": f"The sheet’s energy balance {verdict}: {percent(residual, 1)} of fuel is left",
        "name": record["name"],
        "kind": "class value, not a maker’s offer"
        if record["generic"]
        else "guaranteed data sheet",
        "sheet": _sheet(record),
        "model": _model(record),
        "stations": [
            (
                upper_first(station["station"]),
                number(station["temperature_degC"]),
                number(station["pressure_kPa"]),
                number(station["flow_kg_per_s"], 2),
            )
            for station in record["stations"]
        ],
        "points": [_point(point) for point in record["points"]],
        "figure": _composite(record, figures),
    }


def _sheet(record: Facts) -> list[tuple[str, str]]:
    """What the sheet says."""
    return [
        ("Net power", f"{number(record['sheet_power_kW'])} kW"),
        ("Efficiency (LHV)", percent(record["sheet_efficiency_lhv_frac"], 1)),
        (
            "Exhaust",
            (
                f"{number(record['sheet_exhaust_flow_kg_per_s'], 1)} kg/s at "
                f"{number(record['sheet_exhaust_degC'])} °C"
            ),
        ),
        ("Pressure ratio", number(record["pressure_ratio"], 1)),
        ("Minimum load", percent(record["minimum_load_frac"])),
        (
            "Gas compressor, auxiliaries",
            f"{number(record['gas_compressor_kW'])} kW, {number(record['auxiliary_kW'])} kW",
        ),
    ]


def _model(record: Facts) -> list[tuple[str, str]]:
    """What the model makes of it."""
    paths = ", ".join(str(path).replace("_", " ") for path in record["paths"])
    return [
        ("Left over in the audit", f"{percent(record['audit_residual_frac'], 2)} of fuel (LHV)"),
        ("Polytropic efficiency", percent(record["polytropic_efficiency"], 1)),
        ("Mixed firing temperature", f"{number(record['firing_degC'])} °C"),
        ("Stack", f"{number(record['stack_degC'])} °C"),
        ("Ways of the exhaust", upper_first(paths) or "bypass only"),
        ("Straight pieces in the dispatch", str(record["fit_segments"])),
    ]


def _point(point: Facts) -> tuple[str, list[str]]:
    """The machine in one condition."""
    return (
        upper_first(point["label"]),
        [
            number(point["ambient_degC"]),
            percent(point["load_frac"]),
            number(point["net_power_kW"]),
            number(point["fuel_lhv_kW"]),
            percent(point["efficiency_lhv_frac"], 1),
            number(point["exhaust_flow_kg_per_s"], 1),
            number(point["exhaust_degC"]),
        ],
    )


def _composite(record: Facts, figures: Figures) -> Figure | None:
    """Composite curves; None for a unit without recovery by surfaces."""
    gas, sink = record["recovery_heat_degC"], record["recovery_sink_degC"]
    if len(gas) < 2 or len(sink) < 2:  # noqa: PLR2004 - no line to draw
        return None
    return figures.add(
        draw_composite(gas, sink, _taken_by(record["paths"])),
        title=f"{power(gas[-1][0])} of heat down to {number(gas[-1][1])}\u202f°C at the stack",
        see="What to see: the two lines may come near but never cross; where they are "
        "closest is the pinch "
        "that limits recovery.",
        alt=(
            f"Exhaust cooled from {number(gas[0][1])} to {number(gas[-1][1])} degrees while "
            f"it gives up {power(gas[-1][0])}."
        ),
    )


def _taken_by(paths: list[str]) -> str:
    """What takes the exhaust's heat up."""
    if "steam, then water" in paths:
        return "steam and water"
    return "water" if "water only" in paths else "dryer"

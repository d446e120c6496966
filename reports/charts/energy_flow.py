"""Where the energy goes in a year: from gas and grid through unit and heaters to the site."""

from dataclasses import dataclass, field
from typing import Any

from reports.charts.drawing import NAME_PT, Drawing, text_width_mm
from reports.charts.palette import (
    EXPORT,
    GREY,
    HEATERS,
    IMPORT,
    INK,
    LOSS,
    POWER,
    RECOVERED,
    letters_on,
)
from reports.numbers import significant

WIDTH, TOP, ROOM = 126.0, 7.0, 58.0
SOURCE, MIDDLE, SINK, NODE = 0.0, 43.0, 100.0, 1.6
FLAT = 24.0
LEAST_LABEL_MM = 3.1
LEAST_DRAWN_MM = 0.12
FUEL_PALE = "#5D6067"

GRADE_NAMES = {"hot_gas": "Drying heat", "steam": "Steam", "hot_water": "Hot water"}


@dataclass
class _Sink:
    """A place on the right: its bands so far, from above."""

    name: str
    total_GWh: float
    top_mm: float = 0.0
    filled_mm: float = 0.0
    lines: list[str] = field(default_factory=list)


def draw_energy_flow(energy: dict[str, Any], heater_name: str) -> str:
    """Draw the figure.

    Parameters
    ----------
    energy : dict
        Record of a year's energy [kWh].
    heater_name : str
        What makes the rest of the heat: boilers, burners.

    Returns
    -------
    str
        SVG.
    """
    flows = _flows(energy)
    unit, heaters = flows["unit"], flows["heaters"]
    sinks = _sinks(unit, heaters, flows["import"])
    k = _scale_mm(unit, heaters, flows["import"], sinks)
    drawing = Drawing(WIDTH, TOP + ROOM + 24.0)
    drawing.text(0.0, 2.6, "GWh a year (fuel as LHV), heights to scale", fill=GREY)
    _place_sinks(sinks, k)
    y = TOP
    y = _import_band(drawing, flows["import"], sinks, k, y)
    y = _node(drawing, "Gas to the unit", "Gas turbine", unit, sinks, k, y + 7.5)
    y = _node(drawing, f"Gas to {heater_name}", heater_name.capitalize(), heaters, sinks, k, y + 8.0)
    drawing.height_mm = max(y, *(s.top_mm + s.total_GWh * k for s in sinks.values())) + 4.0
    for sink in sinks.values():
        _name_sink(drawing, sink, k)
    return drawing.svg()


def _flows(energy: dict[str, Any]) -> dict[str, Any]:
    """Bands of each node in GWh: name, amount, where to, colour."""
    recovered, dumped = energy["recovered_kWh"], energy["dumped_kWh"]
    own = energy["power_made_kWh"] - energy["grid_export_kWh"]
    used = {g: recovered[g] - dumped[g] for g in ("hot_gas", "steam", "hot_water")}
    lost = energy["exhaust_loss_kWh"] + sum(dumped.values())
    heat = {g: energy["heater_heat_kWh"][g] for g in ("hot_gas", "steam", "hot_water")}
    lost_boilers = energy["heater_fuel_lhv_kWh"] - sum(heat.values())
    unit = [("Own power", own, "site", POWER), ("Export", energy["grid_export_kWh"], "export", EXPORT)]
    unit += [(GRADE_NAMES[g], v, "heat", RECOVERED[g]) for g, v in used.items()]
    unit += [("Losses", lost, "loss", LOSS)]
    heaters = [(GRADE_NAMES[g], v, "heat", HEATERS) for g, v in heat.items()]
    heaters += [("Losses", max(lost_boilers, 0.0), "loss", LOSS)]
    return {
        "import": energy["grid_import_kWh"] / 1e6,
        "unit": [(name, value / 1e6, to, colour) for name, value, to, colour in unit if value > 0.0],
        "heaters": [(name, value / 1e6, to, colour) for name, value, to, colour in heaters if value > 0.0],
    }


def _sinks(unit: list[Any], heaters: list[Any], grid_import: float) -> dict[str, _Sink]:
    """Places on the right that receive anything."""
    names = {"site": "Site power", "export": "Export", "heat": "Site heat", "loss": "Losses"}
    sums = dict.fromkeys(names, 0.0)
    sums["site"] = grid_import
    for _, value, to, _ in [*unit, *heaters]:
        sums[to] += value
    return {key: _Sink(names[key], total) for key, total in sums.items() if total > 0.0}


def _scale_mm(unit: list[Any], heaters: list[Any], grid_import: float, sinks: dict[str, _Sink]) -> float:
    """Millimetres a GWh at which both sides fit."""
    left = grid_import + sum(b[1] for b in unit) + sum(b[1] for b in heaters)
    return ROOM / max(left, sum(sink.total_GWh for sink in sinks.values()), 1e-9)


def _place_sinks(sinks: dict[str, _Sink], k: float) -> None:
    """Tops of the places on the right, with room for their names between them."""
    y = TOP
    for sink in sinks.values():
        sink.top_mm = y
        y += max(sink.total_GWh * k, 1.0) + 7.5


def _import_band(drawing: Drawing, amount: float, sinks: dict[str, _Sink], k: float, y: float) -> float:
    """Grid import, straight to the site."""
    if amount <= 0.0:
        return y
    height = amount * k
    _band(drawing, (SOURCE + NODE, y), (SINK, sinks["site"].top_mm), height, IMPORT, flat=FLAT + 20.0)
    sinks["site"].filled_mm += height
    drawing.rect(SOURCE, y, NODE, height, INK)
    words = f"Grid import  {significant(amount)}"
    inside = height >= LEAST_LABEL_MM
    drawing.text(SOURCE + NODE + 1.5, y + height / 2 + 1.0 if inside else y - 1.0, words, size_pt=NAME_PT)
    return y + height


def _node(drawing: Drawing, source: str, name: str, bands: list[Any], sinks: dict[str, _Sink], k: float, y: float) -> float:
    """Fuel into a node, and what comes out of it."""
    total = sum(band[1] for band in bands)
    if total * k < LEAST_DRAWN_MM:
        return y
    height = total * k
    _band(drawing, (SOURCE + NODE, y), (MIDDLE, y), height, FUEL_PALE, flat=0.0)
    drawing.rect(SOURCE, y, NODE, height, INK)
    drawing.rect(MIDDLE, y, NODE, height, INK)
    words = f"{source}  {significant(total)}"
    inside = height >= LEAST_LABEL_MM
    drawing.text(SOURCE + NODE + 1.5, y + height / 2 + 1.0 if inside else y + height + 3.0, words, size_pt=NAME_PT, fill=letters_on(FUEL_PALE) if inside else INK)
    drawing.text(MIDDLE, y - 1.3, name, size_pt=NAME_PT, bold=True)
    top = y
    for band, value, to, colour in bands:
        sink, tall = sinks[to], value * k
        _band(drawing, (MIDDLE + NODE, top), (SINK, sink.top_mm + sink.filled_mm), tall, colour, flat=FLAT)
        sink.filled_mm += tall
        label = f"{band}  {significant(value)}"
        if tall >= LEAST_LABEL_MM and text_width_mm(label, NAME_PT) < FLAT + 14.0:
            drawing.text(MIDDLE + NODE + 1.5, top + tall / 2 + 1.0, label, size_pt=NAME_PT, fill=letters_on(colour))
        elif tall > 0.0 and to in ("heat", "loss"):
            sink.lines.append(f"{band.lower()} {name.lower()} {significant(value, 2)}")
        top += tall
    return top


def _band(drawing: Drawing, start: tuple[float, float], end: tuple[float, float], height: float, colour: str, *, flat: float) -> None:
    """A band of even height: flat first, then a curve to its end."""
    (x1, y1), (x2, y2) = start, end
    turn = x1 + flat
    middle = (turn + x2) / 2
    tall = max(height, LEAST_DRAWN_MM)
    drawing.path(
        f"M{x1:.2f} {y1:.2f}H{turn:.2f}C{middle:.2f} {y1:.2f} {middle:.2f} {y2:.2f} {x2:.2f} {y2:.2f}"
        f"V{y2 + tall:.2f}C{middle:.2f} {y2 + tall:.2f} {middle:.2f} {y1 + tall:.2f} "
        f"{turn:.2f} {y1 + tall:.2f}H{x1:.2f}Z",
        fill=colour,
    )


def _name_sink(drawing: Drawing, sink: _Sink, k: float) -> None:
    """Node, name and amount of a place on the right."""
    height = max(sink.total_GWh * k, LEAST_DRAWN_MM)
    drawing.rect(SINK, sink.top_mm, NODE, height, INK)
    y = sink.top_mm + height / 2
    drawing.text(SINK + NODE + 1.5, y - 0.4, sink.name, size_pt=NAME_PT, bold=True)
    drawing.text(SINK + NODE + 1.5, y + 2.9, significant(sink.total_GWh), size_pt=NAME_PT)

"""Where the energy goes in a year: from gas and grid through unit and heaters to the site."""

from dataclasses import dataclass
from typing import Any

from reports.charts.drawing import NAME_PT, Drawing, Point, text_width_mm
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
from reports.wording import upper_first

WIDTH, TOP, ROOM = 126.0, 7.0, 50.0
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


@dataclass(frozen=True)
class _Picture:
    """What is drawn on, where bands end, and millimetres a GWh."""

    drawing: Drawing
    sinks: dict[str, _Sink]
    scale_mm: float


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
    scale_mm = _scale_mm(unit, heaters, flows["import"], sinks)
    picture = _Picture(Drawing(WIDTH, 0.0), sinks, scale_mm)
    picture.drawing.text(0.0, 2.6, "GWh a year (fuel as LHV), heights to scale", fill=GREY)
    _place_sinks(sinks, scale_mm)
    y = _import_band(picture, flows["import"], TOP)
    y = _node(picture, ("Gas to the unit", "Gas turbine"), unit, y + 7.5)
    y = _node(picture, (f"Gas to {heater_name}", upper_first(heater_name)), heaters, y + 8.0)
    feet = [sink.top_mm + sink.total_GWh * scale_mm for sink in sinks.values()]
    picture.drawing.height_mm = max([y, *feet]) + 4.0
    for sink in sinks.values():
        _name_sink(picture, sink)
    return picture.drawing.svg()


def _flows(energy: dict[str, Any]) -> dict[str, Any]:
    """Bands of each node in GWh: name, amount, where to, colour."""
    recovered, dumped = energy["recovered_kWh"], energy["dumped_kWh"]
    own = energy["power_made_kWh"] - energy["grid_export_kWh"]
    used = {g: recovered[g] - dumped[g] for g in ("hot_gas", "steam", "hot_water")}
    lost = energy["exhaust_loss_kWh"] + sum(dumped.values())
    heat = {g: energy["heater_heat_kWh"][g] for g in ("hot_gas", "steam", "hot_water")}
    lost_boilers = energy["heater_fuel_lhv_kWh"] - sum(heat.values())
    unit = [
        ("Own power", own, "site", POWER),
        ("Export", energy["grid_export_kWh"], "export", EXPORT),
    ]
    unit += [(GRADE_NAMES[g], v, "heat", RECOVERED[g]) for g, v in used.items()]
    unit += [("Losses", lost, "loss", LOSS)]
    heaters = [(GRADE_NAMES[g], v, "heat", HEATERS) for g, v in heat.items()]
    heaters += [("Losses", max(lost_boilers, 0.0), "loss", LOSS)]
    return {
        "import": energy["grid_import_kWh"] / 1e6,
        "unit": [
            (name, value / 1e6, to, colour) for name, value, to, colour in unit if value > 0.0
        ],
        "heaters": [
            (name, value / 1e6, to, colour) for name, value, to, colour in heaters if value > 0.0
        ],
    }


def _sinks(unit: list[Any], heaters: list[Any], grid_import: float) -> dict[str, _Sink]:
    """Places on the right that receive anything."""
    names = {"site": "Site power", "export": "Export", "heat": "Site heat", "loss": "Losses"}
    sums = dict.fromkeys(names, 0.0)
    sums["site"] = grid_import
    for _, value, to, _ in [*unit, *heaters]:
        sums[to] += value
    return {key: _Sink(names[key], total) for key, total in sums.items() if total > 0.0}


def _scale_mm(
    unit: list[Any], heaters: list[Any], grid_import: float, sinks: dict[str, _Sink]
) -> float:
    """Millimetres a GWh at which both sides fit."""
    left = grid_import + sum(b[1] for b in unit) + sum(b[1] for b in heaters)
    return ROOM / max(left, sum(sink.total_GWh for sink in sinks.values()), 1e-9)


def _place_sinks(sinks: dict[str, _Sink], k: float) -> None:
    """Tops of the places on the right, with room for their names between them."""
    y = TOP
    for sink in sinks.values():
        sink.top_mm = y
        y += max(sink.total_GWh * k, 1.0) + 7.5


def _import_band(picture: _Picture, amount: float, y: float) -> float:
    """Grid import, straight to the site."""
    if amount <= 0.0:
        return y
    drawing, site = picture.drawing, picture.sinks["site"]
    height = amount * picture.scale_mm
    _band(drawing, (SOURCE + NODE, y), (SINK, site.top_mm), (height, FLAT + 20.0), IMPORT)
    site.filled_mm += height
    drawing.rect(SOURCE, y, NODE, height, INK)
    words = f"Grid import  {significant(amount)}"
    baseline = y + height / 2 + 1.0 if height >= LEAST_LABEL_MM else y - 1.0
    drawing.text(SOURCE + NODE + 1.5, baseline, words, size_pt=NAME_PT)
    return y + height


def _node(picture: _Picture, names: tuple[str, str], bands: list[Any], y: float) -> float:
    """Fuel into a node, and what comes out of it."""
    drawing, total = picture.drawing, sum(band[1] for band in bands)
    height = total * picture.scale_mm
    if height < LEAST_DRAWN_MM:
        return y
    _band(drawing, (SOURCE + NODE, y), (MIDDLE, y), (height, 0.0), FUEL_PALE)
    drawing.rect(SOURCE, y, NODE, height, INK)
    drawing.rect(MIDDLE, y, NODE, height, INK)
    inside = height >= LEAST_LABEL_MM
    drawing.text(
        SOURCE + NODE + 1.5,
        y + height / 2 + 1.0 if inside else y + height + 3.0,
        f"{names[0]}  {significant(total)}",
        size_pt=NAME_PT,
        fill=letters_on(FUEL_PALE) if inside else INK,
    )
    drawing.text(MIDDLE, y - 1.3, names[1], size_pt=NAME_PT, bold=True)
    for name, value, to, colour in bands:
        _outflow(picture, (name, value, colour), picture.sinks[to], y)
        y += value * picture.scale_mm
    return y


def _outflow(picture: _Picture, band: tuple[str, float, str], sink: _Sink, y: float) -> None:
    """One band from a node to its place on the right; its name where it is thick enough."""
    name, value, colour = band
    height = value * picture.scale_mm
    end = (SINK, sink.top_mm + sink.filled_mm)
    _band(picture.drawing, (MIDDLE + NODE, y), end, (height, FLAT), colour)
    sink.filled_mm += height
    words = f"{name}  {significant(value)}"
    if height >= LEAST_LABEL_MM and text_width_mm(words, NAME_PT) < FLAT + 14.0:
        baseline, fill = y + height / 2 + 1.0, letters_on(colour)
        picture.drawing.text(MIDDLE + NODE + 1.5, baseline, words, size_pt=NAME_PT, fill=fill)


def _band(
    drawing: Drawing, start: Point, end: Point, size: tuple[float, float], colour: str
) -> None:
    """A band of even height: flat for a while, then a curve to its end."""
    height, flat = size
    (x1, y1), (x2, y2) = start, end
    turn = x1 + flat
    middle = (turn + x2) / 2
    tall = max(height, LEAST_DRAWN_MM)
    drawing.path(
        f"M{x1:.2f} {y1:.2f}H{turn:.2f}C{middle:.2f} {y1:.2f} {middle:.2f} {y2:.2f} "
        f"{x2:.2f} {y2:.2f}"
        f"V{y2 + tall:.2f}C{middle:.2f} {y2 + tall:.2f} {middle:.2f} {y1 + tall:.2f} "
        f"{turn:.2f} {y1 + tall:.2f}H{x1:.2f}Z",
        fill=colour,
    )


def _name_sink(picture: _Picture, sink: _Sink) -> None:
    """Node, name and amount of a place on the right."""
    drawing = picture.drawing
    height = max(sink.total_GWh * picture.scale_mm, LEAST_DRAWN_MM)
    drawing.rect(SINK, sink.top_mm, NODE, height, INK)
    left, y = SINK + NODE + 1.5, sink.top_mm + height / 2
    drawing.text(left, y - 0.4, sink.name, size_pt=NAME_PT, bold=True)
    drawing.text(left, y + 2.9, significant(sink.total_GWh), size_pt=NAME_PT)

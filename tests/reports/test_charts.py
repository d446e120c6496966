"""Figures: scales, colours, and what is drawn where."""

import base64
import struct
import xml.etree.ElementTree as ET
import zlib

import numpy as np
import pytest

from reports.charts.drawing import PT_MM, Drawing
from reports.charts.duration import Curve, draw_durations, draw_shares
from reports.charts.energy_flow import draw_energy_flow
from reports.charts.outcome import Bar, draw_outcome
from reports.charts.palette import HEAT_SCALE
from reports.charts.raster import coloured_png_base64
from reports.charts.scales import Scale, mark_text, round_step, rounded_range
from reports.charts.week import Band, draw_week
from reports.charts.year_map import draw_year_map

SVG = "{http://www.w3.org/2000/svg}"


def _texts(svg: str) -> list[str]:
    """All labels of a figure."""
    return [element.text or "" for element in ET.fromstring(svg).iter(f"{SVG}text")]  # noqa: S314 - our own


@pytest.mark.parametrize(
    ("span", "most", "step"),
    [(10.0, 5, 2.0), (13.0, 6, 2.5), (0.9, 5, 0.2), (1.0, 10, 0.1), (70000.0, 4, 20000.0)],
)
def test_round_steps(span: float, most: int, step: float) -> None:
    """Steps are 1, 2, 2.5 or 5 times a power of ten, by hand."""
    assert round_step(span, most) == pytest.approx(step)


def test_ranges_hold_zero() -> None:
    """A range that would not hold zero is widened; one without width gets some."""
    assert rounded_range(3.0, 9.0, 5) == (0.0, 10.0)
    assert rounded_range(-7.0, -2.0, 4) == (-8.0, 0.0)
    assert rounded_range(0.0, 0.0) == (0.0, 1.0)


def test_marks_are_round_and_inside() -> None:
    """Marks of a scale from -3 to 10 by steps of 2.5."""
    assert Scale(-3.0, 10.0, 0.0, 100.0).marks(6) == [-2.5, 0.0, 2.5, 5.0, 7.5, 10.0]
    assert mark_text(2.5, 2.5) == "2.5"
    assert mark_text(2000.0, 1000.0) == "2\u202f000"


def test_break_even_is_the_heaviest_line() -> None:
    """Zero is drawn thicker than any other line, at the place of zero on the axis."""
    bars = [Bar("Gas price", -0.2, 0.2, 4e6, -1e6)]
    svg = draw_outcome(bars, planned_npv=2e6, combined_npv=-3e6, currency="EUR")
    lines = list(ET.fromstring(svg).iter(f"{SVG}line"))  # noqa: S314 - our own
    heaviest = max(lines, key=lambda line: float(line.attrib["stroke-width"]))
    zero = next(e for e in ET.fromstring(svg).iter(f"{SVG}text") if e.text == "0")  # noqa: S314 - our own

    assert float(heaviest.attrib["stroke-width"]) == pytest.approx(1.3 * PT_MM, abs=1e-3)
    assert heaviest.attrib["x1"] == heaviest.attrib["x2"] == zero.attrib["x"]
    assert {"breaks even", "as planned 2.0", "All bad at once"} <= set(_texts(svg))


def test_energy_flow_bands_balance() -> None:
    """Power, heat and losses of 10 and 4 GWh of gas and 2 GWh of import, added up by hand."""
    grades = ("steam", "hot_water", "hot_gas")
    energy = {
        "power_made_kWh": 3e6,
        "grid_import_kWh": 2e6,
        "grid_export_kWh": 0.5e6,
        "unit_fuel_lhv_kWh": 10e6,
        "heater_fuel_lhv_kWh": 4e6,
        "recovered_kWh": {"steam": 2.5e6, "hot_water": 2e6, "hot_gas": 0.0},
        "dumped_kWh": {"steam": 0.0, "hot_water": 0.5e6, "hot_gas": 0.0},
        "heater_heat_kWh": dict.fromkeys(grades, 0.0) | {"steam": 3.6e6},
        "exhaust_loss_kWh": 2.5e6,
    }
    texts = _texts(draw_energy_flow(energy, "boilers"))
    named = dict(text.split("  ") for text in texts if "  " in text)

    assert named["Gas to the unit"] == "10.0"
    assert named["Own power"] == "2.50"
    assert named["Hot water"] == "1.50"
    assert named["Grid import"] == "2.00"
    assert texts[texts.index("Export") + 1] == "0.500"
    assert texts[texts.index("Site power") + 1] == "4.50"
    assert texts[texts.index("Site heat") + 1] == "7.60"
    assert texts[texts.index("Losses") + 1] == "3.40"


def _pixels(png_base64: str) -> np.ndarray:
    """Colours of a PNG of 8-bit RGB rows without filter, decoded by the PNG specification."""
    content = base64.b64decode(png_base64)
    columns, rows = struct.unpack(">II", content[16:24])
    length = struct.unpack(">I", content[33:37])[0]
    raw = np.frombuffer(zlib.decompress(content[41 : 41 + length]), dtype=np.uint8)
    return raw.reshape(rows, 1 + 3 * columns)[:, 1:].reshape(rows, columns, 3)


def test_maps_run_through_the_scale() -> None:
    """Nothing is the first colour, everything the last, and the middle lies between."""
    pixels = _pixels(coloured_png_base64(np.array([[0.0, 0.5, 1.0, 7.0]]), HEAT_SCALE))

    expected = [[0xFB, 0xF5, 0xE6], [0xE7, 0x9B, 0x52], [0x6B, 0x1A, 0x1C], [0x6B, 0x1A, 0x1C]]
    assert pixels[0].tolist() == expected


def test_year_map_puts_midnight_at_the_foot() -> None:
    """The first hour of the first day is the lowest cell of the first column."""
    values_kW = np.zeros(8760)
    values_kW[0] = 4000.0
    svg = draw_year_map(values_kW, steps_a_day=24, stops=HEAT_SCALE, name="heat")
    image = next(ET.fromstring(svg).iter(f"{SVG}image"))  # noqa: S314 - our own
    address = image.attrib["{http://www.w3.org/1999/xlink}href"]
    pixels = _pixels(address.split(",")[1])

    assert pixels.shape == (24, 365, 3)
    assert pixels[23, 0].tolist() == [0x6B, 0x1A, 0x1C]
    assert pixels[0, 0].tolist() == [0xFB, 0xF5, 0xE6]


@pytest.mark.parametrize("step_h", [1.0, 0.5, 0.25])
def test_durations_in_any_step(step_h: float) -> None:
    """The hours' axis reaches a year whatever the step, and each curve carries its name."""
    steps = round(8760 / step_h)
    values = np.linspace(0.0, 5000.0, steps)
    curves = [Curve("Power", values, "#1F4E8C"), Curve("Steam", 0.4 * values, "#B5401A")]
    texts = _texts(draw_durations(curves, step_h))

    assert {"Power", "Steam", "8\u202f000"} <= set(texts)
    assert "Boilers" in _texts(draw_shares(values, [Curve("Boilers", values, "#C9CED6")], step_h))


def test_week_names_thick_bands_inside_and_thin_ones_above() -> None:
    """A thick band carries its name; a thin one is named beside its colour; a zero one not."""
    bands = [
        Band("Own power", np.full(168, 4000.0), "#1F4E8C"),
        Band("Grid import", np.full(168, 50.0), "#A97FBF"),
        Band("Store", np.zeros(168), "#E8CF5A"),
    ]
    svg = draw_week(bands, np.full(168, 4050.0), list("MTWTFSS"), what="power")
    labels = {e.text: e.attrib for e in ET.fromstring(svg).iter(f"{SVG}text")}  # noqa: S314 - our own

    assert float(labels["Own power"]["y"]) > 6.0
    assert float(labels["Grid import"]["y"]) < 6.0
    assert "Store" not in labels


def test_labels_are_escaped() -> None:
    """A name with markup in it stays a name."""
    drawing = Drawing(10.0, 10.0)
    drawing.text(0.0, 5.0, "<b>&</b>")

    assert _texts(drawing.svg()) == ["<b>&</b>"]

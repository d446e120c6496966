"""Colours of all figures; each energy keeps its own everywhere."""

INK = "#1B2230"
GREY = "#5B6472"
HAIR = "#AEB4BD"
FAINT = "#E1E4E8"
WHITE = "#FFFFFF"

POWER = "#1F4E8C"
HEAT_HIGH = "#B5401A"
HEAT_LOW = "#EFA96A"
FUEL = "#3A3D45"
IMPORT = "#A97FBF"
EXPORT = "#2FA08A"
STORE = "#E8CF5A"
LOSS = "#D3D6DB"
HEATERS = "#C9CED6"

LOSING = "#B5401A"
LOSING_PALE = "#F3D9CC"
GAINING = "#1F4E8C"

#: Heat recovered, by grade; drying heat is the hottest.
RECOVERED = {"hot_gas": "#7E2A10", "steam": HEAT_HIGH, "hot_water": HEAT_LOW}

HEAT_SCALE = ("#FBF5E6", "#F5D9A0", "#E79B52", "#BF4B20", "#6B1A1C")
POWER_SCALE = ("#F2F6FA", "#BFD3E8", "#6E9BC8", "#1F4E8C", "#0E2547")

#: Fills on which white letters read better than ink.
DARK = frozenset({POWER, HEAT_HIGH, FUEL, "#7E2A10", "#5D6067"})


def letters_on(fill: str) -> str:
    """Colour of letters on a fill."""
    return WHITE if fill in DARK else INK

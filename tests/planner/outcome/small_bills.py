"""Bills of round numbers, made of the sections that the cash flow tells apart."""

from planner.market.invoice import DEMAND_UNIT, MAINTENANCE_LINES, OVERHAUL_LINE, STANDING_UNIT
from planner.results.records import Bill, BillLine

#: Section, line and unit of each part of a bill.
PARTS = {
    "energy": ("power", "All hours", "kWh"),
    "demand": ("power", "Peak demand", DEMAND_UNIT),
    "standing": ("power", "Standing charge", STANDING_UNIT),
    "export": ("export", "Export", "kWh"),
    "gas": ("gas", "Commodity", "kWh HHV"),
    "carbon": ("carbon", "Carbon price on gas", "t CO2"),
    "upkeep": ("upkeep", "Upkeep of boiler house", "year"),
    "maintenance": ("upkeep", MAINTENANCE_LINES[0], "h"),
    "overhaul": ("upkeep", OVERHAUL_LINE, "h"),
}


def bill_of(**amounts: float) -> Bill:
    """A bill with one line for each part given, at a rate of one."""
    lines = [
        BillLine.model_validate(
            {
                "section": PARTS[part][0],
                "line": PARTS[part][1],
                "quantity": amount,
                "quantity_unit": PARTS[part][2],
                "rate": 1.0,
                "amount": amount,
            }
        )
        for part, amount in amounts.items()
    ]
    return Bill(lines=lines, total=sum(amounts.values()))

"""Tariffs to hourly prices, metered flows to a bill.

In the order in which data passes: `tariff_check` refuses a tariff whose windows overlap or leave
gaps; `windows` lays them on the local calendar; `hourly_prices` turns them into the `Prices` of
`prices`, `wear` the unit's upkeep into rates, both for the dispatch; `invoice` makes the `Bill`
from the flows, by code of its own.
"""

from planner.market.hourly_prices import prices
from planner.market.invoice import bill
from planner.market.tariff_check import check_tariff, tariff_findings
from planner.market.wear import Wear, wear

__all__ = ["Wear", "bill", "check_tariff", "prices", "tariff_findings", "wear"]

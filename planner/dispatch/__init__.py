"""The cheapest year and its proof.

In the order in which data passes: `shortfall` refuses demands that nothing could meet; `window`
cuts steps out of plant, prices and demand; `year_program` states them as a `program` for HiGHS;
`months` bounds the year and proposes the unit's state, `commitment` joins it, `solve` makes the
`Schedule`; `record` is the same problem written for the reader in PuLP, and certifies; `verify`
holds every schedule against balances, limits and prices.
"""

from planner.dispatch.schedule import Schedule
from planner.dispatch.solve import solve_year
from planner.dispatch.verify import verify

__all__ = ["Schedule", "solve_year", "verify"]

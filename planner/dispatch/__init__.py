"""The cheapest year and its proof.

In the order in which data passes:

`shortfall` refuses demands that nothing could meet, with their hour. `window` cuts steps out of
plant, prices and demand. `solve` chooses the way to a state of the unit and a bound on the year:
the fast engine (`fast_year` and the modules that begin with `fast_`) where it knows the shape,
else `months` solved apart, each stated by `hull_program` and joined by `commitment`.
`fixed_state` solves the year with that state as `year_program` states it, its segments in order
(`segment_order`); both statements are a `program` for HiGHS, which `solver` runs. `read_back`
makes the columns of a `Schedule`. `record` is the same problem written for the reader in PuLP,
and certifies the cost. `verify` and `machine_checks` hold every schedule against balances, limits
and prices, and know of no solver.
"""

from planner.dispatch.schedule import Schedule
from planner.dispatch.solve import solve_year
from planner.dispatch.verify import verify

__all__ = ["Schedule", "solve_year", "verify"]

"""`Prices`: what the dispatch pays and earns in every step."""

from dataclasses import dataclass

from planner.arrays import BoolArray, FloatArray, IntArray


@dataclass(frozen=True)
class DemandCharge:
    """A charge on the highest import within a set of hours, for each billing period.

    Parameters
    ----------
    name : str
        As the invoice prints it.
    counted : array, shape (steps,)
        Steps in which the import counts.
    period : array of int, shape (steps,)
        Billing period of each step (local calendar month, 0..11).
    rate_per_kW : array, shape (periods,) [currency/kW]
        Rate for the period's highest counted import.
    excess_kW : array, shape (periods,) [kW]
        Within-step excess, added to the highest mean before the rate is applied.
    """

    name: str
    counted: BoolArray
    period: IntArray
    rate_per_kW: FloatArray
    excess_kW: FloatArray


@dataclass(frozen=True)
class Prices:
    """Everything the dispatch's objective knows about money.

    Parameters
    ----------
    step_h : float [h]
        Length of a step.
    import_per_kWh, export_per_kWh : array, shape (steps,) [currency/kWh]
        Energy and levies on import; what export earns, never above the import price.
    import_limit_kW, export_limit_kW : float [kW]
        Connection limits; an export limit of zero forbids export.
    fuel_per_lhv_kWh : array, shape (steps,) [currency/kWh LHV]
        Commodity, transport, levies and carbon of one kWh of gas (LHV).
    demand_charges : tuple of DemandCharge
        All apply at once.
    fixed_per_year : float [currency]
        Standing charges of power and gas, the same whatever runs.
    """

    step_h: float
    import_per_kWh: FloatArray
    export_per_kWh: FloatArray
    import_limit_kW: float
    export_limit_kW: float
    fuel_per_lhv_kWh: FloatArray
    demand_charges: tuple[DemandCharge, ...]
    fixed_per_year: float

"""Records of `results.json`: the contract between planner and reports.

Money is real, in the study's currency; nothing is rounded. Keys carry units.
"""

from typing import Literal

from pydantic import BaseModel, ConfigDict, Field

from planner.study.sections import HeatCarrier

Carrier = Literal["power", "steam", "hot_water", "hot_gas", "cooling"]
Status = Literal["met", "at risk", "exceeded"]


class Record(BaseModel):
    """A strict, frozen record; NaN and infinity are refused."""

    model_config = ConfigDict(extra="forbid", frozen=True, allow_inf_nan=False)


class Heading(Record):
    """What the report's head says."""

    site: str
    place: str
    kind: str
    client: str
    consultant: str
    title: str
    language: str
    currency: str
    year: int
    time_zone: str
    altitude_m: float
    price_year: int
    first_operating_year: int
    life_years: int
    discount_rate_real_frac: float


class InputFile(Record):
    """One file that was read."""

    file: str
    sha256: str
    bytes: int


class DefaultUsed(Record):
    """A study field that was left out."""

    path: str
    value: str
    meaning: str


class FindingRecord(Record):
    """A `Finding`, with the stage that made it."""

    stage: Literal["profiles", "plant", "market", "dispatch", "outcome", "explore"]
    where: str
    what: str
    effect: str
    advice: str
    severity: Literal["note", "attention", "serious"]


class CarrierDemand(Record):
    """One carrier's year."""

    carrier: Carrier
    annual_kWh: float
    peak_kW: float
    peak_local_time: str
    base_kW: float = Field(description="Exceeded in 90 % of the steps.")
    load_factor_frac: float
    monthly_kWh: list[float] = Field(min_length=12, max_length=12)
    origin_frac: dict[str, float] = Field(
        description="Share of the steps measured, filled, billed, synthesised."
    )


class WeatherYear(Record):
    """The year's weather in five numbers."""

    mean_degC: float
    minimum_degC: float
    maximum_degC: float
    mean_relative_humidity_frac: float
    mean_pressure_kPa: float


class Demand(Record):
    """What the site wants."""

    step_h: float
    carriers: list[CarrierDemand]
    daily_mean_heat_kW: list[float] = Field(description="Steam, hot water and hot gas; by day.")
    within_step_excess_kW: list[float] = Field(min_length=12, max_length=12)
    weather: WeatherYear


class BillLine(Record):
    """One line of a yearly bill."""

    section: Literal["power", "export", "gas", "carbon", "upkeep"]
    line: str
    quantity: float
    quantity_unit: str
    rate: float = Field(description="Amount over quantity.")
    amount: float = Field(description="Positive where the client pays.")


class Bill(Record):
    """A year's bill, line by line, from metered flows."""

    lines: list[BillLine]
    total: float


class EnergyYear(Record):
    """Flows of the year [kWh], priced with the exact plant model."""

    power_made_kWh: float
    grid_import_kWh: float
    grid_export_kWh: float
    unit_fuel_lhv_kWh: float = Field(description="Start fuel included.")
    start_fuel_lhv_kWh: float
    heater_fuel_lhv_kWh: float
    recovered_kWh: dict[HeatCarrier, float] = Field(description="Offered by the chosen paths.")
    dumped_kWh: dict[HeatCarrier, float] = Field(description="Offered and not used.")
    heater_heat_kWh: dict[HeatCarrier, float]
    electric_cooling_kWh: float
    absorption_cooling_kWh: float
    store_charged_kWh: float
    store_discharged_kWh: float
    exhaust_loss_kWh: float = Field(description="Unit fuel less power less recovered heat.")


class MonthFlows(Record):
    """One month's main flows [kWh]."""

    month: int
    power_demand_kWh: float
    power_made_kWh: float
    grid_import_kWh: float
    grid_export_kWh: float
    heat_demand_kWh: float
    recovered_used_kWh: float
    heater_heat_kWh: float
    dumped_kWh: float
    peak_import_kW: float
    run_hours: float


class DispatchProof(Record):
    """How good the schedule is, and what was assumed."""

    control: str
    path: str
    cost_per_year: float
    lower_bound_per_year: float
    gap_frac: float
    gap_money: float
    exact_cost_per_year: float = Field(description="Same schedule, exact plant model.")
    fit_fuel_frac: float = Field(description="Fuel, exact over fit, minus one.")
    fit_heat_frac: float
    fit_money: float


class Running(Record):
    """How the unit runs."""

    run_hours: float
    starts: int
    full_load_hours: float = Field(description="Power made over the year's mean maximum power.")
    mean_load_frac: float
    power_covered_frac: float
    heat_covered_frac: float


class SeparateOutcome(Record):
    """The year without CHP."""

    bill: Bill
    energy: EnergyYear
    months: list[MonthFlows]
    proof: DispatchProof


class CapitalItem(Record):
    """One line of capital."""

    line: str
    cost: float


class Capital(Record):
    """Capital by line, and what it avoids."""

    lines: list[CapitalItem]
    total: float
    accuracy_frac: float
    accuracy_class: str
    avoided: list[CapitalItem]
    avoided_present_value: float
    net: float = Field(description="Total less avoided in year 0 and, undiscounted, later years.")


class CashYear(Record):
    """One year of the cash flow; positive where it helps the client."""

    year: int
    calendar_year: int
    capital: float
    avoided_capital: float
    power_saving: float
    gas_saving: float
    carbon_saving: float
    maintenance: float
    overhaul_reserve: float
    upkeep: float
    outage_cost: float
    net: float
    discounted: float
    cumulative: float
    cumulative_discounted: float


class Economics(Record):
    """The money answer; everything real and before tax."""

    annual_saving: float = Field(description="DEFINITIONS: separate lower bound less achieved.")
    saving_share_of_bill_frac: float
    expected_outage_cost: float
    capital: Capital
    npv_real: float
    irr_real_frac: float | None
    simple_payback_years: float | None
    discounted_payback_years: int | None
    cash_flow: list[CashYear]


class CarbonYear(Record):
    """Carbon of one calendar year [t CO2]."""

    calendar_year: int
    grid_kg_per_kWh: float
    separate_t: float
    option_t: float
    saved_t: float


class Carbon(Record):
    """CO2 along the grid's path."""

    fuel_kg_per_lhv_kWh: float
    fuel_kg_per_hhv_kWh: float
    basis: str
    source: str
    export_credit_frac: float
    by_year: list[CarbonYear]
    lifetime_saved_t: float
    first_year_saved_t: float
    stops_year: int | None = Field(description="First year in which the option saves nothing.")
    break_even_grid_kg_per_kWh: float | None


class Nox(Record):
    """NOx indicator, dry at 15 % oxygen, as NO2 [mg/Nm3]."""

    guarantee_ppm_15O2: float
    guarantee_mg_per_Nm3: float
    band_low_mg_per_Nm3: float
    band_centre_mg_per_Nm3: float
    band_high_mg_per_Nm3: float
    limit_mg_per_Nm3: float
    regime: str
    regime_source: str
    status: Status
    annual_low_kg: float
    annual_centre_kg: float
    annual_high_kg: float
    hours_outside_guarantee: float


class Efficiency(Record):
    """Efficiencies of the unit with its recovered and used heat, over the year."""

    electrical_lhv_frac: float
    overall_lhv_frac: float
    overall_hhv_frac: float
    primary_energy_saving_frac: float
    test: str
    required_overall_frac: float | None
    required_saving_frac: float | None
    met: bool | None


class SecurityLine(Record):
    """One carrier with the CHP off."""

    carrier: Carrier
    peak_kW: float
    capacity_kW: float
    margin_kW: float
    margin_one_heater_out_kW: float | None
    met: bool


class Station(Record):
    """Gas at one point of the cycle."""

    station: str
    temperature_degC: float
    pressure_kPa: float
    flow_kg_per_s: float


class OperatingPoint(Record):
    """The machine in one stated condition."""

    label: str
    ambient_degC: float
    load_frac: float
    net_power_kW: float
    fuel_lhv_kW: float
    efficiency_lhv_frac: float
    exhaust_flow_kg_per_s: float
    exhaust_degC: float


class Machine(Record):
    """What the data sheet says and what the model makes of it."""

    name: str
    generic: bool
    sheet_power_kW: float
    sheet_efficiency_lhv_frac: float
    sheet_exhaust_flow_kg_per_s: float
    sheet_exhaust_degC: float
    pressure_ratio: float
    audit_residual_frac: float = Field(description="DEFINITIONS: share of fuel (LHV).")
    polytropic_efficiency: float
    firing_degC: float
    gas_compressor_kW: float = Field(description="At the sheet's condition.")
    auxiliary_kW: float
    minimum_load_frac: float
    stations: list[Station]
    points: list[OperatingPoint] = Field(description="Cold, ISO, hot; full, three quarters, half.")
    paths: list[str]
    fit_segments: int
    recovery_heat_degC: list[tuple[float, float]] = Field(
        description="Gas side of the composite curve: heat given up [kW] against gas temperature."
    )
    recovery_sink_degC: list[tuple[float, float]] = Field(
        description="Water side of the composite curve: heat taken up [kW] against temperature."
    )
    stack_degC: float


class Variant(Record):
    """One evaluation with changed inputs."""

    key: str
    factor: Literal[
        "base",
        "fuel_price",
        "power_price",
        "heat_demand",
        "capital",
        "boiler_efficiency",
        "combined_bad",
        "break_even",
    ]
    change_frac: float
    annual_saving: float | None
    npv_real: float | None
    irr_real_frac: float | None
    simple_payback_years: float | None
    run_hours: float | None
    gap_frac: float | None
    status: Literal["solved", "failed"]
    note: str = ""


class BreakEven(Record):
    """Where the option stops paying; None where it does not within the range tried."""

    npv_zero_fuel_price_frac: float | None = Field(description="Change of commodity price.")
    npv_zero_commodity_per_hhv_kWh: float | None
    saving_zero_fuel_price_frac: float | None
    saving_zero_commodity_per_hhv_kWh: float | None
    tried_from_frac: float
    tried_to_frac: float


class OptionOutcome(Record):
    """Everything about one option."""

    key: str = Field(description="Names the hourly file: hourly_<key>.csv.")
    name: str
    description: str = Field(description="One phrase: machine, recovery, store.")
    machine: Machine
    running: Running
    energy: EnergyYear
    months: list[MonthFlows]
    bill: Bill
    proof: DispatchProof
    economics: Economics
    carbon: Carbon
    nox: Nox
    efficiency: Efficiency
    security: list[SecurityLine]
    variants: list[Variant]
    break_even: BreakEven


class Verdict(Record):
    """What to do, by stated rule: the option with the highest NPV, if it is above zero."""

    recommended: str | None = Field(description="Key of the option to build; None: build none.")
    best: str = Field(description="Key of the option with the highest NPV.")
    rule: str
    holds_in_variants: int = Field(description="Variants of `best` in which its sign stays.")
    variants_tried: int


class Weeks(Record):
    """Local days that begin the two weeks drawn in the report."""

    winter_monday: str
    summer_monday: str


class Tariffs(Record):
    """The prices in words and numbers, for the method part."""

    power_lines: list[str]
    gas_lines: list[str]
    all_in_gas_per_lhv_kWh: float
    mean_import_per_kWh: float
    hhv_over_lhv: float
    fuel_name: str
    lhv_MJ_per_kg: float


class Results(Record):
    """The whole of `results.json`."""

    format: Literal[1]
    flueprint_version: str
    made_at_utc: str
    heading: Heading
    inputs: list[InputFile]
    defaults: list[DefaultUsed]
    findings: list[FindingRecord]
    demand: Demand
    tariffs: Tariffs
    separate_supply: SeparateOutcome
    options: list[OptionOutcome] = Field(min_length=1)
    verdict: Verdict
    weeks: Weeks

"""The sections of a study file, field by field; every quantity's unit is in its key."""

from datetime import date
from typing import Annotated, Literal

from pydantic import BaseModel, ConfigDict, Field

Positive = Annotated[float, Field(gt=0)]
NonNegative = Annotated[float, Field(ge=0)]
Fraction = Annotated[float, Field(ge=0, le=1)]
Efficiency = Annotated[float, Field(gt=0.2, le=1.1)]
Month = Annotated[int, Field(ge=1, le=12)]
Weekday = Literal["mon", "tue", "wed", "thu", "fri", "sat", "sun"]
Basis = Literal["LHV", "HHV"]
HeatCarrier = Literal["steam", "hot_water", "hot_gas"]

ALL_MONTHS = tuple(range(1, 13))
ALL_WEEKDAYS: tuple[Weekday, ...] = ("mon", "tue", "wed", "thu", "fri", "sat", "sun")


class Section(BaseModel):
    """A strict record: unknown keys and wrong types are faults."""

    model_config = ConfigDict(extra="forbid", frozen=True, strict=True, allow_inf_nan=False)


class Site(Section):
    """Where the demand is."""

    name: str = Field(description="Name as it stands in the report.", min_length=1)
    kind: Literal["hospital", "factory"] = Field(description="What the site is.")
    place: str = Field(description="Town or region, for the reader.")
    time_zone: str = Field(description="IANA name of the site's clock, such as Europe/Berlin.")
    altitude_m: Annotated[float, Field(ge=-430, le=4500)] = Field(description="Altitude [m].")
    year: Annotated[int, Field(ge=1990, le=2100)] = Field(
        description="Calendar year of the meter files, in the site's standard time."
    )


class SteamSystem(Section):
    """The state of steam at the site's valve and of what comes back."""

    pressure_kPa_gauge: Positive = Field(description="Saturated steam pressure [kPa gauge].")
    condensate_return_frac: Fraction = Field(0.7, description="Share of steam that returns.")
    condensate_degC: Annotated[float, Field(ge=10, le=140)] = Field(
        85.0, description="Temperature of returned condensate [degC]."
    )
    make_up_degC: Annotated[float, Field(ge=2, le=60)] = Field(
        12.0, description="Temperature of make-up water [degC]."
    )
    feedwater_degC: Annotated[float, Field(ge=60, le=160)] = Field(
        105.0, description="Feedwater after the deaerator [degC]."
    )
    blowdown_frac: Annotated[float, Field(ge=0, le=0.15)] = Field(
        0.03, description="Blowdown over steam made."
    )


class WaterSystem(Section):
    """Flow and return of the hot-water network."""

    flow_degC: Annotated[float, Field(ge=40, le=140)] = Field(description="Flow [degC].")
    return_degC: Annotated[float, Field(ge=20, le=110)] = Field(description="Return [degC].")


class GasSystem(Section):
    """The dryer that can take exhaust directly."""

    reference_degC: float = Field(
        description="Temperature above which heat counts as useful [degC]."
    )
    required_degC: Annotated[float, Field(ge=60, le=900)] = Field(
        description="Gas temperature the dryer needs [degC]."
    )
    limit_degC: Annotated[float, Field(ge=60, le=1000)] = Field(
        description="Hottest gas the dryer may receive; hotter gas is tempered with air [degC]."
    )


class Heat(Section):
    """The grades of heat that the site uses; a grade with demand must be declared."""

    steam: SteamSystem | None = Field(None, description="Steam system.")
    hot_water: WaterSystem | None = Field(None, description="Hot-water network.")
    hot_gas: GasSystem | None = Field(None, description="Direct use of hot gas.")


class DatedCost(Section):
    """A payment in one year of the plan; year 0 is the year of building."""

    what: str = Field(description="What is paid for.")
    year: Annotated[int, Field(ge=0, le=40)] = Field(description="Year of the plan.")
    cost: NonNegative = Field(description="Real cost [currency].")


class Heater(Section):
    """Boilers or burners of one carrier, taken together."""

    name: str = Field(description="Name as it stands in the report.")
    serves: HeatCarrier = Field(description="Carrier that it makes.")
    capacity_kW: Positive = Field(description="Useful heat of all together [kW].")
    largest_unit_kW: Positive = Field(
        description="Useful heat of the largest single one, for the security table [kW]."
    )
    efficiency_frac: Efficiency = Field(description="Useful heat over fuel at full load.")
    efficiency_basis: Basis = Field(description="Calorific value of that efficiency.")
    standing_loss_frac: Annotated[float, Field(ge=0, le=0.1)] = Field(
        0.01, description="Heat lost while hot, over capacity, in every hour of the year."
    )
    upkeep_per_year: NonNegative = Field(description="Maintenance and inspection [currency].")


class Chiller(Section):
    """The electric chillers of today."""

    capacity_kW: Positive = Field(description="Cooling of all together [kW].")
    cop: Annotated[float, Field(gt=1, le=12)] = Field(description="Cooling over power.")


class SeparateSupply(Section):
    """Grid and boilers without CHP: what every option is compared with."""

    heater: tuple[Heater, ...] = Field(description="Boilers and burners.", min_length=1)
    chiller: Chiller | None = Field(None, description="Electric chillers.")
    renewal: tuple[DatedCost, ...] = Field(
        (), description="What separate supply must buy over the years, CHP or not."
    )


class Window(Section):
    """A set of hours on the local clock."""

    months: tuple[Month, ...] = Field(ALL_MONTHS, description="Months, 1 to 12.")
    weekdays: tuple[Weekday, ...] = Field(ALL_WEEKDAYS, description="Days of the week.")
    from_hour: Annotated[int, Field(ge=0, le=23)] = Field(0, description="Begins at this hour.")
    to_hour: Annotated[int, Field(ge=1, le=24)] = Field(24, description="Ends at this hour.")


class EnergyCharge(Window):
    """Price of imported energy in a window."""

    name: str = Field(description="As the invoice prints it.")
    price_per_kWh: NonNegative = Field(description="Price [currency/kWh].")


class DemandRate(Window):
    """A charge on the month's highest import within a window."""

    name: str = Field(description="As the invoice prints it.")
    rate_per_kW_month: NonNegative = Field(description="Rate [currency/kW and month].")
    interval_minutes: Literal[15, 30, 60] = Field(
        30, description="Interval over which the meter averages demand [min]."
    )


class PowerTariff(Section):
    """The power contract."""

    energy: tuple[EnergyCharge, ...] = Field(
        description="Energy charges; together they must cover every hour exactly once.",
        min_length=1,
    )
    demand: tuple[DemandRate, ...] = Field((), description="Demand charges, all at once.")
    levy_per_kWh: NonNegative = Field(0.0, description="Levies on import [currency/kWh].")
    standing_per_month: NonNegative = Field(0.0, description="Standing charge [currency].")
    import_limit_kW: Positive = Field(description="What the connection can import [kW].")
    export_limit_kW: NonNegative = Field(0.0, description="What may be exported; 0 forbids [kW].")
    export_price_per_kWh: NonNegative = Field(
        0.0, description="What export earns; never above any import price [currency/kWh]."
    )


class GasTariff(Section):
    """The gas contract; priced on HHV as invoices are."""

    commodity_per_hhv_kWh: NonNegative = Field(description="Commodity [currency/kWh HHV].")
    transport_per_hhv_kWh: NonNegative = Field(0.0, description="Transport [currency/kWh HHV].")
    levy_per_hhv_kWh: NonNegative = Field(0.0, description="Levies [currency/kWh HHV].")
    standing_per_month: NonNegative = Field(0.0, description="Standing charge [currency].")
    carbon_price_per_t: NonNegative = Field(
        0.0, description="Carbon price on site fuel, CHP and boilers alike [currency/t CO2]."
    )


class Fuel(Section):
    """The gas at the site's meter."""

    name: str = Field("Natural gas", description="Name as it stands in the report.")
    composition_mol_frac: dict[str, Fraction] = Field(
        description="Mole fractions by component; they add up to 1."
    )
    supply_pressure_kPa_gauge: NonNegative = Field(
        description="Pressure at the site's meter, before the fuel-gas compressor [kPa gauge]."
    )


class GuaranteedNox(Section):
    """The maker's written NOx guarantee: a ceiling, dry at 15 % oxygen, as NO2."""

    nox_ppm_15O2: Positive = Field(description="Guaranteed NOx [ppm dry at 15 % O2].")
    from_load_frac: Fraction = Field(description="Holds from this load upwards.")
    from_ambient_degC: float = Field(-20.0, description="Holds from this ambient upwards [degC].")
    to_ambient_degC: float = Field(40.0, description="Holds up to this ambient [degC].")


class DataSheet(Section):
    """A gas turbine's data sheet at one stated condition, without site losses."""

    power_kW: Positive = Field(description="Power at the generator's terminals [kW].")
    efficiency_frac: Annotated[float, Field(gt=0.1, lt=0.5)] = Field(
        description="That power over fuel."
    )
    efficiency_basis: Basis = Field(description="Calorific value of that efficiency.")
    exhaust_flow_kg_per_s: Positive = Field(description="Exhaust mass flow [kg/s].")
    exhaust_degC: Annotated[float, Field(ge=200, le=750)] = Field(
        description="Exhaust temperature at the turbine flange [degC]."
    )
    pressure_ratio: Annotated[float, Field(ge=2, le=50)] = Field(description="Compressor ratio.")
    ambient_degC: Annotated[float, Field(ge=-30, le=50)] = Field(
        15.0, description="Ambient of the sheet [degC]."
    )
    relative_humidity_frac: Fraction = Field(0.6, description="Humidity of the sheet.")
    pressure_kPa: Annotated[float, Field(ge=60, le=110)] = Field(
        101.325, description="Pressure of the sheet [kPa]."
    )
    control: Literal["fuel_only", "guide_vanes"] = Field(
        description="How load is reduced: fuel alone, or inlet guide vanes first."
    )
    held: Literal["firing_temperature", "exhaust_temperature"] = Field(
        "firing_temperature", description="What the controller holds at full load."
    )
    minimum_load_frac: Annotated[float, Field(ge=0.1, le=1)] = Field(
        description="Mechanical minimum over the hour's full load."
    )
    generator_limit_kW: Positive | None = Field(
        None, description="Cap of generator or gearbox; left out, 1.15 of power_kW [kW]."
    )
    fuel_gas_pressure_kPa_gauge: Positive = Field(
        description="Pressure that the machine needs at its fuel skid [kPa gauge]."
    )
    nox: GuaranteedNox = Field(description="NOx guarantee.")
    audit_accepted_because: str | None = Field(
        None, description="Reason for using a sheet whose first-law audit is out of bounds."
    )


class PlannedOutage(Section):
    """A stop for inspection, chosen by the study."""

    first_day: date = Field(description="First day without the unit.")
    days: Annotated[int, Field(ge=1, le=120)] = Field(description="Length [days].")


class Unit(Section):
    """One machine of an option."""

    name: str = Field(description="Name as it stands in the report.")
    generic: bool = Field(
        True, description="True for a class value; false once a maker has guaranteed the sheet."
    )
    sheet: DataSheet = Field(description="Data sheet.")
    inlet_loss_kPa: NonNegative = Field(1.0, description="Filter and duct at full flow [kPa].")
    exhaust_loss_kPa: NonNegative = Field(
        2.5, description="Recovery, silencer and stack at full flow [kPa]."
    )
    auxiliary_kW: NonNegative = Field(description="Pumps, fans, cooling, controls [kW].")
    average_power_loss_frac: Annotated[float, Field(ge=0, le=0.15)] = Field(
        0.025, description="Power lost to fouling and ageing, average over the life."
    )
    average_fuel_rise_frac: Annotated[float, Field(ge=0, le=0.15)] = Field(
        0.015, description="Rise of fuel per kWh from fouling and ageing, average over the life."
    )
    start_fuel_lhv_kWh: NonNegative = Field(description="Fuel of one start [kWh LHV].")
    minimum_up_h: Annotated[float, Field(ge=0, le=72)] = Field(4.0, description="Once on [h].")
    minimum_down_h: Annotated[float, Field(ge=0, le=72)] = Field(2.0, description="Once off [h].")
    maintenance_per_run_hour: NonNegative = Field(
        0.0, description="Upkeep by hour run [currency/h]."
    )
    maintenance_per_MWh: NonNegative = Field(
        0.0, description="Upkeep by net power made [currency/MWh]."
    )
    maintenance_per_start: NonNegative = Field(0.0, description="Upkeep by start [currency/start].")
    overhaul_cost: NonNegative = Field(description="One overhaul, real [currency].")
    overhaul_every_run_hours: Positive = Field(description="Hours between overhauls [h].")
    planned_outage: tuple[PlannedOutage, ...] = Field(description="Inspections of the year.")
    forced_outage_frac: Annotated[float, Field(ge=0, le=0.2)] = Field(
        0.02, description="Share of running time lost without warning."
    )
    demand_saving_lost_months: Annotated[int, Field(ge=0, le=12)] = Field(
        2, description="Months a year in which one trip costs the month's demand saving."
    )


class Recovery(Section):
    """What the exhaust is used for, and how closely."""

    hot_gas: bool = Field(False, description="Exhaust may go to the dryer.")
    steam: bool = Field(False, description="Exhaust may make steam.")
    hot_water: bool = Field(False, description="Exhaust may heat water, alone or after steam.")
    pinch_K: Annotated[float, Field(ge=4, le=60)] = Field(10.0, description="Evaporator pinch [K].")
    approach_K: Annotated[float, Field(ge=0, le=40)] = Field(
        8.0, description="Feedwater below saturation at the drum [K]."
    )
    loss_frac: Annotated[float, Field(ge=0, le=0.05)] = Field(
        0.01, description="Casing loss over heat recovered."
    )
    minimum_stack_degC: Annotated[float, Field(ge=40, le=250)] = Field(
        95.0, description="Coldest stack allowed [degC]."
    )


class Store(Section):
    """A hot-water store."""

    capacity_kWh: Positive = Field(description="Usable heat [kWh].")
    maximum_charge_kW: Positive = Field(description="Most heat into the store [kW].")
    maximum_discharge_kW: Positive = Field(description="Most heat out of the store [kW].")
    loss_frac_per_h: Annotated[float, Field(ge=0, le=0.05)] = Field(
        0.0008, description="Share of the level lost each hour."
    )


class AbsorptionChiller(Section):
    """A single-effect chiller driven by recovered heat."""

    capacity_kW: Positive = Field(description="Cooling [kW].")
    cop: Annotated[float, Field(ge=0.4, le=1.5)] = Field(0.7, description="Cooling over heat.")
    drive: Literal["hot_water", "steam"] = Field("hot_water", description="What drives it.")


class CapitalLine(Section):
    """One line of the capital estimate."""

    line: Literal[
        "machine",
        "heat_recovery",
        "store",
        "absorption_chiller",
        "electrical_connection",
        "gas_connection_and_compression",
        "building_and_civil",
        "engineering_and_management",
        "contingency",
        "other",
    ] = Field(description="Heading.")
    cost: NonNegative = Field(description="Real cost in the year of building [currency].")


class Option(Section):
    """A candidate plant."""

    name: str = Field(description="Name as it stands in the report.", min_length=1, max_length=60)
    unit: Unit = Field(description="The machine.")
    recovery: Recovery = Field(description="Use of the exhaust.")
    store: Store | None = Field(None, description="Hot-water store.")
    absorption_chiller: AbsorptionChiller | None = Field(None, description="Heat-driven cooling.")
    capital: tuple[CapitalLine, ...] = Field(description="Capital by line.", min_length=1)
    capital_accuracy_frac: Annotated[float, Field(gt=0, le=0.6)] = Field(
        0.25, description="Accuracy of the estimate, either way."
    )
    capital_class: str = Field("budget estimate", description="Name of that accuracy class.")
    avoided: tuple[DatedCost, ...] = Field(
        (), description="What separate supply would buy and this option does not."
    )
    upkeep_per_year: NonNegative = Field(
        0.0, description="Staff, insurance, inspection of the option [currency]."
    )


class Money(Section):
    """How money over the years is weighed. Everything is real, before tax."""

    discount_rate_real_frac: Annotated[float, Field(ge=0, le=0.25)] = Field(
        description="Real discount rate."
    )
    life_years: Annotated[int, Field(ge=10, le=25)] = Field(description="Years of operation.")
    price_year: Annotated[int, Field(ge=2000, le=2100)] = Field(
        description="Year whose money every figure is in."
    )
    first_operating_year: Annotated[int, Field(ge=2000, le=2100)] = Field(
        description="Calendar year of the first full year."
    )


class PricePaths(Section):
    """Real growth of each price from the first operating year."""

    power_real_growth_frac: Annotated[float, Field(ge=-0.2, le=0.2)] = Field(
        0.0, description="Power prices, a year."
    )
    gas_real_growth_frac: Annotated[float, Field(ge=-0.2, le=0.2)] = Field(
        0.0, description="Gas commodity, transport and levies, a year."
    )
    carbon_price_real_growth_frac: Annotated[float, Field(ge=-0.2, le=0.2)] = Field(
        0.0, description="Carbon price, a year."
    )
    upkeep_real_growth_frac: Annotated[float, Field(ge=-0.2, le=0.2)] = Field(
        0.0, description="Maintenance, overhaul and upkeep, a year."
    )


class GridCarbonPoint(Section):
    """Carbon intensity of the grid in one year."""

    year: Annotated[int, Field(ge=2000, le=2100)] = Field(description="Calendar year.")
    kg_per_kWh: NonNegative = Field(description="CO2 of imported power [kg/kWh].")


class GridCarbon(Section):
    """How the grid's carbon falls; straight lines between the points, level beyond them."""

    path: tuple[GridCarbonPoint, ...] = Field(description="Points of the path.", min_length=1)
    basis: Literal["average", "marginal"] = Field(
        description="Whether the factors are grid averages or marginal."
    )
    source: str = Field(description="Where the path comes from.")
    export_credit_frac: Fraction = Field(
        0.0, description="Share of the factor credited to exported power."
    )


class EmissionRules(Section):
    """The regime that the exhaust is held to."""

    nox_regime: str = Field(description="Key of a row in planner/data/nox_limits.csv.")
    local_nox_limit_mg_per_Nm3: Positive | None = Field(
        None, description="A stricter local limit, dry at 15 % O2 [mg/Nm3]."
    )
    efficiency_test: Literal["eu_high_efficiency", "none"] = Field(
        "eu_high_efficiency", description="Legal test of overall efficiency."
    )
    reference_power_efficiency_lhv_frac: Efficiency = Field(
        0.53,
        description="Reference for separate power in the primary-energy saving (LHV), with "
        "grid losses of the connection and climate already taken in.",
    )
    reference_steam_efficiency_lhv_frac: Efficiency = Field(
        0.87, description="Reference for separate steam (LHV)."
    )
    reference_water_efficiency_lhv_frac: Efficiency = Field(
        0.92, description="Reference for separate hot water (LHV)."
    )
    reference_gas_efficiency_lhv_frac: Efficiency = Field(
        0.84, description="Reference for direct use of hot gas (LHV)."
    )


class Sensitivity(Section):
    """How far each assumption is moved."""

    fuel_price_steps_frac: tuple[Annotated[float, Field(ge=-0.9, le=2)], ...] = Field(
        (-0.3, -0.2, -0.1, 0.1, 0.2, 0.3), description="Steps of the gas commodity price."
    )
    power_price_step_frac: Positive = Field(0.1, description="Step of every power price.")
    heat_demand_step_frac: Positive = Field(0.1, description="Step of every heat demand.")
    capital_step_frac: Positive = Field(0.15, description="Step of the capital.")
    boiler_efficiency_step_frac: Positive = Field(
        0.03, description="Step of every heater's efficiency, relative."
    )
    bad_fuel_price_frac: NonNegative = Field(0.2, description="Combined bad variant: gas dearer.")
    bad_power_price_frac: NonNegative = Field(
        0.1, description="Combined bad variant: power cheaper."
    )
    bad_heat_demand_frac: NonNegative = Field(0.1, description="Combined bad variant: less heat.")
    bad_capital_frac: NonNegative = Field(0.15, description="Combined bad variant: dearer plant.")


class ReportPlan(Section):
    """Who the report is for."""

    client: str = Field(description="Client.")
    consultant: str = Field(description="Who signs the report.")
    title: str = Field("CHP feasibility study", description="Kind of report.")
    language: Literal["en"] = Field("en", description="Language of the report.")
    currency: Annotated[str, Field(min_length=1, max_length=4)] = Field(
        description="Currency of every amount in this file."
    )

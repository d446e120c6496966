"""What a study must declare about each raw file: the contract that readers hold files to.

Nothing here is guessed by a reader. A declaration that the data contradict is refused.
"""

from datetime import date
from typing import Annotated, Literal

from pydantic import BaseModel, ConfigDict, Field

Positive = Annotated[float, Field(gt=0)]
Fraction = Annotated[float, Field(ge=0, le=1)]
Efficiency = Annotated[float, Field(gt=0.2, le=1.1)]


class Declaration(BaseModel):
    """A strict record: unknown keys and wrong types are faults."""

    model_config = ConfigDict(extra="forbid", frozen=True, strict=True, allow_inf_nan=False)


class Layout(Declaration):
    """How a delimited text file is written and how its stamps are to be read."""

    file: str = Field(description="File name, relative to the study file.")
    delimiter: Literal[",", ";", "\t", "|"] = Field(",", description="Column separator.")
    decimal: Literal[".", ","] = Field(".", description="Decimal mark.")
    skip_rows: int = Field(0, ge=0, le=100, description="Lines above the header row.")
    stamp_column: str = Field("time", description="Header of the column that holds the time.")
    stamp_format: str = Field(
        "%Y-%m-%d %H:%M",
        description="strptime format of the stamps; `ISO` for ISO 8601 with offset.",
    )
    clock: Literal["local", "standard", "utc"] = Field(
        "local",
        description="Clock of the stamps: local with daylight saving, standard all year, or UTC.",
    )
    stamp_marks: Literal["start", "end"] = Field(
        "start", description="Whether a stamp marks the start or the end of its interval."
    )


class WeatherFile(Layout):
    """Hourly weather of the metered year, or of a typical year."""

    temperature_column: str = Field("ambient_degC", description="Dry-bulb temperature [degC].")
    humidity_column: str = Field(
        "relative_humidity_percent", description="Relative humidity [%], 0 to 100."
    )
    pressure_column: str | None = Field(
        "pressure_hPa",
        description="Station pressure [hPa]; leave out to compute it from the altitude.",
    )


class IntervalMeter(Layout):
    """Metered intervals of one carrier, in energy or mean power."""

    source: Literal["interval_meter"] = Field(description="Metered intervals.")
    value_column: str = Field(description="Header of the column that holds the values.")
    quantity: Literal["energy_kWh", "mean_kW"] = Field(
        description="What a value is: energy of the interval, or its mean power."
    )
    interval_minutes: Literal[15, 30, 60] = Field(description="Length of an interval [min].")


class GasRegister(Layout):
    """Cumulative readings of a gas meter behind heaters, spread over the hours by a day shape."""

    source: Literal["gas_register"] = Field(description="Register readings of a gas meter.")
    value_column: str = Field(description="Header of the column that holds the register.")
    calorific_value_hhv_kWh_per_m3: Positive = Field(
        description="Calorific value on the invoices [kWh HHV per m3 as metered]."
    )
    heater_efficiency_hhv_frac: Efficiency = Field(
        description="Useful heat over fuel (HHV) of the heaters behind the meter, as metered year."
    )
    shape: str = Field(description="Day shape from load_profiles/shapes that spreads the readings.")


class MonthlyBill(Declaration):
    """One billed period of gas."""

    first_day: date = Field(description="First day billed.")
    last_day: date = Field(description="Last day billed, included.")
    fuel_hhv_kWh: Annotated[float, Field(ge=0)] = Field(description="Billed fuel [kWh HHV].")


class MonthlyBills(Declaration):
    """Heat known only from gas bills; spread by degree-days and a day shape so that bills close."""

    source: Literal["monthly_bills"] = Field(description="Monthly gas bills.")
    heater_efficiency_hhv_frac: Efficiency = Field(
        description="Useful heat over fuel (HHV) of the heaters behind the bills."
    )
    base_temperature_degC: float | None = Field(
        None, description="Heating base temperature [degC]; left out, it is fitted to the bills."
    )
    shape: str = Field(
        description="Day shape from load_profiles/shapes for the weather-bound part."
    )
    base_shape: str = Field(description="Day shape for the base heat (domestic hot water).")
    bill: tuple[MonthlyBill, ...] = Field(description="The bills, oldest first.", min_length=1)


class CoolingDegrees(Declaration):
    """Cooling known only as a yearly total; spread by cooling degree-hours and a day shape."""

    source: Literal["cooling_degrees"] = Field(description="Yearly cooling spread by the weather.")
    annual_cooling_MWh: Positive = Field(description="Cooling delivered in the year [MWh].")
    base_temperature_degC: float = Field(
        16.0, description="Ambient above which cooling is needed [degC]."
    )
    base_share_frac: Fraction = Field(
        0.2, description="Share that does not depend on the weather (server rooms, cold stores)."
    )
    shape: str = Field(description="Day shape from load_profiles/shapes.")


HeatSource = Annotated[IntervalMeter | GasRegister | MonthlyBills, Field(discriminator="source")]
CoolingSource = Annotated[IntervalMeter | CoolingDegrees, Field(discriminator="source")]


class DemandFiles(Declaration):
    """Where each carrier's demand comes from; a carrier left out is not wanted on the site."""

    power: IntervalMeter = Field(description="Grid import of the whole site, chillers included.")
    steam: HeatSource | None = Field(None, description="Process or hospital steam.")
    hot_water: HeatSource | None = Field(None, description="Space heating and domestic hot water.")
    hot_gas: HeatSource | None = Field(None, description="Direct drying heat.")
    cooling: CoolingSource | None = Field(None, description="Chilled water.")
    permitted_fill_frac: Fraction = Field(
        0.1, description="Largest share of a metered year that may be filled by rule."
    )

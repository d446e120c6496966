"""`Study`: everything a user states about one site, validated, frozen and complete."""

from typing import Literal

from pydantic import Field

from load_profiles.declarations import DemandFiles, WeatherFile
from planner.study.sections import (
    EmissionRules,
    Fuel,
    GasTariff,
    GridCarbon,
    Heat,
    Money,
    Option,
    PowerTariff,
    PricePaths,
    ReportPlan,
    Section,
    Sensitivity,
    SeparateSupply,
    Site,
)


class Study(Section):
    """One study file, as read. Defaults are filled in; `planner.study.defaults` lists them."""

    format: Literal[1] = Field(description="Version of this file's format; must stand first.")
    site: Site = Field(description="Where the demand is.")
    report: ReportPlan = Field(description="Who the report is for.")
    weather: WeatherFile = Field(description="Weather of the year.")
    demand: DemandFiles = Field(description="Where each demand comes from.")
    heat: Heat = Field(description="Grades of heat on the site.")
    separate_supply: SeparateSupply = Field(description="Today's plant.")
    power_tariff: PowerTariff = Field(description="Power contract.")
    gas_tariff: GasTariff = Field(description="Gas contract.")
    fuel: Fuel = Field(description="The gas.")
    option: tuple[Option, ...] = Field(description="Candidate plants.", min_length=1, max_length=6)
    money: Money = Field(description="How money over the years is weighed.")
    price_paths: PricePaths = Field(PricePaths(), description="Growth of prices.")
    grid_carbon: GridCarbon = Field(description="Carbon of the grid.")
    emissions: EmissionRules = Field(description="Regime that the exhaust is held to.")
    sensitivity: Sensitivity = Field(Sensitivity(), description="How far assumptions move.")

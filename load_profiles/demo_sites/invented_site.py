"""`InventedSite`: what a site is, how its files are written, what went wrong in its year."""

from dataclasses import dataclass

from load_profiles.demo_sites.clock import StepClock
from load_profiles.demo_sites.demand import SiteDemand
from load_profiles.demo_sites.exports import (
    BillPlan,
    PowerExport,
    RegisterExport,
    WeatherExport,
)
from load_profiles.demo_sites.factory import FactorySize, factory_demand
from load_profiles.demo_sites.hospital import HospitalSize, hospital_demand
from load_profiles.demo_sites.noise import NoiseStream
from load_profiles.demo_sites.weather import Climate, Weather


@dataclass(frozen=True)
class InventedSite:
    """One site and its files.

    Parameters
    ----------
    seed : int
        Of its noise.
    clock : StepClock
        Steps of its power meter.
    climate : Climate
        Its weather.
    size : HospitalSize or FactorySize
        What it uses.
    power : PowerExport
        Its power meter.
    register : RegisterExport
        A gas meter that somebody reads.
    bills : BillPlan
        Gas that is only billed.
    weather : WeatherExport
        Its weather station.
    """

    seed: int
    clock: StepClock
    climate: Climate
    size: HospitalSize | FactorySize
    power: PowerExport
    register: RegisterExport
    bills: BillPlan
    weather: WeatherExport

    def demand(self, weather: Weather, stream: NoiseStream) -> SiteDemand:
        """True demands under some weather.

        Parameters
        ----------
        weather : Weather
            Hourly weather of the year.
        stream : NoiseStream
            What no rule explains.

        Returns
        -------
        SiteDemand
            On the steps of the power meter.
        """
        if isinstance(self.size, HospitalSize):
            return hospital_demand(self.size, self.clock, weather, stream)
        return factory_demand(self.size, self.clock, weather, stream)

"""`StudyResult`: the answer in memory, which prints, sums up and saves itself."""

from dataclasses import dataclass
from pathlib import Path

import pandas as pd

from planner.results.folder import write_folder
from planner.results.records import OptionOutcome, Results
from planner.results.screen import one_screen


@dataclass(frozen=True, repr=False)
class StudyResult:
    """What `plan` hands back.

    Parameters
    ----------
    results : Results
        Every record of `results.json`.
    hourly_by_key : dict of key to DataFrame
        Hourly flows of each option and of "separate", columns as `HOURLY_COLUMNS`.
    study_path : Path
        The study file.
    """

    results: Results
    hourly_by_key: dict[str, pd.DataFrame]
    study_path: Path

    @property
    def best(self) -> OptionOutcome:
        """The option with the highest net present value, worth building or not."""
        return next(o for o in self.results.options if o.key == self.results.verdict.best)

    @property
    def hourly(self) -> pd.DataFrame:
        """Hourly flows of the best option."""
        return self.hourly_by_key[self.best.key]

    @property
    def summary(self) -> pd.Series:
        """Headline figures of the best option, unit in each label."""
        return pd.Series(summary(self.best, self.results.heading.currency), name=self.best.name)

    def save(self, folder: str | Path) -> Path:
        """Write the results folder.

        Parameters
        ----------
        folder : str or Path
            Where to; a results folder from before is replaced.

        Returns
        -------
        Path
            The folder.

        Raises
        ------
        ResultsError
            If the place cannot be written or holds something else.
        """
        return write_folder(self.results, self.hourly_by_key, self.study_path, Path(folder))

    def __str__(self) -> str:
        """One screen: what to build, energy, saving, payback, carbon, NOx, findings."""
        return one_screen(self.results)

    __repr__ = __str__


def summary(option: OptionOutcome, currency: str) -> dict[str, float | str | None]:
    """Headline figures of one option.

    Parameters
    ----------
    option : OptionOutcome
        The option.
    currency : str
        Currency of the study.

    Returns
    -------
    dict
        Label with unit to figure; None where there is none, such as a payback never reached.
    """
    money, energy = option.economics, option.energy
    return {
        "power made [MWh]": energy.power_made_kWh / 1e3,
        "heat recovered and used [MWh]": recovered_and_used_kWh(option) / 1e3,
        "fuel of the unit, LHV [MWh]": energy.unit_fuel_lhv_kWh / 1e3,
        f"annual saving [{currency}]": money.annual_saving,
        f"capital [{currency}]": money.capital.total,
        f"NPV, real [{currency}]": money.npv_real,
        "IRR, real [-]": money.irr_real_frac,
        "simple payback [years]": money.simple_payback_years,
        "lifetime CO2 saved [t]": option.carbon.lifetime_saved_t,
        "NOx, centre of band [mg/Nm3 at 15 % O2]": option.nox.band_centre_mg_per_Nm3,
        "overall efficiency, LHV [-]": option.efficiency.overall_lhv_frac,
    }


def recovered_and_used_kWh(option: OptionOutcome) -> float:
    """Heat that the unit offered and the site took.

    Parameters
    ----------
    option : OptionOutcome
        The option.

    Returns
    -------
    float [kWh]
        Over the year, all grades.
    """
    return sum(option.energy.recovered_kWh.values()) - sum(option.energy.dumped_kWh.values())

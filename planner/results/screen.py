"""The answer on one screen of a terminal."""

import textwrap

from planner.results.records import Carbon, OptionOutcome, Results

#: Findings shown in full; the report has them all.
SHOWN_FINDINGS = 6

#: Width of a terminal that everybody has.
WIDTH = 100

SEVERITY_ORDER = ("serious", "attention", "note")


def one_screen(results: Results) -> str:
    """What to build, what it makes and saves, and what to know about the answer.

    Parameters
    ----------
    results : Results
        The whole answer.

    Returns
    -------
    str
        Lines of at most 100 characters.
    """
    heading = results.heading
    headline = f"{heading.site}, {heading.place}: {_verdict(results)}"
    lines = [*textwrap.wrap(headline, WIDTH), ""]
    ordered = sorted(results.options, key=lambda o: o.key != results.verdict.best)
    for option in ordered:
        lines += [option.name, *_option_lines(option, results), ""]
    lines += _finding_lines(results)
    return "\n".join(_cut(line.rstrip()) for line in lines)


def _verdict(results: Results) -> str:
    """The advice in one clause."""
    if results.verdict.recommended is None:
        return "build none of the options"
    best = next(o for o in results.options if o.key == results.verdict.recommended)
    return f"build {best.name}"


def _option_lines(option: OptionOutcome, results: Results) -> list[str]:
    """An option's figures, two columns wide."""
    money, carbon, nox = option.economics, option.carbon, option.nox
    currency, life = results.heading.currency, results.heading.life_years
    energy = option.energy
    used = sum(energy.recovered_kWh.values()) - sum(energy.dumped_kWh.values())
    payback = money.simple_payback_years
    irr = "none" if money.irr_real_frac is None else f"{money.irr_real_frac:.1%}"
    return [
        _pair("power made", f"{energy.power_made_kWh / 1e3:,.0f} MWh")
        + _pair("heat recovered and used", f"{used / 1e3:,.0f} MWh"),
        _pair("fuel (LHV)", f"{energy.unit_fuel_lhv_kWh / 1e3:,.0f} MWh")
        + _pair("runs", f"{option.running.run_hours:,.0f} h, {option.running.starts} starts"),
        _pair("saves a year", f"{money.annual_saving:,.0f} {currency}")
        + _pair("share of today's bill", f"{money.saving_share_of_bill_frac:.1%}"),
        _pair("capital", f"{money.capital.total:,.0f} {currency}")
        + _pair(
            "payback", f"not within {life} years" if payback is None else f"{payback:.1f} years"
        ),
        _pair("NPV, real", f"{money.npv_real:,.0f} {currency}") + _pair("IRR, real", irr),
        _pair("CO2 saved over life", f"{carbon.lifetime_saved_t:,.0f} t")
        + _pair("saves carbon", _saving_years(carbon)),
        _pair("NOx", f"{nox.band_centre_mg_per_Nm3:.0f} mg/Nm3, limit {nox.limit_mg_per_Nm3:.0f}")
        + _pair("against its limit", nox.status),
        _pair("proven gap", f"{option.proof.gap_frac:.3%}")
        + _pair("control assumed", option.proof.control),
    ]


def _saving_years(carbon: Carbon) -> str:
    """In which years an option emits less than separate supply."""
    if all(year.saved_t <= 0.0 for year in carbon.by_year):
        return "in no year"
    if carbon.first_year_saved_t <= 0.0:
        return "not in its first year"
    return f"until {carbon.stops_year - 1}" if carbon.stops_year else "over its whole life"


def _pair(label: str, value: str) -> str:
    """A label and its value, half a line wide."""
    return f"  {label:<24}{value:<23} "


def _finding_lines(results: Results) -> list[str]:
    """The weightiest findings, and how many more there are."""
    ordered = sorted(results.findings, key=lambda f: SEVERITY_ORDER.index(f.severity))
    shown = ordered[:SHOWN_FINDINGS]
    lines = [f"Findings ({len(ordered)})"]
    lines += [f"  {f.severity}: {f.where}: {f.what}" for f in shown]
    if len(ordered) > len(shown):
        lines.append(f"  and {len(ordered) - len(shown)} more, all in the report")
    return lines


def _cut(line: str) -> str:
    """A line that fits the screen."""
    return line if len(line) <= WIDTH else line[: WIDTH - 1] + "…"

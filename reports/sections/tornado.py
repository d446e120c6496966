"""How sure: the picture of page 1, and of every option that is not advised."""

from reports.charts.outcome import Bar, draw_outcome
from reports.figures import Figure, Figures
from reports.numbers import money
from reports.results_folder import Facts, ResultsFolder
from reports.wording import FACTORS, listed, upper_first

#: Of several steps of one assumption, those nearest to a fifth are shown.
SHOWN_STEP = 0.2

STEPPED = ("fuel_price", "power_price", "heat_demand", "capital", "boiler_efficiency")


def tornado_bars(option: Facts) -> list[Bar]:
    """One bar an assumption, the widest first."""
    bars = []
    for factor in STEPPED:
        variants = [v for v in option["variants"] if v["factor"] == factor]
        low = _nearest([v for v in variants if v["change_frac"] < 0.0])
        high = _nearest([v for v in variants if v["change_frac"] > 0.0])
        if low is not None and high is not None:
            bars.append(
                Bar(
                    FACTORS[factor],
                    low["change_frac"],
                    high["change_frac"],
                    low["npv_real"],
                    high["npv_real"],
                )
            )
    return sorted(bars, key=_span, reverse=True)


def _nearest(variants: list[Facts]) -> Facts | None:
    """The variant whose step is nearest to the one shown."""
    return min(variants, key=lambda v: abs(abs(v["change_frac"]) - SHOWN_STEP), default=None)


def _span(bar: Bar) -> float:
    """Width of a bar; one without both ends has none."""
    ends = [npv for npv, _ in bar.ends()]
    return max(ends) - min(ends) if len(ends) > 1 else 0.0


def outcome_figure(results: ResultsFolder, option: Facts, figures: Figures) -> Figure:
    """How sure an option's answer is, as a picture.

    Parameters
    ----------
    results : ResultsFolder
        The whole answer.
    option : dict
        Record of the option.
    figures : Figures
        Numbers the figure.

    Returns
    -------
    Figure
        One bar an assumption, break-even as the heaviest line.
    """
    planned = option["economics"]["npv_real"]
    bars = tornado_bars(option)
    combined = next((v for v in option["variants"] if v["factor"] == "combined_bad"), None)
    combined_npv = None if combined is None else combined["npv_real"]
    svg = draw_outcome(
        bars, planned_npv=planned, combined_npv=combined_npv, currency=results.currency
    )
    end = "none was found" if combined_npv is None else money(combined_npv, results.currency)
    return figures.add(
        svg,
        title=_title(bars, planned),
        see="What to see: the heavy line is break-even. Each bar moves one assumption and runs the "
        f"year again. With all bad at once, NPV is {end}.",
        alt=f"Net present value as planned {money(planned, results.currency)}; "
        + "; ".join(
            f"{bar.name} {words}: {money(npv, results.currency)}"
            for bar in bars
            for npv, words in bar.ends()
        )
        + f"; all bad at once: {end}.",
    )


def _title(bars: list[Bar], planned: float) -> str:
    """What the picture shows, in one line."""
    if not any(bar.ends() for bar in bars):
        return "No variant gave an answer"
    verb = "undo" if planned > 0.0 else "rescue"
    turned = [
        bar.name.lower()
        for bar in bars
        if any((npv > 0.0) != (planned > 0.0) for npv, _ in bar.ends())
    ]
    if not turned:
        return f"No single step can {verb} the case"
    each = "each alone" if len(turned) > 1 else "alone"
    return f"{upper_first(listed(turned))} {each} can {verb} the case"

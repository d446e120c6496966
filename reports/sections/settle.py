"""What must be settled next, drawn from the results in order of weight."""

from collections.abc import Iterator

from reports.numbers import number, percent, power, signed_percent
from reports.results_folder import ResultsFolder
from reports.wording import carrier, listed, shortened

#: Points that fit on page 1.
MOST = 3

#: Letters of a point that fit on page 1; the findings have it in full.
LONGEST_POINT = 170

#: A break-even nearer than this asks for a contract.
NEAR_BREAK_EVEN_FRAC = 0.25


def to_settle(results: ResultsFolder) -> list[str]:
    """The weightiest open points.

    Parameters
    ----------
    results : ResultsFolder
        The whole answer.

    Returns
    -------
    list of str
        At most `MOST` sentences, at least one.
    """
    points = [*_shortfalls(results), *_limits(results), *_findings(results), *_basis(results)]
    return [shortened(point, LONGEST_POINT) for point in dict.fromkeys(points)][:MOST]


def _shortfalls(results: ResultsFolder) -> Iterator[str]:
    """Peaks that nothing carries while the unit stands."""
    for line in results.subject["security"]:
        if not line["met"]:
            yield (
                f"Who carries {carrier(line['carrier'])} while the unit stands: "
                f"{power(-line['margin_kW'])} are missing."
            )


def _limits(results: ResultsFolder) -> Iterator[str]:
    """Limits that are not met for sure, and a break-even that is near."""
    nox, efficiency = results.subject["nox"], results.subject["efficiency"]
    if nox["status"] != "met":
        yield (
            f"A written NOx guarantee below {number(nox['limit_mg_per_Nm3'])}\u202fmg/Nm³, or "
            "treatment of the exhaust, before any permit is asked for."
        )
    if efficiency["met"] is False:
        yield "Whether the test of high efficiency, which is not met as dispatched, is needed here."
    zero = results.subject["break_even"]["npv_zero_fuel_price_frac"]
    if results.is_advised and zero is not None and abs(zero) < NEAR_BREAK_EVEN_FRAC:
        yield f"A gas price for the first years: the case ends at {signed_percent(zero)}."


def _findings(results: ResultsFolder) -> Iterator[str]:
    """Serious findings that say what to do."""
    others = [option["name"] for option in results.others]
    for finding in results.facts["findings"]:
        elsewhere = any(finding["where"].startswith(name) for name in others)
        if finding["severity"] == "serious" and finding["advice"] and not elsewhere:
            yield f"{finding['where']}: {finding['advice']}"


def _basis(results: ResultsFolder) -> Iterator[str]:
    """What the figures rest on and could rest on more firmly."""
    option = results.subject
    capital = option["economics"]["capital"]
    if option["machine"]["generic"]:
        yield f"A maker’s guaranteed data sheet: {option['machine']['name']} is a class value."
    yield (
        f"Firm quotations: capital is a {capital['accuracy_class']}, "
        f"±{percent(capital['accuracy_frac'])}."
    )
    derived = [
        carrier(line["carrier"])
        for line in results.facts["demand"]["carriers"]
        if line["origin_frac"].get("measured", 0.0) < 0.5  # noqa: PLR2004 - most of the year
    ]
    if derived:
        yield f"Meters for {listed(derived)}: the study derives most hours from bills or registers."
    yield "The grid operator’s written terms for connection and export."

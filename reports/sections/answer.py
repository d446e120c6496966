"""Page 1: what to build and whether it pays, how sure that is, and what it rests on."""

from typing import Any

from reports.figures import Figures
from reports.numbers import (
    THIN,
    money,
    money_parts,
    number,
    percent,
    power,
    signed_percent,
    significant,
    small_percent,
    unit_price,
)
from reports.results_folder import Facts, ResultsFolder
from reports.sections.settle import to_settle
from reports.sections.tornado import outcome_figure
from reports.wording import TESTS, carrier, listed, upper_first, with_article

#: Headlines above these lengths are set smaller.
LONG_HEADLINE, LONGEST_HEADLINE, LONGEST_WORD = 84, 116, 30


def answer(results: ResultsFolder, figures: Figures) -> dict[str, Any]:
    """Everything on page 1."""
    return {
        "headline": headline(results),
        "size": _size(headline(results)),
        "lead": _lead(results),
        "keys": _keys(results),
        "figure": outcome_figure(results, results.subject, figures),
        "rows": [
            ("With the unit out", _security(results.subject)),
            ("NOx", _nox(results.subject["nox"])),
            ("Overall efficiency", _efficiency(results.subject["efficiency"])),
            ("The saving assumes", _control(results)),
            ("What would change it", change(results)),
        ],
        "settle_title": "Settle before signing"
        if results.is_advised
        else "Settle before looking again",
        "settle": to_settle(results),
    }


def headline(results: ResultsFolder) -> str:
    """The answer in two short sentences."""
    option, life = results.subject, results.heading["life_years"]
    economics = option["economics"]
    name = with_article(option["name"])
    if results.is_advised:
        return f"Build {name}. {_earned_back(economics['simple_payback_years'], life)}"
    npv = economics["npv_real"]
    loses = f"lose {money(-npv, results.currency)}" if npv < 0.0 else "earn nothing"
    if not results.others:
        return f"Do not build {name}. It would {loses} over {life} years."
    return f"Build none of them. {upper_first(name)} comes nearest; it would {loses}."


def _size(words: str) -> str:
    """Letters grow smaller as the headline grows longer, so that page 1 stays one page."""
    if len(words) > LONGEST_HEADLINE or max(map(len, words.split())) > LONGEST_WORD:
        return "longest"
    return "long" if len(words) > LONG_HEADLINE else ""


def _earned_back(payback_years: float | None, life: int) -> str:
    """Payback as a sentence."""
    if payback_years is None or payback_years > life:
        return "It earns its cost back only by what later years bring."
    if payback_years <= 0.0:
        return "It costs no more than what it makes needless."
    return f"It pays for itself in {number(payback_years, 1)} years."


def _lead(results: ResultsFolder) -> str:
    """NPV and rate of return, each with what it is."""
    option, heading = results.subject, results.heading
    economics, currency = option["economics"], results.currency
    rate, life = percent(heading["discount_rate_real_frac"], 1), heading["life_years"]
    irr = economics["irr_real_frac"]
    returns = (
        f"its internal rate of return {percent(irr, 1)}"
        if irr is not None
        else "and no single internal rate of return exists"
    )
    verdict, running = results.facts["verdict"], option["running"]
    held, tried = verdict["holds_in_variants"], verdict["variants_tried"]
    holds = f" The answer holds in {held} of {tried} variants tried." if tried else ""
    whose = "Its" if results.is_advised or not results.others else "The best one’s"
    covers = (
        f" It makes {percent(running['power_covered_frac'])} of the site’s power and "
        f"{percent(running['heat_covered_frac'])} of its heat."
    )
    return (
        f"{whose} net present value is {money(economics['npv_real'], currency)} over "
        f"{life} years at "
        f"{rate}, {returns}, both real and before tax.{covers}{holds}"
    )


def _keys(results: ResultsFolder) -> list[tuple[str, str, str]]:
    """Four key numbers: value, unit, what it is."""
    option, life = results.subject, results.heading["life_years"]
    economics, currency = option["economics"], results.currency
    capital = economics["capital"]
    share, avoids = economics["saving_share_of_bill_frac"], bool(capital["avoided"])
    saving, saving_unit = money_parts(economics["annual_saving"], currency)
    cost, cost_unit = money_parts(capital["total"], currency)
    saved = "saved a year" if economics["annual_saving"] >= 0 else "saved a year: it costs more"
    return [
        (saving, saving_unit, f"{saved}; {percent(share, 1)} of today’s bill"),
        (
            cost,
            cost_unit,
            (
                f"capital, {capital['accuracy_class']} (±{percent(capital['accuracy_frac'])})"
                + (f"; {money(capital['net'], currency)} net of what it avoids" if avoids else "")
            ),
        ),
        _payback_key(economics, life),
        _carbon_key(option["carbon"], life),
    ]


def _payback_key(economics: Facts, life: int) -> tuple[str, str, str]:
    """Simple payback, with the discounted beside it."""
    simple, later = economics["simple_payback_years"], economics["discounted_payback_years"]
    discounted = (
        f"discounted: in year {later}"
        if later is not None
        else f"discounted: not within {life} years"
    )
    if simple is None or simple > life:
        return ("never", f"in {life} years", f"simple payback; {discounted}")
    return (number(simple, 1), "years", f"simple payback; {discounted}")


def _carbon_key(carbon: Facts, life: int) -> tuple[str, str, str]:
    """Lifetime CO₂ with the year it stops."""
    tonnes, stops = carbon["lifetime_saved_t"], carbon["stops_year"]
    value = significant(abs(tonnes))
    if stops is None:
        until = "something in every year"
    elif stops <= carbon["by_year"][0]["calendar_year"]:
        until = "none in the first year"
    else:
        until = f"each year’s saving ends after {stops - 1}"
    if tonnes < 0.0:
        ended = (
            "it saves in no year" if all(y["saved_t"] <= 0 for y in carbon["by_year"]) else until
        )
        return (value, f"t{THIN}CO₂", f"more than today over {life} years; {ended}")
    return (value, f"t{THIN}CO₂", f"saved over {life} years; {until}")


def _security(option: Facts) -> str:
    """Whether power and heat are met while the unit stands."""
    short = [line for line in option["security"] if not line["met"]]
    if short:
        missing = [f"{carrier(line['carrier'])} by {power(-line['margin_kW'])}" for line in short]
        return f"Not met: grid and heaters fall short of the year’s peak of {listed(missing)}."
    if not option["security"]:
        return "The site has no demand to secure."
    tight = min(
        option["security"], key=lambda line: line["margin_kW"] / max(line["capacity_kW"], 1e-9)
    )
    weak = [line for line in option["security"] if (line["margin_one_heater_out_kW"] or 0.0) < 0.0]
    more = (
        (
            " With its largest heater out as well, "
            f"{listed([carrier(line['carrier']) for line in weak])} "
            f"{'is' if len(weak) == 1 else 'are'} short."
        )
        if weak
        else ""
    )
    return (
        f"Met: grid and heaters carry every peak. Narrowest: {carrier(tight['carrier'])}, "
        f"{power(tight['margin_kW'])} to spare on a peak of {power(tight['peak_kW'])}.{more}"
    )


def _nox(nox: Facts) -> str:
    """NOx against its limit, with the margin."""
    limit, high = nox["limit_mg_per_Nm3"], nox["band_high_mg_per_Nm3"]
    return (
        f"{upper_first(nox['status'])}: {number(nox['band_low_mg_per_Nm3'])} to "
        f"{number(high)}{THIN}mg/Nm³, at the "
        f"upper edge {percent(high / limit)} of the limit of {number(limit)}{THIN}mg/Nm³ "
        f"(15{THIN}% O₂). The guarantee is {number(nox['guarantee_mg_per_Nm3'], 1)}."
    )


def _efficiency(efficiency: Facts) -> str:
    """Overall efficiency against its test."""
    overall = f"{percent(efficiency['overall_lhv_frac'], 1)} of the fuel’s LHV over the year"
    if efficiency["met"] is None:
        return f"{overall}; no legal test was asked for."
    verdict = "Met" if efficiency["met"] else "Not met"
    return (
        f"{verdict}: {overall} ({percent(efficiency['required_overall_frac'])} asked), "
        "primary energy saving "
        f"{percent(efficiency['primary_energy_saving_frac'], 1)} "
        f"({percent(efficiency['required_saving_frac'])} asked): "
        f"{TESTS.get(efficiency['test'], efficiency['test'])}."
    )


def _control(results: ResultsFolder) -> str:
    """Control, gap and fit, in money."""
    proof, currency = results.subject["proof"], results.currency
    foresight = (
        (
            "Perfect foresight: weather, demand and prices known in advance; a real "
            "controller earns less."
        )
        if proof["control"] == "perfect foresight"
        else f"Control: {proof['control']}."
    )
    return (
        f"{foresight} Proven gap {small_percent(proof['gap_frac'])} "
        f"({money(proof['gap_money'], currency)} a year); "
        f"simplifying the plant moves cost by {money(proof['fit_money'], currency)}."
    )


def change(results: ResultsFolder) -> str:
    """What would turn the answer: the price of gas first."""
    point, currency = results.subject["break_even"], results.currency
    zero, price = point["npv_zero_fuel_price_frac"], point["npv_zero_commodity_per_hhv_kWh"]
    if zero is None or price is None:
        tried = (
            f"{signed_percent(point['tried_from_frac'])} to "
            f"{signed_percent(point['tried_to_frac'])}"
        )
        turn = "end the case" if results.is_advised else "make it pay"
        return f"No gas price from {tried} would {turn}."
    start = "It stops paying if" if results.is_advised else "It would begin to pay if"
    way = "rose" if zero > 0 else "fell"
    saving_zero = point["saving_zero_fuel_price_frac"]
    also = (
        ""
        if saving_zero is None
        else f" The annual saving is gone at {signed_percent(saving_zero)}."
    )
    return (
        f"{start} the gas commodity price {way} by {percent(abs(zero))} for good, to "
        f"{unit_price(price, currency)} (HHV).{also}"
    )

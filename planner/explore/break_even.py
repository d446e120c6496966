"""The change of the fuel price at which an option stops paying."""

from collections.abc import Callable
from dataclasses import dataclass, field
from itertools import pairwise

from load_profiles import SiteYear
from planner.errors import PlannerError
from planner.evaluate import evaluate, money
from planner.explore.changes import Change
from planner.results.records import BreakEven
from planner.study.study import Study

#: Changes of the commodity price within which a zero is looked for.
TRIED_FROM_FRAC = -0.8
TRIED_TO_FRAC = 1.5

#: Further years dispatched to close in on one zero.
MOST_STEPS = 4


@dataclass
class Curve:
    """Net present value and annual saving over the change of the fuel price.

    Parameters
    ----------
    study, site_year
        As metered and stated.
    number : int
        Which option.
    known : dict of change to (npv, saving)
        Points worked out so far; grows with use.
    """

    study: Study
    site_year: SiteYear
    number: int
    known: dict[float, tuple[float, float]] = field(default_factory=dict)

    def at(self, change_frac: float) -> tuple[float, float] | None:
        """NPV and annual saving at a change, dispatched anew if it is not known yet."""
        if change_frac not in self.known:
            change = Change("break-even", "break_even", change_frac, fuel_price=1.0 + change_frac)
            study = change.study(self.study)
            try:
                separate = evaluate(study, self.site_year, None)
                case = evaluate(study, self.site_year, study.option[self.number])
            except PlannerError:
                return None
            earned = money(study, separate, case)
            self.known[change_frac] = (earned.npv_real, earned.annual_saving)
        return self.known[change_frac]


def break_even(
    study: Study, site_year: SiteYear, number: int, known: dict[float, tuple[float, float]]
) -> BreakEven:
    """Find where an option's NPV, and where its annual saving, crosses zero.

    Parameters
    ----------
    study : Study
        As stated.
    site_year : SiteYear
        As metered.
    number : int
        Which option.
    known : dict of change to (npv, saving)
        Points from the variants; at least the base at 0.

    Returns
    -------
    BreakEven
        The zeros, None where there is none within the range tried.
    """
    curve = Curve(study, site_year, number, dict(known))
    capital = sum(line.cost for line in study.option[number].capital)
    npv_zero = _zero(curve, 0, tolerance=0.002 * capital)
    saving_zero = _zero(curve, 1, tolerance=0.0002 * capital)
    commodity = study.gas_tariff.commodity_per_hhv_kWh

    def price(change_frac: float | None) -> float | None:
        return None if change_frac is None else commodity * (1.0 + change_frac)

    return BreakEven(
        npv_zero_fuel_price_frac=npv_zero,
        npv_zero_commodity_per_hhv_kWh=price(npv_zero),
        saving_zero_fuel_price_frac=saving_zero,
        saving_zero_commodity_per_hhv_kWh=price(saving_zero),
        tried_from_frac=TRIED_FROM_FRAC,
        tried_to_frac=TRIED_TO_FRAC,
    )


def _zero(curve: Curve, which: int, *, tolerance: float) -> float | None:
    """Change at which one figure of a curve is zero, by false position on dispatched years."""

    def value(change_frac: float) -> float | None:
        point = curve.at(change_frac)
        return None if point is None else point[which]

    bracket = _bracket(curve, which, value)
    if bracket is None:
        return None
    (low, low_value), (high, high_value) = bracket
    middle = low
    for _ in range(MOST_STEPS):
        middle = low - low_value * (high - low) / (high_value - low_value)
        middle_value = value(middle)
        if middle_value is None or abs(middle_value) <= tolerance:
            return middle
        if (middle_value > 0.0) == (low_value > 0.0):
            low, low_value = middle, middle_value
        else:
            high, high_value = middle, middle_value
    return low - low_value * (high - low) / (high_value - low_value)


def _bracket(
    curve: Curve, which: int, value: Callable[[float], float | None]
) -> tuple[tuple[float, float], tuple[float, float]] | None:
    """Neighbouring known changes with opposite signs, widening the range where there are none."""
    for further in (None, TRIED_FROM_FRAC, TRIED_TO_FRAC):
        if further is not None and value(further) is None:
            continue
        points = sorted((change, point[which]) for change, point in curve.known.items())
        for left, right in pairwise(points):
            if (left[1] > 0.0) != (right[1] > 0.0):
                return left, right
    return None

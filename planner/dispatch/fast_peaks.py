"""A month's demand charges: which peaks to allow, with proof that no others are better.

With the peaks capped at q, a month costs f(q), which only falls as q rises. All peaks p between a
and b therefore cost at least f(b) + rate . a. Where that already reaches the best known total,
they are done; else the box is cut back to what is not yet proven, or halved.
"""

from dataclasses import dataclass, field
from heapq import heappop, heappush

import numpy as np

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.fast_bound import sweep_back
from planner.dispatch.fast_shape import KW_PER_MW
from planner.dispatch.fast_stage import Year, price_steps
from planner.dispatch.window import Window
from planner.errors import SolveError

#: A box that a cut leaves larger than this is halved instead.
WORTHWHILE_CUT = 0.7

#: Points tried along the diagonal, and in each direction, before proving.
FIRST_POINTS, FURTHER_POINTS = 6, 5

#: After so many sweeps of one month the bound is taken as it stands.
MOST_SWEEPS = 400

NO_VALUES = np.zeros((0, 0, 0))


@dataclass(frozen=True)
class Month:
    """Consecutive steps that share no peak with others.

    Parameters
    ----------
    first, steps : int
        Place in the year.
    counted : array of bool, shape (charges, steps)
        Which steps each charge counts.
    rates : array, shape (charges,) [currency/MW]
        Of each charge that costs anything here.
    lowest, highest : arrays, shape (charges,) [MW]
        Below the one no schedule exists, above the other caps bind nothing.
    """

    first: int
    steps: int
    counted: BoolArray
    rates: FloatArray
    lowest: FloatArray
    highest: FloatArray


@dataclass(order=True)
class _Box:
    """Peaks between two corners, and the best proof known for them."""

    rank: float
    low: FloatArray = field(compare=False)
    high: FloatArray = field(compare=False)


def months_of(window: Window, year: Year, cuts: IntArray) -> list[Month]:
    """Cut a year into months.

    Parameters
    ----------
    window : Window
        All steps.
    year : Year
        The same, made ready.
    cuts : array of int
        From 0 to the number of steps.

    Returns
    -------
    list of Month
        In order. A period that comes again later pays no peak there, which keeps the bound valid.
    """
    months, seen = [], set()
    state_least = np.where(year.curves.count > 0, year.least, np.inf).min(axis=1)
    state_largest = np.where(year.curves.count > 0, year.largest, 0.0).max(axis=1)
    for first, after in zip(cuts[:-1].tolist(), cuts[1:].tolist(), strict=True):
        masks, rates = [], []
        for number, charge in enumerate(window.prices.demand_charges):
            counted, period = charge.counted[first:after], charge.period[first:after]
            for one in np.unique(period[counted]).tolist():
                rate = float(charge.rate_per_kW[one]) * KW_PER_MW
                if rate > 0.0 and (number, one) not in seen:
                    masks.append(counted & (period == one))
                    rates.append(rate)
                seen.add((number, one))
        counted = np.array(masks, dtype=bool).reshape(len(masks), after - first)
        least, largest = state_least[first:after], state_largest[first:after]
        lowest = np.array([least[mask].max() for mask in masks])
        highest = np.array([largest[mask].max() for mask in masks])
        highest = np.maximum(highest, lowest)
        months.append(Month(first, after - first, counted, np.array(rates), lowest, highest))
    return months


class MonthSearch:
    """Sweeps of one month, remembered.

    Parameters
    ----------
    year : Year
        The year.
    month : Month
        Which.
    after : array, shape (states, prices)
        Conjugates after the month.
    """

    def __init__(self, year: Year, month: Month, after: FloatArray) -> None:
        self.year, self.month, self.after = year, month, after
        self.stage = np.zeros((month.steps, 2, after.shape[1]))
        self.alive = np.zeros((month.steps, 2), dtype=np.int64)
        self._no_surcharge = np.zeros((month.steps, 2))
        self._peaks = np.zeros((MOST_SWEEPS + 1, len(month.rates)))
        self._worth = np.zeros((MOST_SWEEPS + 1, after.shape[0]))
        self._least = np.full(after.shape[0], np.inf)
        self._found: list[FloatArray] = []
        self._leaves: list[tuple[int, float]] = []

    @property
    def sweeps(self) -> int:
        """How often the month was swept."""
        return len(self._found)

    def best_peaks(self, state: int) -> FloatArray:
        """Best peaks found for a month that begins in a state [MW]."""
        costs = self._worth[: self.sweeps, state] + self._peaks[: self.sweeps] @ self.month.rates
        return self._peaks[int(costs.argmin())]

    def price(self, peaks: FloatArray) -> None:
        """Fill the month's steps under some peaks."""
        caps, first = self.caps(peaks), self.month.first
        if not price_steps(self.year, first, caps, self._no_surcharge, self.stage, self.alive):
            raise SolveError(f"a step's programme failed in the month from step {first}")

    def caps(self, peaks: FloatArray) -> FloatArray:
        """Most import in each step under some peaks [MW]."""
        caps = np.full(self.month.steps, np.inf)
        for mask, peak in zip(self.month.counted, peaks, strict=True):
            np.minimum(caps, peak, out=caps, where=mask)
        return caps

    def bound(self, allowed: float, hint: FloatArray | None = None) -> FloatArray:
        """Prove.

        Parameters
        ----------
        allowed : float [currency]
            How far the bound may lie below the best peaks' cost.
        hint : array, shape (charges,), optional [MW]
            Peaks that were best at other prices.

        Returns
        -------
        array, shape (states, prices)
            Conjugates before the month; valid whatever was allowed.
        """
        month = self.month
        if not len(month.rates):
            self._sweep(np.zeros(0))
            return self._found[0]
        self._look_around(hint)
        boxes = [self._box(month.lowest, month.highest)]
        while boxes and self.sweeps < MOST_SWEEPS:
            box = heappop(boxes)
            number, paid = self._proof(box.high), float(month.rates @ box.low)
            short = self._short(number, paid) - allowed
            if short <= 0.0:
                self._leaves.append((number, paid))
                continue
            for smaller in self._smaller(box, number, short, paid):
                heappush(boxes, smaller)
        for box in boxes:
            self._leaves.append((self._proof(box.high), float(month.rates @ box.low)))
        return np.asarray(np.max([self._found[n] - paid for n, paid in self._leaves], axis=0))

    def _sweep(self, peaks: FloatArray) -> None:
        """Sweep under some peaks."""
        number = self.sweeps
        if number > MOST_SWEEPS:
            return
        self.price(peaks)
        first = self.month.first
        before = sweep_back(self.year, first, self.stage, self.alive, self.after, NO_VALUES)
        self._peaks[number] = peaks
        self._worth[number] = _worth(self.year, first, before)
        self._found.append(before)
        np.minimum(self._least, self._worth[number] + peaks @ self.month.rates, out=self._least)

    def _best(self) -> FloatArray:
        """Peaks that are near the best whatever the state before."""
        number = self.sweeps
        costs = self._worth[:number] + (self._peaks[:number] @ self.month.rates)[:, None]
        return self._peaks[int((costs - self._least).max(axis=1).argmin())]

    def _proof(self, high: FloatArray) -> int:
        """The sweep that says most about peaks up to a corner."""
        number = self.sweeps
        covers = (self._peaks[:number] >= high - 1e-12).all(axis=1)
        worth = self._worth[:number].sum(axis=1)
        return int(np.where(covers, worth, -np.inf).argmax())

    def _short(self, number: int, paid: float) -> float:
        """How far a sweep's bound lies below the best cost, for the state where that is most."""
        return float((self._least - self._worth[number] - paid).max())

    def _box(self, low: FloatArray, high: FloatArray) -> _Box:
        """A box, ranked by what its proof lacks."""
        paid = float(self.month.rates @ low)
        return _Box(-self._short(self._proof(high), paid), low, high)

    def _smaller(self, box: _Box, number: int, short: float, paid: float) -> list[_Box]:
        """What a box leaves to prove: cut back, or halved; its new corner is swept."""
        rates = self.month.rates
        high = np.minimum(box.high, box.low + short / rates)
        if (high < box.high).any():
            self._leaves.append((number, paid + short))
        size, left = float(rates @ (box.high - box.low)), float(rates @ (high - box.low))
        if left < WORTHWHILE_CUT * size:
            self._sweep(high)
            return [self._box(box.low, high)]
        widest = int((rates * (high - box.low)).argmax())
        upper_low, lower_high = box.low.copy(), high.copy()
        upper_low[widest] = lower_high[widest] = 0.5 * (box.low[widest] + high[widest])
        self._sweep(lower_high)
        return [self._box(upper_low, high), self._box(box.low, lower_high)]

    def _look_around(self, hint: FloatArray | None) -> None:
        """Find good peaks before proving anything."""
        month = self.month
        span = month.highest - month.lowest
        self._sweep(month.highest)
        if hint is None:
            for part in np.linspace(0.0, 1.0, FIRST_POINTS)[:-1]:
                self._sweep(month.lowest + part * span)
            reach, rounds = span / (FIRST_POINTS - 1), FURTHER_POINTS
        else:
            self._sweep(np.clip(hint, month.lowest, month.highest))
            reach, rounds = 0.02 * span, 2
        for _ in range(rounds):
            for charge in range(len(month.rates)):
                best = self._best()
                for turn in (-0.5, 0.5):
                    peaks = best.copy()
                    peaks[charge] += turn * reach[charge]
                    self._sweep(np.clip(peaks, month.lowest, month.highest))
            reach = 0.5 * reach


def _worth(year: Year, first: int, before: FloatArray) -> FloatArray:
    """Cost to go of each state from half a store on."""
    last = first - 1 if first > 0 else 0
    scale = year.scale[last] if first > 0 else 1.0
    prices = year.grid[year.day[last]] * scale
    return np.asarray((-before - prices * 0.5 * year.capacity).max(axis=1))

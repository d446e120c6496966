"""A month's demand charges: which peaks to allow, with proof that no others are better.

With the peaks capped at q, a month costs f(q), which only falls as q rises. All peaks p between a
and b therefore cost at least f(b) + rate . a. Where that already reaches the best known total,
they are done; else the box is cut back to what is not yet proven, or halved.
"""

from dataclasses import dataclass, field
from heapq import heappop, heappush

import numpy as np

from planner.arrays import BoolArray, FloatArray, IntArray
from planner.dispatch.fast_bound import Year, price_steps, sweep_back
from planner.dispatch.fast_shape import KW_PER_MW
from planner.dispatch.window import Window
from planner.errors import SolveError

#: A box that a cut leaves larger than this is halved instead.
WORTHWHILE_CUT = 0.7

#: Points tried along the diagonal, and in each direction, before proving.
FIRST_POINTS, FURTHER_POINTS = 6, 5

#: After so many sweeps of one month the bound is taken as it stands.
MOST_SWEEPS = 3000

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
    number: int
    low: FloatArray = field(compare=False)
    high: FloatArray = field(compare=False)


@dataclass
class MonthBound:
    """What is known of a month.

    Parameters
    ----------
    before : array, shape (states, prices)
        Conjugates before the month.
    peaks : array, shape (charges,) [MW]
        Best peaks found.
    sweeps : int
        How often the month was swept.
    open_cost : float [currency]
        How far the bound may lie below the best peaks' cost.
    """

    before: FloatArray
    peaks: FloatArray
    sweeps: int
    open_cost: float


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
        self.no_surcharge = np.zeros((month.steps, 2))
        self.peaks: list[FloatArray] = []
        self.found: list[FloatArray] = []
        self.worth: list[FloatArray] = []
        self.leaves: list[tuple[int, float]] = []

    def caps(self, peaks: FloatArray) -> FloatArray:
        """Most import in each step under some peaks."""
        caps = np.full(self.month.steps, np.inf)
        for mask, peak in zip(self.month.counted, peaks, strict=True):
            caps[mask] = np.minimum(caps[mask], peak)
        return caps

    def price(self, peaks: FloatArray) -> None:
        """Fill the month's steps under some peaks."""
        caps, first = self.caps(peaks), self.month.first
        if not price_steps(self.year, first, caps, self.no_surcharge, self.stage, self.alive):
            raise SolveError(f"a step's programme failed in the month from step {first}")

    def sweep(self, peaks: FloatArray) -> int:
        """Sweep under some peaks; the number of the sweep."""
        self.price(peaks)
        args = (self.year, self.month.first, self.stage, self.alive, self.after, NO_VALUES)
        before = sweep_back(*args)
        self.peaks.append(peaks)
        self.found.append(before)
        self.worth.append(_worth(self.year, self.month.first, before))
        return len(self.peaks) - 1

    def best(self) -> tuple[FloatArray, int]:
        """Least cost by state over all sweeps, peaks paid, and the sweep best for most."""
        costs = np.array(self.worth) + (np.array(self.peaks) @ self.month.rates)[:, None]
        least = costs.min(axis=0)
        return least, int((costs - least).max(axis=1).argmin())

    def proof(self, high: FloatArray) -> int:
        """The sweep that says most about peaks up to a corner."""
        covers = (np.array(self.peaks) >= high - 1e-12).all(axis=1)
        worth = np.array(self.worth).sum(axis=1)
        return int(np.where(covers, worth, -np.inf).argmax())

    def bound(self, allowed: float) -> MonthBound:
        """Prove.

        Parameters
        ----------
        allowed : float [currency]
            How far the bound may lie below the best peaks' cost.

        Returns
        -------
        MonthBound
            Valid whatever was allowed.
        """
        month = self.month
        if not len(month.rates):
            number = self.sweep(np.zeros(0))
            return MonthBound(self.found[number], np.zeros(0), 1, 0.0)
        self._look_around()
        boxes = [_Box(0.0, 0, month.lowest, month.highest)]
        made, worst = 1, 0.0
        while boxes:
            box = heappop(boxes)
            number = self.proof(box.high)
            paid = float(month.rates @ box.low)
            least, _ = self.best()
            short = float((least - allowed - self.worth[number] - paid).max())
            if short <= 0.0 or len(self.peaks) > MOST_SWEEPS:
                self.leaves.append((number, paid))
                worst = max(worst, short + allowed)
                continue
            for low, high in self._smaller(box, number, short, paid):
                rank = float(-month.rates @ (high - low))
                heappush(boxes, _Box(rank, made, low, high))
                made += 1
        _, chosen = self.best()
        before = np.max([self.found[n] - paid for n, paid in self.leaves], axis=0)
        return MonthBound(before, self.peaks[chosen], len(self.peaks), worst)

    def _smaller(
        self, box: _Box, number: int, short: float, paid: float
    ) -> list[tuple[FloatArray, FloatArray]]:
        """What a box leaves to prove: cut back, or halved; its new corner is swept."""
        rates = self.month.rates
        high = np.minimum(box.high, box.low + short / rates)
        if (high < box.high).any():
            self.leaves.append((number, paid + short))
        size, left = float(rates @ (box.high - box.low)), float(rates @ (high - box.low))
        if left < WORTHWHILE_CUT * size:
            self.sweep(high)
            return [(box.low, high)]
        widest = int((rates * (high - box.low)).argmax())
        upper_low, lower_high = box.low.copy(), high.copy()
        upper_low[widest] = lower_high[widest] = 0.5 * (box.low[widest] + high[widest])
        self.sweep(lower_high)
        return [(upper_low, high), (box.low, lower_high)]

    def _look_around(self) -> None:
        """Find good peaks before proving anything."""
        month = self.month
        for part in np.linspace(1.0, 0.0, FIRST_POINTS):
            self.sweep(month.lowest + part * (month.highest - month.lowest))
        reach = (month.highest - month.lowest) / (FIRST_POINTS - 1)
        for _ in range(FURTHER_POINTS):
            for charge in range(len(month.rates)):
                _, chosen = self.best()
                for turn in (-0.5, 0.5):
                    peaks = self.peaks[chosen].copy()
                    peaks[charge] += turn * reach[charge]
                    self.sweep(np.clip(peaks, month.lowest, month.highest))
            reach = 0.5 * reach


def _worth(year: Year, first: int, before: FloatArray) -> FloatArray:
    """Cost to go of each state from half a store on."""
    last = first - 1 if first > 0 else 0
    scale = year.scale[last] if first > 0 else 1.0
    prices = year.grid[year.day[last]] * scale
    return np.asarray((-before - prices * 0.5 * year.capacity).max(axis=1))

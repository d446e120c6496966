"""Full load and part load: which firing temperature and guide-vane position give a power."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from planner.arrays import FloatArray
from planner.constants import ZERO_CELSIUS_K
from planner.errors import SolveError
from planner.plant.running import Ambient, RunningPoint, run
from planner.plant.turbine import GasTurbine

#: Guide vanes close no further than this share of the open flow: common practice, 0.70 to 0.75.
CLOSED_VANE_FRAC = 0.72

#: Powers are met to this share of the sheet's power.
POWER_TOLERANCE = 1e-9

#: A miss above this is an error: the search has failed.
MISSED_FRAC = 1e-6
ITERATIONS = 40

#: Firing temperatures between which loads are looked for [K].
COLDEST_FIRING_K = 500.0
HOTTEST_OVER_DESIGN = 1.12

#: First step of the secant method, small steps of derivatives.
FIRST_STEP_K = 5.0
FIRING_STEP_K = 0.05
VANE_STEP = 1e-4

#: Vanes that the search may pass through on its way; below `CLOSED_VANE_FRAC` fuel takes over.
LEAST_VANE_FRAC = 0.35


@dataclass(frozen=True)
class NetMachine:
    """A machine with what lies between its terminals and the site's busbar.

    Parameters
    ----------
    turbine : GasTurbine
        Calibrated.
    hours : Ambient
        Air of each hour.
    auxiliary_kW : float [kW]
        Pumps, fans, cooling, controls.
    compression_kJ_per_kg : float [kJ/kg]
        Work of the fuel-gas compressor.
    terminal_limit_kW : float [kW]
        Cap of generator or gearbox.
    """

    turbine: GasTurbine
    hours: Ambient
    auxiliary_kW: float
    compression_kJ_per_kg: float
    terminal_limit_kW: float

    def net_kW(self, point: RunningPoint) -> FloatArray:
        """Power at the site's busbar."""
        compressor_kW = point.fuel_kg_per_s * self.compression_kJ_per_kg
        return np.asarray(point.terminal_power_kW - self.auxiliary_kW - compressor_kW)

    def full_load(self) -> RunningPoint:
        """The most that the controller and the generator allow in each hour.

        Returns
        -------
        RunningPoint
            Firing or exhaust temperature held, with the generator's cap in the cold.

        Raises
        ------
        SolveError
            If no firing temperature holds the cap.
        """
        point = self._uncapped()
        over = point.terminal_power_kW > self.terminal_limit_kW
        if not over.any():
            return point
        wanted_kW = np.minimum(point.terminal_power_kW, self.terminal_limit_kW)
        capped = self._fire(
            lambda p: p.terminal_power_kW - wanted_kW, np.ones(len(wanted_kW)), point.firing_K
        )
        return self._met(capped, capped.terminal_power_kW - wanted_kW)

    def _uncapped(self) -> RunningPoint:
        """Full load without the generator's cap."""
        turbine = self.turbine
        open_vanes = np.ones(len(self.hours.temperature_K))
        if turbine.sheet.held == "firing_temperature":
            return run(turbine, self.hours, turbine.firing_K * open_vanes, open_vanes)
        return self._hold_exhaust(turbine.exhaust_K * open_vanes, open_vanes)

    def at_net_power(self, net_kW: FloatArray, full: RunningPoint) -> RunningPoint:
        """The machine at a power at the busbar.

        Parameters
        ----------
        net_kW : array, shape (hours,) [kW]
            Not above full load.
        full : RunningPoint
            Full load of the same hours.

        Returns
        -------
        RunningPoint
            By the sheet's control law: fuel alone, or guide vanes first, which hold the exhaust's
            temperature until they are closed.

        Raises
        ------
        SolveError
            If the machine has no such power in some hour; never a point that misses it.
        """
        point = self._at_net_power(net_kW, full)
        return self._met(point, self.net_kW(point) - net_kW)

    def _met(self, point: RunningPoint, miss_kW: FloatArray) -> RunningPoint:
        """The point, if it misses no power."""
        missed = ~(np.abs(miss_kW) <= MISSED_FRAC * self.turbine.sheet.power_kW)  # NaN is missed
        if missed.any():
            first = int(np.flatnonzero(missed)[0])
            at_degC = self.hours.temperature_K[first] - ZERO_CELSIUS_K
            raise SolveError(
                f"the turbine of {self.turbine.sheet.power_kW:,.0f} kW does not reach the power "
                f"asked of it in {missed.sum():,} of {len(missed):,} steps, first in step {first} "
                f"at {at_degC:.1f} degC; check the sheet's minimum load and the auxiliaries"
            )
        return point

    def _at_net_power(self, net_kW: FloatArray, full: RunningPoint) -> RunningPoint:
        """The point at a power by the sheet's control law, met or not."""
        open_vanes = np.ones(len(net_kW))
        if self.turbine.sheet.control == "fuel_only":
            return self._fire(lambda p: self.net_kW(p) - net_kW, open_vanes, full.firing_K)
        held = self._hold_both(net_kW, full)
        below = held.vane_frac < CLOSED_VANE_FRAC
        if not below.any():
            return held.point
        vanes = np.where(below, CLOSED_VANE_FRAC, held.vane_frac)

        def miss(point: RunningPoint) -> FloatArray:
            exhaust_miss = point.exhaust_K - full.exhaust_K
            return np.where(below, self.net_kW(point) - net_kW, exhaust_miss)

        return self._fire(miss, vanes, held.point.firing_K)

    def _hold_both(self, net_kW: FloatArray, full: RunningPoint) -> "_Held":
        """Firing and vanes that give a power and hold the exhaust, as if vanes could close further.

        Newton's method in both at once, derivatives by small steps.
        """
        turbine, hours = self.turbine, self.hours
        firing_K, vanes = full.firing_K, np.sqrt(np.clip(net_kW / self.net_kW(full), 0.3, 1.0))
        point = run(turbine, hours, firing_K, vanes)
        closed = np.zeros(len(vanes), dtype=bool)
        for _ in range(ITERATIONS):
            power_miss, exhaust_miss = self.net_kW(point) - net_kW, point.exhaust_K - full.exhaust_K
            # Hours that stay at the search's limit are left to fuel alone.
            closed, was_closed = vanes <= LEAST_VANE_FRAC, closed
            worst = np.maximum(np.abs(power_miss), np.abs(exhaust_miss))
            done = worst <= POWER_TOLERANCE * turbine.sheet.power_kW
            if (done | (closed & was_closed)).all():
                break
            hotter = run(turbine, hours, firing_K + FIRING_STEP_K, vanes, near=point)
            wider = run(turbine, hours, firing_K, vanes + VANE_STEP, near=point)
            a = (self.net_kW(hotter) - self.net_kW(point)) / FIRING_STEP_K
            b = (self.net_kW(wider) - self.net_kW(point)) / VANE_STEP
            c = (hotter.exhaust_K - point.exhaust_K) / FIRING_STEP_K
            d = (wider.exhaust_K - point.exhaust_K) / VANE_STEP
            determinant = a * d - b * c
            firing_K = firing_K - (d * power_miss - b * exhaust_miss) / determinant
            firing_K = np.clip(firing_K, COLDEST_FIRING_K, HOTTEST_OVER_DESIGN * turbine.firing_K)
            vanes = vanes - (a * exhaust_miss - c * power_miss) / determinant
            vanes = np.clip(vanes, LEAST_VANE_FRAC, 1.0)
            point = run(turbine, hours, firing_K, vanes, near=point)
        return _Held(point, vanes)

    def _hold_exhaust(self, exhaust_K: FloatArray, vanes: FloatArray) -> RunningPoint:
        """The firing temperature at which the exhaust has a given temperature."""
        start_K = np.full(len(vanes), self.turbine.firing_K)
        return self._fire(lambda p: p.exhaust_K - exhaust_K, vanes, start_K)

    def _fire(
        self,
        miss: Callable[[RunningPoint], FloatArray],
        vanes: FloatArray,
        start_K: FloatArray,
    ) -> RunningPoint:
        """Firing temperature at which a miss is zero, by the secant method in all hours."""
        turbine, hours = self.turbine, self.hours
        bounds = (COLDEST_FIRING_K, turbine.firing_K * HOTTEST_OVER_DESIGN)
        point = run(turbine, hours, start_K, vanes)
        before_K, before = start_K, miss(point)
        now_K = np.clip(before_K - FIRST_STEP_K * np.sign(before), *bounds)
        for _ in range(ITERATIONS):
            point = run(turbine, hours, now_K, vanes, near=point)
            now = miss(point)
            if np.abs(now).max() <= POWER_TOLERANCE * turbine.sheet.power_kW:
                break
            # Where nothing moved any more, the hour is done: its step is zero.
            moved = now != before
            slope = np.divide(now_K - before_K, now - before, out=np.zeros_like(now), where=moved)
            before_K, before = now_K, now
            now_K = np.clip(now_K - np.clip(now * slope, -150.0, 150.0), *bounds)
        return point


@dataclass(frozen=True)
class _Held:
    """A running point and the vanes that it needs."""

    point: RunningPoint
    vane_frac: FloatArray

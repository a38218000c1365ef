"""A time-proportioned loop at other cycle times than the chosen one, its worst cases held."""

from dataclasses import replace

from specgen.design.trade_point import TradePoint, error_of
from specgen.process.box import Box
from specgen.process.load_step import LoadStep, load_step
from specgen.process.loop_dynamics import Dynamics
from specgen.process.time_proportioned import predict_ripple
from specgen.process.tuning import NothingLimitsTheGainError, Settings, cycle_delay, simc
from specgen.rules.base import Case
from specgen.sizing.contact_life import years_of_life
from specgen.sizing.scan import scan_and_pulse
from specgen.sizing.settings import ProportionedSettings
from specgen.sizing.simulated import LoadCase
from specgen.sizing.starting_values import Hardest, hardest_case, with_choice
from specgen.sizing.wear import HOUR, hours_per_year, weakest

HALF = 0.5  # a cycle's delay is at least half of it
Sudden = tuple[LoadCase, float, float]


class Pulsed:
    """The worst cases of a time-proportioned loop, held while its cycle moves; ``longest`` is the most it is moved to."""

    def __init__(self, case: Case, box: Box, settings: ProportionedSettings, load: tuple[LoadCase, ...], longest: float) -> None:
        self._case, self._box, self._settings = case, box, settings
        worst = settings.ripple
        self._plants = tuple(dict.fromkeys(found.plant for found in (worst.above, worst.below, worst.swing)))
        self._hours = hours_per_year(case.loop, case.panel)
        last = weakest(case.device)
        self._lasts = last.operations if last else None
        self._scan, self._pulse = scan_and_pulse(case.panel)
        self._hardest: Hardest = hardest_case(box)
        # a load meets short cycles as their mean output and long ones pulse by pulse: the worst of both is held
        self._sudden = tuple(dict.fromkeys(self._worst_load(load, cycle) for cycle in (settings.cycle_time, longest))) if load else ()

    def chosen(self) -> TradePoint:
        """Return the record's own figures."""
        settings = self._settings
        more = error_of(self._case) + (settings.tuning.load_deviation or 0.0)
        ripple = settings.ripple
        return TradePoint(
            settings.cycle_time, ripple.above.value + more, ripple.below.value + more, ripple.swing.value, settings.shortest_on,
            settings.shortest_off, HOUR / settings.cycle_time, settings.contact_life,
            chosen=True,
        )  # fmt: skip

    def at(self, cycle: float) -> TradePoint | None:
        """Return the figures at another cycle time; None where the sudden load cannot be taken up there."""
        settings = self._settings
        deviation = self._deviation(cycle)
        if deviation is None:
            return None
        more = error_of(self._case) + deviation
        above, below, swing = self._ripples(cycle)
        life = None if self._lasts is None else years_of_life(self._lasts, self._hours * HOUR / cycle)
        return TradePoint(
            cycle, above + more, below + more, swing, settings.lowest_duty * cycle,
            (1 - settings.highest_duty) * cycle, HOUR / cycle, life,
        )  # fmt: skip

    def _ripples(self, cycle: float) -> tuple[float, float, float]:
        """Return the ripple above, below and peak to trough."""
        least, low, high = self._settings.least_pulse, self._settings.lowest_duty, self._settings.highest_duty
        if min(low, 1 - high) * cycle < least:
            # pulses too short to be made are held back, and where that is worst jumps about
            worst = predict_ripple(self._box, cycle, least, least)
            return worst.above.value, worst.below.value, worst.swing.value
        found = [plant.ripple(cycle) for plant in self._plants]
        up, down = max(ripple.above for ripple in found), max(ripple.below for ripple in found)
        above, below = (up, down) if self._box.sign > 0 else (down, up)
        return above, below, max(ripple.swing for ripple in found)

    def _worst_load(self, load: tuple[LoadCase, ...], cycle: float) -> Sudden:
        """Return the change of load that carries the value farthest: where it happens, the duty it meets, and its sign."""
        every = [
            (case, duty, change)
            for case in load
            for duty in sorted({case.duty_low, case.duty_high})
            for change in (case.share, -case.share)
        ]
        return max(every, key=lambda sudden: self._off(sudden, cycle))

    def _off(self, sudden: Sudden, cycle: float) -> float:
        step = self._step(sudden, cycle)
        # what the output cannot take up is no deviation (M9 and M10 judge that)
        return max(step.deviation - step.ripple, 0.0) if step is not None and step.recovers else -1.0

    def _deviation(self, cycle: float) -> float | None:
        if not self._sudden:
            return 0.0
        found = max(self._off(sudden, cycle) for sudden in self._sudden)
        return found if found >= 0 else None

    def _step(self, sudden: Sudden, cycle: float) -> LoadStep | None:
        case, duty, change = sudden
        plant = self._hardest.dynamics
        tuned = self._tuned(plant, cycle)
        if tuned is None:
            return None
        there = replace(plant, slope=plant.slope * case.steeper, theta=plant.theta + self._scan / 2)
        return load_step(there, tuned, duty, change, cycle)

    def _tuned(self, plant: Dynamics, cycle: float) -> Settings | None:
        """Return the starting values at a cycle time, with the designer's own in their place."""
        charged = cycle_delay(cycle, max(self._hardest.duty_high, HALF), self._pulse, plant.theta, plant.lag)
        lags = tuple(lag for lag in (plant.lag, plant.sensor_lag) if lag > 0)
        try:
            ruled = simc(plant.slope, plant.tau, plant.theta, lags, self._scan / 2, charged)
        except NothingLimitsTheGainError:
            return None
        return ruled if self._case.loop.choose is None else with_choice(ruled, self._case.loop.choose)

"""What on-off control does in the worst case."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Literal

from specgen.core.postponed import Postponed
from specgen.process.box import Box, Point
from specgen.process.box_edges import candidates
from specgen.process.limit_cycle import SECONDS_AN_HOUR, Cycle, NoCycle
from specgen.process.plant import ProcessModel
from specgen.process.worst_case import Sense, Worst, worst

Look = Literal["quick", "edges", "thorough"]
Placement = Literal["centred", "below", "above"]
CycleOf = Callable[[ProcessModel], Cycle]

# less heat capacity always swings wider and switches faster; dead time and lags widen the swing and slow the switching
WIDEST = Point(capacity=0.0, dead_time=1.0, lag=1.0, sensor_lag=1.0)
SCATTERED = 48  # cases spread through the box where figures may jump
FASTEST = Point(capacity=0.0, dead_time=0.0, lag=0.0, sensor_lag=0.0)


def switch_points(differential: float, placement: Placement, sign: int) -> tuple[float, float]:
    """Return the switch-off and switch-on points from the setpoint, in the sense of more output [K].

    Parameters
    ----------
    differential : float
        The whole distance between the points [K].
    placement : "centred", "below" or "above"
        Where they lie on the measured value's own scale.
    sign : int
        +1 where more output raises the value, -1 where it lowers it.

    Examples
    --------
    >>> switch_points(2, "centred", 1), switch_points(2, "below", 1), switch_points(2, "below", -1)
    ((1.0, -1.0), (0.0, -2), (2, 0.0))
    """
    if placement == "centred":
        return differential / 2, -differential / 2
    if (placement == "below") == (sign > 0):
        return 0.0, -differential
    return differential, 0.0


@dataclass(frozen=True, slots=True)
class OnOffPrediction:
    """Worst cases of settled on-off running.

    ``above`` and ``below`` are the largest excursions of the true value from the setpoint on the value's own scale, not negative
    [K]; ``swing`` the largest peak to trough in one case; ``starts_per_hour`` and ``period`` of the fastest case, least times
    enforced where they were given; ``shortest_on`` and ``shortest_off`` without least times [s].
    """

    differential: float
    placement: Placement
    switch_off: float
    switch_on: float
    above: Worst
    below: Worst
    swing: Worst
    starts_per_hour: Worst
    shortest_on: Worst
    shortest_off: Worst
    min_run: float
    min_rest: float

    @property
    def period(self) -> float:
        """Return the shortest time from start to start [s]."""
        return SECONDS_AN_HOUR / self.starts_per_hour.value


@dataclass(frozen=True, slots=True)
class CycleFigure:
    """What is read off a cycle, which way it is worse, and the ends of dead time and lags at which it is."""

    read: Callable[[Cycle], float]
    sense: Sense
    pinned: Point


SWING = CycleFigure(lambda cycle: cycle.swing, "largest", WIDEST)
PERIOD = CycleFigure(lambda cycle: cycle.period, "smallest", FASTEST)
STARTS = CycleFigure(lambda cycle: cycle.starts_per_hour, "largest", FASTEST)
ON = CycleFigure(lambda cycle: cycle.t_on, "smallest", FASTEST)
OFF = CycleFigure(lambda cycle: cycle.t_off, "smallest", FASTEST)


@dataclass(frozen=True, slots=True)
class Setting:
    """A box at one setting of the two-position controller.

    A ``quick`` look takes the worst of the cases on the box's edges; ``edges`` searches on from them and, where least times may bend a
    figure, from where they begin to act; ``thorough`` then starts inside the box as well.
    """

    box: Box
    placement: Placement
    min_run: float
    min_rest: float
    look: Look = "thorough"

    def at(self, plant: ProcessModel, differential: float, *, timers: bool = True) -> Cycle:
        """Return the cycle of one plant."""
        high, low = switch_points(differential, self.placement, self.box.sign)
        if timers:
            return plant.limit_cycle(high, low, self.min_run, self.min_rest)
        return plant.limit_cycle(high, low)

    def worst(self, of: CycleFigure, differential: float, cycle: CycleOf, among: Sequence[Point] | None = None) -> Worst:
        """Return the worst of a cycle's figure."""
        high, low = switch_points(differential, self.placement, self.box.sign)

        def figure(plant: ProcessModel) -> float:
            return of.read(cycle(plant))

        scattered = SCATTERED if self.may_jump and self.look == "thorough" else 0
        if among is None:
            among = self.candidates(differential, (of.pinned,))
        search = self.look != "quick"
        return worst(
            self.box, figure, of.sense, high=high, low=low, pinned=of.pinned, among=among, scattered=scattered, search=search
        )

    @property
    def may_jump(self) -> bool:
        """Tell whether least times may act: where they begin to, figures bend, and with lags long and short cycles can alternate."""
        return self.look != "quick" and max(self.min_run, self.min_rest) > 0

    def candidates(self, differential: float, pins: tuple[Point, ...] = (FASTEST, WIDEST)) -> tuple[Point, ...]:
        """Return the cases to look at: with least times, also where the natural times just equal them."""
        high, low = switch_points(differential, self.placement, self.box.sign)
        bends = []
        for pinned in pins if self.may_jump else ():
            if self.min_run > 0:
                bends.append(self._bend(differential, pinned, lambda c: c.t_on, self.min_run))
            if self.min_rest > 0:
                bends.append(self._bend(differential, pinned, lambda c: c.t_off, self.min_rest))
        duties = [0.5]
        if self.may_jump and min(self.min_run, self.min_rest) > 0:
            # both least times together hold this duty; which of them gives way changes here
            both = self.min_run / (self.min_run + self.min_rest)
            duties += [both * (1 - 1e-6), both * (1 + 1e-6)]
        return tuple(candidates(self.box, high, low, duties, bends))

    def _bend(self, differential: float, pinned: Point, time: Callable[[Cycle], float], least: float) -> Callable[[Point], float]:
        def bend(point: Point) -> float:
            at = pinned._replace(strength=point.strength, load=point.load, loss=point.loss)
            try:
                # the ratio, because a time grows without limit towards the edge of what can switch
                return 1 - least / time(self.at(self.box.plant_at(at), differential, timers=False))
            except NoCycle:
                return 1.0

        return bend

    def cycles(self, differential: float, *, timers: bool = True) -> CycleOf:
        """Return a plant's cycle at a differential, each plant's computed once."""
        known: dict[ProcessModel, Cycle] = {}

        def cycle(plant: ProcessModel) -> Cycle:
            found = known.get(plant)
            if found is None:
                found = known[plant] = self.at(plant, differential, timers=timers)
            return found

        return cycle

    @property
    def above(self) -> CycleFigure:
        """Return the excursion above the setpoint on the value's own scale."""
        return CycleFigure(lambda c: max(0.0, c.peak), "largest", WIDEST) if self.box.sign > 0 else CycleFigure(_dip, "largest", WIDEST)

    @property
    def below(self) -> CycleFigure:
        """Return the excursion below the setpoint on the value's own scale."""
        return CycleFigure(_dip, "largest", WIDEST) if self.box.sign > 0 else CycleFigure(lambda c: max(0.0, c.peak), "largest", WIDEST)


def _dip(cycle: Cycle) -> float:
    return max(0.0, -cycle.trough)


def predict_on_off(
    box: Box, differential: float, placement: Placement = "centred", min_run: float = 0.0, min_rest: float = 0.0
) -> OnOffPrediction:
    """Return the worst cases of settled on-off running.

    Parameters
    ----------
    box : Box
        The loop's box.
    differential : float
        The whole distance between the switch points [K].
    placement : "centred", "below" or "above"
        Where the points lie to the setpoint.
    min_run, min_rest : float
        Least run and rest that are enforced [s].

    Returns
    -------
    OnOffPrediction

    Raises
    ------
    NoCycle
        No case of the box switches.
    """
    setting = Setting(box, placement, min_run, min_rest)
    enforced = setting.cycles(differential)
    natural = enforced if min_run <= 0 and min_rest <= 0 else setting.cycles(differential, timers=False)
    high, low = switch_points(differential, placement, box.sign)
    among = setting.candidates(differential)
    looked_at = {
        "above": (setting.above, enforced), "below": (setting.below, enforced), "swing": (SWING, enforced),
        "starts_per_hour": (STARTS, enforced), "shortest_on": (ON, natural), "shortest_off": (OFF, natural),
    }  # fmt: skip

    def figure(name: str) -> Worst:
        of, cycle = looked_at[name]
        return setting.worst(of, differential, cycle, among)

    # a box without a case that switches is told at once
    known = {"differential": differential, "placement": placement, "switch_off": high * box.sign, "switch_on": low * box.sign,
             "starts_per_hour": figure("starts_per_hour"), "min_run": min_run, "min_rest": min_rest}  # fmt: skip
    return _LatePrediction.after(known, figure)


class _LatePrediction(Postponed, OnOffPrediction):
    """A prediction whose figures are looked for when they are asked for."""

    __slots__ = ("_later",)

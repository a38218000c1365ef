"""What the switching of a time-proportioned output leaves on the value, in the worst case, and the longest cycle that keeps it small."""

from collections.abc import Callable
from dataclasses import dataclass
from math import inf

from scipy.optimize import brentq

from specgen.core.postponed import Postponed
from specgen.process.box import Box, Point
from specgen.process.cycle_ripple import Ripple, carried_over
from specgen.process.limit_cycle import NoCycle
from specgen.process.plant import ProcessModel
from specgen.process.worst_case import Sense, Worst, worst

# less heat capacity and less lag let more of the switching through; dead time and a sensor's lag do not change it
LIVELIEST = Point()
HELD = 1e-4
TURNS = 25
HAIR = 1e-9


@dataclass(frozen=True, slots=True)
class RipplePrediction:
    """Worst cases of the steady ripple about the mean, which control holds at the setpoint.

    ``above`` and ``below`` on the value's own scale, and ``swing`` [K]; ``shortest_on`` and ``shortest_off`` are the pulses asked for at
    the lowest and the highest duty [s]. ``duty_low`` and ``duty_high`` are those of the box, not clipped; pulses are those of the part
    between 0 and 1. ``held_back`` tells whether pulses below the device's least are skipped or stretched somewhere in the box.
    """

    cycle_time: float
    above: Worst
    below: Worst
    swing: Worst
    shortest_on: Worst
    shortest_off: Worst
    duty_low: float
    duty_high: float
    held_back: bool


@dataclass(frozen=True, slots=True)
class _Pattern:
    """A cycle time and the least pulses of the device."""

    cycle_time: float
    least_on: float
    least_off: float

    def ripple(self, plant: ProcessModel) -> Ripple:
        """Return the ripple of the pattern that the device makes."""
        duty = plant.duty
        if not 0 < duty < 1:
            raise NoCycle(plant.settles_on, plant.settles_off, 0.0, 0.0)
        if self.least_on <= 0 and self.least_off <= 0:
            return plant.ripple(self.cycle_time)
        return plant.ripple(carried_over(self.cycle_time, duty, self.least_on, self.least_off))

    @property
    def duties(self) -> tuple[float, ...]:
        """Return the duties where the ripple can be largest: half, and where a pulse is only just held back for several cycles."""
        made = [0.5]
        for k in (1, 2, 3):
            made += [self.least_on / (k * self.cycle_time) * (1 - HAIR), 1 - self.least_off / (k * self.cycle_time) * (1 - HAIR)]
        return tuple(sorted({x for x in made if 0 < x < 1}))

    def worst(self, box: Box, of: Callable[[Ripple], float], sense: Sense = "largest") -> Worst:
        """Return the worst of a figure of the ripple."""

        def figure(plant: ProcessModel) -> float:
            return of(self.ripple(plant))

        return worst(box, figure, sense, pinned=LIVELIEST, duties=self.duties)


def _sides(box: Box) -> tuple[Callable[[Ripple], float], Callable[[Ripple], float]]:
    """Return what reads the excursion above and below on the value's own scale."""
    up, down = (lambda r: r.above), (lambda r: r.below)
    return (up, down) if box.sign > 0 else (down, up)


def predict_ripple(box: Box, cycle_time: float, least_on: float = 0.0, least_off: float = 0.0) -> RipplePrediction:
    """Return the worst cases of the steady ripple at a cycle time.

    Parameters
    ----------
    box : Box
        The loop's box.
    cycle_time : float
        Cycle time [s].
    least_on, least_off : float
        Shortest pulse on and off that the device makes; shorter ones are held back and added to the next [s].

    Returns
    -------
    RipplePrediction

    Raises
    ------
    NoCycle
        No case of the box needs a duty between 0 and 1.
    """
    pattern, asked = _Pattern(cycle_time, least_on, least_off), _Pattern(cycle_time, 0.0, 0.0)
    up, down = _sides(box)

    def later(name: str) -> Worst | bool:
        match name:
            case "below":
                return pattern.worst(box, down)
            case "swing":
                return pattern.worst(box, lambda r: r.swing)
            case "shortest_on":
                return asked.worst(box, lambda r: r.t_on, "smallest")
            case "shortest_off":
                return asked.worst(box, lambda r: r.t_off, "smallest")
            case _:
                return made.shortest_on.value < least_on or made.shortest_off.value < least_off

    # a box without a case that needs a part of full output is told at once
    known = {"cycle_time": cycle_time, "above": pattern.worst(box, up), "duty_low": box.duty_low[0], "duty_high": box.duty_high[0]}
    made = _LatePrediction.after(known, later)
    return made


class _LatePrediction(Postponed, RipplePrediction):
    """A prediction whose other figures are looked for when they are asked for."""

    __slots__ = ("_later",)


def longest_cycle(box: Box, allowed_above: float, allowed_below: float) -> float:
    """Return the longest cycle time at which the steady ripple stays within what is allowed on each side, in every case [s].

    Parameters
    ----------
    box : Box
        The loop's box.
    allowed_above, allowed_below : float
        Share of the tolerance that the switching may take, on the value's own scale [K].

    Returns
    -------
    float
        Infinite where no cycle ripples that much: full and no output themselves stay within it.

    Raises
    ------
    NoCycle
        No case of the box needs a duty between 0 and 1.
    """
    up, down = _sides(box)
    longest = inf
    for side, allowed in ((up, allowed_above), (down, allowed_below)):
        longest = min(longest, _longest(box, side, allowed, longest))
    return longest


def _longest(box: Box, side: Callable[[Ripple], float], allowed: float, most: float) -> float:
    """Return the longest cycle for one side: the root with the worst case held, then the worst case again, until it keeps."""
    cycle_time = most if most < inf else 1e6 * _second(box)
    for _ in range(TURNS):
        now = _Pattern(cycle_time, 0.0, 0.0).worst(box, side)
        if now.value <= allowed * (1 + HELD):
            return cycle_time if cycle_time < 1e6 * _second(box) else inf

        def over(t: float, plant: ProcessModel = now.plant) -> float:
            return side(plant.ripple(t)) - allowed

        cycle_time = float(brentq(over, 0.0, cycle_time, xtol=1e-12 * cycle_time, rtol=1e-9)) * (1 - HAIR)
    return cycle_time


def _second(box: Box) -> float:
    """Return a time of the size in which the box's plants move [s]."""
    plant = box.plant_at(Point())
    return max(1.0, plant.tau if plant.tau < inf else 1.0, plant.lag)

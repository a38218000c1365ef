"""The worst value of a figure over a loop's box: every corner, the points of half duty, and a search from the best of them.

Switching is fastest and ripple largest near half duty, which corners alone miss. The cases that can switch form a body over strength,
load and loss: the box cut by what full output still passes and what still falls back. A figure is looked at in all its corners, where
the surface of half duty cuts its edges, and where a least time begins to act on them; the best are then moved along each axis until the
figure stays within 0.1 percent. Cases that rest or do not reach are cut off there: the last case that still switches stands for them.
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from functools import lru_cache
from math import inf
from typing import Literal

from specgen.process.box import Box, Point
from specgen.process.box_edges import MOVED, candidates
from specgen.process.limit_cycle import NoCycle
from specgen.process.plant import ProcessModel

Sense = Literal["largest", "smallest"]
Judged = Callable[[ProcessModel], float]

PROBE = 0.01
ENOUGH = 2e-5  # relative gain below which the search stops; the figure then moves by less than 0.1 percent
ROUNDS = 12
GOLDEN = 0.6180339887498949
SECTIONS = 14
STARTS = 2
RIVAL = 0.1  # a start further than this below the best is not searched from
PINNED = ("capacity", "dead_time", "lag", "sensor_lag")
LAGS = ("lag", "sensor_lag")  # a larger lag mostly, not always, swings wider
BASES = (2, 3, 5, 7, 11, 13, 17)


@dataclass(frozen=True, slots=True)
class Worst:
    """A figure's worst value and the case that gave it."""

    value: float
    plant: ProcessModel
    point: Point
    box: Box

    @property
    def case(self) -> Mapping[str, float]:
        """Return the case as the value of every declared field that varies, by its path."""
        return self.box.case(self.point)

    @property
    def text(self) -> str:
        """Return the case in words."""
        return self.box.text(self.point)


class Judge:
    """A figure over a box, each case computed once; minus infinity where the case has none."""

    def __init__(self, box: Box, figure: Judged, sense: Sense) -> None:
        self.box = box
        self.figure = figure
        self.turn = 1.0 if sense == "largest" else -1.0
        self.known: dict[Point, float] = {}

    def __call__(self, point: Point) -> float:
        """Return the figure at a case, larger for worse."""
        value = self.known.get(point)
        if value is None:
            try:
                value = self.turn * self.figure(self.box.plant_at(point))
            except NoCycle:
                value = -inf
            self.known[point] = value
        return value


def worst(
    box: Box,
    figure: Judged,
    sense: Sense,
    *,
    high: float = 0.0,
    low: float = 0.0,
    pinned: Point | None = None,
    duties: Sequence[float] = (0.5,),
    among: Sequence[Point] | None = None,
    scattered: int = 0,
    search: bool = True,
) -> Worst:
    """Return the worst value of a figure over a box.

    Parameters
    ----------
    box : Box
        The loop's box.
    figure : callable
        Takes a plant and returns the figure; raises ``NoCycle`` where the plant has none.
    sense : "largest" or "smallest"
        Which is worse.
    high, low : float
        Switch points from the setpoint [K]; both 0 for what does not switch on them.
    pinned : Point or None
        Ends of capacity, dead time and lags known to be the worse ones; all their corners are tried without it, and the other ends of
        the worst case found are tried in any event.
    duties : sequence of float
        Duties whose lines across the box are on the list.
    among : sequence of Point or None
        What ``candidates`` gave for the same switch points and duties, where it is already known.
    scattered : int
        Number of cases spread evenly through the box that are tried too, with every corner of ``pinned``'s axes: for figures that jump.
    search : bool
        False to take the worst of the listed cases as it is.

    Returns
    -------
    Worst

    Raises
    ------
    NoCycle
        No case of the box has the figure.
    """
    judge = Judge(box, figure, sense)
    known = among if among is not None else tuple(candidates(box, high, low, duties))
    starts = [pinned] if pinned is not None and not scattered else box.ends(*PINNED)
    tried = [start._replace(strength=at.strength, load=at.load, loss=at.loss) for start in starts for at in known]
    tried += spread(box.free, scattered)
    ranked = sorted(tried, key=judge, reverse=True)
    if not ranked or judge(ranked[0]) == -inf:
        point = box.duty_low[1] if box.rests else box.reach.point
        plant = box.plant_at(point)
        raise NoCycle(plant.settles_on, plant.settles_off, high, low)
    best = judge(ranked[0])
    if not search:
        return Worst(judge.turn * best, box.plant_at(ranked[0]), ranked[0], box)
    near = [start for start in ranked[: STARTS + bool(scattered)] if judge(start) >= best - RIVAL * abs(best)]
    moved = [name for name in MOVED + (PINNED if scattered else LAGS) if name in box.free]
    found = max((_refined(box, judge, start, moved) for start in near), key=judge)
    return Worst(judge.turn * judge(found), box.plant_at(found), found, box)


@lru_cache(maxsize=128)
def spread(free: tuple[str, ...], count: int) -> tuple[Point, ...]:
    """Return cases spread evenly through the axes that vary: Halton's sequence, so that every run tries the same ones.

    References
    ----------
    Halton, Numerische Mathematik 2 (1960) 84-90; standing: from memory.
    """
    return tuple(Point(**{name: _halton(i, base) for name, base in zip(free, BASES, strict=False)}) for i in range(1, count + 1))


def _halton(index: int, base: int) -> float:
    """Return the digits of a number mirrored at the point: ``6`` in base 2 is 110, mirrored 0.011, that is 0.375."""
    value, share = 0.0, 1.0
    while index > 0:
        share /= base
        index, digit = divmod(index, base)
        value += share * digit
    return value


def _refined(box: Box, judge: Judge, start: Point, moved: Sequence[str]) -> Point:
    """Move a case along the axes until the figure stays."""
    best = start
    pinned = [name for name in PINNED if name in box.free]
    for _ in range(ROUNDS):
        before = judge(best)
        for name in pinned:
            other = best._replace(**{name: 1.0 - getattr(best, name)})
            if judge(other) > judge(best):
                best = other
        for name in moved:
            best = _along(judge, best, name)
        if judge(best) - before <= ENOUGH * abs(before):
            return best
    return best


def _along(judge: Judge, best: Point, name: str) -> Point:
    """Return the best case on one axis, searched only where a small step gains."""
    here = getattr(best, name)
    value = judge(best)
    for step in (PROBE, -PROBE):
        near = min(1.0, max(0.0, here + step))
        if near != here and judge(best._replace(**{name: near})) > value:
            return _golden(judge, best, name, here, 1.0 if step > 0 else 0.0)
    return best


def _rises_throughout(judge: Judge, best: Point, name: str, start: float, end: float) -> bool:
    """Tell whether a figure with one top on the stretch, as golden section takes it, has it at the very end.

    It then rises to the last point that the section would come to before the end, and from there to the end.
    """
    length = end - start
    last = judge(best)
    for share in (1 - GOLDEN, GOLDEN, 1 - GOLDEN ** (SECTIONS + 1), 1.0):
        value = judge(best._replace(**{name: end if share == 1 else start + share * length}))
        if not value > last:
            return False
        last = value
    return True


def _golden(judge: Judge, best: Point, name: str, start: float, end: float) -> Point:
    """Search the stretch from ``start`` to ``end`` by golden section; return the best case met."""
    if _rises_throughout(judge, best, name, start, end):
        return best._replace(**{name: end})
    a, b = start, end
    c, d = b - GOLDEN * (b - a), a + GOLDEN * (b - a)
    for _ in range(SECTIONS):
        at_c, at_d = best._replace(**{name: c}), best._replace(**{name: d})
        if judge(at_c) >= judge(at_d):
            b, d = d, c
            c = b - GOLDEN * (b - a)
        else:
            a, c = c, d
            d = a + GOLDEN * (b - a)
    met = [best, *(best._replace(**{name: t}) for t in (c, d, end, start))]
    return max(met, key=judge)

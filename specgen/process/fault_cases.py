"""Worst cases over a loop's box of an output that sticks, of a limiter that stops it, and of a cold start."""

from collections.abc import Iterator
from dataclasses import dataclass
from math import inf
from typing import Literal

from specgen.process.box import Box, Point
from specgen.process.faults import coasts_to, limiter_acts_at, time_at_speed, time_up, warm_up_time

Output = Literal["on", "off"]
Extreme = Literal["highest", "lowest"]
LOSSES = (0.0, 0.25, 0.5, 0.75, 1.0)


@dataclass(frozen=True, slots=True)
class FaultCase:
    """A worst value with its case: a real value or a time [s], infinite where it does not end."""

    value: float
    point: Point
    text: str


@dataclass(frozen=True, slots=True)
class LimiterCase:
    """What a limiter does in the fastest case: the true value when it acts and the highest that follows, and the case."""

    acts_at: float
    peaks_at: float
    point: Point
    text: str


def _corners(box: Box) -> Iterator[Point]:
    """Yield the cases that matter to a stuck output: ends of strength, load and capacity, and steps of the loss."""
    for point in box.ends("strength", "load", "capacity"):
        for loss in LOSSES if "loss" in box.free else (0.0,):
            yield point._replace(loss=loss)


def _ends(box: Box, point: Point) -> tuple[float, float] | None:
    """Return where full and no output settle, as real values; None where nothing settles."""
    loss = box.loss.at(point.loss)
    if loss <= 0 or box.ambient is None:
        return None
    load, strength = box.sides_at(point)
    setpoint = box.setpoint.at(point.load)
    return setpoint + box.sign * (strength - load) / loss, setpoint - box.sign * load / loss


def _speeds(box: Box, point: Point, *, whole: bool) -> tuple[float, float]:
    """Return the real speeds with full and no output where nothing settles [K/s]."""
    load, strength = box.sides_at(point)
    capacity = (box.whole_capacity if whole else box.capacity).at(point.capacity)
    return box.sign * (strength - load) / capacity, -box.sign * load / capacity


def settles_at(box: Box, output: Output, extreme: Extreme) -> FaultCase | None:
    """Return the highest or lowest real value that a stuck output settles at.

    Parameters
    ----------
    box : Box
        The loop's box.
    output : "on" or "off"
        How the output sticks.
    extreme : "highest" or "lowest"
        Which end is asked for.

    Returns
    -------
    FaultCase or None
        None where in some case the value does not settle (rates, or a balance without loss): it is then taken to reach anything.
    """
    made: list[tuple[float, Point]] = []
    for point in _corners(box):
        ends = _ends(box, point)
        if ends is None:
            return None
        made.append((ends[0] if output == "on" else ends[1], point))
    value, point = (max if extreme == "highest" else min)(made, key=lambda pair: pair[0])
    return FaultCase(value, point, box.text(point))


def time_to_reach(box: Box, output: Output, start: float, target: float, *, whole: bool = False) -> FaultCase:
    """Return the shortest time from a real value to another with a stuck output, element already hot (or already cold).

    Parameters
    ----------
    box : Box
        The loop's box.
    output : "on" or "off"
        How the output sticks.
    start, target : float
        From the highest peak (or lowest trough) of normal running to the danger or spoiling value.
    whole : bool
        Count every body's heat capacity (spoiling) and not only the fast ones (danger).

    Returns
    -------
    FaultCase
        The time of the earliest case [s]; infinite where no case gets there.
    """
    way = 1 if target >= start else -1
    best: tuple[float, Point] | None = None
    for point in _corners(box):
        ends = _ends(box, point)
        if ends is None:
            speeds = _speeds(box, point, whole=whole)
            seconds = time_at_speed(way * start, way * target, way * speeds[0 if output == "on" else 1])
        else:
            tau = (box.whole_capacity if whole else box.capacity).at(point.capacity) / box.loss.at(point.loss)
            seconds = time_up(way * start, way * ends[0 if output == "on" else 1], way * target, tau)
        if best is None or seconds < best[0]:
            best = (seconds, point)
    assert best is not None  # noqa: S101 - a box has at least one corner
    return FaultCase(best[0], best[1], box.text(best[1]))


def limiter_case(box: Box, set_value: float, sensor_lag: float) -> LimiterCase:
    """Return the true value when a limiter acts on an output stuck on, in the case that passes its set value fastest.

    Parameters
    ----------
    box : Box
        The loop's box.
    set_value : float
        The limiter's set value, a real one on the side that full output moves towards.
    sensor_lag : float
        Lag of the limiter's own sensor [s].

    Returns
    -------
    LimiterCase
        ``acts_at`` when its reading passes the set value, ``peaks_at`` after dead time and second lag have run out.
    """
    worst: LimiterCase | None = None
    for corner in _corners(box):
        point = corner._replace(dead_time=1.0, lag=1.0)
        theta, lag = box.dead_time.at(1.0), box.lag.at(1.0)
        ends = _ends(box, point)
        up = box.sign
        if ends is None:
            on, off = _speeds(box, point, whole=False)
            acts = up * limiter_acts_at(up * set_value, up * on, sensor_lag)
            peak = up * coasts_to(up * acts, up * on, up * off, inf, theta, lag)
        else:
            tau = box.capacity.at(point.capacity) / box.loss.at(point.loss)
            on, off = ends
            acts = up * min(limiter_acts_at(up * set_value, up * (on - set_value) / tau, sensor_lag), max(up * on, up * set_value))
            peak = up * coasts_to(up * acts, up * on, up * off, tau, theta, lag)
        if worst is None or up * peak > up * worst.peaks_at:
            worst = LimiterCase(acts, peak, point, box.text(point))
    assert worst is not None  # noqa: S101 - a box has at least one corner
    return worst


def coldest_rest(box: Box, point: Point) -> float | None:
    """Return the real value at which a loop rests without output in a case of strength and loss: smallest load, hardest surroundings.

    None where the plant's form does not say where the loop rests.
    """
    loss = box.loss.at(point.loss)
    if box.ambient is None or loss <= 0:
        return None
    return box.ambient.at(1.0) - box.sign * min(box.heat.at(0.0), box.heat.at(1.0)) / loss


def warm_up(box: Box, allowed: float) -> FaultCase | None:
    """Return the longest time from the coldest rest to the near edge of the band: lowest supply, largest load, every body counted.

    Parameters
    ----------
    box : Box
        The loop's box.
    allowed : float
        Distance of the band's near edge from the setpoint [K].

    Returns
    -------
    FaultCase or None
        Infinite where full output does not reach the band; None where the plant's form does not say where the loop rests.

    Notes
    -----
    At rest the smallest load acts in the hardest surroundings; from switching on, the largest.
    """
    made: list[tuple[float, Point]] = []
    for corner in box.ends("strength", "loss", "capacity"):
        point = corner._replace(load=1.0, dead_time=1.0, lag=1.0)
        ends, loss, cold = _ends(box, point), box.loss.at(point.loss), coldest_rest(box, point)
        if ends is None or cold is None:
            return None
        up = box.sign
        target = box.setpoint.at(1.0) - up * allowed
        tau = box.whole_capacity.at(point.capacity) / loss
        constants = (tau, box.lag.at(1.0))
        seconds = warm_up_time(up * cold, up * target, up * ends[0], up * ends[1], constants, box.dead_time.at(1.0))
        made.append((seconds, point))
    value, point = max(made, key=lambda pair: pair[0])
    return FaultCase(value, point, box.text(point))


__all__ = ["FaultCase", "LimiterCase", "coldest_rest", "limiter_case", "settles_at", "time_to_reach", "warm_up"]

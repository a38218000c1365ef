"""Where the value goes with a stuck output, and after something has cut it: the courses behind ``fault_cases``' worst numbers."""

from collections.abc import Sequence
from math import exp, inf

from specgen.process.box import Box, Point
from specgen.process.fault_cases import Output
from specgen.process.faults import time_at_speed, time_up
from specgen.process.periodic import modes_of


def stuck_course(box: Box, point: Point, output: Output, start: float, times: Sequence[float]) -> tuple[float, ...]:
    """Return the real value with the output stuck, element already hot (or already cold).

    Parameters
    ----------
    box : Box
        The loop's box.
    point : Point
        The case.
    output : "on" or "off"
        How the output sticks.
    start : float
        Real value at time 0.
    times : sequence of float
        Times asked for [s].

    Notes
    -----
    First order from ``start``, as ``fault_cases.time_to_reach`` takes it; at a steady speed where nothing settles.
    """
    to, tau = _driven(box, point, output)
    if tau == inf:
        return tuple(start + to * time for time in times)
    return tuple(to - (to - start) * exp(-time / tau) for time in times)


def stuck_time(box: Box, point: Point, output: Output, start: float, target: float) -> float:
    """Return when the value of a case passes a target [s]; infinite where it does not."""
    to, tau = _driven(box, point, output)
    way = 1.0 if target >= start else -1.0
    if tau == inf:
        return time_at_speed(way * start, way * target, way * to)
    return time_up(way * start, way * to, way * target, tau)


def cut_course(box: Box, point: Point, cut: float, times: Sequence[float]) -> tuple[float, ...]:
    """Return the real value after full output was cut at the value ``cut``: dead time at full output, then the second lag empties.

    Parameters
    ----------
    box : Box
        The loop's box.
    point : Point
        The case, its dead time and lag at the longest.
    cut : float
        Real value when the output was cut.
    times : sequence of float
        From the cut on [s].

    Notes
    -----
    The course whose highest value is ``faults.coasts_to``.
    """
    (on, tau), (off, _) = _driven(box, point, "on"), _driven(box, point, "off")
    theta, lag = box.dead_time.at(point.dead_time), box.lag.at(point.lag)
    early = stuck_course(box, point, "on", cut, [min(time, theta) for time in times])
    (top,) = stuck_course(box, point, "on", cut, (theta,))
    found = []
    for value, time in zip(early, times, strict=True):
        t = time - theta
        if t <= 0:
            found.append(value)
        elif tau == inf:
            stored = lag * (on - off) * (1 - exp(-t / lag)) if lag > 0 else 0.0
            found.append(top + off * t + stored)
        elif lag > 0:
            filled = sum(c * exp(-t / k) for c, k in modes_of((tau, lag)))
            found.append(off + (on - off) * filled - (on - top) * exp(-t / tau))
        else:
            found.append(off + (top - off) * exp(-t / tau))
    return tuple(found)


def _driven(box: Box, point: Point, output: Output) -> tuple[float, float]:
    """Return where a held output takes the real value, and its time constant [s]; a speed with an infinite one where nothing settles."""
    (load, strength), loss = box.sides_at(point), box.loss.at(point.loss)
    capacity = box.capacity.at(point.capacity)
    push = strength - load if output == "on" else -load
    if loss <= 0 or box.ambient is None:
        return box.sign * push / capacity, inf
    return box.setpoint.at(point.load) + box.sign * push / loss, capacity / loss

"""Where an output that is stuck on takes the value, and where the limiter stops it: the course behind the sheet's figures."""

from dataclasses import dataclass
from math import isfinite, log

from specgen.design.types import DecidedLoop
from specgen.process.box import Box, Point, Unmodelled
from specgen.process.fault_cases import limiter_case, settles_at, time_to_reach
from specgen.process.stuck_course import cut_course, stuck_course, stuck_time
from specgen.sizing.candidate import Unsized
from specgen.sizing.normal_running import normal_running

POINTS = 48
AFTER = 0.35  # of the time drawn before, for what follows the danger or the limiter
SETTLED = 0.98  # of the way: a value that stays short of the danger is drawn to here


@dataclass(frozen=True, slots=True)
class Course:
    """Times [s] from when the output sticks, and real values."""

    times: tuple[float, ...]
    values: tuple[float, ...]
    case: str


@dataclass(frozen=True, slots=True)
class Stopped:
    """What the limiter does: set value, true value when it acts and farthest that follows, their times [s], and the course from there."""

    set: float
    acts_at: float
    acts_time: float
    peaks_at: float
    peak_time: float
    before: Course
    after: Course


@dataclass(frozen=True, slots=True)
class StuckOn:
    """An output stuck on, from the worst peak of normal running.

    ``danger`` is the declared one on that side with the time to it, None where it is not declared or not reached; ``settles`` is the
    extreme the value settles at, None where it does not. ``outward`` is +1 where the value rises.
    """

    start: float
    outward: int
    course: Course
    danger: float | None
    danger_time: float | None
    settles: float | None
    stopped: Stopped | None


def stuck_on(decided: DecidedLoop) -> StuckOn | Unsized:
    """Return the course of an output stuck on; Unsized with the reason where there is none to draw."""
    case = decided.decision.chosen.case
    box, faults = case.box, case.faults
    if isinstance(box, Unmodelled) or isinstance(faults, Unsized):
        return Unsized(box.because if isinstance(box, Unmodelled) else "the faults are not computed")
    up = box.sign
    running = normal_running(case.loop, case.settings)
    start = running.high if up > 0 else running.low
    declared = case.loop.limits.danger_high if up > 0 else case.loop.limits.danger_low
    danger = None if declared is None else float(declared)
    if danger is None and (decided.limiter is None or decided.limiter.set is None):
        return Unsized("no danger is declared on the side that full output moves towards")
    if danger is not None and up * (danger - start) <= 0:
        return Unsized("normal running reaches the danger already")
    settles = faults.on.settles_at
    point, end = _farthest(box, start, danger, settles)
    if end <= 0:
        return Unsized("full output does not carry the value beyond normal running")
    stopped = _stopped(decided, box, start, end)
    times = _spread(end * (1 + AFTER))
    if faults.on.time_to_danger is not None:
        times = tuple(sorted({*times, faults.on.time_to_danger}))
    course = Course(times, stuck_course(box, point, "on", start, times), box.text(point))
    return StuckOn(start, up, course, danger, faults.on.time_to_danger, settles, stopped)


def _farthest(box: Box, start: float, danger: float | None, settles: float | None) -> tuple[Point, float]:
    """Return the case that is drawn and the time up to the danger, or until it is nearly settled [s]."""
    if danger is not None:
        found = time_to_reach(box, "on", start, danger)
        if isfinite(found.value):
            return found.point, found.value
    extreme = settles_at(box, "on", "highest" if box.sign > 0 else "lowest")
    if extreme is None or settles is None:
        # nothing settles and no danger is declared: an arbitrary stretch would say nothing
        return Point(), 0.0
    loss = box.loss.at(extreme.point.loss)
    tau = box.capacity.at(extreme.point.capacity) / loss
    return extreme.point, 0.0 if box.sign * (settles - start) <= 0 else -log(1 - SETTLED) * tau


def _stopped(decided: DecidedLoop, box: Box, start: float, end: float) -> Stopped | None:
    limiter = decided.limiter
    if limiter is None or limiter.set is None or limiter.acts_at is None or limiter.peaks_at is None:
        return None
    up = box.sign
    found = limiter_case(box, limiter.set, limiter.sensor_lag)
    if up * (limiter.acts_at - start) <= 0:
        return None
    acts = stuck_time(box, found.point, "on", start, limiter.acts_at)
    if not isfinite(acts):
        return None
    before = _spread(acts)
    after = _spread(max(AFTER * max(end, acts), 3 * box.dead_time.at(1.0) + 2 * box.lag.at(1.0)))
    course = cut_course(box, found.point, limiter.acts_at, after)
    top = max(range(len(after)), key=lambda index: up * course[index])
    at = _peak_time(box, found.point, limiter.acts_at, after[max(0, top - 1)], after[min(len(after) - 1, top + 1)])
    # the farthest value itself is on the course
    after = tuple(sorted({*after, at}))
    course = cut_course(box, found.point, limiter.acts_at, after)
    return Stopped(
        limiter.set, limiter.acts_at, acts, limiter.peaks_at, acts + at,
        Course(before, stuck_course(box, found.point, "on", start, before), found.text),
        Course(tuple(acts + time for time in after), course, found.text),
    )  # fmt: skip


def _peak_time(box: Box, point: Point, cut: float, low: float, high: float) -> float:
    """Return when the value is farthest after the cut, by thirds between two times around it."""
    theta = box.dead_time.at(point.dead_time)
    if low <= theta <= high and box.lag.at(point.lag) <= 0:
        return theta
    for _ in range(60):
        a, b = low + (high - low) / 3, high - (high - low) / 3
        at_a, at_b = cut_course(box, point, cut, (a, b))
        low, high = (a, high) if box.sign * at_a < box.sign * at_b else (low, b)
    return (low + high) / 2


def _spread(end: float) -> tuple[float, ...]:
    return tuple(end * index / POINTS for index in range(POINTS + 1))

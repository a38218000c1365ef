"""The whole course of a start from rest, for drawing: full output, then the tuned loop, or two-position control."""

from collections.abc import Sequence
from dataclasses import dataclass

from specgen.process.closed_loop import advanced, weighed
from specgen.process.held_loop import averaged, hold_steps, stepped
from specgen.process.loop_dynamics import Dynamics, Modes, modes_of
from specgen.process.start_up import StartUp
from specgen.process.tuning import Settings

RISING = 60  # points while the output stays at its end
A_CYCLE = 48  # steps of a two-position cycle; a crossing is then halved down to
HALVINGS = 40
MOST_STEPS = 20_000

Level = tuple[float, float]


@dataclass(frozen=True, slots=True)
class StartCourse:
    """A start from rest.

    Parameters
    ----------
    times : tuple of float
        From switching on [s].
    values : tuple of float
        True value from the setpoint in the sense of more output [value unit].
    outputs : tuple of (float, float)
        When the output changes [s], and to what [1].
    """

    times: tuple[float, ...]
    values: tuple[float, ...]
    outputs: tuple[Level, ...]


def rising(plant: Dynamics, start: float, load: float, times: Sequence[float]) -> tuple[float, ...]:
    """Return the true value with the output on from time 0.

    Parameters
    ----------
    plant : Dynamics
        The plant, at rest at ``start`` with its element without output.
    start : float
        Distance from the setpoint at time 0 [value unit].
    load : float
        Output that would hold the setpoint [1].
    times : sequence of float
        Times asked for [s].

    Returns
    -------
    tuple of float
        Distances from the setpoint [value unit].

    References
    ----------
    Exact modes of the plant; compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_start_course.py``.

    Examples
    --------
    >>> [round(v, 3) for v in rising(Dynamics(slope=0.5, tau=float("inf"), theta=2), start=-10, load=0.2, times=(0, 2, 12))]
    [-10.0, -10.2, -6.2]
    """
    modes = modes_of(plant)
    first = modes.start(start)
    turned, _ = advanced(modes, first, 0.0, -load, plant.theta)
    found = []
    for time in times:
        early = time <= plant.theta
        states, _ = advanced(modes, first, 0.0, -load, time) if early else advanced(modes, turned, 1.0, -load, time - plant.theta)
        found.append(weighed(modes.true, states))
    return tuple(found)


def tuned_course(plant: Dynamics, settings: Settings, rise: float, duty: float, cycle_time: float, run: StartUp) -> StartCourse:
    """Put the full output of a simulated start before its run.

    Parameters
    ----------
    plant, settings, rise, duty, cycle_time
        As :func:`specgen.process.start_up.start_up` was asked with.
    run : StartUp
        What it answered.

    Returns
    -------
    StartCourse
        Of a cycle that was simulated by its mean output, the mean.
    """
    steady = averaged(plant, settings, cycle_time, duty)
    seen = plant
    if steady is not None:
        step, delay = hold_steps(steady, settings)
        seen = stepped(steady, step, delay)
    full = run.full_output
    early = sorted({full * index / RISING for index in range(RISING)} | {seen.theta}) if full > 0 else []
    early = [time for time in early if time < full]
    times = (*early, *run.run.times)
    values = (*rising(seen, -rise, duty, early), *run.run.values)
    span = (run.run.times[-1] - full) / len(run.run.outputs) if run.run.outputs else 0.0
    levels: list[Level] = [(0.0, 1.0)] if full > 0 else []
    for index, level in enumerate(run.run.outputs):
        if not levels or levels[-1][1] != level:
            levels.append((full + index * span, level))
    return StartCourse(times, values, tuple(levels))


def switched_course(
    plant: Dynamics, start: float, load: float, points: tuple[float, float], least: tuple[float, float], cycles: int
) -> StartCourse | None:
    """Return a start under two-position control, with a number of cycles after the first rise.

    Parameters
    ----------
    plant : Dynamics
        The plant, at rest at ``start``.
    start : float
        Distance from the setpoint at time 0, below the point where the output goes on [value unit].
    load : float
        Output that would hold the setpoint, between 0 and 1 [1].
    points : tuple of float
        Reading at which the output goes off, and on, from the setpoint [value unit].
    least : tuple of float
        Least run and least rest [s].
    cycles : int
        Cycles followed after the first time the output goes off.

    Returns
    -------
    StartCourse or None
        None where full or no output cannot pass its switch point.

    Notes
    -----
    Exact between the output's edges; the crossing of a switch point is halved down from steps of a fraction of the cycle.

    References
    ----------
    Its cycles settle to :meth:`specgen.process.plant.ProcessModel.limit_cycle` in ``tests/process/test_start_course.py``.
    """
    if not 0 < load < 1 or plant.gain * (1 - load) <= points[0] or -plant.gain * load >= points[1]:
        return None
    relay = _Relay(plant, load, points, least)
    relay.begin(start)
    for _ in range(1 + 2 * cycles):
        if not relay.follow_phase():
            break
    return relay.course()


class _Relay:
    """A two-position loop on its way, phase by phase."""

    def __init__(self, plant: Dynamics, load: float, points: tuple[float, float], least: tuple[float, float]) -> None:
        self._plant, self._load, self._points, self._least = plant, load, points, least
        self._modes: Modes = modes_of(plant)
        self._now, self._on, self._arriving = 0.0, True, 0.0
        self._states: list[float] = []
        self._times: list[float] = []
        self._values: list[float] = []
        self._outputs: list[Level] = []
        self._step = 0.0

    def begin(self, start: float) -> None:
        """Rest at a distance from the setpoint, and switch on."""
        self._states = self._modes.start(start)
        self._outputs.append((0.0, 1.0))
        self._keep()
        # the first rise: its length with a plain lag sets the steps
        speed = self._plant.slope * (1 - self._load)
        self._step = max(-start / speed, self._plant.theta) / RISING

    def course(self) -> StartCourse:
        """Return what was followed."""
        return StartCourse(tuple(self._times), tuple(self._values), tuple(self._outputs))

    def follow_phase(self) -> bool:
        """Follow one state of the output until the reading passes its point; tell whether it does."""
        began = self._now
        arrives = began + self._plant.theta
        earliest = began + self._least[0 if self._on else 1]
        before = 0.0 if self._on else 1.0
        for _ in range(MOST_STEPS):
            level = before if self._now < arrives else (1.0 if self._on else 0.0)
            span = min([self._step, *(edge - self._now for edge in (arrives, earliest) if edge > self._now)])
            ahead, _ = advanced(self._modes, self._states, level, -self._load, span)
            if self._now + span >= earliest and self._past(ahead):
                self._cross(level, span, earliest)
                self._turn(began)
                return True
            self._states, self._now = ahead, self._now + span
            self._keep()
        return False

    def _past(self, states: list[float]) -> bool:
        reading = weighed(self._modes.measured, states)
        return reading >= self._points[0] if self._on else reading <= self._points[1]

    def _cross(self, level: float, span: float, earliest: float) -> None:
        """Move to where the reading passes the point, not before the least time has run."""
        low, high = max(0.0, min(earliest - self._now, span)), span
        if self._past(advanced(self._modes, self._states, level, -self._load, low)[0]):
            high = low
        for _ in range(HALVINGS):
            if high - low <= 0:
                break
            middle = (low + high) / 2
            there = self._past(advanced(self._modes, self._states, level, -self._load, middle)[0])
            low, high = (low, middle) if there else (middle, high)
        self._states, _ = advanced(self._modes, self._states, level, -self._load, high)
        self._now += high
        self._keep()

    def _turn(self, began: float) -> None:
        self._on = not self._on
        self._outputs.append((self._now, 1.0 if self._on else 0.0))
        if not self._on and began == 0.0:
            # from now on it is cycles that are followed
            fall = self._plant.slope * self._load
            height = self._points[0] - self._points[1]
            self._step = (height / fall + height / (self._plant.slope * (1 - self._load)) + 2 * self._plant.theta) / A_CYCLE

    def _keep(self) -> None:
        self._times.append(self._now)
        self._values.append(weighed(self._modes.true, self._states))

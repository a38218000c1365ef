"""States and results of a simulated closed loop: at rest, in its steady cycle, at the end of full output.

All values are distances from the setpoint, counted in the direction of more output. The load is counted as the output that
holds it: a loop that holds its setpoint at duty ``x`` has the load ``-x``.
"""

from collections.abc import Callable
from dataclasses import dataclass
from math import log

from specgen.process.loop_dynamics import Dynamics, Modes, grown, modes_of
from specgen.process.tuning import Settings

Edge = tuple[float, float]


@dataclass(frozen=True, slots=True)
class LoopState:
    """A loop at the instant of a latch.

    Parameters
    ----------
    time : float
        Time of the latch [s].
    modes : tuple of float
        State of the plant's modes [value unit].
    integral : float
        The controller's integral part, as output [1].
    level : float
        Output that reaches the plant now, past the dead time [1].
    edges : tuple of (float, float)
        Times at which the output changes at the plant, and to what, still under way [s, 1].
    last_outside : float
        Time at which the value was last outside the band [s].
    """

    time: float
    modes: tuple[float, ...]
    integral: float
    level: float
    edges: tuple[Edge, ...]
    last_outside: float = 0.0


def weighed(weights: tuple[float, ...], states: list[float] | tuple[float, ...]) -> float:
    """Return the sum of the modes as ``weights`` show them."""
    total = 0.0
    for weight, state in zip(weights, states, strict=True):
        total += weight * state
    return total


def advanced(modes: Modes, states: list[float], level: float, load: float, span: float) -> tuple[list[float], float]:
    """Carry the modes on under a constant output and load, exactly.

    Parameters
    ----------
    modes : Modes
        The plant's modes.
    states : list of float
        Their state at the start [value unit].
    level, load : float
        Output at the plant, and load as output [1].
    span : float
        Time to pass [s].

    Returns
    -------
    list of float
        State at the end.
    float
        Integral of the measurement over the span [value unit s].

    Examples
    --------
    >>> body = modes_of(Dynamics(slope=0.5, tau=float("inf"), theta=0))
    >>> advanced(body, [0.0], level=1.0, load=0.0, span=4.0)
    ([2.0], 4.0)
    """
    after, integral = [], 0.0
    for rate, enters, loads, shows, state in zip(modes.rate, modes.output, modes.load, modes.measured, states, strict=True):
        kept, answer, gathered = grown(rate, span)
        drive = enters * level + loads * load
        after.append(kept * state + answer * drive)
        integral += shows * (answer * state + gathered * drive)
    return after, integral


def measured_slope(modes: Modes, states: list[float], level: float, load: float) -> float:
    """Return the measurement's rate of change [value unit/s]."""
    return sum(
        shows * (enters * level + loads * load - rate * state)
        for rate, enters, loads, shows, state in zip(modes.rate, modes.output, modes.load, modes.measured, states, strict=True)
    )


def steady_cycle(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> LoopState:
    """Settled cycle of a loop that holds its setpoint at ``duty``, at the instant of a latch.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    cycle_time : float
        Cycle time T [s].
    duty : float
        Duty that holds the setpoint, 0 to 1 [1].

    Returns
    -------
    LoopState
        The state that repeats each cycle; the measurement's mean is the setpoint, as integral action demands.

    References
    ----------
    Each mode's periodic answer to the delayed pulse train; an integrator's constant from the mean of the measurement.
    """
    modes = modes_of(plant)
    train = _pulse_train(plant.theta, cycle_time, duty)
    before = [to for time, to, _ in train if time <= 0]
    level = before[-1] if before else float(duty >= 1)
    # the pulse of this very latch is the simulation's to send, but the cycle that repeats contains it
    edges = tuple((time, to) for time, to, latch in train if time > 0 and latch < 0)
    repeating = tuple((time, to) for time, to, _ in train if 0 < time < cycle_time)
    rounds = [0.0] * len(modes.rate)
    from_rest, _ = _one_cycle(modes, rounds, level, repeating, -duty, cycle_time)
    states = [end / (1 - grown(rate, cycle_time)[0]) if rate > 0 else 0.0 for rate, end in zip(modes.rate, from_rest, strict=True)]
    if plant.is_integrating:
        _, gathered = _one_cycle(modes, states, level, repeating, -duty, cycle_time)
        states[0] -= gathered / cycle_time / modes.measured[0]
    slope = measured_slope(modes, states, level, -duty)
    seen = weighed(modes.measured, states) + settings.derivative_time * slope
    return LoopState(0.0, tuple(states), duty + settings.gain * seen, level, edges)


def _pulse_train(theta: float, cycle_time: float, duty: float) -> list[tuple[float, float, int]]:
    """Return the edges of past and present pulses at the plant: time, level, and the latch that sent them (0 is the present)."""
    train = []
    for latch in range(-int(theta // cycle_time) - 2, 1):
        arrives = latch * cycle_time + theta
        train.append((arrives, 1.0 if duty > 0 else 0.0, latch))
        if 0 < duty < 1:
            train.append((arrives + duty * cycle_time, 0.0, latch))
    return train


def _one_cycle(
    modes: Modes, states: list[float], level: float, edges: tuple[Edge, ...], load: float, cycle_time: float
) -> tuple[list[float], float]:
    """Carry the modes through one cycle of a pulse train that repeats."""
    now, total = 0.0, 0.0
    for time, to in (*edges, (cycle_time, level)):
        states, gathered = advanced(modes, states, level, load, time - now)
        now, level, total = time, to, total + gathered
    return states, total


def full_output(plant: Dynamics, settings: Settings, step: float, duty: float, rise: float, below: float) -> LoopState:
    """Start from rest at full output up to the first latch that asks for less.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    step : float
        Time between latches [s].
    duty : float
        Output that holds the setpoint, below 1 [1].
    rise : float
        Distance from rest to the setpoint, above zero [value unit].
    below : float
        Lower edge of the band, as a distance below the setpoint [value unit].

    Returns
    -------
    LoopState
        At the first latch below full output. While the output is held at its end the integral does not grow.

    Raises
    ------
    ValueError
        The duty is 1 or more: full output does not reach the setpoint.
    """
    if duty >= 1:
        raise ValueError(f"full output does not reach the setpoint: holding it takes {duty:.3g} of it")
    modes = modes_of(plant)
    start = modes.start(-rise)

    def at(time: float) -> list[float]:
        early = min(time, plant.theta)
        states, _ = advanced(modes, start, 0.0, -duty, early)
        return advanced(modes, states, 1.0, -duty, time - early)[0] if time > early else states

    def is_full(count: int) -> bool:
        states = at(count * step)
        slope = measured_slope(modes, states, float(count * step > plant.theta), -duty)
        return -settings.gain * (weighed(modes.measured, states) + settings.derivative_time * slope) >= 1

    # a value that climbs smoothly leaves full output once: look further and further ahead, then halve
    low, high = -1, 0
    while is_full(high):
        low, high = high, 2 * high + 1
    while high - low > 1:
        middle = (low + high) // 2
        low, high = (middle, high) if is_full(middle) else (low, middle)
    now = high * step
    states = at(now)
    arrived = now >= plant.theta and high > 0
    edges = () if arrived or high == 0 else ((plant.theta, 1.0),)
    return LoopState(now, tuple(states), 0.0, float(arrived), edges, _last_below(modes, at, now, below))


def _last_below(modes: Modes, at: Callable[[float], list[float]], now: float, below: float) -> float:
    """Return when the rising value passed ``-below``, or ``now`` where it has not yet."""
    if weighed(modes.true, at(now)) < -below:
        return now
    low, high = 0.0, now
    while high - low > 1e-9 * now:
        middle = (low + high) / 2
        low, high = (middle, high) if weighed(modes.true, at(middle)) < -below else (low, middle)
    return high


def turn(modes: Modes, states: list[float], level: float, load: float, span: float) -> tuple[float, float] | None:
    """Return when and at what value the true value turns within a span, None where it does not.

    Parameters
    ----------
    modes : Modes
        The plant's modes.
    states : list of float
        Their state at the start [value unit].
    level, load : float
        Output at the plant, and load as output [1].
    span : float
        Length of the span [s].

    Returns
    -------
    tuple of float or None
        Time from the start of the span [s] and the extreme value [value unit].

    Notes
    -----
    Body and second lag make up the true value; the slope of each decays by itself, so that
    ``y'(t) = a e^(-p0 t) + b e^(-p1 t)`` has its one zero at ``ln(-b/a)/(p1 - p0)``. Without a second lag it has none.
    """
    if modes.true[1:2] in ((), (0.0,)):
        return None
    body, lag = (
        modes.true[index] * (modes.output[index] * level + modes.load[index] * load - modes.rate[index] * states[index]) for index in (0, 1)
    )
    if body * lag >= 0:
        return None
    time = log(-lag / body) / (modes.rate[1] - modes.rate[0])
    if not 0 < time < span:
        return None
    moved = body * grown(modes.rate[0], time)[1] + lag * grown(modes.rate[1], time)[1]
    return time, weighed(modes.true, states) + moved

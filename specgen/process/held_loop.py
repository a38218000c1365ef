"""A limited loop with a continuous output in time, in fine steps that are exact for the plant."""

from collections import deque
from dataclasses import replace

from specgen.process.closed_loop import LoopState, measured_slope, turn, weighed
from specgen.process.loop_dynamics import Dynamics, grown, modes_of
from specgen.process.loop_run import Band, Run, Watch
from specgen.process.tuning import Settings, reduce_plant

STEPS = 20
"""Steps that the effective delay is cut into."""

SHORT = 0.15
"""A cycle under this share of the effective delay is simulated by its mean output, with its delay; its ripple is added."""


def own_delay(plant: Dynamics, settings: Settings) -> float:
    """Return the effective delay of the plant alone, for the structure of the settings [s]."""
    return reduce_plant(plant.tau, plant.theta, (plant.lag, plant.sensor_lag), structure=settings.structure).delay.total


def averaged(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> Dynamics | None:
    """Return the plant to simulate with a continuous output, None where the cycle must be simulated pulse by pulse.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    cycle_time : float
        Cycle time; zero for a continuous output [s].
    duty : float
        Duty that holds the setpoint [1].

    Returns
    -------
    Dynamics or None
        The plant, with the delay of a short cycle in its dead time.
    """
    if cycle_time >= SHORT * own_delay(plant, settings) and cycle_time > 0:
        return None
    return replace(plant, theta=plant.theta + duty * cycle_time)


def hold_steps(plant: Dynamics, settings: Settings) -> tuple[float, int]:
    """Choose the step, and the number of steps that the dead time takes.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.

    Returns
    -------
    float
        Step [s].
    int
        Steps between an output and its arrival.

    Raises
    ------
    ValueError
        The plant has neither dead time nor a lag.

    Notes
    -----
    An output held for a step arrives half a step late on average. The step is chosen so that this half and the whole steps make
    up the dead time exactly; only a dead time under a quarter of the step is rounded up, to half a step.

    Examples
    --------
    >>> hold_steps(Dynamics(slope=0.1, tau=100, theta=30), Settings(gain=0.1, integral_time=100))
    (1.4634146341463414, 20)
    """
    scale = own_delay(plant, settings)
    if scale <= 0:
        raise ValueError("the plant has neither dead time nor a lag")
    step = scale / STEPS
    if plant.theta <= step / 2:
        return (2 * plant.theta if plant.theta > step / 4 else step), 0
    whole = max(1, int(plant.theta / step))
    return plant.theta / (whole + 0.5), whole


def steady_hold(plant: Dynamics, duty: float) -> LoopState:
    """Rest of a loop that holds its setpoint with a continuous output.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    duty : float
        Output that holds the setpoint [1].

    Returns
    -------
    LoopState
        The state that does not move.
    """
    modes = modes_of(plant)
    states = [
        0.0 if index == 0 else (enters - loads) * duty / rate
        for index, (rate, enters, loads) in enumerate(zip(modes.rate, modes.output, modes.load, strict=True))
    ]
    states[0] = -weighed(modes.measured, states) / modes.measured[0]
    return LoopState(0.0, tuple(states), duty, duty, ())


def stepped(plant: Dynamics, step: float, delay: int) -> Dynamics:
    """Return the plant with the dead time that the whole steps make up; the hold adds the other half step."""
    return replace(plant, theta=step * delay)


def simulate_held(
    plant: Dynamics,
    settings: Settings,
    start: LoopState,
    load: float,
    horizon: float,
    band: Band | None = None,
) -> Run:
    """Run a loop with a continuous output, limits and anti-windup.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    start : LoopState
        State at the start, made with the steps of :func:`hold_steps`.
    load : float
        Load from then on, as the output that would hold it [1].
    horizon : float
        Time to run for [s].
    band : Band or None
        Band whose reaching is timed; with one, the run ends early once value and output rest.

    Returns
    -------
    Run
        Extremes, time to the band and the course.

    Raises
    ------
    ValueError
        The plant has neither dead time nor a lag.

    Notes
    -----
    As :func:`specgen.process.latched_loop.simulate_latched`, but the output is a level held for a step instead of a pulse.

    References
    ----------
    Compared with a hundredfold finer step in ``tests/process/test_held_loop.py``.
    """
    step, delay = hold_steps(plant, settings)
    modes = modes_of(plant)
    grows = [grown(rate, step) for rate in modes.rate]
    fixed = list(zip(grows, modes.output, [-loads * load for loads in modes.load], modes.measured, strict=True))
    gain, reset, derivative = settings.gain, settings.gain / settings.integral_time, settings.derivative_time
    watch = Watch(band or Band(), start.last_outside)
    states, integral, now = list(start.modes), start.integral, start.time
    pending = deque(_under_way(start, step, delay))
    level = start.level
    quiet = 0.0
    watch.keep(now, weighed(modes.true, states))
    turns = modes.true[1:2] not in ((), (0.0,))
    for _ in range(int(horizon / step) + 1):
        reading = weighed(modes.measured, states)
        if derivative > 0:
            reading += derivative * measured_slope(modes, states, level, -load)
        wanted = integral - gain * reading
        output = min(max(wanted, 0.0), 1.0)
        pending.append(output)
        level = pending.popleft()
        turned = turn(modes, states, level, -load, step) if turns else None
        if turned is not None:
            watch.see(now + turned[0], turned[1])
        gathered = 0.0
        after = []
        for ((kept, answer, later), enters, loads, shows), state in zip(fixed, states, strict=True):
            drive = enters * level + loads
            after.append(kept * state + answer * drive)
            gathered += shows * (answer * state + later * drive)
        states = after
        now += step
        watch.outputs.append(output)
        watch.keep(now, weighed(modes.true, states))
        if not ((wanted > 1 and gathered < 0) or (wanted < 0 and gathered > 0)):
            integral -= reset * gathered
        if band is not None:
            quiet = quiet + step if band.holds(gathered / step, output - load, gain) else 0.0
            if quiet > 2 * plant.spread + step:
                break
    return watch.run()


def _under_way(start: LoopState, step: float, delay: int) -> list[float]:
    """Return the outputs that are still to arrive, one a step."""
    found, level = [], start.level
    edges = deque(start.edges)
    for index in range(delay):
        while edges and edges[0][0] <= start.time + (index + 0.5) * step:
            level = edges.popleft()[1]
        found.append(level)
    return found

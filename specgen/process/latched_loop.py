"""A limited, latched, time-proportioned loop in time: exact from edge to edge, cycle by cycle."""

from collections import deque

from specgen.process.closed_loop import LoopState, advanced, measured_slope, steady_cycle, turn, weighed
from specgen.process.loop_dynamics import Dynamics, modes_of
from specgen.process.loop_run import Band, Run, Watch
from specgen.process.tuning import Settings


def simulate_latched(
    plant: Dynamics,
    settings: Settings,
    cycle_time: float,
    start: LoopState,
    load: float,
    horizon: float,
    band: Band | None = None,
    load_seen: float | None = None,
) -> Run:
    """Run a loop with latched duty, limits and anti-windup from a latch on.

    Parameters
    ----------
    plant : Dynamics
        The plant.
    settings : Settings
        Settings in the ideal form.
    cycle_time : float
        Cycle time T, above zero [s].
    start : LoopState
        State at the first latch.
    load : float
        Load from then on, as the duty that would hold it [1].
    horizon : float
        Time to run for; the run ends at a latch [s].
    band : Band or None
        Band whose reaching is timed; with one, the run ends early once value and output rest.
    load_seen : float or None
        Load up to the first latch, where it changes just after it: derivative action does not see the change yet [1].

    Returns
    -------
    Run
        Extremes, time to the band and the course.

    Raises
    ------
    ValueError
        A cycle time that is not above zero.

    Notes
    -----
    At each latch ``v = Kc (e - Td m') + I`` is limited to 0..1: the duty of the cycle. ``I`` gathers ``Kc/Ti`` times the integral
    of the error over the cycle, but not where ``v`` lies beyond a limit and ``I`` would move further that way (conditional
    integration). Derivative action works on the measurement. Between edges the plant is carried on by its modes, without
    any time step.

    References
    ----------
    Compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_latched_loop.py``.
    """
    if cycle_time <= 0:
        raise ValueError("the cycle time is above zero")
    modes = modes_of(plant)
    watch = Watch(band or Band(), start.last_outside)
    states, level, integral = list(start.modes), start.level, start.integral
    edges = deque(start.edges)
    now, finish = start.time, start.time + horizon
    quiet, seen = 0.0, load if load_seen is None else load_seen
    watch.keep(now, weighed(modes.true, states))
    while now < finish:
        reading = weighed(modes.measured, states)
        if settings.derivative_time > 0:
            reading += settings.derivative_time * measured_slope(modes, states, level, -seen)
        seen = load
        wanted = integral - settings.gain * reading
        duty = min(max(wanted, 0.0), 1.0)
        watch.outputs.append(duty)
        _add_pulse(edges, now + plant.theta, duty, cycle_time)
        end = now + cycle_time
        gathered = 0.0
        while now < end:
            span = min(edges[0][0] if edges else end, end) - now
            if span > 0:
                turned = turn(modes, states, level, -load, span)
                if turned is not None:
                    watch.see(now + turned[0], turned[1])
                states, part = advanced(modes, states, level, -load, span)
                gathered += part
            # the cycle ends exactly at its end, whatever the sum of its spans rounds to
            now = end if not edges or edges[0][0] >= end else edges[0][0]
            while edges and edges[0][0] <= now:
                level = edges.popleft()[1]
            watch.keep(now, weighed(modes.true, states))
        step = -settings.gain / settings.integral_time * gathered
        if not ((wanted > 1 and step > 0) or (wanted < 0 and step < 0)):
            integral += step
        if band is not None:
            quiet = quiet + cycle_time if band.holds(gathered / cycle_time, duty - load, settings.gain) else 0.0
            if quiet > 2 * plant.spread + 2 * cycle_time:
                break
    return watch.run()


def excursions(plant: Dynamics, settings: Settings, cycle_time: float, duty: float) -> tuple[float, float]:
    """Find how far the switching takes the true value from its mean in the steady cycle.

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
    tuple of float
        Distance below and above, zero or more [value unit].
    """
    if cycle_time <= 0:
        return 0.0, 0.0
    run = simulate_latched(plant, settings, cycle_time, steady_cycle(plant, settings, cycle_time, duty), duty, cycle_time)
    return -run.lowest, run.highest


def _add_pulse(edges: deque[tuple[float, float]], arrives: float, duty: float, cycle_time: float) -> None:
    """Put a cycle's pulse on its way to the plant."""
    edges.append((arrives, 1.0 if duty > 0 else 0.0))
    if 0 < duty < 1:
        edges.append((arrives + duty * cycle_time, 0.0))

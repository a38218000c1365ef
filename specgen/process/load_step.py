"""What a sudden change of load does to a tuned loop."""

from dataclasses import dataclass, replace
from math import inf

from specgen.process.closed_loop import steady_cycle
from specgen.process.held_loop import averaged, own_delay, simulate_held, steady_hold
from specgen.process.latched_loop import excursions, simulate_latched
from specgen.process.loop_dynamics import Dynamics
from specgen.process.tuning import Settings

FOLLOWED = 12.0
"""Effective delays that a load step is followed for, twice as long each time the value was still leaving at the end."""

LOOKS = 4
"""Times that the length is doubled at most."""


@dataclass(frozen=True, slots=True)
class LoadStep:
    """Answer of a loop to a sudden change of load.

    Parameters
    ----------
    deviation : float
        Largest distance of the true value from the setpoint after the change, on the side it is driven to, the ripple of
        the switching included; ``inf`` where an integrating plant is lost [value unit].
    ripple : float
        Largest distance on that side in the steady cycle before the change [value unit].
    recovers : bool
        Whether the output can hold the new load.
    """

    deviation: float
    ripple: float
    recovers: bool


def first_estimate(slope: float, theta_e: float, change: float) -> float:
    """Estimate the deviation after a load step of a loop with SIMC settings, before any simulation.

    Parameters
    ----------
    slope : float
        ``K/tau`` or ``k'`` [value unit/s].
    theta_e : float
        Effective delay that the settings were made for [s].
    change : float
        Change of load, as a fraction of full output [1].

    Returns
    -------
    float
        ``1.97 slope theta_e |change|`` [value unit].

    Notes
    -----
    Simulated for a pure dead time and a continuous output: exact to 1 % for an integrating plant; with a time constant an upper
    bound, the factor being 1.93 at ``tau/theta_e`` of 100, 1.63 at 8 and 1.05 at 2. It leaves out the ripple and the
    wait for the next latch; with half of a lag in ``theta_e`` it is up to a tenth low
    where that lag is no longer than the dead time, and further beyond.

    References
    ----------
    Own simulation, repeated in ``tests/process/test_load_step.py``.

    Examples
    --------
    >>> round(first_estimate(0.1, 40, 0.1), 3)
    0.788
    """
    return 1.97 * slope * theta_e * abs(change)


def load_step(plant: Dynamics, settings: Settings, duty: float, change: float, cycle_time: float = 0.0) -> LoadStep:
    """Simulate the largest deviation after a sudden change of load from the steady loop.

    Parameters
    ----------
    plant : Dynamics
        The plant; an actuator's delay counts with its dead time.
    settings : Settings
        Settings in the ideal form.
    duty : float
        Output that holds the load before the change [1].
    change : float
        Change of the load, as a fraction of full output; positive takes the value down [1].
    cycle_time : float
        Cycle time of a time-proportioned output; zero for a continuous one [s].

    Returns
    -------
    LoadStep
        Deviation, ripple before it, and whether the loop can hold the new load.

    Raises
    ------
    ValueError
        A duty outside 0 to 1, or a plant with neither dead time nor a lag.

    Notes
    -----
    The load acts on the body at once, past dead time and second lag. It changes just after a latch, where the
    controller has longest to wait; where the ripple is large another instant can be worse by up to 2 %. Where the new
    load lies beyond the output's range the value settles, or runs, off the setpoint: ``deviation`` is then where it ends.

    References
    ----------
    :func:`specgen.process.latched_loop.simulate_latched`, :func:`specgen.process.held_loop.simulate_held`.

    Examples
    --------
    >>> plant, settings = Dynamics(slope=0.1, tau=1300, theta=25), Settings(gain=0.125, integral_time=320)
    >>> found = load_step(plant, settings, duty=0.4, change=0.1, cycle_time=20)
    >>> round(found.deviation, 2), round(found.ripple, 2), found.recovers
    (0.96, 0.24, True)
    """
    if not 0 <= duty <= 1:
        raise ValueError("the duty lies between 0 and 1")
    after = duty + change
    steady = averaged(plant, settings, cycle_time, duty)
    if steady is not None:
        # a load just after a latch waits half a cycle longer than on average
        steady = replace(steady, theta=steady.theta + cycle_time / 2)
    start = steady_cycle(plant, settings, cycle_time, duty) if steady is None else steady_hold(steady, duty)
    side = -1.0 if change > 0 else 1.0
    horizon = FOLLOWED * (own_delay(plant, settings) + cycle_time)
    below, above = excursions(plant, settings, cycle_time, duty)
    ripple, deviation = below if change > 0 else above, 0.0
    for _ in range(LOOKS):
        if steady is None:
            run = simulate_latched(plant, settings, cycle_time, start, after, horizon, load_seen=duty)
        else:
            run = simulate_held(steady, settings, start, after, horizon)
        deviation = max(side * run.highest, side * run.lowest)
        late = max(side * value for time, value in zip(run.times, run.values, strict=True) if time >= 0.8 * horizon)
        if late < 0.95 * deviation:
            break
        horizon *= 2
    if steady is not None:
        # the mean of a short cycle leaves the ripple out
        deviation += ripple
    missing = max(after - 1, -after, 0.0)
    if missing > 0:
        deviation = inf if plant.is_integrating else max(deviation, plant.gain * missing)
    return LoadStep(deviation, ripple, missing <= 0)

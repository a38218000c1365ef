"""Start-up of a tuned loop from rest: overshoot and time to the band."""

from dataclasses import dataclass

from specgen.process.closed_loop import full_output
from specgen.process.held_loop import averaged, hold_steps, simulate_held, stepped
from specgen.process.latched_loop import excursions, simulate_latched
from specgen.process.loop_dynamics import Dynamics
from specgen.process.loop_run import Band, Run
from specgen.process.tuning import Settings

HORIZON = 6.0
"""Integral times after the end of full output that a start-up is followed for."""

LONGEST = 4000
"""Cycles or steps that a start-up is followed for at most."""


@dataclass(frozen=True, slots=True)
class StartUp:
    """Predicted start-up.

    Parameters
    ----------
    overshoot : float
        Highest true value above the setpoint, zero or more [value unit].
    time_to_band : float
        Time from switching on after which the true value stays in the band; ``inf`` where it does not within the horizon [s].
    full_output : float
        Time for which the output is at its end at first [s].
    run : Run
        The course from there on, for a chart.
    """

    overshoot: float
    time_to_band: float
    full_output: float
    run: Run


def start_up(plant: Dynamics, settings: Settings, rise: float, duty: float, band: Band, cycle_time: float = 0.0) -> StartUp:
    """Simulate a start from rest with limits, anti-windup and the real cycle.

    Parameters
    ----------
    plant : Dynamics
        The plant; an actuator's delay counts with its dead time.
    settings : Settings
        Settings in the ideal form.
    rise : float
        Distance from rest to the setpoint, above zero [value unit].
    duty : float
        Output that holds the setpoint, below 1; for a plant that settles and starts from rest without output, ``rise/K`` [1].
    band : Band
        Band that is to be reached.
    cycle_time : float
        Cycle time of a time-proportioned output; zero for a continuous one [s].

    Returns
    -------
    StartUp
        Overshoot and times.

    Raises
    ------
    ValueError
        Full output does not reach the setpoint, or a rise that is not above zero.

    Notes
    -----
    While the output is at its end the controller does not integrate, so that integral action starts where full output ends.
    Controllers differ here; the sheet lists this as an assumption.

    References
    ----------
    :func:`specgen.process.latched_loop.simulate_latched`, :func:`specgen.process.held_loop.simulate_held`.

    Examples
    --------
    >>> plant, settings = Dynamics(slope=0.1, tau=1300, theta=25), Settings(gain=0.125, integral_time=320)
    >>> found = start_up(plant, settings, rise=52, duty=0.4, band=Band(1.5, 1.5), cycle_time=20)
    >>> round(found.overshoot, 2), found.full_output, found.time_to_band
    (0.2, 580, 825)
    """
    if rise <= 0:
        raise ValueError("a start-up begins below the setpoint")
    steady = averaged(plant, settings, cycle_time, duty)
    if steady is not None:
        step, delay = hold_steps(steady, settings)
        start = full_output(stepped(steady, step, delay), settings, step, duty, rise, band.below)
        horizon = min(HORIZON * settings.integral_time, LONGEST * step)
        run = simulate_held(steady, settings, start, duty, horizon, band)
        ripple = excursions(plant, settings, cycle_time, duty)[1]
    else:
        start = full_output(plant, settings, cycle_time, duty, rise, band.below)
        horizon = min(HORIZON * settings.integral_time + 3 * cycle_time, LONGEST * cycle_time)
        run = simulate_latched(plant, settings, cycle_time, start, duty, horizon, band)
        ripple = 0.0
    return StartUp(max(0.0, run.highest + ripple), run.time_to_band, start.time, run)

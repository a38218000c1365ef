"""Gain margin, phase margin and peak sensitivity of a PI or PID loop, with the exact dead time."""

from dataclasses import replace
from math import ceil, log10, pi, sqrt

import numpy as np

from specgen.process.loop_dynamics import Complexes, Dynamics, Reals
from specgen.process.margin_search import Margins, margins_of
from specgen.process.tuning import Settings

__all__ = ["Margins", "controller_response", "frequencies", "margins", "margins_of", "slowest_frequency"]

POINTS_A_DECADE = 40
DELAY_STEP = 0.1
"""Turn of the dead time's phase between two points of the search [rad]."""
TURNS = 2.0
"""Whole turns of the dead time's phase that are searched; beyond them only the size of the response counts."""
FAR = 40.0
"""Turns that are searched where that size would decide a margin."""


def margins(plant: Dynamics, settings: Settings, extra_delay: float = 0.0) -> Margins:
    """Margins of a PI or PID loop in the ideal form around a plant, with the exact dead time.

    Parameters
    ----------
    plant : Dynamics
        The plant with its own dead time and lags; the worst case has the highest slope.
    settings : Settings
        Settings in the ideal form.
    extra_delay : float
        What cycle and actuator add to the dead time [s].

    Returns
    -------
    Margins
        The smallest margins over all crossovers.

    Notes
    -----
    ``L(s) = Kc (1 + 1/(Ti s) + Td s) slope e^(-theta s)/((s + 1/tau)(1 + lag s)(1 + sensor_lag s))``, without any approximation of
    ``e^(-theta s)``. Two whole turns of its phase are searched, forty where it matters; past them the
    loop is charged as if its phase were at its worst at the largest remaining ``|L|``.

    References
    ----------
    Skogestad, J. Process Control 13 (2003): GM 3.14, PM 61.4 deg, Ms 1.59 (from memory, recomputed in the tests).

    Examples
    --------
    >>> found = margins(Dynamics(slope=0.1, tau=100, theta=25), Settings(gain=0.2, integral_time=100))
    >>> round(found.gain, 2), round(found.phase, 1), round(found.sensitivity, 2)
    (3.14, 61.4, 1.59)
    """
    theta = plant.theta + extra_delay
    charged = replace(plant, theta=theta)

    def response(omega: Reals) -> Complexes:
        s: Complexes = 1j * omega
        return controller_response(settings, s) * charged.response(s)

    slow = slowest_frequency(charged, settings, 0.0)
    corners = [1 / time for time in (plant.tau, plant.lag, plant.sensor_lag, settings.integral_time, settings.derivative_time) if time > 0]
    if theta <= 0:
        grid = _decades(slow, 1000 * max(corners))
        return margins_of(response, grid, starts_turned=plant.is_integrating)
    # derivative action on a plant without further lag keeps a level loop gain for ever
    first_order = plant.lag <= 0 and plant.sensor_lag <= 0
    level = settings.gain * settings.derivative_time * plant.slope if first_order else 0.0
    for turns in (TURNS, FAR):
        grid = frequencies(slow, theta, turns)
        beyond = _decades(float(grid[-1]), 100 * max(*corners, float(grid[-1])))
        tail = max(level, float(np.abs(response(beyond)).max()))
        found = margins_of(response, grid, starts_turned=plant.is_integrating, tail=tail)
        if tail < 1 and found.gain < 1 / tail and found.sensitivity > 1 / (1 - tail):
            break
    return found


def controller_response(settings: Settings, s: Complexes) -> Complexes:
    """Return ``Kc (1 + 1/(Ti s) + Td s)`` at ``s`` [1/value unit]."""
    found: Complexes = settings.gain + settings.gain / settings.integral_time / s
    if settings.derivative_time > 0:
        found = found + settings.gain * settings.derivative_time * s
    return found


def slowest_frequency(plant: Dynamics, settings: Settings, theta: float) -> float:
    """Return a frequency far below every crossover of the loop [rad/s]."""
    bound = 1e-3 / (settings.integral_time + theta + plant.spread)
    level = settings.gain * plant.slope / settings.integral_time
    crossings = [sqrt(level)] if plant.is_integrating else [sqrt(level), level * plant.tau]
    return min(bound, 0.1 * min(crossings))


def frequencies(slow: float, theta: float, turns: float = TURNS) -> Reals:
    """Frequencies for the search: decades first, then even steps of the dead time's phase.

    Parameters
    ----------
    slow : float
        Lowest frequency [rad/s].
    theta : float
        Dead time, above zero [s].
    turns : float
        Whole turns of the dead time's phase that are covered [1].

    Returns
    -------
    ndarray of float
        Rising frequencies [rad/s].
    """
    even_from = max(1.7 / theta, slow)
    count = max(2, ceil((2 * pi * turns - even_from * theta) / DELAY_STEP))
    even = np.linspace(even_from, max(2 * pi * turns / theta, 2 * even_from), count)
    return np.concatenate((_decades(slow, even_from)[:-1], even)) if slow < even_from else even


def _decades(low: float, high: float) -> Reals:
    """Return evenly spaced logarithms of frequency from ``low`` to ``high``."""
    count = max(2, ceil(POINTS_A_DECADE * log10(high / low)))
    return np.geomspace(low, high, count + 1)

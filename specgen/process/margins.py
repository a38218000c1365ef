"""Gain margin, phase margin and peak sensitivity of a loop, exactly, by a search over frequency."""

from collections.abc import Callable
from dataclasses import dataclass, replace
from math import ceil, degrees, inf, isfinite, log10, pi, sqrt

import numpy as np

from specgen.process.loop_dynamics import Complexes, Dynamics, Reals
from specgen.process.tuning import Settings

Response = Callable[[Reals], Complexes]

POINTS_A_DECADE = 40
DELAY_STEP = 0.1
"""Turn of the dead time's phase between two points of the search [rad]."""
TURNS = 2.0
"""Whole turns of the dead time's phase that are searched; beyond them only the size of the response counts."""
MINOR = 0.5
"""Crossings this much smaller than the largest are left out."""
ZOOM = 17
"""Points a bracket is cut into at each of three steps: 16^3 of a grid step, then a straight line or a parabola."""


@dataclass(frozen=True, slots=True)
class Margins:
    """How far a loop is from instability.

    Parameters
    ----------
    gain : float
        Factor by which the loop's gain may grow; ``inf`` where no growth upsets it, 1 or less where it is unstable [1].
    phase : float
        Least phase margin over all gain crossovers; ``inf`` where there is none, negative where it is unstable [deg].
    sensitivity : float
        Peak sensitivity Ms, the largest ``|1/(1 + L)|`` [1].
    stable : bool
        Whether the closed loop is stable.
    gain_reduction : float
        Factor by which the gain may fall; ``inf`` but for loops that need their gain [1].
    phase_crossover, gain_crossover : float
        Frequency at which the gain and the phase margin are found; ``inf`` where there is none [rad/s].
    """

    gain: float
    phase: float
    sensitivity: float
    stable: bool
    gain_reduction: float
    phase_crossover: float
    gain_crossover: float


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
    ``e^(-theta s)``. Two whole turns of its phase are searched; past them the loop is charged as if its phase were at
    its worst at the largest remaining ``|L|``.

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
    grid = frequencies(slow, theta)
    beyond = _decades(float(grid[-1]), 100 * max(*corners, float(grid[-1])))
    # derivative action on a plant without further lag keeps a level loop gain for ever
    first_order = plant.lag <= 0 and plant.sensor_lag <= 0
    level = settings.gain * settings.derivative_time * plant.slope if first_order else 0.0
    tail = max(level, float(np.abs(response(beyond)).max()))
    return margins_of(response, grid, starts_turned=plant.is_integrating, tail=tail)


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


def margins_of(response: Response, grid: Reals, *, starts_turned: bool = False, tail: float = 0.0, closes: bool = False) -> Margins:
    """Margins of any loop whose open-loop poles are stable but for one or two integrators.

    Parameters
    ----------
    response : callable
        Frequency response of the open loop, for an array of frequencies [rad/s].
    grid : ndarray of float
        Rising frequencies that are close enough for each crossing to show as a change of sign [rad/s].
    starts_turned : bool
        Whether the open loop has two integrators, so that its phase starts at -180 degrees.
    tail : float
        Largest ``|L|`` above the grid, where the phase may be anything [1].
    closes : bool
        Whether the grid ends on the real axis, as that of a sampled loop does at ``pi/T``.

    Returns
    -------
    Margins
        The smallest margins over all crossovers.

    Notes
    -----
    Stability by Nyquist: the net number of times the response passes the real axis left of -1 is zero. Crossings are
    bracketed on the grid and refined until they no longer move.
    """
    value = response(grid)
    size = np.abs(value)
    crossings, net = _axis_crossings(response, grid, value)
    if closes and value[-1].real < 0:
        crossings.append((float(grid[-1]), float(value[-1].real)))
        if value[-1].real < -1:
            # half of a passage: the mirrored lower half of the response makes the other
            net += 0.5 if value[-2].imag < 0 else -0.5
    if starts_turned and value[0].imag > 0:
        # begins on the far side of the axis: it has passed left of -1 already
        net += 1
    stable = net == 0 and tail < 1
    gain, at, reduction = _gain_margin(crossings, stable=stable)
    if tail > 0 and 1 / tail < gain:
        gain, at = 1 / tail, inf
    phase, gain_at = inf, inf
    for index in np.flatnonzero((size[:-1] >= 1) != (size[1:] >= 1)):
        omega, point = _zoom(response, float(grid[index]), float(grid[index + 1]), _excess)
        margin = degrees(float(np.angle(-point)))
        margin = abs(margin) if stable else -abs(margin)
        if margin < phase:
            phase, gain_at = margin, omega
    sensitivity = max(_peak(response, grid, value), 1 / (1 - tail) if tail < 1 else inf)
    return Margins(gain, phase, sensitivity, stable, reduction, at, gain_at)


def _axis_crossings(response: Response, grid: Reals, value: Complexes) -> tuple[list[tuple[float, float]], float]:
    """Return frequency and value at each passage of the negative real axis, and the net number left of -1."""
    crossings: list[tuple[float, float]] = []
    net = 0.0
    above = value.imag >= 0
    reach = np.minimum(value.real[:-1], value.real[1:])
    places = np.flatnonzero((above[:-1] != above[1:]) & (reach < 0))
    # the far smaller ones of the dead time's later turns can be no margin: they are not worth refining
    worth = min(MINOR * float(reach[places].min()), 0.0) if places.size else 0.0
    for index in places[reach[places] <= max(worth, -MINOR)]:
        omega, point = _zoom(response, float(grid[index]), float(grid[index + 1]), _imaginary)
        if point.real < 0:
            crossings.append((omega, point.real))
            if point.real < -1:
                net += 1 if above[index + 1] else -1
    return crossings, net


def _gain_margin(crossings: list[tuple[float, float]], *, stable: bool) -> tuple[float, float, float]:
    """Return the gain margin, its frequency and the factor by which the gain may fall."""
    factors = sorted((-1 / value, omega) for omega, value in crossings)
    if not stable:
        # no crossing need lie beyond -1 where low gain is what upsets the loop: then nothing is left
        return (*factors[0], inf) if factors and factors[0][0] <= 1 else (0.0, inf, inf)
    growing = [pair for pair in factors if pair[0] >= 1]
    falling = [pair for pair in factors if pair[0] < 1]
    gain, at = growing[0] if growing else (inf, inf)
    return gain, at, 1 / falling[-1][0] if falling else inf


def _imaginary(value: Complexes) -> Reals:
    """Zero on the real axis."""
    imaginary: Reals = value.imag
    return imaginary


def _excess(value: Complexes) -> Reals:
    """Zero on the unit circle."""
    excess: Reals = np.log(np.abs(value))
    return excess


def _zoom(response: Response, low: float, high: float, measure: Callable[[Complexes], Reals]) -> tuple[float, complex]:
    """Return frequency and response where ``measure`` changes sign between ``low`` and ``high``."""
    for _ in range(3):
        omega = np.linspace(low, high, ZOOM)
        value = response(omega)
        found = measure(value)
        positive = found >= 0
        index = int(np.argmax(positive != positive[0])) - 1
        low, high = float(omega[index]), float(omega[index + 1])
    share = found[index] / (found[index] - found[index + 1])
    return low + float(share) * (high - low), complex(value[index] + share * (value[index + 1] - value[index]))


def _peak(response: Response, grid: Reals, value: Complexes) -> float:
    """Return the largest ``|1/(1 + L)|`` on and between the points of the grid."""
    distance = np.abs(1 + value)
    least = float(distance.min())
    inner = (distance[1:-1] <= distance[:-2]) & (distance[1:-1] <= distance[2:]) & (distance[1:-1] < 1.05 * least)
    for start in np.flatnonzero(inner):
        low, high = float(grid[start]), float(grid[start + 2])
        for _ in range(3):
            omega = np.linspace(low, high, ZOOM)
            near = np.abs(1 + response(omega))
            index = min(max(int(near.argmin()), 1), ZOOM - 2)
            low, high = float(omega[index - 1]), float(omega[index + 1])
        least = min(least, float(near.min()))
    return 1 / least if least > 0 and isfinite(least) else inf

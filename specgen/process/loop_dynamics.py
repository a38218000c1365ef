"""The plant as the loop sees it: slope, time constant, dead time, second lag and sensor lag, and its exact modes.

A self-regulating plant is one with a finite time constant, an integrating plant one with an infinite one; both are
the same chain, so that nothing downstream asks which it is::

    output u (0..1) -> dead time -> second lag -> [slope; load enters here; time constant] -> true value -> sensor lag -> measurement
"""

from dataclasses import dataclass
from functools import lru_cache
from math import exp, expm1, inf, isfinite
from typing import Any

import numpy as np
import numpy.typing as npt

Reals = npt.NDArray[np.floating[Any]]
Complexes = npt.NDArray[np.complexfloating[Any, Any]]

SMALL = 1e-3
"""Share of a time constant below which a mode's answer is summed as a series."""

SEPARATION = 1e-5
"""Equal lags are set apart by this share of themselves each way, sum and gain kept: the measurement's answer to the output
moves by 1e-10, the true value's and those to the load by 1e-5 at most; less would lose more to rounding."""


@dataclass(frozen=True, slots=True)
class Dynamics:
    """A plant by its numbers, seen from the controller's output to the measurement.

    Parameters
    ----------
    slope : float
        First slope of the value under a step from no output to full output, ``K/tau`` [value unit/s].
    tau : float
        Time constant; ``inf`` for an integrating plant [s].
    theta : float
        Dead time [s].
    lag : float
        Second lag, between the output and the body whose value is controlled [s].
    sensor_lag : float
        Lag between the true value and the measurement [s].

    Raises
    ------
    ValueError
        A slope or time constant that is not above zero, a time below zero, or a number that is not finite.
    """

    slope: float
    tau: float
    theta: float
    lag: float = 0.0
    sensor_lag: float = 0.0

    def __post_init__(self) -> None:
        """Refuse what is no plant."""
        if not (isfinite(self.slope) and self.slope > 0):
            raise ValueError(f"the slope {self.slope} is not above zero")
        if not self.tau > 0:
            raise ValueError(f"the time constant {self.tau} is not above zero")
        if not all(isfinite(time) and time >= 0 for time in (self.theta, self.lag, self.sensor_lag)):
            raise ValueError("dead time, second lag and sensor lag are times of zero or more")

    @property
    def is_integrating(self) -> bool:
        """Whether the plant does not settle by itself."""
        return not isfinite(self.tau)

    @property
    def gain(self) -> float:
        """Change of the settled value from no output to full output [value unit]; ``inf`` where the plant integrates."""
        return self.slope * self.tau

    @property
    def spread(self) -> float:
        """Dead time and lags beside the time constant, added up [s]."""
        return self.theta + self.lag + self.sensor_lag

    def response(self, s: Complexes) -> Complexes:
        """Return the transfer function from output to measurement at ``s`` [rad/s]."""
        poles = s + 1 / self.tau
        if self.lag > 0:
            poles = poles * (1 + self.lag * s)
        if self.sensor_lag > 0:
            poles = poles * (1 + self.sensor_lag * s)
        lagged: Complexes = self.slope * np.exp(-self.theta * s) / poles
        return lagged


@dataclass(frozen=True, slots=True)
class Modes:
    """Independent modes ``z_i' = -rate_i z_i + output_i u + load_i d`` of a plant after its dead time.

    The true value is ``sum(true_i z_i)``, the measurement ``sum(measured_i z_i)``. The load ``d`` is counted as a
    fraction of full output and acts on the body, past dead time and second lag.
    """

    rate: tuple[float, ...]
    output: tuple[float, ...]
    load: tuple[float, ...]
    true: tuple[float, ...]
    measured: tuple[float, ...]

    def start(self, value: float) -> list[float]:
        """Return the modes at rest at ``value``: element without output, measurement equal to the true value.

        Parameters
        ----------
        value : float
            True value and measurement [value unit].

        Returns
        -------
        list of float
            State of each mode.
        """
        first = value / self.true[0]
        # the sensor's own mode makes up what the body's mode shows of itself through the sensor
        rest = [0.0] * (len(self.rate) - 1)
        if self.measured != self.true:
            rest[-1] = value - self.measured[0] * first
        return [first, *rest]


def self_regulating(gain: float, tau: float, theta: float, lag: float = 0.0, sensor_lag: float = 0.0) -> Dynamics:
    """Plant that settles: ``gain`` from no output to full output, time constant ``tau``.

    Parameters
    ----------
    gain : float
        Change of the settled value from no output to full output, ``y_on - y_off`` [value unit].
    tau, theta, lag, sensor_lag : float
        Time constant, dead time, second lag and sensor lag [s].

    Returns
    -------
    Dynamics
        The plant.

    Raises
    ------
    ValueError
        As :class:`Dynamics`.

    Examples
    --------
    >>> self_regulating(gain=130, tau=1300, theta=25).slope
    0.1
    """
    return Dynamics(gain / tau, tau, theta, lag, sensor_lag)


def integrating(slope: float, theta: float, lag: float = 0.0, sensor_lag: float = 0.0) -> Dynamics:
    """Plant that does not settle: the value moves by ``slope`` with full output against none.

    Parameters
    ----------
    slope : float
        Rate with full output less rate with none, ``r_on + r_off`` [value unit/s].
    theta, lag, sensor_lag : float
        Dead time, second lag and sensor lag [s].

    Returns
    -------
    Dynamics
        The plant.

    Raises
    ------
    ValueError
        As :class:`Dynamics`.

    Examples
    --------
    >>> integrating(slope=0.05, theta=25).is_integrating
    True
    """
    return Dynamics(slope, inf, theta, lag, sensor_lag)


@lru_cache(maxsize=512)
def modes_of(plant: Dynamics) -> Modes:
    """Take the chain second lag, body, sensor lag apart into modes.

    Parameters
    ----------
    plant : Dynamics
        The plant.

    Returns
    -------
    Modes
        One mode for the body, then one for the second lag and one for the sensor lag where they are not zero.

    Notes
    -----
    With rates ``p0 = 1/tau``, ``p1 = 1/lag``, ``p2 = 1/sensor_lag``: the body's share of the lag's mode is
    ``-slope/(p1 - p0)``, the sensor's share of a mode of rate ``p`` is ``p2/(p2 - p)`` times the body's.
    Equal rates have no such form; they are set apart first (see ``SEPARATION``).

    References
    ----------
    Partial fractions; compared with ``scipy.linalg.expm`` of the chain in ``tests/process/test_loop_dynamics.py``.
    """
    has_lag, has_sensor = plant.lag > 0, plant.sensor_lag > 0
    tau, lag, sensor = _set_apart(plant.tau, plant.lag, plant.sensor_lag)
    slope = plant.slope if plant.is_integrating else plant.gain / tau
    rate, output, load, true = [1 / tau], [slope], [slope], [1.0]
    if has_lag:
        share = -slope / (1 / lag - 1 / tau)
        rate.append(1 / lag)
        output = [-share / lag, 1 / lag]
        load.append(0.0)
        true.append(share)
    measured = list(true)
    if has_sensor:
        quick = 1 / sensor
        measured = [quick / (quick - p) * share for p, share in zip(rate, true, strict=True)]
        output.append(-sum(share * enters for share, enters in zip(measured, output, strict=True)))
        load.append(-sum(share * enters for share, enters in zip(measured, load, strict=True)))
        rate.append(quick)
        true.append(0.0)
        measured.append(1.0)
    return Modes(tuple(rate), tuple(output), tuple(load), tuple(true), tuple(measured))


def _set_apart(*times: float) -> list[float]:
    """Return the times with equal ones set apart evenly about their mean."""
    order = sorted((index for index, time in enumerate(times) if time > 0), key=lambda index: times[index])
    apart = list(times)
    groups: list[list[int]] = []
    for index in order:
        if groups and times[index] - times[groups[-1][-1]] < 2 * SEPARATION * times[index]:
            groups[-1].append(index)
        else:
            groups.append([index])
    for group in groups:
        mean = sum(times[index] for index in group) / len(group)
        for place, index in enumerate(group):
            if len(group) > 1:
                apart[index] = mean * (1 + SEPARATION * (2 * place - len(group) + 1))
    return apart


def grown(rate: float, span: float) -> tuple[float, float, float]:
    """Return what one mode does in ``span``: its decay, its answer to a unit input, and that answer's integral.

    Parameters
    ----------
    rate : float
        Rate of the mode; zero for an integrator [1/s].
    span : float
        Time passed [s].

    Returns
    -------
    tuple of float
        ``e^-ps`` [1], ``(1 - e^-ps)/p`` [s], ``(s - (1 - e^-ps)/p)/p`` [s2].

    Examples
    --------
    >>> grown(0.0, 3.0)
    (1.0, 3.0, 4.5)
    """
    x = rate * span
    if x < SMALL:
        # the closed forms lose their digits here; four terms leave 1e-14 or less
        first = span * (1 - x / 2 * (1 - x / 3 * (1 - x / 4 * (1 - x / 5))))
        second = span * span / 2 * (1 - x / 3 * (1 - x / 4 * (1 - x / 5)))
        return exp(-x), first, second
    first = -expm1(-x) / rate
    return exp(-x), first, (span - first) / rate

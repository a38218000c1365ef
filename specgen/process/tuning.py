"""Starting values of a proportional loop by the published SIMC rule, the cycle's delay included."""

from dataclasses import dataclass
from math import isfinite
from typing import Literal

from specgen.process.half_rule import EffectiveDelay, Reduced, Structure, effective_delay, reduce_plant

Pulse = Literal["latched", "ramp"]

__all__ = [
    "EffectiveDelay",
    "NothingLimitsTheGainError",
    "Pulse",
    "Reduced",
    "Settings",
    "Structure",
    "cycle_delay",
    "effective_delay",
    "reduce_plant",
    "series_to_ideal",
    "simc",
]


class NothingLimitsTheGainError(ValueError):
    """The plant declares neither dead time nor a second lag, and no cycle: the rule would give endless gain."""


@dataclass(frozen=True, slots=True)
class Settings:
    """Settings in the ideal form ``Kc (1 + 1/(Ti s) + Td s)``.

    Parameters
    ----------
    gain : float
        Kc, fraction of full output for each unit of the value [1/value unit].
    integral_time, derivative_time : float
        Ti and Td; no derivative action where Td is zero [s].
    reduced : Reduced or None
        The reduced plant that the rule started from; absent for settings that somebody chose.
    series : tuple of float or None
        Kc, Ti, Td of the series form ``Kc (1 + 1/(Ti s))(1 + Td s)``, where the rule gave that.
    """

    gain: float
    integral_time: float
    derivative_time: float = 0.0
    reduced: Reduced | None = None
    series: tuple[float, float, float] | None = None

    def __post_init__(self) -> None:
        """Refuse settings that no controller takes."""
        if not (isfinite(self.gain) and self.gain > 0 and self.integral_time > 0 and self.derivative_time >= 0):
            raise ValueError("gain and integral time are above zero, derivative time is zero or more")

    @property
    def proportional_band(self) -> float:
        """Change of the value that moves the output through its whole range, 100 %/Kc [value unit]."""
        return 1 / self.gain

    @property
    def structure(self) -> Structure:
        """Whether there is derivative action."""
        return "PID" if self.derivative_time > 0 else "PI"

    @property
    def theta_e(self) -> float:
        """Effective delay that the rule worked with [s].

        Raises
        ------
        ValueError
            The settings were chosen by somebody and come from no rule.
        """
        if self.reduced is None:
            raise ValueError("settings that somebody chose come from no effective delay")
        return self.reduced.delay.total


def cycle_delay(cycle_time: float, x_high: float, pulse: Pulse = "latched", theta: float = 0.0, lag: float = 0.0) -> float:
    """Delay that a time-proportioned output adds to the loop.

    Parameters
    ----------
    cycle_time : float
        Cycle time T; zero for a continuous output [s].
    x_high : float
        Highest duty of the declared range, 0 to 1 [1].
    pulse : {"latched", "ramp"}
        Duty latched at the start of the cycle with the output on first, or compared with a ramp all the time.
    theta, lag : float
        Dead time and second lag of the plant [s].

    Returns
    -------
    float
        ``T max(x_high, 1/2)``; nothing for a ramp where ``T <= theta`` and the plant has a second lag [s].

    Raises
    ------
    ValueError
        A cycle time below zero or a duty outside 0 to 1.

    Notes
    -----
    A pulse whose length is latched at the start of the cycle and which is on first ends ``x T`` later: it is the end
    that the controller moves. Half a cycle is right only on average. Where the plant has a lag that no derivative
    action cancels and ``T <= theta``, the charge keeps at least nine tenths of the gain margin that it promises; what is left
    elsewhere, and exactly, tells :func:`specgen.process.loop_map.stated_margins`.

    References
    ----------
    Exact one-cycle maps, ``tests/process/test_loop_map.py``.

    Examples
    --------
    >>> cycle_delay(20, 0.8), cycle_delay(20, 0.2), cycle_delay(20, 0.8, "ramp", theta=25, lag=10)
    (16.0, 10.0, 0.0)
    """
    if cycle_time < 0 or not 0 <= x_high <= 1:
        raise ValueError("the cycle time is zero or more and the duty lies between 0 and 1")
    if pulse == "ramp" and cycle_time <= theta and lag > 0:
        return 0.0
    return cycle_time * max(x_high, 0.5)


def series_to_ideal(gain: float, integral_time: float, derivative_time: float) -> tuple[float, float, float]:
    """Turn series settings into ideal ones.

    Parameters
    ----------
    gain : float
        Kc of ``Kc (1 + 1/(Ti s))(1 + Td s)`` [1/value unit].
    integral_time, derivative_time : float
        Ti and Td of the series form [s].

    Returns
    -------
    tuple of float
        Kc, Ti, Td of ``Kc (1 + 1/(Ti s) + Td s)``.

    References
    ----------
    Skogestad, J. Process Control 13 (2003) (from memory); multiplied out.

    Examples
    --------
    >>> series_to_ideal(0.5, 1.5, 1.0)
    (0.8333333333333333, 2.5, 0.6000000000000001)
    """
    factor = 1 + derivative_time / integral_time
    return gain * factor, integral_time * factor, derivative_time / factor


def simc(
    slope: float,
    tau: float,
    theta: float,
    lags: tuple[float, ...] = (),
    actuator: float = 0.0,
    cycle_delay: float = 0.0,
    structure: Structure | None = None,
) -> Settings:
    """Take starting values by SIMC with the closed loop's time constant equal to the effective delay.

    Parameters
    ----------
    slope : float
        First slope under full output: ``K/tau``, or ``k'`` of an integrating plant; the worst case is the largest [value unit/s].
    tau : float
        Time constant; ``inf`` for an integrating plant [s].
    theta : float
        Dead time [s].
    lags : tuple of float
        All further lags, the sensor's among them [s].
    actuator, cycle_delay : float
        Delay of the actuator and of the cycle [s].
    structure : {"PI", "PID"} or None
        None takes PID where the second time constant exceeds the delay left beside it.

    Returns
    -------
    Settings
        In the ideal form, with the reduced plant.

    Raises
    ------
    NothingLimitsTheGainError
        The effective delay is zero.

    Notes
    -----
    ``Kc = tau/(K (tau_c + theta_e))``, ``Ti = min(tau, 4 (tau_c + theta_e))``, ``tau_c = theta_e``; an integrating plant has
    ``1/k'`` for ``tau/K``. Derivative action cancels the second time constant in the series form.

    References
    ----------
    Skogestad, J. Process Control 13 (2003) 291-309.

    Examples
    --------
    >>> settings = simc(slope=0.1, tau=1300, theta=25)
    >>> settings.gain, settings.integral_time, settings.proportional_band
    (0.2, 200.0, 5.0)
    """
    if structure is None:
        with_derivative = reduce_plant(tau, theta, lags, actuator, cycle_delay, "PID")
        structure = "PID" if with_derivative.lag > with_derivative.delay.total > 0 else "PI"
    reduced = reduce_plant(tau, theta, lags, actuator, cycle_delay, structure)
    theta_e = reduced.delay.total
    if theta_e <= 0:
        raise NothingLimitsTheGainError("no dead time, no second lag and no cycle: declare the dead time or the controller's scan")
    # half of a lag left out makes the kept time constant longer and the slope as much flatter; the gain K stays
    flatter = slope * tau / reduced.tau if isfinite(tau) else slope
    gain = 1 / (flatter * 2 * theta_e)
    integral_time = min(reduced.tau, 8 * theta_e)
    if structure == "PI":
        return Settings(gain, integral_time, 0.0, reduced)
    series = (gain, integral_time, reduced.lag)
    return Settings(*series_to_ideal(*series), reduced, series)

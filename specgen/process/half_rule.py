"""The half rule: a chain of lags reduced to one or two time constants and an effective delay."""

from dataclasses import dataclass
from typing import Literal

Structure = Literal["PI", "PID"]


@dataclass(frozen=True, slots=True)
class EffectiveDelay:
    """What adds up to the delay that the rule works with, each part in seconds.

    Parameters
    ----------
    dead_time, actuator, cycle : float
        The plant's dead time, the actuator's delay, what a time-proportioned output adds [s].
    half_lag : float
        Half of the largest lag that the rule leaves out [s].
    other_lags : float
        All smaller lags, whole [s].
    """

    dead_time: float
    actuator: float
    cycle: float
    half_lag: float
    other_lags: float

    @property
    def total(self) -> float:
        """The effective delay ``theta_e`` [s]."""
        return self.dead_time + self.actuator + self.cycle + self.half_lag + self.other_lags

    @property
    def without_cycle(self) -> float:
        """The effective delay ``theta_0`` that the loop has before any cycle is added [s]."""
        return self.total - self.cycle


@dataclass(frozen=True, slots=True)
class Reduced:
    """Plant reduced by the half rule to one time constant, or two, and an effective delay.

    Parameters
    ----------
    tau : float
        Time constant that is kept; ``inf`` where the plant integrates [s].
    lag : float
        Second time constant that is kept for derivative action, else zero [s].
    delay : EffectiveDelay
        All that is not kept.
    """

    tau: float
    lag: float
    delay: EffectiveDelay


def effective_delay(theta: float, lags: tuple[float, ...] = (), actuator: float = 0.0, cycle_delay: float = 0.0) -> EffectiveDelay:
    """Effective delay of a loop by the half rule: dead time and half of the largest lag left out, all smaller ones whole.

    Parameters
    ----------
    theta : float
        Dead time; inverse response counts with it [s].
    lags : tuple of float
        Lags that the reduced plant leaves out, in any order [s].
    actuator, cycle_delay : float
        Delay of the actuator and of the cycle [s].

    Returns
    -------
    EffectiveDelay
        The parts and their sum.

    References
    ----------
    Skogestad, J. Process Control 13 (2003) 291-309, half rule (from memory).

    Examples
    --------
    >>> round(effective_delay(0.22, (1.0, 0.4, 0.2, 0.15)).total, 9)
    1.47
    """
    ordered = sorted((lag for lag in lags if lag > 0), reverse=True)
    half = ordered[0] / 2 if ordered else 0.0
    return EffectiveDelay(theta, actuator, cycle_delay, half, sum(ordered[1:], 0.0))


def reduce_plant(
    tau: float,
    theta: float,
    lags: tuple[float, ...] = (),
    actuator: float = 0.0,
    cycle_delay: float = 0.0,
    structure: Structure = "PI",
) -> Reduced:
    """Reduce a chain of lags to one time constant (PI) or two (PID) and an effective delay.

    Parameters
    ----------
    tau : float
        Time constant; ``inf`` for an integrating plant [s].
    theta : float
        Dead time [s].
    lags : tuple of float
        All further lags, the sensor's among them [s].
    actuator, cycle_delay : float
        Delay of the actuator and of the cycle [s].
    structure : {"PI", "PID"}
        How many time constants are kept.

    Returns
    -------
    Reduced
        Time constants and effective delay.

    Notes
    -----
    The largest lag left out gives half of itself to the delay and half to the smallest time constant kept.

    References
    ----------
    Skogestad, J. Process Control 13 (2003) 291-309; his examples E1, E2, E4, E5 are the tests.

    Examples
    --------
    >>> reduced = reduce_plant(1.0, 0.0, (1.0, 1.0, 1.0), structure="PID")
    >>> reduced.tau, reduced.lag, reduced.delay.total
    (1.5, 1.0, 1.5)
    """
    chain = sorted((tau, *(lag for lag in lags if lag > 0)), reverse=True)
    kept = chain[: 2 if structure == "PID" else 1]
    left_out = chain[len(kept) :]
    delay = effective_delay(theta, tuple(left_out), actuator, cycle_delay)
    # the rest of the largest lag left out goes to the smallest one kept, which may then be the larger of the two
    kept[-1] += delay.half_lag
    kept.sort(reverse=True)
    return Reduced(kept[0], kept[1] if len(kept) > 1 else 0.0, delay)

"""A motorised valve driven by raise and lower pulses: travel step, neutral zone, pulses an hour, motor duty."""

from dataclasses import dataclass

HOUR = 3600.0


@dataclass(frozen=True, slots=True)
class ThreePoint:
    """Settings and wear of a three-point drive.

    Parameters
    ----------
    travel_step : float
        Travel of the shortest pulse, a fraction of the whole [1].
    step_effect : float
        What that step does to the settled value at the highest plant gain [value unit].
    neutral_zone : float
        Whole width of the zone around the setpoint in which no pulse is given [value unit].
    decided_by : {"pulse", "measurement"}
        Whether the pulse or the measurement's step made the zone as wide as it is.
    """

    travel_step: float
    step_effect: float
    neutral_zone: float
    decided_by: str


@dataclass(frozen=True, slots=True)
class MotorWork:
    """What the load's swing asks of the actuator.

    Parameters
    ----------
    pulses_per_hour : float
        Starts an hour; at most one shortest pulse for each travel step to be moved [1/h].
    duty : float
        Share of the time the motor runs [1].
    """

    pulses_per_hour: float
    duty: float


def travel_step(min_pulse: float, travel_time: float) -> float:
    """Travel of the shortest pulse.

    Parameters
    ----------
    min_pulse : float
        Shortest pulse the motor follows [s].
    travel_time : float
        Time for the whole travel [s].

    Returns
    -------
    float
        ``min_pulse/travel_time`` [1].

    Raises
    ------
    ValueError
        A time that is not above zero, or a pulse longer than the whole travel.

    Examples
    --------
    >>> travel_step(0.5, 50)
    0.01
    """
    if min_pulse <= 0 or travel_time < min_pulse:
        raise ValueError("the shortest pulse is above zero and no longer than the whole travel")
    return min_pulse / travel_time


def three_point(min_pulse: float, travel_time: float, highest_gain: float, measurement_step: float) -> ThreePoint:
    """Set a three-point drive.

    Parameters
    ----------
    min_pulse, travel_time : float
        Shortest pulse and time for the whole travel [s].
    highest_gain : float
        Change of the settled value from shut to open at the valve's steepest and the plant's most sensitive [value unit].
    measurement_step : float
        Step of the measurement [value unit].

    Returns
    -------
    ThreePoint
        Travel step, its effect and the least neutral zone.

    Raises
    ------
    ValueError
        As :func:`travel_step`, or a gain that is not above zero.

    Notes
    -----
    ``zone = max(2 gain min_pulse/travel_time, measurement_step)``: a zone narrower than the shortest pulse's effect makes the
    valve hunt.

    References
    ----------
    Common practice, no source.

    Examples
    --------
    >>> three_point(0.5, 50, highest_gain=60, measurement_step=0.1)
    ThreePoint(travel_step=0.01, step_effect=0.6, neutral_zone=1.2, decided_by='pulse')
    """
    if highest_gain <= 0:
        raise ValueError("the highest gain is above zero")
    step = travel_step(min_pulse, travel_time)
    effect = highest_gain * step
    if 2 * effect >= measurement_step:
        return ThreePoint(step, effect, 2 * effect, "pulse")
    return ThreePoint(step, effect, measurement_step, "measurement")


def motor_work(load_swing: float, load_period: float, step: float, travel_time: float) -> MotorWork:
    """Pulses and running time that a swinging load asks of the actuator.

    Parameters
    ----------
    load_swing : float
        Swing of the load from top to bottom, as a fraction of the travel [1].
    load_period : float
        Time in which it swings there and back [s].
    step : float
        Travel of one pulse [1].
    travel_time : float
        Time for the whole travel [s].

    Returns
    -------
    MotorWork
        Pulses an hour and the motor's share of the time.

    Raises
    ------
    ValueError
        A swing below zero or a time or step that is not above zero.

    Notes
    -----
    The valve follows the load there and back: ``2 swing`` of travel each period, cut into shortest pulses, which is the most starts
    it can take.

    References
    ----------
    Arithmetic.

    Examples
    --------
    >>> motor_work(load_swing=0.25, load_period=1000, step=0.0125, travel_time=80)
    MotorWork(pulses_per_hour=144.0, duty=0.04)
    """
    if load_swing < 0 or load_period <= 0 or step <= 0 or travel_time <= 0:
        raise ValueError("the swing is zero or more; period, step and travel time are above zero")
    moved = 2 * load_swing / load_period
    return MotorWork(moved / step * HOUR, moved * travel_time)

"""The settled cycle of a two-position controller on a first-order or an integrating plant with dead time.

Closed forms only; plants with a second lag, a sensor lag or run times that bind are in ``exact_cycle``.
"""

from dataclasses import dataclass
from math import exp, inf, log

SECONDS_AN_HOUR = 3600.0


class NoCycle(ValueError):  # noqa: N818 - an answer about the plant, not a fault of the call
    """The loop cannot switch: the value does not pass both switch points, or nothing spaces the switchings."""

    def __init__(self, y_on: float, y_off: float, high: float, low: float) -> None:
        self.y_on = y_on
        self.y_off = y_off
        self.high = high
        self.low = low
        if y_on <= high:
            because = f"full output settles at {y_on:.6g}, not above the switch-off point {high:.6g}"
        elif y_off >= low:
            because = f"without output the value settles at {y_off:.6g}, not below the switch-on point {low:.6g}"
        else:
            because = "no dead time, no lag and no differential: nothing keeps the switchings apart"
        super().__init__(because)
        self.because = because


@dataclass(frozen=True, slots=True)
class Cycle:
    """One settled cycle: extremes of the true and of the measured value, output times on and off [s], mean value."""

    peak: float
    trough: float
    t_on: float
    t_off: float
    mean: float
    measured_peak: float
    measured_trough: float

    @property
    def period(self) -> float:
        """Return the time from one start to the next [s]."""
        return self.t_on + self.t_off

    @property
    def duty(self) -> float:
        """Return the share of the time that the output is on [0..1]."""
        return self.t_on / (self.t_on + self.t_off)

    @property
    def swing(self) -> float:
        """Return the distance from trough to peak of the true value."""
        return self.peak - self.trough

    @property
    def measured_swing(self) -> float:
        """Return the distance from trough to peak as the controller reads it."""
        return self.measured_peak - self.measured_trough

    @property
    def starts_per_hour(self) -> float:
        """Return the switchings-on an hour [1/h]."""
        return SECONDS_AN_HOUR / self.period if self.period > 0 else inf


def relay_cycle(y_on: float, y_off: float, tau: float, theta: float, high: float, low: float) -> Cycle:
    r"""Return the settled cycle of a raise-direction relay on a first-order plant with dead time.

    Parameters
    ----------
    y_on, y_off : float
        Where the value settles with full and with no output [degC].
    tau, theta : float
        Time constant and dead time [s].
    high, low : float
        Value at which the output switches off and on [degC].

    Returns
    -------
    Cycle
        Peak, trough and mean [degC], time on and off [s].

    Raises
    ------
    NoCycle
        The plant cannot pass both switch points (``y_on <= high`` or ``y_off >= low``), or ``theta`` and ``high - low`` are both zero.

    Notes
    -----
    The value runs on for the dead time after each switching, so that with
    :math:`q = 1 - e^{-\theta/\tau}` the peak is :math:`high + (y_{on} - high) q`; the trough mirrors it.

    References
    ----------
    Derived from the first-order step response; compared with ``scipy.integrate.solve_ivp`` in
    ``tests/process/test_limit_cycle.py``.

    Examples
    --------
    >>> cycle = relay_cycle(y_on=160, y_off=20, tau=600, theta=30, high=66, low=64)
    >>> round(cycle.peak, 2), round(cycle.trough, 2), round(cycle.period, 1)
    (70.58, 61.85, 169.6)
    """
    if y_on <= high or y_off >= low or (theta <= 0 and high <= low):
        raise NoCycle(y_on, y_off, high, low)
    q = 1 - exp(-theta / tau)
    peak = high + (y_on - high) * q
    trough = low - (low - y_off) * q
    on = theta + tau * log(1 + (high - trough) / (y_on - high))
    off = theta + tau * log(1 + (peak - low) / (low - y_off))
    mean = y_off + (y_on - y_off) * on / (on + off)
    return Cycle(peak, trough, on, off, mean, peak, trough)


def timed_relay_cycle(
    y_on: float, y_off: float, tau: float, theta: float, high: float, low: float, min_run: float, min_rest: float
) -> Cycle:
    r"""Return the settled cycle of a relay on a first-order plant whose least run and least rest are enforced.

    Parameters
    ----------
    y_on, y_off, tau, theta, high, low : float
        As in ``relay_cycle``.
    min_run, min_rest : float
        Least time on and off [s].

    Returns
    -------
    Cycle
        Peak, trough and mean [degC], time on and off [s].

    Raises
    ------
    NoCycle
        As in ``relay_cycle``; two least times keep the switchings apart too.

    Notes
    -----
    A phase that ends at its switch point starts the next one from the same value as without least times; a phase of fixed length ``t``
    carries the value on by :math:`1 - e^{-t/\tau}` of what is left. With both fixed the value follows a rectangle.

    References
    ----------
    Derived; compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_exact_cycle.py``.

    Examples
    --------
    >>> cycle = timed_relay_cycle(160, 20, 600, 30, high=66, low=64, min_run=120, min_rest=0)
    >>> cycle.t_on, round(cycle.peak, 2), round(cycle.trough, 2)  # 61.854 + (160 - 61.854)(1 - e^-0.2)
    (120, 79.64, 61.85)
    """
    if theta > 0 or high > low:
        free = relay_cycle(y_on, y_off, tau, theta, high, low)
        if free.t_on >= min_run and free.t_off >= min_rest:
            return free
    elif y_on <= high or y_off >= low or min(min_run, min_rest) <= 0:
        raise NoCycle(y_on, y_off, high, low)
    q = 1 - exp(-theta / tau)
    gain = y_on - y_off
    trough = low - (low - y_off) * q
    peak = y_on - (y_on - trough) * exp(-min_run / tau)
    off = theta + tau * log(1 + (peak - low) / (low - y_off)) if peak > low else 0.0
    if off >= min_rest and min_run > 0:
        return Cycle(peak, trough, min_run, off, y_off + gain * min_run / (min_run + off), peak, trough)
    peak = high + (y_on - high) * q
    trough = y_off + (peak - y_off) * exp(-min_rest / tau)
    on = theta + tau * log(1 + (high - trough) / (y_on - high)) if trough < high else 0.0
    if on >= min_run and min_rest > 0:
        return Cycle(peak, trough, on, min_rest, y_off + gain * on / (on + min_rest), peak, trough)
    whole = 1 - exp(-(min_run + min_rest) / tau)
    peak = y_off + gain * (1 - exp(-min_run / tau)) / whole
    trough = y_on - gain * (1 - exp(-min_rest / tau)) / whole
    return Cycle(peak, trough, min_run, min_rest, y_off + gain * min_run / (min_run + min_rest), peak, trough)


def integrating_cycle(r_on: float, r_off: float, theta: float, high: float, low: float) -> Cycle:
    r"""Return the settled cycle of a relay on an integrating plant with dead time.

    Parameters
    ----------
    r_on, r_off : float
        Speed towards what the output does with full output, and back again with none, both positive [K/s].
    theta : float
        Dead time [s].
    high, low : float
        Value at which the output switches off and on [degC].

    Returns
    -------
    Cycle
        Peak, trough and mean [degC], time on and off [s].

    Raises
    ------
    NoCycle
        A speed is not positive, or ``theta`` and ``high - low`` are both zero.

    Notes
    -----
    :math:`peak = high + r_{on}\theta`, :math:`trough = low - r_{off}\theta`, and the triangle between them gives
    :math:`P = (1/r_{on} + 1/r_{off})(d + \theta(r_{on} + r_{off}))`.

    References
    ----------
    Algebra; compared with the published row of a tank level in ``tests/process/test_limit_cycle.py``.

    Examples
    --------
    >>> cycle = integrating_cycle(r_on=0.2, r_off=0.1, theta=5, high=1, low=-1)
    >>> round(cycle.swing, 9), round(cycle.t_on, 9), round(cycle.t_off, 9)
    (3.5, 17.5, 35.0)
    """
    if r_on <= 0 or r_off <= 0 or (theta <= 0 and high <= low):
        raise NoCycle(high + r_on if r_on <= 0 else inf, low - r_off if r_off <= 0 else -inf, high, low)
    peak = high + r_on * theta
    trough = low - r_off * theta
    swing = peak - trough
    return Cycle(peak, trough, swing / r_on, swing / r_off, (peak + trough) / 2, peak, trough)

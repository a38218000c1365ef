"""Steady ripple of a time-proportioned output: how far the value leaves its mean when the output is on for ``x T`` of each cycle ``T``."""

from dataclasses import dataclass
from math import ceil, exp, expm1

from specgen.process.periodic import crest, modes_of, ramp_crest


@dataclass(frozen=True, slots=True)
class Ripple:
    """Excursions of the true value above and below its mean, both positive, and the pulses that cause them [s]."""

    above: float
    below: float
    t_on: float
    t_off: float

    @property
    def swing(self) -> float:
        """Return the distance from trough to peak."""
        return self.above + self.below


def lag_ripple(gain: float, tau: float, cycle_time: float, duty: float, lag: float = 0.0) -> Ripple:
    r"""Return the steady ripple of a plant with one or two lags.

    Parameters
    ----------
    gain : float
        Change of the settled value from no output to full output [K].
    tau, lag : float
        Time constant and second lag [s].
    cycle_time : float
        Cycle time [s].
    duty : float
        Share of the cycle that the output is on [0..1].

    Returns
    -------
    Ripple
        Excursions above and below the mean [K] and the pulses [s].

    Notes
    -----
    One lag: :math:`swing = K (1 - e^{-xT/\tau})(1 - e^{-(1-x)T/\tau})/(1 - e^{-T/\tau})`, at half duty :math:`K\tanh(T/4\tau)`.
    Dead time shifts the ripple in time and does not change it; a sensor's lag hides part of it and does not change it either.

    References
    ----------
    Derived from the step response; compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_cycle_ripple.py``.

    Examples
    --------
    >>> from math import tanh
    >>> abs(lag_ripple(140, 600, 60, 0.5).swing - 140 * tanh(60 / 2400)) < 1e-12
    True
    """
    on, off = duty * cycle_time, (1 - duty) * cycle_time
    if on <= 0 or off <= 0:
        return Ripple(0.0, 0.0, max(on, 0.0), max(off, 0.0))
    if lag <= 0:
        whole = -expm1(-cycle_time / tau)
        swing = gain * expm1(-on / tau) * expm1(-off / tau) / whole
        # the peak is K u with u = (1 - e^(-on/tau))/whole; K (u - x) loses digits only where the ripple is below 1e-9 of the gain
        above = gain * (-expm1(-on / tau) / whole - duty)
        return Ripple(above, swing - above, on, off)
    modes = modes_of((tau, lag))
    return Ripple(gain * (crest(modes, on, off) - duty), gain * (crest(modes, off, on) - (1 - duty)), on, off)


def integrating_ripple(span: float, cycle_time: float, duty: float, lag: float = 0.0) -> Ripple:
    """Return the steady ripple of an integrating plant.

    Parameters
    ----------
    span : float
        Speed with full output plus speed back without output [K/s].
    cycle_time, lag : float
        Cycle time and lag ahead of the integrator [s].
    duty : float
        Share of the cycle that the output is on, at which the value stands still on average [0..1].

    Returns
    -------
    Ripple
        Excursions above and below the mean [K] and the pulses [s].

    Notes
    -----
    Without lag a triangle: swing = span x (1 - x) T.

    References
    ----------
    Algebra; compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_cycle_ripple.py``.

    Examples
    --------
    >>> round(integrating_ripple(span=0.3, cycle_time=60, duty=0.5).swing, 9)
    4.5
    """
    on, off = duty * cycle_time, (1 - duty) * cycle_time
    if on <= 0 or off <= 0:
        return Ripple(0.0, 0.0, max(on, 0.0), max(off, 0.0))
    modes = modes_of((lag,)) if lag > 0 else ()
    return Ripple(span * ramp_crest(modes, on, off), span * ramp_crest(modes, off, on), on, off)


def carried_over(cycle_time: float, duty: float, least_on: float, least_off: float) -> float:
    """Return the cycle time of the pattern that remains when pulses below the device's least are held back [s].

    Parameters
    ----------
    cycle_time : float
        Cycle time [s].
    duty : float
        Share of the cycle that the output is asked to be on [0..1].
    least_on, least_off : float
        Shortest pulse on and off that the device makes [s].

    Returns
    -------
    float
        ``k T`` with the least whole ``k`` at which ``k x T`` and ``k (1 - x) T`` are pulses the device makes [s].

    Notes
    -----
    What a skipped pulse leaves undone is added to the next, so that the mean duty is kept: ``k`` cycles' demand in one pulse, exactly.

    Examples
    --------
    >>> carried_over(cycle_time=10, duty=0.05, least_on=1.2, least_off=1.2)  # 0.5 s asked for: every third cycle 1.5 s
    30.0
    >>> carried_over(cycle_time=10, duty=0.5, least_on=1.2, least_off=1.2)
    10.0
    """
    if not 0 < duty < 1:
        return float(cycle_time)
    # a hair less than the quotient, so that a pulse exactly as long as the least counts as made
    needed = max(least_on / (duty * cycle_time), least_off / ((1 - duty) * cycle_time), 1.0)
    return ceil(needed * (1 - 1e-12)) * float(cycle_time)


def half_duty_ripple(gain: float, tau: float, cycle_time: float) -> float:
    """Return the largest steady ripple of one lag over all duties, ``K tanh(T/4 tau)`` [K].

    Examples
    --------
    >>> round(half_duty_ripple(gain=140, tau=600, cycle_time=60), 4)
    3.4993
    """
    e = exp(-cycle_time / (2 * tau))
    return gain * (1 - e) / (1 + e)

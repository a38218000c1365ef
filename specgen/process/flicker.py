"""Flicker of lamps by a load that is switched again and again: voltage change, short-term severity, shortest cycle."""

from collections.abc import Sequence
from itertools import pairwise
from math import exp, inf, log

Curve = Sequence[tuple[float, float]]
"""Changes a minute [1/min], rising, and the voltage change at which they are just irritating (Pst = 1) [1]."""

MINUTE = 60.0
CHANGES_PER_CYCLE = 2  # on and off
ONCE_AN_HOUR = 1 / 60  # changes a minute: what is rarer has no severity
_EXPONENT = 3.2
_IMPRESSION = 2.3  # s
_INTERVAL = 600.0  # s, of the short-term severity


def voltage_change(current: float, impedance: float, voltage: float) -> float:
    """Relative change of the supply's voltage by a change of current.

    Parameters
    ----------
    current : float
        Change of current [A].
    impedance : float
        What the supply opposes to it: of the whole loop line to neutral, of both lines between lines, of one line for a balanced
        three-phase load; for a load without reactance its resistance alone [ohm].
    voltage : float
        Voltage that changes: the load's own, for a balanced three-phase load line to neutral [V].

    Returns
    -------
    float
        ``I Z/U`` [1].

    Raises
    ------
    ValueError
        A voltage that is not above zero, or a current or impedance below zero.

    References
    ----------
    Ohm's law; IEC 61000-3-3 for what it is taken over.

    Examples
    --------
    2 kW at 230 V over 0.4 ohm: 8.7 A, 3.48 V, 1.51 %.

    >>> round(voltage_change(2000 / 230, 0.4, 230), 4)
    0.0151
    """
    if current < 0 or impedance < 0 or voltage <= 0:
        raise ValueError("current and impedance are zero or more, the voltage above zero")
    return current * impedance / voltage


def allowed_change(rate: float, curve: Curve) -> float:
    """Voltage change at which rectangular changes of a rate are just irritating.

    Parameters
    ----------
    rate : float
        Changes a minute, above zero [1/min].
    curve : sequence of (float, float)
        The curve of Pst = 1.

    Returns
    -------
    float
        Voltage change [1]; between the points straight in logarithms, beyond the ends that of the end.

    Examples
    --------
    >>> curve = ((1.0, 0.02724), (2.0, 0.02211))
    >>> allowed_change(1.0, curve), round(allowed_change(2**0.5, curve), 5), allowed_change(0.5, curve)
    (0.02724, 0.02454, 0.02724)
    """
    if rate <= curve[0][0]:
        return curve[0][1]
    for (r_0, d_0), (r_1, d_1) in pairwise(curve):
        if rate <= r_1:
            return d_0 * exp(log(d_1 / d_0) * log(rate / r_0) / log(r_1 / r_0))
    return curve[-1][1]


def severity(change: float, cycle: float, curve: Curve) -> float:
    """Short-term severity of a load that is switched on and off once a cycle; steady cycling gives the same over the long term.

    Parameters
    ----------
    change : float
        Voltage change at each switching [1].
    cycle : float
        Time from one switching-on to the next [s].
    curve : sequence of (float, float)
        The curve of Pst = 1.

    Returns
    -------
    float
        Pst [1]; zero where the changes are rarer than once an hour.

    Notes
    -----
    Two changes a cycle; severity is in proportion to the change. Plt is the cube root of the mean of twelve Pst cubed, which of twelve
    equal ones is Pst.

    References
    ----------
    IEC 61000-3-3, figure 2 and clause 5.

    Examples
    --------
    >>> severity(0.0151, 60.0, ((1.0, 0.02724), (2.0, 0.02211))).__round__(2)
    0.68
    """
    rate = CHANGES_PER_CYCLE * MINUTE / cycle
    return 0.0 if rate < ONCE_AN_HOUR else change / allowed_change(rate, curve)


def severity_analytic(change: float, cycle: float) -> float:
    """Short-term severity by the standard's formula, for at least a second between changes.

    Parameters
    ----------
    change : float
        Voltage change at each switching [1].
    cycle : float
        Time from one switching-on to the next [s].

    Returns
    -------
    float
        Pst [1].

    Notes
    -----
    Each change leaves an impression of ``2.3 s d^3.2`` with ``d`` in percent; ``Pst = (sum/600 s)^(1/3.2)``.

    References
    ----------
    IEC 61000-3-3 clause 4.2.4 (from memory).

    Examples
    --------
    >>> round(severity_analytic(0.01512, 17.3), 2)
    1.0
    """
    changes = CHANGES_PER_CYCLE * _INTERVAL / cycle
    return float((changes * _IMPRESSION * (100 * change) ** _EXPONENT / _INTERVAL) ** (1 / _EXPONENT))


def shortest_cycle(change: float, limit: float, curve: Curve) -> float:
    """Shortest cycle from which on a load keeps a severity.

    Parameters
    ----------
    change : float
        Voltage change at each switching [1].
    limit : float
        Severity that is allowed [1].
    curve : sequence of (float, float)
        The curve of Pst = 1.

    Returns
    -------
    float
        Time from one switching-on to the next [s]: zero where no rate is too fast, infinite where none on the curve is slow enough.

    Notes
    -----
    The curve falls to its least near 1000 changes a minute and rises again where the eye no longer follows. Cycles that are faster
    than that are not offered: a duty's pulses have many rates.

    References
    ----------
    IEC 61000-3-3, figure 2, read the other way round.

    Examples
    --------
    Half way between 1 and 2 changes a minute in logarithms: 120 s/1.414.

    >>> round(shortest_cycle(0.65 * (0.02724 * 0.02211) ** 0.5, 0.65, ((1.0, 0.02724), (2.0, 0.02211))), 2)
    84.85
    """
    wanted = change / limit
    least = min(range(len(curve)), key=lambda i: curve[i][1])
    falling = curve[: least + 1]
    if wanted <= falling[-1][1]:
        return 0.0
    if wanted > falling[0][1]:
        return inf
    for (r_0, d_0), (r_1, d_1) in pairwise(falling):
        if wanted >= d_1:
            return CHANGES_PER_CYCLE * MINUTE / (r_0 * exp(log(r_1 / r_0) * log(wanted / d_0) / log(d_1 / d_0)))
    return 0.0

"""Where the value goes, and how fast, when the output sticks; what a limiter sees; how long a cold start takes.

Pure functions of one plant. All values of one call are in one sense: the value moves *up*, towards ``end``; a value that falls is negated
by the caller. The worst cases over a loop's box are in ``fault_cases``.
"""

from math import exp, inf, log

from scipy.optimize import brentq

from specgen.process.periodic import modes_of


def time_up(start: float, end: float, target: float, tau: float) -> float:
    r"""Return the time a first-order value takes from ``start`` up to ``target`` on its way to ``end`` [s].

    Parameters
    ----------
    start, end, target : float
        Where the value is, where it would settle, and the value asked about, in one unit.
    tau : float
        Time constant [s].

    Returns
    -------
    float
        0 where the target is reached at the start, infinite where the value settles short of it.

    Notes
    -----
    :math:`\tau\ln((end - start)/(end - target))`. The element is taken as hot: a second lag starts full and holds nothing back.

    Examples
    --------
    >>> round(time_up(start=70, end=160, target=95, tau=600), 1)  # 600 ln(90/65)
    195.3
    >>> time_up(70, 90, 95, 600), time_up(96, 160, 95, 600)
    (inf, 0.0)
    """
    if start >= target:
        return 0.0
    if end <= target:
        return inf
    return tau * log((end - start) / (end - target))


def time_at_speed(start: float, target: float, speed: float) -> float:
    """Return the time up to ``target`` at a steady speed [s]: what rates and integrating plants give.

    Examples
    --------
    >>> time_at_speed(start=70, target=95, speed=0.05), time_at_speed(70, 95, -0.1)
    (500.0, inf)
    """
    if start >= target:
        return 0.0
    return (target - start) / speed if speed > 0 else inf


def limiter_acts_at(set_value: float, speed_at_set: float, sensor_lag: float) -> float:
    r"""Return the true value when a limiter behind its own sensor's lag acts.

    Parameters
    ----------
    set_value : float
        The limiter's set value, in the value's unit.
    speed_at_set : float
        Speed of the true value as it passes the set value, output stuck [K/s].
    sensor_lag : float
        Lag of the limiter's sensor [s].

    Returns
    -------
    float
        ``set + lag x speed``.

    Notes
    -----
    Exact for a value that settles, too, once the sensor trails it: with :math:`T - m = (T_{end} - T)\,s/(\tau - s)` the reading ``m``
    passes the set value when the true value is :math:`set + s\,(T_{end} - set)/\tau`. A sensor that was level with the value
    shortly before trails it by less.

    Examples
    --------
    >>> limiter_acts_at(set_value=88, speed_at_set=0.12, sensor_lag=20)
    90.4
    """
    return set_value + sensor_lag * max(0.0, speed_at_set)


def coasts_to(start: float, end: float, rest: float, tau: float, theta: float, lag: float) -> float:
    """Return the highest value after full output is cut at ``start``, dead time and second lag still to come.

    Parameters
    ----------
    start, end, rest : float
        The value when the output is cut, where full output would have taken it, and where it settles with none.
    tau, theta, lag : float
        Time constant, dead time and second lag [s]; an infinite ``tau`` makes ``end`` and ``rest`` speeds [K/s].

    Returns
    -------
    float

    Notes
    -----
    The dead time passes at full output, then the second lag empties: the value turns where the two meet.

    Examples
    --------
    >>> round(coasts_to(start=90, end=160, rest=20, tau=600, theta=30, lag=0), 2)  # 160 - 70 e^-0.05
    93.41
    """
    if tau == inf:
        top = start + end * theta
        if lag <= 0 or end <= 0 or rest >= 0:
            return top
        turn = lag * log((end - rest) / -rest)
        return top + rest * turn + lag * (end - rest) * (1 - exp(-turn / lag))
    top = end - (end - start) * exp(-theta / tau)
    if lag <= 0 or end <= top:
        return top
    modes = modes_of((tau, lag))

    def value(t: float) -> float:
        # the lag starts full: the response to a fall from ``end`` to ``rest``, and what the value still had to go
        return rest + (end - rest) * sum(c * exp(-t / k) for c, k in modes) - (end - top) * exp(-t / tau)

    def above_drive(t: float) -> float:
        return value(t) - (rest + (end - rest) * exp(-t / lag))

    reach = lag
    while above_drive(reach) < 0:
        reach *= 2
    return value(float(brentq(above_drive, 0.0, reach, xtol=1e-12 * reach)))


def warm_up_time(start: float, target: float, end: float, rest: float, constants: tuple[float, ...], theta: float) -> float:
    """Return the time from switching on at ``start`` until the value first reaches ``target`` with full output [s].

    Parameters
    ----------
    start, target, end, rest : float
        The cold value, the near edge of the band, and where full and no output settle.
    constants : tuple of float
        Time constant and, where there is one, the second lag, empty at the start [s].
    theta : float
        Dead time [s]; in it the value moves as without output.

    Returns
    -------
    float
        Infinite where full output settles short of the target.

    Examples
    --------
    >>> round(warm_up_time(start=20, target=64, end=160, rest=20, constants=(600,), theta=30), 1)  # 30 + 600 ln(140/96)
    256.4
    """
    tau = constants[0]
    begin = rest + (start - rest) * exp(-theta / tau)
    if begin >= target:
        return 0.0 if start >= target else theta
    if end <= target:
        return inf
    modes = modes_of(constants)

    def short(t: float) -> float:
        return rest + (begin - rest) * exp(-t / tau) + (end - rest) * (1 - sum(c * exp(-t / k) for c, k in modes)) - target

    reach = tau
    while short(reach) < 0:
        reach *= 2
    return theta + float(brentq(short, 0.0, reach, xtol=1e-10 * reach))

r"""The settled on-off cycle with a second lag, a sensor lag, or least run and rest times that bind.

The plant's input is a rectangle of ``t_on`` and ``t_off``, so the settled response of every lag is known in closed form (``periodic``),
and the cycle is the pair of times at which the *measured* value meets the switch points: two equations, solved by Newton's method with
exact slopes. Such a response rises and falls once a cycle, hence a solution at which the measurement passes the upper point rising and
the lower point falling is the first crossing. A least time that binds fixes its unknown. Where Newton's method does not settle, or the
repeated cycle repels its neighbours, the cycles are followed one by one (``follow``).
"""

from collections.abc import Callable
from dataclasses import dataclass
from math import exp, expm1, inf, isfinite, log

from scipy.optimize import brentq

from specgen.core.postponed import Postponed
from specgen.process.follow import Relay, attracts, follow
from specgen.process.limit_cycle import Cycle, NoCycle, relay_cycle
from specgen.process.periodic import Mode, after_off, after_on, crest, modes_of, ramp_crest

CLOSE = 1e-12
RATTLE = 1e-7
STEPS = 40
HAIR = 1e-9


@dataclass(frozen=True, slots=True)
class _Chain:
    """The measured value's chain and how far, as a share of the whole change, the switch points are from where the value would settle."""

    modes: tuple[Mode, ...]
    theta: float
    above_high: float
    below_low: float

    def ahead(self, a: float, b: float) -> tuple[float, float, float]:
        """Return what is left to full when the output switches off, and its slopes along ``a`` and ``b``."""
        left = along_a = along_b = 0.0
        for c, t in self.modes:
            whole = -expm1(-(a + b) / t)
            decayed = c * exp(-(a - self.theta) / t) / whole
            g = -decayed * expm1(-b / t)
            left += g
            along_a -= g / (t * whole)
            along_b -= decayed * exp(-b / t) * expm1(-a / t) / (t * whole)
        return left, along_a, along_b

    def both_ahead(self, a: float, b: float) -> tuple[float, float, float, float, float, float]:
        """Return ``ahead(a, b)`` and ``ahead(b, a)``, of which the exponentials are the same."""
        theta = self.theta
        left_on = on_a = on_b = left_off = off_b = off_a = 0.0
        for c, t in self.modes:
            whole = -expm1(-(a + b) / t)
            gone_a, gone_b = expm1(-a / t), expm1(-b / t)
            share = t * whole
            decayed = c * exp(-(a - theta) / t) / whole
            g = -decayed * gone_b
            left_on += g
            on_a -= g / share
            on_b -= decayed * (1 + gone_b) * gone_a / share
            decayed = c * exp(-(b - theta) / t) / whole
            g = -decayed * gone_a
            left_off += g
            off_b -= g / share
            off_a -= decayed * (1 + gone_a) * gone_b / share
        return left_on, on_a, on_b, left_off, off_b, off_a


def lagged_cycle(
    y_on: float,
    y_off: float,
    tau: float,
    theta: float,
    high: float,
    low: float,
    lag: float = 0.0,
    sensor_lag: float = 0.0,
    min_run: float = 0.0,
    min_rest: float = 0.0,
) -> Cycle:
    """Return the settled cycle of a self-regulating plant with lags and least times.

    Parameters
    ----------
    y_on, y_off : float
        Where the value settles with full and with no output [degC].
    tau, theta, lag, sensor_lag : float
        Time constant, dead time, second lag and the lag of the measurement [s].
    high, low : float
        Measured value at which the output switches off and on [degC].
    min_run, min_rest : float
        Least time on and off [s].

    Returns
    -------
    Cycle
        Peak, trough and mean of the true value, the measured extremes [degC], time on and off [s].

    Raises
    ------
    NoCycle
        The plant cannot pass both switch points, or nothing keeps the switchings apart.

    References
    ----------
    Derived from the step response; compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_exact_cycle.py``.

    Examples
    --------
    >>> cycle = lagged_cycle(160, 20, 600, 30, high=66, low=64, sensor_lag=60)
    >>> cycle.swing > cycle.measured_swing  # the sensor hides part of the swing
    True
    """
    delay = theta + lag + sensor_lag + min(min_run, min_rest)
    if y_on <= high or y_off >= low or (delay <= 0 and high <= low):
        raise NoCycle(y_on, y_off, high, low)
    gain = y_on - y_off
    chain = _Chain(modes_of((tau, lag, sensor_lag)), theta, (y_on - high) / gain, (low - y_off) / gain)
    guess = relay_cycle(y_on, y_off, tau, theta + lag + sensor_lag, high, low) if theta + lag + sensor_lag > 0 or high > low else None
    start = (guess.t_on, guess.t_off) if guess else (min_run or min_rest, min_rest or min_run)
    true_modes = modes_of((tau, lag))
    times = _settle(chain, start, min_run, min_rest)
    if times is None:
        high_share, low_share = 1 - chain.above_high, chain.below_low
        found, _ = follow(Relay(true_modes, chain.modes, high_share, low_share, theta, min_run, min_rest))
        return scaled(found, gain, y_off)
    on, off = times

    def extreme(name: str) -> float:
        modes = chain.modes if name in _MEASURED else true_modes
        return y_off + gain * crest(modes, on, off) if name in _HIGH else y_on - gain * crest(modes, off, on)

    return _LateCycle.after({"t_on": on, "t_off": off, "mean": y_off + gain * on / (on + off)}, extreme)


class _LateCycle(Postponed, Cycle):
    """A cycle whose extremes are found when they are asked for: most searches look at its times alone."""

    __slots__ = ("_later",)


_MEASURED = ("measured_peak", "measured_trough")
_HIGH = ("peak", "measured_peak")


def scaled(cycle: Cycle, height: float, zero: float) -> Cycle:
    """Return a cycle given in shares as one in the value's unit."""
    levels = (zero + height * x for x in (cycle.peak, cycle.trough, cycle.mean, cycle.measured_peak, cycle.measured_trough))
    peak, trough, mean, seen_peak, seen_trough = levels
    return Cycle(peak, trough, cycle.t_on, cycle.t_off, mean, seen_peak, seen_trough)


def _settle(chain: _Chain, start: tuple[float, float], min_run: float, min_rest: float) -> tuple[float, float] | None:
    """Find which least times bind and return the settled times on and off; None where no cycle repeats by itself."""
    free = _newton(chain, start, None, None)
    if free is not None and free[0] >= min_run * (1 - HAIR) and free[1] >= min_rest * (1 - HAIR):
        return free
    begin = free or start
    longer = (max(begin[0], min_run), max(begin[1], min_rest))
    for run, rest in ((min_run, None), (None, min_rest), (min_run, min_rest)):
        if run == 0 or rest == 0:
            continue
        found = _newton(chain, longer, run, rest)
        if found is not None and _keeps_times(chain, found, run, rest, min_run, min_rest):
            relay = Relay((), chain.modes, 1 - chain.above_high, chain.below_low, chain.theta, min_run, min_rest)
            held = len(chain.modes) == 1 or attracts(relay, *found, run_fixed=run is not None, rest_fixed=rest is not None)
            return found if held else None
    return None


def _keeps_times(chain: _Chain, found: tuple[float, float], run: float | None, rest: float | None, min_run: float, min_rest: float) -> bool:
    """Tell whether the least times hold and each fixed time ends past its switch point."""
    a, b = found
    past_high = run is None or chain.ahead(a, b)[0] <= chain.above_high * (1 + HAIR)
    past_low = rest is None or chain.ahead(b, a)[0] <= chain.below_low * (1 + HAIR)
    return past_high and past_low and a >= min_run * (1 - HAIR) and b >= min_rest * (1 - HAIR)


def _newton(chain: _Chain, start: tuple[float, float], run: float | None, rest: float | None) -> tuple[float, float] | None:
    """Solve for the times that are not fixed; None where the steps do not settle on a genuine cycle."""
    theta = chain.theta
    a = run if run is not None else max(start[0], theta * 1.001)
    b = rest if rest is not None else max(start[1], theta * 1.001)
    if a <= theta or b <= theta:
        return None
    if run is not None and rest is not None:
        return a, b
    size = inf
    for _ in range(STEPS):
        left_on, on_a, on_b, left_off, off_b, off_a = chain.both_ahead(a, b)
        if left_on <= 0 or left_off <= 0:
            return None
        # logarithms, because what is left decays exponentially with the time that is sought
        f, g = log(left_on / chain.above_high), log(left_off / chain.below_low)
        on_a, on_b, off_a, off_b = on_a / left_on, on_b / left_on, off_a / left_off, off_b / left_off
        if run is not None:
            step_a, step_b = 0.0, -g / off_b if off_b else inf
        elif rest is not None:
            step_a, step_b = -f / on_a if on_a else inf, 0.0
        else:
            whole = on_a * off_b - on_b * off_a
            if whole == 0:
                return None
            step_a, step_b = (g * on_b - f * off_b) / whole, (f * off_a - g * on_a) / whole
        if not (isfinite(step_a) and isfinite(step_b)):
            return None
        # never past the dead time, never more than threefold at once
        shrink = 1.0
        for step, at in ((step_a, a - theta), (step_b, b - theta)):
            most = 0.7 * at / -step if step < 0 else 2 * (at + theta) / step if step > 0 else 1.0
            shrink = min(shrink, most)
        a += shrink * step_a
        b += shrink * step_b
        size, before = max(abs(step_a) / a, abs(step_b) / b), size
        # steps that stop shrinking are the last digits rattling, where lags are nearly equal or the swing is tiny beside the change
        if size <= CLOSE or (size <= RATTLE and size > before / 4):
            return (a, b) if _genuine(chain, a, b, run, rest) else None
    return None


def _genuine(chain: _Chain, a: float, b: float, run: float | None, rest: float | None) -> bool:
    """Tell whether the measurement passes the upper point rising and the lower point falling."""
    up = down = 0.0
    theta = chain.theta
    for c, t in chain.modes:
        share = c / (t * expm1(-(a + b) / t))
        up += share * expm1(-b / t) * exp(-(a - theta) / t)
        down += share * expm1(-a / t) * exp(-(b - theta) / t)
    return (run is not None or up > 0) and (rest is not None or down > 0)


def lagged_integrating_cycle(
    r_on: float,
    r_off: float,
    theta: float,
    high: float,
    low: float,
    lag: float = 0.0,
    sensor_lag: float = 0.0,
    min_run: float = 0.0,
    min_rest: float = 0.0,
) -> Cycle:
    """Return the settled cycle of an integrating plant with lags and least times.

    Parameters
    ----------
    r_on, r_off : float
        Speed with full output, and back without, both positive [K/s].
    theta, lag, sensor_lag, min_run, min_rest : float
        Dead time, second lag, lag of the measurement, least time on and off [s].
    high, low : float
        Measured value at which the output switches off and on [degC].

    Returns
    -------
    Cycle
        Peak, trough and mean of the true value, the measured extremes [degC], time on and off [s].

    Raises
    ------
    NoCycle
        A speed is not positive, or nothing keeps the switchings apart.

    Notes
    -----
    What the on time adds the off time takes: ``r_on t_on = r_off t_off`` leaves one unknown, and of two least times the one that asks
    for the longer cycle binds.

    References
    ----------
    Derived; compared with ``scipy.integrate.solve_ivp`` in ``tests/process/test_exact_cycle.py``.

    Examples
    --------
    >>> cycle = lagged_integrating_cycle(0.2, 0.1, 5, high=1, low=-1, min_run=60)
    >>> cycle.t_on, round(cycle.t_off, 9), round(cycle.trough, 9), round(cycle.peak, 9)
    (60.0, 120.0, -1.5, 10.5)
    """
    delay = theta + lag + sensor_lag + min(min_run, min_rest)
    if r_on <= 0 or r_off <= 0 or (delay <= 0 and high <= low):
        raise NoCycle(high + r_on if r_on <= 0 else inf, low - r_off if r_off <= 0 else -inf, high, low)
    ratio = r_on / r_off
    span = r_on + r_off
    modes = modes_of((lag, sensor_lag)) if max(lag, sensor_lag) > 0 else ()

    def behind(on: float) -> float:
        # after_on less after_off of each mode
        off = on * ratio
        gathered = 0.0
        for c, t in modes:
            whole = expm1(-(on + off) / t)
            rises, falls = expm1(-off / t) / whole * exp(-(on - theta) / t), expm1(-on / t) / whole * exp(-(off - theta) / t)
            gathered += c * t * (1 - rises - falls)
        return gathered

    def distance(on: float) -> float:
        return r_on * on - span * (theta + behind(on)) - (high - low)

    # lags hold the integral back by less than a dead time of their length would: the cycle with that dead time is never shorter
    longest = (high - low + span * (theta + lag + sensor_lag)) / r_on
    natural = _last_root(distance, max(theta, theta / ratio), longest) if longest > 0 else 0.0
    run_binds, rest_binds = min_run > natural, min_rest / ratio > natural
    by_rest = rest_binds and min_rest / ratio >= min_run
    on = natural
    if run_binds or rest_binds:
        on = max(float(min_run), min_rest / ratio)
        relay = Relay(modes_of((lag,)) if lag > 0 else (), modes, high / span, low / span, theta, min_run, min_rest, r_off / span)
        if modes and not attracts(relay, on, on * ratio, run_fixed=not by_rest, rest_fixed=by_rest):
            return scaled(follow(relay)[0], span, 0.0)
    off = on * ratio
    # the integral of the plant's input when that goes on: from the switch point whose crossing is not held up
    if by_rest:
        start = high - r_on * (on - theta) + sum(c * t * (span * after_on(((1.0, t),), on, off, on - theta) - r_off) for c, t in modes)
    else:
        start = low - r_off * theta + sum(c * t * (span * after_off(((1.0, t),), on, off, off - theta) - r_off) for c, t in modes)
    true_modes = modes_of((lag,)) if lag > 0 else ()
    mean = start + r_on * on / 2

    def extreme(name: str) -> float:
        own = modes if name in _MEASURED else true_modes
        return mean + span * ramp_crest(own, on, off) if name in _HIGH else mean - span * ramp_crest(own, off, on)

    return _LateCycle.after({"t_on": on, "t_off": off, "mean": mean}, extreme)


def _last_root(distance: Callable[[float], float], least: float, most: float) -> float:
    """Return the last root of a function that is not negative at ``most``; earlier ones pass the switch point the wrong way."""
    above = most
    below = max(least, 0.75 * most)
    while distance(below) > 0:
        if below <= least * (1 + HAIR) or below < most * HAIR:
            return below
        above, below = below, max(least, 0.75 * below)
    return float(brentq(distance, below, above, xtol=1e-14 * most, rtol=1e-13)) if distance(above) > 0 else above

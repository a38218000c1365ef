"""Identification of a first-order response with dead time from a recorded step test."""

from dataclasses import replace

import numpy as np
from numpy.typing import ArrayLike, NDArray
from scipy.special import fdtrc, stdtrit

from specgen.process.step_test_interval import Spread, resolution, spread
from specgen.process.step_test_response import Array, OutputRecord, staircase
from specgen.process.step_test_result import Identified, Interval, NotIdentified, Record, at_rated_supply
from specgen.process.step_test_search import Point, Samples, best_fit, solved

__all__ = ["Identified", "Interval", "NotIdentified", "at_rated_supply", "identify"]

FEWEST_POINTS = 20
MOST_POINTS = 20_000
LEAST_RESPONSE = 5.0  # times the noise
LEAST_TIME_CONSTANTS = 2.0
WIDEST = 0.5  # of the value
# An interval of the dead time narrower than this share of the time constant hardly moves a peak, however short the dead time is
NARROW_THETA = 0.05
_MOST_MISSING = 0.10
_LONGEST_GAP = 0.05
_SEEN_BEFORE = 5
_MOVING = 0.02  # of the response
_TELLS = 0.30  # of the response
_CHANCE = 1e-3
_MISREADING = 20.0  # times the middle residual; of normal noise the largest of a million is 7
_NOT_FIRST_ORDER = 0.5  # correlation of neighbouring residuals


def identify(times: ArrayLike, output: ArrayLike, value: ArrayLike, *, sensor_lag: float = 0.0) -> Identified | NotIdentified:
    r"""Fit a first-order response with dead time to a recording.

    Parameters
    ----------
    times : array
        Time of each sample, increasing, at any distances [s].
    output : array
        Output at each sample, held until the next [fraction]; any course that moves at least once.
    value : array
        Measured value at each sample. NaN in any of the three leaves the sample out.
    sensor_lag : float
        Known first-order lag between the true value and the measured [s]; it is fitted through, so that tau and theta are the true value's.

    Returns
    -------
    Identified or NotIdentified
        The numbers with their 95 % intervals, or the reason why the recording does not give them.

    Raises
    ------
    ValueError
        The three arrays are not of one length, or the lag is negative: a mistake of the caller.

    Notes
    -----
    Least squares on ``y0, drift, K, tau, theta`` in :math:`y = y_0 + drift\,(t - t_0) + K\,x(t; \tau, \theta)`, with :math:`x` the
    exact response to the output's changes, from rest. Where the samples before the first change show that the value was still
    settling, a decay :math:`c\,e^{-(t - t_0)/\tau}` is fitted too and no rest value is given. The rest value is :math:`y_0 - K u_0`.

    Refused are: fewer than 20 samples, empty cells beyond 10 % or in one long stretch, no change of output, a constant value, a response
    below 5 times the noise, a record that ends before theta + 2 tau, too few samples on the rise, and a gain, time constant or dead
    time whose interval is wider than half the value (a dead time's may be as wide as a twentieth of the time constant: it then matters
    little however short the dead time).

    The intervals do not cover a plant that is not first order; residuals that hang together widen them.

    References
    ----------
    Derived; see `specgen.process.step_test_response` and `specgen.process.step_test_interval`. Coverage is measured in
    ``tests/process/test_step_test_coverage.py``.

    Examples
    --------
    A heater at 20 %, raised to 70 % after 100 s: gain 130 K, time constant 600 s, dead time 25 s, read every 10 s to 0.1 K.

    >>> t = np.arange(0.0, 4000.0, 10.0)
    >>> out = np.where(t < 100.0, 0.2, 0.7)
    >>> rise = np.where(t < 125.0, 0.0, 1.0 - np.exp(-(t - 125.0) / 600.0))
    >>> found = identify(t, out, np.round(46.0 + 65.0 * rise, 1))
    >>> [f"{number.low:.1f} to {number.high:.1f}" for number in (found.gain, found.tau, found.theta, found.rest)]
    ['129.8 to 130.2', '598.7 to 601.0', '24.5 to 25.6', '19.9 to 20.1']
    """
    t, u, y = (np.asarray(column, dtype=np.float64) for column in (times, output, value))
    if not t.ndim == u.ndim == y.ndim == 1 or not len(t) == len(u) == len(y) or sensor_lag < 0.0:
        raise ValueError("time, output and value are rows of one length and the lag is not negative")
    present = np.isfinite(t) & np.isfinite(u) & np.isfinite(y)
    refused = _missing(present) or _unusable(t[present], u[present], y[present])
    if refused is not None:
        return refused
    t, u, y = t[present], u[present], y[present]
    course = staircase(t, u)
    every = -(-len(t) // MOST_POINTS)
    samples = Samples(t[::every], y[::every], course, sensor_lag)
    samples, point, width = _fitted(samples)
    fitted = samples.value - point.residuals
    record = Record(samples.times, u[::every], samples.value, fitted, dropped=len(present) - len(t), every=every)
    found = _answer(samples, point, width, record, last_before_change=float(np.min(course.times[1] - t[t < course.times[1]])))
    return _unfit(samples, found) or found


def _missing(present: NDArray[np.bool_]) -> NotIdentified | None:
    count = len(present)
    if count == 0:
        return None
    edges = np.flatnonzero(np.concatenate(([True], present, [True])))
    longest = int(np.max(np.diff(edges))) - 1
    missing = count - int(np.sum(present))
    if missing > _MOST_MISSING * count or longest > max(_LONGEST_GAP * count, 3):
        return NotIdentified(
            "gaps",
            f"{missing} of {count} rows have an empty cell, {longest} of them in one stretch",
            "cut the record to a stretch without gaps, or record again",
        )
    return None


def _unusable(t: Array, u: Array, y: Array) -> NotIdentified | None:
    """Return why no fit can begin, None where it can."""
    if len(t) < FEWEST_POINTS:
        return NotIdentified("too_few_points", f"{len(t)} samples; at least {FEWEST_POINTS} are needed", "record at a shorter interval")
    back = np.flatnonzero(np.diff(t) <= 0.0)
    if len(back):
        where = int(back[0]) + 1
        return NotIdentified(
            "time_not_increasing",
            f"time stands still or goes back at sample {where + 1}: {t[where]:g} s after {t[where - 1]:g} s",
            "remove doubled rows, or the rows from before a clock change",
        )
    if np.min(u) < -0.005 or np.max(u) > 1.005:  # noqa: PLR2004 - what a scaling of 0 to 100 % may overshoot
        text = f"the output runs from {100 * np.min(u):g} to {100 * np.max(u):g} percent; it lies within 0 to 100 percent"
        return NotIdentified("bad_output", text, "is the column in percent, and is it the output?")
    if np.ptp(u[:-1]) == 0.0:
        return NotIdentified(
            "no_step",
            f"the output stands at {100 * u[0]:g} percent throughout",
            "start the record before the output is changed, and change it by hand",
        )
    if np.ptp(y) == 0.0:
        text = f"the value stands at {y[0]:g} throughout"
        return NotIdentified("constant_value", text, "is the sensor connected, and is it this loop's?")
    return None


def _fitted(samples: Samples) -> tuple[Samples, Point, Spread]:
    """Return the fit, with a decay from the start where the value was clearly not at rest before the first change."""
    point = best_fit(samples)
    width = spread(samples, point)
    before = int(np.searchsorted(samples.times, samples.output.times[1]))
    if before < _SEEN_BEFORE or samples.after_change < point.theta + LEAST_TIME_CONSTANTS * point.tau:
        # nothing to tell it by; or a record too short, which a decay would only make look long enough
        return samples, point, width
    free = replace(samples, free_start=True)
    decaying = solved(free, point.tau, point.theta)
    freedom = len(samples.times) - len(decaying.linear) - 2
    grown = (1.0 + width.correlation) / (1.0 - width.correlation)
    # rounding errors of a fit without noise are no decay
    least = (1e-9 * float(np.ptp(samples.value))) ** 2
    won = (point.squares - decaying.squares) / max(decaying.squares / freedom, least) / grown
    response = abs(point.linear[2]) * float(np.ptp(samples.columns(point.tau, point.theta)[:, 2]))
    if abs(decaying.linear[3]) > _MOVING * response and fdtrc(1.0, freedom, max(won, 0.0)) < _CHANCE:
        decaying = best_fit(free)
        return free, decaying, spread(free, decaying)
    return samples, point, width


def _answer(samples: Samples, point: Point, width: Spread, record: Record, last_before_change: float) -> Identified:
    free = samples.free_start
    others = [0.0] * len(point.linear)

    def interval(at: float, *weights: float, least: float = -np.inf) -> Interval:
        half = width.half_width(*weights)
        return Interval(at, max(at - half, least), at + half)

    def one(position: int) -> list[float]:
        return [float(k == position) for k in range(len(point.linear) + 2)]

    start, drift, gain = (float(number) for number in point.linear[:3])
    slope = interval(drift, *one(1))
    response = abs(gain) * float(np.ptp(samples.columns(point.tau, point.theta)[:, 2]))
    u0 = samples.output.start
    reason, known = _steady(samples, point, width, response)
    rest = interval(start - gain * u0, 1.0, 0.0, -u0, *others[3:], 0.0, 0.0) if known else None
    return Identified(
        gain=interval(gain, *one(2)),
        tau=interval(point.tau, *one(len(point.linear)), least=0.0),
        theta=interval(point.theta, *one(len(point.linear) + 1), least=0.0),
        start=interval(start, *one(0)),
        drift=Interval(slope.value / samples.span, slope.low / samples.span, slope.high / samples.span),
        rest=rest,
        rest_because=reason,
        at_rest_before=not free,
        response=response,
        noise=width.noise,
        correlation=width.correlation,
        resolution=resolution(samples.value),
        last_before_change=last_before_change,
        record=record,
    )


def _steady(samples: Samples, point: Point, width: Spread, response: float) -> tuple[str, bool]:
    """Tell whether the value was at rest before the first change, and by what."""
    before = samples.times < samples.output.times[1] + point.theta
    t, y = samples.times[before], samples.value[before]
    if samples.free_start:
        return "the value was still settling from before when the record began", False
    if len(t) < _SEEN_BEFORE:
        return f"only {len(t)} samples stand before the first change, too few to show that the value was at rest", False
    centred = t - np.mean(t)
    squares = float(centred @ centred)
    slope = float(centred @ y) / squares
    half = float(stdtrit(len(t) - 2.0, 0.995)) * width.noise / np.sqrt(squares)
    if half * point.tau > _TELLS * response:
        return f"the {t[-1] - t[0]:.3g} s before the first response are too short to show that the value was at rest", False
    if (abs(slope) - half) * point.tau > _MOVING * response:
        return "the value was moving before the first change", False
    return f"the value was at rest for {t[-1] - t[0]:.3g} s before the first response; rest value: start - gain x first output", True


def _unfit(samples: Samples, found: Identified) -> NotIdentified | None:
    """Return why a fit that was found is not to be designed with."""
    if found.response < LEAST_RESPONSE * found.noise:
        return _weak(found)
    needed = found.theta.value + LEAST_TIME_CONSTANTS * found.tau.value
    if samples.after_change < needed:
        return NotIdentified(
            "short_record",
            f"the record ends {samples.after_change:.4g} s after the first change; "
            f"dead time and two time constants are {needed:.4g} s by this fit",
            "record until the value has nearly settled; where it never does, as in a level or a receiver's pressure, declare rates",
        )
    if _on_the_rise(samples.times, samples.output, found) < 3:  # noqa: PLR2004 - fewer say nothing about the shape
        return NotIdentified(
            "coarse_sampling",
            f"hardly a sample lies on the rise: it takes {2.0 * found.tau.value:.3g} s, the samples are {samples.sampling:.3g} s apart",
            "record at a tenth of the time constant or less",
        )
    for name, number in (("gain", found.gain), ("time constant", found.tau), ("dead time", found.theta)):
        narrow = NARROW_THETA * found.tau.value if name == "dead time" else 0.0
        if number.width > max(WIDEST * abs(number.value), narrow):
            text = f"the {name} is {number.value:.3g} but may lie anywhere from {number.low:.3g} to {number.high:.3g}"
            hint = "make a larger step, record longer, or record a step up and a step down"
            if found.correlation > _NOT_FIRST_ORDER:
                text += f"; the residuals hang together (correlation {found.correlation:.2f})"
                hint = "the plant may not be first order, or something else moved it: " + hint + "; declare the sensor's lag"
            return NotIdentified("wide_interval", text, hint)
    return None


def _weak(found: Identified) -> NotIdentified:
    """Refuse a response that the noise hides; a single misreading can be most of the noise, and is named."""
    text = f"the response is {found.response / found.noise:.2g} times the noise; at least {LEAST_RESPONSE:g} times is needed"
    off = np.abs(found.record.residuals)
    worst = int(np.argmax(off))
    if off[worst] > _MISREADING * np.median(off):
        return NotIdentified("weak_step", text, f"the sample at {found.record.times[worst]:g} s lies far off the others: leave it out")
    return NotIdentified("weak_step", text, "make a larger step, or quieten the measurement")


def _on_the_rise(times: Array, output: OutputRecord, found: Identified) -> int:
    """Return the most samples that lie within two time constants of the arrival of a change."""
    begin = output.times[1:] + found.theta.value
    inside = np.searchsorted(times, begin + 2.0 * found.tau.value) - np.searchsorted(times, begin)
    return int(np.max(inside))

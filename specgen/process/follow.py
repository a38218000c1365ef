"""Following a switched loop cycle after cycle, exactly, where one repeated cycle is not what it settles to.

Least times together with lags can make long and short cycles alternate: a run that the least time stretched leaves the value so far
down that the next one ends by itself. What repeats is then a pattern of several cycles, or nothing does; its extremes and its mean
times are what counts.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from math import exp, inf, log, sqrt

import numpy as np
from scipy.optimize import brentq

from specgen.process.limit_cycle import Cycle, NoCycle
from specgen.process.periodic import Mode, full_at_end

SAME = 1e-9
FIRM = 0.9
SETTLING = 400
LONGEST_PATTERN = 64
STILL = 1e-15  # of the time sought: a step that moves less is rounding


@dataclass(frozen=True, slots=True)
class Relay:
    """A two-position loop in shares of the whole change (of the whole speed, for an integrating plant).

    Parameters
    ----------
    true, measured : tuple of (weight, time constant [s])
        Chains from the plant's input to the true and to the measured value; ahead of the integrator where there is one.
    high, low : float
        Measured value at which the output switches off and on.
    theta, min_run, min_rest : float
        Dead time, least time on and off [s].
    duty : float or None
        Share of full output at which an integrating plant stands still; None for a plant that settles.
    """

    true: tuple[Mode, ...]
    measured: tuple[Mode, ...]
    high: float
    low: float
    theta: float
    min_run: float
    min_rest: float
    duty: float | None = None


@dataclass(frozen=True, slots=True)
class _Track:
    """One value on its way: weights and time constants, the lags' states, the integral."""

    weights: tuple[float, ...]
    constants: tuple[float, ...]
    states: tuple[float, ...]
    level: float

    def at(self, s: float, share: float | None) -> float:
        """Return the value a time ``s`` into a phase with full input."""
        value, settled = (0.0, 1.0) if share is None else (self.level + (1 - share) * s, 1 - share)
        for weight, constant, state in zip(self.weights, self.constants, self.states, strict=True):
            value += weight * settled - weight * (1 - state) * exp(-s / constant)
        return value

    def slope(self, s: float, share: float | None) -> float:
        """Return the slope of the value a time ``s`` into a phase with full input."""
        return self.seen(s, share)[1]

    def seen(self, s: float, share: float | None) -> tuple[float, float]:
        """Return value and slope a time ``s`` into a phase with full input."""
        value, slope = (0.0, 0.0) if share is None else (self.level + (1 - share) * s, 1 - share)
        settled = 1.0 if share is None else 1 - share
        for weight, constant, state in zip(self.weights, self.constants, self.states, strict=True):
            left = weight * (1 - state) * exp(-s / constant)
            value += weight * settled - left
            slope += left / constant
        return value, slope

    def after(self, length: float, share: float | None) -> "_Track":
        """Return the track at the end of a phase with full input, mirrored for the phase without."""
        states = tuple([(1 - y) * exp(-length / t) for t, y in zip(self.constants, self.states, strict=True)])
        level = 0.0 if share is None else -(self.level + (1 - share) * length)
        return _Track(self.weights, self.constants, states, level)


def _track(modes: Sequence[Mode], *, integrates: bool) -> _Track:
    weights = tuple(-c * t if integrates else c for c, t in modes)
    return _Track(weights, tuple(t for _, t in modes), (0.0,) * len(modes), 0.0)


def _lowest(track: _Track, length: float, share: float | None) -> float:
    """Return the lowest value in a phase with full input."""
    if track.slope(0.0, share) >= 0:
        return track.at(0.0, share)
    if track.slope(length, share) <= 0:
        return track.at(length, share)
    if share is None and len(track.constants) == 2:  # noqa: PLR2004  two falling exponentials meet once
        (w1, w2), (t1, t2), (y1, y2) = track.weights, track.constants, track.states
        return track.at(log(-(w2 * (1 - y2) * t1) / (w1 * (1 - y1) * t2)) / (1 / t2 - 1 / t1), share)
    return track.at(float(brentq(track.slope, 0.0, length, args=(share,), xtol=1e-13 * length)), share)


def follow(relay: Relay) -> tuple[Cycle, int]:
    """Follow the loop from rest until its cycles repeat.

    Parameters
    ----------
    relay : Relay
        The loop.

    Returns
    -------
    tuple of (Cycle, int)
        Extremes over the repeated pattern with its mean times [s] and the number of cycles in the pattern; 0 where none repeats (then
        over the last 64 cycles). Values in shares, as the switch points were given.

    Raises
    ------
    NoCycle
        The value does not pass a switch point.
    """
    share = relay.duty
    turned = None if share is None else 1 - share
    full = 0.0 if share is not None else 1.0
    true, measured = (_track(m, integrates=share is not None) for m in (relay.true, relay.measured))
    phases: list[_Phases] = []
    on = off = 0.0
    for _ in range(SETTLING + LONGEST_PATTERN):
        rising, seen_rising = true, measured
        on = _length(relay, measured, relay.high, share, relay.min_run, on)
        true, measured = true.after(on, share), measured.after(on, share)
        falling, seen_falling = true, measured
        off = _length(relay, measured, full - relay.low, turned, relay.min_rest, off)
        true, measured = true.after(off, turned), measured.after(off, turned)
        phases.append(_Phases(on, off, share, (rising, seen_rising), (falling, seen_falling)))
        pattern = _repeats(phases)
        if pattern:
            return _summed(phases[-pattern:]), pattern
    return _summed(phases[-LONGEST_PATTERN:]), 0


@dataclass(slots=True)
class _Phases:
    """One cycle: its times, and the true and the measured value as its two phases begin. Extremes are found when asked for."""

    on: float
    off: float
    share: float | None
    rising: tuple[_Track, _Track]
    falling: tuple[_Track, _Track]
    known: tuple[float, float] | None = None

    @property
    def extremes(self) -> tuple[float, float]:
        """Return the highest and the lowest true value."""
        if self.known is None:
            self.known = self._extremes(0)
        return self.known

    @property
    def measured_extremes(self) -> tuple[float, float]:
        """Return the highest and the lowest measured value."""
        return self._extremes(1)

    def _extremes(self, which: int) -> tuple[float, float]:
        turned, full = (None, 1.0) if self.share is None else (1 - self.share, 0.0)
        return full - _lowest(self.falling[which], self.off, turned), _lowest(self.rising[which], self.on, self.share)


def _repeats(phases: list[_Phases]) -> int:
    """Return after how many cycles the last ones repeat; 0 for not yet."""
    if len(phases) < 2:  # noqa: PLR2004  one cycle repeats nothing
        return 0
    last, before = phases[-1], phases[-2]
    near = SAME * (last.on + last.off)
    creeping = abs(last.on - before.on) <= near * 1e3 and abs(last.off - before.off) <= near * 1e3
    for back in range(1, min(LONGEST_PATTERN, len(phases) // 2) + 1):
        pairs = [(phases[-1 - i], phases[-1 - i - back]) for i in range(back)]
        if all(abs(x.on - y.on) <= near and abs(x.off - y.off) <= near for x, y in pairs) and _same_extremes(pairs):
            return back
        if creeping:
            return 0  # still creeping towards one cycle
    return 0


def _same_extremes(pairs: list[tuple[_Phases, _Phases]]) -> bool:
    high, low = pairs[0][0].extremes
    near = SAME * (high - low)
    return all(
        abs(x.extremes[0] - y.extremes[0]) <= near and abs(x.extremes[1] - y.extremes[1]) <= near for x, y in pairs
    )


def _summed(phases: list[_Phases]) -> Cycle:
    """Make one cycle of several: extremes over all, mean times."""
    count = len(phases)
    on, off = sum(p.on for p in phases) / count, sum(p.off for p in phases) / count
    if on <= 0 or off <= 0:
        # at the very edge of what switches, without a dead time, rounding leaves no time between the switchings
        raise NoCycle(inf, -inf, 0.0, 0.0)
    peak, trough = max(p.extremes[0] for p in phases), min(p.extremes[1] for p in phases)
    seen = [p.measured_extremes for p in phases]
    mean = on / (on + off) if phases[0].share is None else (peak + trough) / 2
    return Cycle(peak, trough, on, off, mean, max(top for top, _ in seen), min(low for _, low in seen))


def _length(relay: Relay, measured: _Track, target: float, share: float | None, least: float, before: float) -> float:
    """Return how long the output stays as it is [s]; the phase counts from when the plant's input changed.

    ``before`` is the length of the same phase one cycle earlier, near which the crossing is looked for.
    """
    if measured.at(0.0, share) >= target:
        return max(relay.theta, least)
    if least > relay.theta and measured.at(least - relay.theta, share) >= target:
        return least
    return max(relay.theta + _crossing(relay, measured, target, share, before - relay.theta), least)


def _crossing(relay: Relay, measured: _Track, target: float, share: float | None, near: float) -> float:
    """Return when the measured value passes the target, once it has turned [s]: Newton's steps inside a bracket."""
    low, high = 0.0, max(relay.theta, relay.min_run, relay.min_rest, near, *measured.constants, 1e-6)
    for _ in range(200):
        if measured.at(high, share) >= target:
            break
        low, high = high, high * 2
    else:
        raise NoCycle(measured.at(high, share), -inf, target, -inf)
    at = near if low < near < high else (low + high) / 2
    for _ in range(200):
        value, slope = measured.seen(at, share)
        if value >= target:
            high = at
        else:
            low = at
        following = at - (value - target) / slope if slope > 0 else inf
        if not low < following < high:
            following = (low + high) / 2
        if abs(following - at) <= STILL * following:
            return following
        at = following
    return at


def attracts(relay: Relay, a: float, b: float, *, run_fixed: bool, rest_fixed: bool) -> bool:
    """Tell whether a repeated cycle firmly draws its neighbours in.

    Parameters
    ----------
    relay : Relay
        The loop.
    a, b : float
        Times on and off of the repeated cycle [s].
    run_fixed, rest_fixed : bool
        Whether a least time, not the switch point, ends the phase.

    Notes
    -----
    With ``E`` the decay over a phase, ``d`` the coordinates' speed at its end and ``h`` what they have left of the measurement at the
    crossing, a phase that ends by its crossing maps a small change by ``E - d h/(m')``, one of fixed length by ``E``. All multipliers of
    the whole cycle must be below 0.9: just below 1 a second, alternating pattern can live beside the cycle, and that is the one a start
    from rest falls into.
    """
    share = None if relay.duty is None else a / (a + b)
    if share is None and len(relay.measured) == 2:  # noqa: PLR2004  a matrix of two by two: its larger multiplier in closed form
        return _of_two(_rows(relay, b, a, fixed=run_fixed), _rows(relay, a, b, fixed=rest_fixed)) < FIRM
    through = _through(relay, b, a, share, fixed=run_fixed)
    back = _through(relay, a, b, None if share is None else 1 - share, fixed=rest_fixed)
    multipliers = np.abs(np.linalg.eigvals(back @ through))
    return bool(multipliers.max() < FIRM)


Rows = tuple[tuple[float, float], tuple[float, float]]


def _of_two(first: Rows, then: Rows) -> float:
    """Return the larger multiplier, in size, of two phases one after the other."""
    (a, b), (c, d) = first
    (e, f), (g, h) = then
    trace, whole = e * a + f * c + g * b + h * d, (a * d - b * c) * (e * h - f * g)
    half = trace / 2
    apart = half * half - whole
    return abs(half) + sqrt(apart) if apart >= 0 else sqrt(whole)


def _rows(relay: Relay, before: float, length: float, *, fixed: bool) -> Rows:
    """Return ``_through`` of two modes that settle."""
    (c1, t1), (c2, t2) = relay.measured
    d1, d2 = exp(-length / t1), exp(-length / t2)
    if fixed:
        return (d1, 0.0), (0.0, d2)
    crossing = length - relay.theta
    u1, u2 = full_at_end(t1, before, length) / t1, full_at_end(t2, before, length) / t2
    h1, h2 = c1 * exp(-crossing / t1), c2 * exp(-crossing / t2)
    going = h1 * u1 + h2 * u2
    v1, v2 = u1 * d1 / going, u2 * d2 / going
    return (d1 - v1 * h1, -v1 * h2), (-v2 * h1, d2 - v2 * h2)


Matrix = np.ndarray[tuple[int, int], np.dtype[np.float64]]


def _through(relay: Relay, before: float, length: float, share: float | None, *, fixed: bool) -> Matrix:
    """Return how a small change of the coordinates passes one phase."""
    crossing = length - relay.theta
    constants = [t for _, t in relay.measured]
    weights = [c if share is None else -c * t for c, t in relay.measured]
    behind = [full_at_end(t, before, length) for t in constants]
    decay = [exp(-length / t) for t in constants]
    speed = [u / t * e for u, t, e in zip(behind, constants, decay, strict=True)]
    left = [w * exp(-crossing / t) for w, t in zip(weights, constants, strict=True)]
    going = sum(h * u / t for h, u, t in zip(left, behind, constants, strict=True))
    if share is not None:
        decay, speed, left, going = [*decay, 1.0], [*speed, 1 - share], [*left, 1.0], going + 1 - share
    passing = np.diag(decay)
    return passing if fixed else passing - np.outer(speed, left) / going

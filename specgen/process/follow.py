"""Following a switched loop cycle after cycle, exactly, where one repeated cycle is not what it settles to.

Least times together with lags can make long and short cycles alternate: a run that the least time stretched leaves the value so far
down that the next one ends by itself. What repeats is then a pattern of several cycles, or nothing does; its extremes and its mean
times are what counts.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from math import exp, inf

import numpy as np
from scipy.optimize import brentq

from specgen.process.limit_cycle import Cycle, NoCycle
from specgen.process.periodic import Mode, full_at_end

SAME = 1e-9
FIRM = 0.9
SETTLING = 400
LONGEST_PATTERN = 64


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
        lags = zip(self.weights, self.constants, self.states, strict=True)
        if share is None:
            return sum(w * (1 - (1 - y) * exp(-s / t)) for w, t, y in lags)
        return self.level + (1 - share) * s + sum(w * (1 - (1 - y) * exp(-s / t) - share) for w, t, y in lags)

    def slope(self, s: float, share: float | None) -> float:
        """Return the slope of the value a time ``s`` into a phase with full input."""
        lags = zip(self.weights, self.constants, self.states, strict=True)
        return (0.0 if share is None else 1 - share) + sum(w * (1 - y) / t * exp(-s / t) for w, t, y in lags)

    def after(self, length: float, share: float | None) -> "_Track":
        """Return the track at the end of a phase with full input, mirrored for the phase without."""
        states = tuple((1 - y) * exp(-length / t) for t, y in zip(self.constants, self.states, strict=True))
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
    true, measured = (_track(m, integrates=share is not None) for m in (relay.true, relay.measured))
    starts: list[tuple[float, ...]] = []
    phases: list[tuple[float, float, float, float, float, float]] = []
    full = 0.0 if share is not None else 1.0
    for _ in range(SETTLING + LONGEST_PATTERN):
        on = _length(relay, measured, relay.high, share, relay.min_run)
        low, seen_low = _lowest(true, on, share), _lowest(measured, on, share)
        true, measured = true.after(on, share), measured.after(on, share)
        off = _length(relay, measured, full - relay.low, turned, relay.min_rest)
        top, seen_top = full - _lowest(true, off, turned), full - _lowest(measured, off, turned)
        true, measured = true.after(off, turned), measured.after(off, turned)
        phases.append((on, off, top, low, seen_top, seen_low))
        starts.append((on, off, top, low))
        pattern = _repeats(starts)
        if pattern:
            return _summed(phases[-pattern:], share), pattern
    return _summed(phases[-LONGEST_PATTERN:], share), 0


def _repeats(starts: list[tuple[float, ...]]) -> int:
    """Return after how many cycles the last ones repeat; 0 for not yet."""
    last = starts[-1]
    near = [SAME * (last[0] + last[1])] * 2 + [SAME * (last[2] - last[3])] * 2
    for back in range(1, min(LONGEST_PATTERN, len(starts) // 2) + 1):
        pairs = [(starts[-1 - i], starts[-1 - i - back]) for i in range(back)]
        if all(abs(x - y) <= e for one, other in pairs for x, y, e in zip(one, other, near, strict=True)):
            return back
        if abs(last[0] - starts[-2][0]) <= near[0] * 1e3 and abs(last[1] - starts[-2][1]) <= near[1] * 1e3:
            return 0  # still creeping towards one cycle
    return 0


def _summed(phases: list[tuple[float, float, float, float, float, float]], share: float | None) -> Cycle:
    """Make one cycle of several: extremes over all, mean times."""
    count = len(phases)
    on, off = sum(p[0] for p in phases) / count, sum(p[1] for p in phases) / count
    peak, trough = max(p[2] for p in phases), min(p[3] for p in phases)
    mean = on / (on + off) if share is None else (peak + trough) / 2
    return Cycle(peak, trough, on, off, mean, max(p[4] for p in phases), min(p[5] for p in phases))


def _length(relay: Relay, measured: _Track, target: float, share: float | None, least: float) -> float:
    """Return how long the output stays as it is [s]; the phase counts from when the plant's input changed."""

    def left(s: float) -> float:
        return measured.at(s, share) - target

    reach = 0.0
    if left(0.0) < 0:
        reach = max(relay.theta, least, *measured.constants, 1e-6)
        for _ in range(200):
            if left(reach) >= 0:
                break
            reach *= 2
        else:
            raise NoCycle(measured.at(reach, share), -inf, target, -inf)
        reach = float(brentq(left, 0.0, reach, xtol=1e-14 * reach, rtol=1e-13))
    return max(relay.theta + reach, least)


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
    through = _through(relay, b, a, share, fixed=run_fixed)
    back = _through(relay, a, b, None if share is None else 1 - share, fixed=rest_fixed)
    multipliers = np.abs(np.linalg.eigvals(back @ through))
    return bool(multipliers.max() < FIRM)


Matrix = np.ndarray[tuple[int, int], np.dtype[np.float64]]


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

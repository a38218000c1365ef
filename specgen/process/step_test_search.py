"""The search for time constant and dead time: what is linear is solved for, the rest is searched from many starts."""

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np
from scipy.optimize import least_squares

from specgen.process.step_test_response import Array, OutputRecord, unit_response

_TAU_STARTS = 14
_THETA_STARTS = 16
_REFINED = 3
_COARSE_SAMPLES = 400


@dataclass(frozen=True, slots=True)
class Samples:
    """What is fitted: the value at ``times`` [s] and the output behind it; ``lag`` is the sensor's, known [s].

    ``free_start`` adds a decay from the start of the recording, for a value that was not at rest then.
    """

    times: Array
    value: Array
    output: OutputRecord
    lag: float = 0.0
    free_start: bool = False

    @property
    def span(self) -> float:
        """Length of the recording [s]."""
        return float(self.times[-1] - self.times[0])

    @property
    def after_change(self) -> float:
        """Time from the first change of the output to the end [s]."""
        return float(self.times[-1] - self.output.times[1])

    @property
    def sampling(self) -> float:
        """Middle one of the sampling intervals [s]."""
        return float(np.median(np.diff(self.times)))

    def columns(self, tau: float, theta: float) -> Array:
        """Return what multiplies y0, drift over the whole record, gain and, with ``free_start``, the decay."""
        since = self.times - self.times[0]
        rows = [np.ones_like(since), since / self.span, unit_response(self.output, self.times, tau, theta, self.lag)]
        if self.free_start:
            rows.append(np.exp(-since / tau))
        return np.column_stack(rows)


@dataclass(frozen=True, slots=True)
class Point:
    """A fit: time constant and dead time [s], the coefficients of the columns, and what is left of each sample."""

    tau: float
    theta: float
    linear: Array
    residuals: Array

    @property
    def squares(self) -> float:
        """Sum of the squared residuals."""
        return float(self.residuals @ self.residuals)


def solved(samples: Samples, tau: float, theta: float) -> Point:
    """Return the best fit at a given time constant and dead time [s], by linear least squares."""
    columns = samples.columns(tau, theta)
    linear: Array = np.asarray(np.linalg.lstsq(columns, samples.value, rcond=None)[0], dtype=np.float64)
    return Point(tau, theta, linear, samples.value - columns @ linear)


def best_fit(samples: Samples) -> Point:
    """Search time constant and dead time for the least sum of squares.

    Parameters
    ----------
    samples : Samples
        The recording; its output moves at least once.

    Returns
    -------
    Point
        The best of the refined starts.

    Notes
    -----
    Variable projection: for each (tau, theta) the offset, drift and gain are linear and solved for, so that two unknowns are left.
    A grid of starts, evaluated on a thinned record, covers tau from half the sampling interval to ten records and theta up to the end
    of the record; what is best among its neighbours in tau is refined with ``scipy.optimize.least_squares``. The sum of squares has a
    kink in theta at every sample, so the neighbourhood of the best point is searched once more in parts of the sampling interval.

    References
    ----------
    Golub and Pereyra (1973), The differentiation of pseudo-inverses and nonlinear least squares problems whose variables
    separate (from memory).
    """
    lowest, highest = np.log(samples.sampling / 5.0), np.log(10.0 * samples.span)
    latest = samples.after_change * 0.98
    coarse = _thinned(samples)
    valleys = _valleys(coarse, np.linspace(np.log(samples.sampling / 2.0), highest - 0.1, _TAU_STARTS), _theta_starts(latest))
    best = _best(_refined(samples, log_tau, theta, (lowest, highest), latest) for log_tau, theta in valleys)
    near = best.theta + samples.sampling * np.linspace(-1.5, 1.5, 13)
    again = _best(solved(samples, best.tau, float(theta)) for theta in near if 0.0 <= theta <= latest)
    if again.squares < best.squares:
        best = _best([best, _refined(samples, np.log(again.tau), again.theta, (lowest, highest), latest)])
    return best


def _valleys(samples: Samples, log_taus: Array, thetas: Array) -> list[tuple[float, float]]:
    """Return the starts that are better than both neighbours in tau, each with its best theta; the best ones only."""
    rows = [min((solved(samples, float(np.exp(log_tau)), float(theta)).squares, float(theta)) for theta in thetas) for log_tau in log_taus]
    heights = [np.inf, *(squares for squares, _ in rows), np.inf]
    valleys = [
        (squares, float(log_tau), theta)
        for (squares, theta), log_tau, before, after in zip(rows, log_taus, heights[:-2], heights[2:], strict=True)
        if squares <= before and squares <= after
    ]
    return [(log_tau, theta) for _, log_tau, theta in sorted(valleys)[:_REFINED]]


def _best(points: Iterable[Point]) -> Point:
    return min(points, key=lambda point: point.squares)


def _theta_starts(latest: float) -> Array:
    """Return starts that lie closer together near zero, where dead times are."""
    return latest * np.linspace(0.0, 0.95, _THETA_STARTS) ** 2


def _refined(samples: Samples, log_tau: float, theta: float, tau_bounds: tuple[float, float], latest: float) -> Point:
    scale = latest

    def residuals(unknown: Array) -> Array:
        return solved(samples, float(np.exp(unknown[0])), float(unknown[1] * scale)).residuals

    # strictly inside: the method walks from the inside to its bounds
    start = [np.clip(log_tau, tau_bounds[0] + 1e-6, tau_bounds[1] - 1e-6), np.clip(theta / scale, 1e-6, 1.0 - 1e-6)]
    found = least_squares(
        residuals, start, bounds=([tau_bounds[0], 0.0], [tau_bounds[1], 1.0]), method="trf", xtol=1e-12, ftol=1e-12, gtol=1e-14, max_nfev=60
    )
    return solved(samples, float(np.exp(found.x[0])), float(found.x[1] * scale))


def _thinned(samples: Samples) -> Samples:
    step = max(1, len(samples.times) // _COARSE_SAMPLES)
    return Samples(samples.times[::step], samples.value[::step], samples.output, samples.lag, samples.free_start)

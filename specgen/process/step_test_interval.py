"""How far the fitted numbers can be trusted: their covariance, with residuals that hang together counted for less."""

from dataclasses import dataclass
from math import sqrt

import numpy as np
from scipy.linalg import solve_banded
from scipy.optimize import brentq
from scipy.special import stdtrit

from specgen.process.step_test_response import Array
from specgen.process.step_test_search import Point, Samples

_PASSES = 2
_MOST_CORRELATED = 0.98


@dataclass(frozen=True, slots=True)
class Spread:
    """Covariance of the linear coefficients, time constant and dead time (in this order), and what made it.

    ``noise`` is the standard deviation of the residuals, ``correlation`` that between a residual and the next,
    ``reach`` the quantile that turns a standard error into half a 95 % interval.
    """

    covariance: Array
    noise: float
    correlation: float
    reach: float

    def half_width(self, *weights: float) -> float:
        """Return half of the 95 % interval of a weighted sum of the fitted numbers."""
        row = np.asarray(weights)
        return self.reach * sqrt(max(float(row @ self.covariance @ row), 0.0))


def spread(samples: Samples, point: Point) -> Spread:
    r"""Covariance of a fit from its Jacobian.

    Parameters
    ----------
    samples : Samples
        The recording.
    point : Point
        The fit.

    Returns
    -------
    Spread
        Covariance, noise and the quantile for 95 %.

    Notes
    -----
    With the Jacobian :math:`J` of the fitted values, its pseudo-inverse :math:`J^+` and :math:`M = I - J J^+`,

    .. math:: \mathrm{cov} = s^2 J^+ R J^{+T}, \qquad s^2 = \mathrm{RSS}/\mathrm{tr}(M R)

    :math:`R` is the identity where the residuals are independent, and then :math:`\mathrm{tr}(M R) = n - p`. Where the correlation
    between neighbours is more than chance, :math:`R_{ij} = \rho^{|i - j|}`; :math:`\rho` is the one that makes the residuals' expected
    correlation the one seen (residuals hang together less than the errors that made them, since the fit follows these), and the
    degrees of freedom behind the t-quantile shrink by :math:`(1 - \rho)/(1 + \rho)`.

    A value recorded in steps of :math:`q` carries a rounding error with variance :math:`q^2/12` that all readings in a run of the same
    value share; its covariance is added, and where it is most of :math:`s^2` its part is taken out of the first term.

    The derivatives by tau and theta are differences over one standard error to either side: the response has a kink in theta at
    each sample, and a difference over the distance that matters is not misled by it.

    References
    ----------
    Seber and Wild (1989), Nonlinear Regression (from memory); coverage is measured in ``tests/process/test_step_test_coverage.py``.
    """
    count, unknowns = len(samples.times), len(point.linear) + 2
    steps = 1e-3 * point.tau, 1e-3 * point.tau
    for _ in range(_PASSES):
        jacobian = _jacobian(samples, point, *steps)
        scale = np.linalg.norm(jacobian, axis=0)
        scale[scale == 0.0] = 1.0
        basis, rest = np.linalg.qr(jacobian / scale)
        inverse = np.linalg.pinv(rest) @ basis.T / scale[:, None]
        correlation = _correlation(point.residuals, basis)
        noise = sqrt(point.squares / (count - float(np.sum(basis * correlated(basis, correlation)))))
        rounding = resolution(samples.value) ** 2 / 12.0
        # where rounding is the smaller part, the correlation seen is that of both together
        other = max(noise**2 - rounding, 0.0) if rounding > noise**2 / 2.0 else noise**2
        covariance = other * inverse @ correlated(inverse.T, correlation) + rounding * _in_runs(samples.value, inverse)
        steps = _steps(point, covariance)
    shrink = (1.0 - correlation) / (1.0 + correlation)
    reach = float(stdtrit(max(count * shrink - unknowns, 3.0), 0.975))
    return Spread(np.asarray(covariance, dtype=np.float64), noise, correlation, reach)


def resolution(value: Array) -> float:
    """Return the step in which a value was recorded, 0 where its differences have no common one.

    Examples
    --------
    >>> round(resolution(np.array([20.0, 20.1, 20.1, 20.4])), 6)
    0.1
    """
    apart = np.diff(np.unique(value))
    apart = apart[apart > 1e-9 * np.max(np.abs(value))]
    if len(apart) == 0:
        return 0.0
    step = float(np.min(apart))
    multiples = apart / step
    return step if bool(np.all(np.abs(multiples - np.round(multiples)) < 1e-3 * np.maximum(multiples, 1.0))) else 0.0


def correlated(columns: Array, correlation: float) -> Array:
    """Return ``R @ columns`` for ``R[i, j] = correlation**|i - j|``, by one sweep down and one up."""
    if correlation == 0.0:
        return columns
    down = _swept(columns, correlation)
    up = _swept(columns[::-1], correlation)[::-1]
    return np.asarray(down + up - columns, dtype=np.float64)


def _swept(columns: Array, correlation: float) -> Array:
    bands = np.ones((2, len(columns)))
    bands[1] = -correlation
    return np.asarray(solve_banded((1, 0), bands, columns, check_finite=False), dtype=np.float64)


def _correlation(residuals: Array, basis: Array) -> float:
    """Return the errors' correlation from one sample to the next, 0 where chance explains what the residuals show."""
    squares = float(residuals @ residuals)
    if squares == 0.0:
        return 0.0
    seen = float(residuals[1:] @ residuals[:-1]) / squares
    if seen - _expected(0.0, basis) < 2.0 / sqrt(len(residuals)):
        return 0.0
    if seen >= _expected(_MOST_CORRELATED, basis):
        return _MOST_CORRELATED
    return float(brentq(lambda correlation: _expected(correlation, basis) - seen, 0.0, _MOST_CORRELATED, xtol=1e-3))


def _expected(correlation: float, basis: Array) -> float:
    """Return the neighbour correlation that the residuals of a fit have when the errors' is ``correlation``.

    It is tr(M L M R)/tr(M R) with M = I - Q Q', L the shift by one sample and Q the orthonormal ``basis`` of the Jacobian.
    """
    count = len(basis)
    beside = correlated(basis, correlation)
    inner = basis.T @ beside
    later = np.vstack([basis[1:], np.zeros((1, basis.shape[1]))])  # L' Q
    sooner = np.vstack([np.zeros((1, basis.shape[1])), basis[:-1]])  # L Q
    products = (count - 1) * correlation - np.sum(later * beside) - np.sum(beside * sooner) + np.sum((basis.T @ sooner).T * inner)
    return float(products / (count - np.trace(inner)))


def _in_runs(value: Array, inverse: Array) -> Array:
    """Return the covariance from an error of variance 1 that all readings in a run of the same value share."""
    starts = np.concatenate(([0], np.flatnonzero(np.diff(value) != 0.0) + 1))
    runs = np.add.reduceat(inverse, starts, axis=1)
    return np.asarray(runs @ runs.T, dtype=np.float64)


def _steps(point: Point, covariance: Array) -> tuple[float, float]:
    """Return one standard error of tau and theta, within what differences can bear."""
    tau, theta = (sqrt(max(float(covariance[k, k]), 0.0)) for k in (-2, -1))
    least, most = 1e-5 * point.tau, 0.3 * point.tau
    return min(max(tau, least), most), min(max(theta, least), most)


def _jacobian(samples: Samples, point: Point, tau_step: float, theta_step: float) -> Array:
    def fitted(tau: float, theta: float) -> Array:
        return samples.columns(tau, theta) @ point.linear

    by_tau = (fitted(point.tau + tau_step, point.theta) - fitted(point.tau - tau_step, point.theta)) / (2.0 * tau_step)
    by_theta = (fitted(point.tau, point.theta + theta_step) - fitted(point.tau, point.theta - theta_step)) / (2.0 * theta_step)
    return np.column_stack([samples.columns(point.tau, point.theta), by_tau, by_theta])

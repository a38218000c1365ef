"""Unit response of a first-order plant with dead time to an output record that is held between its changes."""

from dataclasses import dataclass
from itertools import accumulate

import numpy as np
from numpy.typing import NDArray
from scipy.linalg import solve_banded

Array = NDArray[np.float64]

_MANY = 50  # changes


@dataclass(frozen=True, slots=True)
class OutputRecord:
    """The output as a staircase: from ``times[j]`` [s] on it stands ``levels[j]`` [fraction] above where it began.

    ``times[0]`` is the start of the recording, ``levels[0]`` is 0 and ``start`` is the output there [fraction].
    """

    times: Array
    levels: Array
    start: float

    @property
    def changes(self) -> int:
        """Number of times that the output moves."""
        return len(self.times) - 1


def staircase(times: Array, output: Array) -> OutputRecord:
    """Reduce a sampled output to its changes; each level holds from the sample that first shows it.

    Parameters
    ----------
    times : array
        Time of each sample, increasing [s].
    output : array
        Output at each sample [fraction].

    Returns
    -------
    OutputRecord
        One entry for the start and one for each change.

    Examples
    --------
    >>> record = staircase(np.array([0.0, 1.0, 2.0, 3.0]), np.array([0.25, 0.25, 0.75, 0.75]))
    >>> record.times.tolist(), record.levels.tolist(), record.start
    ([0.0, 2.0], [0.0, 0.5], 0.25)
    """
    keep = np.concatenate(([True], np.diff(output) != 0.0))
    return OutputRecord(times[keep], output[keep] - output[0], float(output[0]))


def unit_response(record: OutputRecord, at: Array, tau: float, theta: float, lag: float = 0.0) -> Array:
    r"""Response of a plant of gain one that was at rest when the recording began.

    Parameters
    ----------
    record : OutputRecord
        The output.
    at : array
        Times at which the response is wanted [s].
    tau, theta : float
        Time constant and dead time [s].
    lag : float
        Lag of the sensor, a first-order lag behind the plant [s]; 0 for none.

    Returns
    -------
    array
        Response above its start, in the unit of the gain a full output [1].

    Notes
    -----
    Between two changes the delayed output is the constant :math:`v`, so that from a state :math:`x_j` at the change

    .. math:: x(t) = v + (x_j - v) e^{-t/\tau}, \qquad
              w(t) = v + (w_j - v) e^{-t/l} + (x_j - v) \frac{\tau}{\tau - l}\left(e^{-t/\tau} - e^{-t/l}\right)

    for the plant and, behind the lag :math:`l`, the sensor. The states at the changes do not depend on the dead time, which only
    shifts them; they follow from a recursion that is solved as a bidiagonal system.

    References
    ----------
    Derived; compared with ``scipy.integrate.solve_ivp`` and ``scipy.signal.lsim`` in ``tests/process/test_step_test.py``.

    Examples
    --------
    A step at 10 s seen at 10 + 5 + 60 s: one time constant after the dead time.

    >>> record = OutputRecord(np.array([0.0, 10.0]), np.array([0.0, 1.0]), 0.0)
    >>> round(float(unit_response(record, np.array([75.0]), tau=60.0, theta=5.0)[0]), 4)
    0.6321
    """
    span = np.diff(record.times)
    before = record.levels[:-1]
    fade = np.exp(-span / tau)
    x = _recursion(fade, (1.0 - fade) * before)
    # before the first change arrives the level and the states are those of the start, all zero
    seen = np.maximum(np.searchsorted(record.times + theta, at, side="right") - 1, 0)
    since = np.maximum(at - theta - record.times[seen], 0.0)
    level = record.levels[seen]
    gap = x[seen] - level
    if lag <= 0.0:
        return np.asarray(level + gap * np.exp(-since / tau), dtype=np.float64)
    quick = np.exp(-span / lag)
    w = _recursion(quick, (1.0 - quick) * before + (x[:-1] - before) * _between(span, tau, lag))
    behind = w[seen] - level
    return np.asarray(level + behind * np.exp(-since / lag) + gap * _between(since, tau, lag), dtype=np.float64)


def _recursion(fade: Array, drive: Array) -> Array:
    """Return z with ``z[0] = 0`` and ``z[j+1] = fade[j] z[j] + drive[j]``."""
    if len(fade) < _MANY:
        # a step test mostly moves once or twice: calling LAPACK for that takes longer than the rest of the response
        return np.array(list(accumulate(zip(fade.tolist(), drive.tolist(), strict=True), lambda z, by: by[0] * z + by[1], initial=0.0)))
    bands = np.ones((2, len(fade) + 1))
    bands[1, :-1] = -fade
    return np.asarray(solve_banded((1, 0), bands, np.concatenate(([0.0], drive)), check_finite=False), dtype=np.float64)


def _between(since: Array, tau: float, lag: float) -> Array:
    """Return ``tau/(tau - lag) (exp(-since/tau) - exp(-since/lag))``, finite also where tau equals the lag."""
    # (1 - exp(-a))/a is 1 to the last digit where a is this small, and 0/0 at 0
    apart = np.maximum(np.abs(since * (tau - lag) / (tau * lag)), 1e-16)
    mean = -np.expm1(-apart) / apart
    return np.asarray(since / lag * np.exp(-since / max(tau, lag)) * mean, dtype=np.float64)

"""Margins of any open loop from its frequency response: brackets on a grid, then refined."""

from cmath import phase as phase_of
from collections.abc import Callable
from dataclasses import dataclass
from math import degrees, inf

import numpy as np
import numpy.typing as npt

from specgen.process.loop_dynamics import Complexes, Reals

Response = Callable[[Reals], Complexes]
Measure = Callable[[Complexes], Reals]
Indices = npt.NDArray[np.intp]

MINOR = 0.5
"""Crossings this much smaller than the largest are left out."""
NEARLY = 1.05
"""Places up to this much farther from -1 than the nearest point of the grid are looked at closely."""
ZOOM = 17
"""Points that a bracket is cut into at each round; then a straight line: a grid step of 0.1 rad leaves 1e-7."""
ROUNDS = 2
SHARES = np.linspace(0, 1, ZOOM)


@dataclass(frozen=True, slots=True)
class Margins:
    """How far a loop is from instability.

    Parameters
    ----------
    gain : float
        Factor by which the loop's gain may grow; ``inf`` where no growth upsets it, 1 or less where it is unstable [1].
    phase : float
        Least phase margin over all gain crossovers; ``inf`` where there is none, negative where it is unstable [deg].
    sensitivity : float
        Peak sensitivity Ms, the largest ``|1/(1 + L)|`` [1].
    stable : bool
        Whether the closed loop is stable.
    gain_reduction : float
        Factor by which the gain may fall; ``inf`` but for loops that need their gain [1].
    phase_crossover, gain_crossover : float
        Frequency at which the gain and the phase margin are found; ``inf`` where there is none [rad/s].
    """

    gain: float
    phase: float
    sensitivity: float
    stable: bool
    gain_reduction: float
    phase_crossover: float
    gain_crossover: float


def margins_of(response: Response, grid: Reals, *, starts_turned: bool = False, tail: float = 0.0, closes: bool = False) -> Margins:
    """Margins of any loop whose open-loop poles are stable but for one or two integrators.

    Parameters
    ----------
    response : callable
        Frequency response of the open loop, for an array of frequencies [rad/s].
    grid : ndarray of float
        Rising frequencies that are close enough for each crossing to show as a change of sign [rad/s].
    starts_turned : bool
        Whether the open loop has two integrators, so that its phase starts at -180 degrees.
    tail : float
        Largest ``|L|`` above the grid, where the phase may be anything [1].
    closes : bool
        Whether the grid ends on the real axis, as that of a sampled loop does at ``pi/T``.

    Returns
    -------
    Margins
        The smallest margins over all crossovers.

    Notes
    -----
    Stability by Nyquist: the net number of times the response passes the real axis left of -1 is zero. Crossings are
    bracketed on the grid and refined until they no longer move.
    """
    value = response(grid)
    above = value.imag >= 0
    axis = _axis_places(value, above)
    circle = np.flatnonzero(np.diff(np.abs(value) >= 1))
    distance = np.abs(1 + value)
    peaks = _peak_places(distance)
    found = _refined(
        response,
        grid[np.concatenate((axis, circle, peaks))],
        grid[np.concatenate((axis + 1, circle + 1, peaks + 2))],
        [_imaginary] * axis.size + [_excess] * circle.size + [None] * peaks.size,
    )
    crossings, net = _passages(found[: axis.size], above[axis + 1])
    if closes and value[-1].real < 0:
        crossings.append((float(grid[-1]), float(value[-1].real)))
        if value[-1].real < -1:
            # half of a passage: the mirrored lower half of the response makes the other
            net += 0.5 if value[-2].imag < 0 else -0.5
    if starts_turned and value[0].imag > 0:
        # begins on the far side of the axis: it has passed left of -1 already
        net += 1
    stable = net == 0 and tail < 1
    gain, at, reduction = _gain_margin(crossings, stable=stable)
    if tail > 0 and 1 / tail < gain:
        gain, at = 1 / tail, inf
    phase, gain_at = inf, inf
    for omega, point in found[axis.size : axis.size + circle.size]:
        margin = abs(degrees(phase_of(-point))) * (1 if stable else -1)
        if margin < phase:
            phase, gain_at = margin, omega
    least = min(float(distance.min()), *(abs(1 + point) for _, point in found[axis.size + circle.size :]), 1 - min(tail, 1.0))
    return Margins(gain, phase, 1 / least if least > 0 else inf, stable, reduction, at, gain_at)


def _axis_places(value: Complexes, above: npt.NDArray[np.bool_]) -> Indices:
    """Return where the response passes the negative real axis, those left out that are too small to be a margin."""
    reach = np.minimum(value.real[:-1], value.real[1:])
    places = np.flatnonzero((above[:-1] != above[1:]) & (reach < 0))
    if not places.size:
        return places
    worth = max(MINOR * float(reach[places].min()), -MINOR)
    return places[reach[places] <= worth]


def _peak_places(distance: Reals) -> Indices:
    """Return the point before each place at which the response comes about as near to -1 as anywhere."""
    inner = (distance[1:-1] <= distance[:-2]) & (distance[1:-1] <= distance[2:])
    return np.flatnonzero(inner & (distance[1:-1] < NEARLY * float(distance.min())))


def _passages(found: list[tuple[float, complex]], rises: npt.NDArray[np.bool_]) -> tuple[list[tuple[float, float]], float]:
    """Return frequency and value at each passage of the negative real axis, and the net number left of -1."""
    crossings = [(omega, point.real) for omega, point in found if point.real < 0]
    net = sum((1 if up else -1) for (_, point), up in zip(found, rises, strict=True) if point.real < -1)
    return crossings, float(net)


def _gain_margin(crossings: list[tuple[float, float]], *, stable: bool) -> tuple[float, float, float]:
    """Return the gain margin, its frequency and the factor by which the gain may fall."""
    factors = sorted((-1 / value, omega) for omega, value in crossings)
    if not stable:
        # no crossing need lie beyond -1 where low gain is what upsets the loop: then nothing is left
        return (*factors[0], inf) if factors and factors[0][0] <= 1 else (0.0, inf, inf)
    growing = [pair for pair in factors if pair[0] >= 1]
    falling = [pair for pair in factors if pair[0] < 1]
    gain, at = growing[0] if growing else (inf, inf)
    return gain, at, 1 / falling[-1][0] if falling else inf


def _imaginary(value: Complexes) -> Reals:
    """Zero on the real axis."""
    imaginary: Reals = value.imag
    return imaginary


def _excess(value: Complexes) -> Reals:
    """Zero on the unit circle."""
    excess: Reals = np.abs(value) - 1
    return excess


def _refined(response: Response, lows: Reals, highs: Reals, measures: list[Measure | None]) -> list[tuple[float, complex]]:
    """Narrow all brackets at once to where their measure changes sign, or, without one, to where the response is nearest to -1."""
    found: list[tuple[float, complex]] = [(0.0, 0j)] * len(measures)
    lows, highs = lows.copy(), highs.copy()
    for _ in range(ROUNDS if measures else 0):
        omega = lows[:, None] + (highs - lows)[:, None] * SHARES
        value = response(omega.ravel()).reshape(omega.shape)
        for row, measure in enumerate(measures):
            if measure is None:
                index = int(np.abs(1 + value[row]).argmin())
                found[row] = float(omega[row, index]), complex(value[row, index])
                lows[row], highs[row] = omega[row, max(index - 1, 0)], omega[row, min(index + 1, ZOOM - 1)]
                continue
            size = measure(value[row])
            positive = size >= 0
            index = max(int((positive != positive[0]).argmax()) - 1, 0)
            share = float(size[index] / (size[index] - size[index + 1]))
            lows[row], highs[row] = omega[row, index], omega[row, index + 1]
            left, right = value[row, index], value[row, index + 1]
            found[row] = float(lows[row] + share * (highs[row] - lows[row])), complex(left + share * (right - left))
    return found

r"""What a chain of first-order lags does to a periodic on and off: the exact settled response, without stepping through time.

A chain :math:`1/\prod(1 + T_i s)` is split into :math:`\sum c_i/(1 + T_i s)` with :math:`\sum c_i = 1`. Each part answers a rectangle
of height 1, on for ``a`` and off for ``b``, with a settled response that has a closed form; so has their sum. Values here run from
0 (what no input settles at) to 1 (what full input settles at); times count from the switching of the *plant's* input.
"""

from collections.abc import Sequence
from functools import lru_cache
from math import exp, expm1, log

from scipy.optimize import brentq

Mode = tuple[float, float]
"""Weight and time constant [s] of one part of the chain."""

# Equal constants are drawn apart by this share of their mean. That keeps their sum and changes the product by about its square (1e-10 for
# two, 1e-7 for three), and keeps the weights, which rounding is multiplied by, below 1e5 and 1e7.
APART_TWO = 1e-5
APART_THREE = 3e-4
NEGLIGIBLE = 1e-9


@lru_cache(maxsize=4096)
def modes_of(constants: tuple[float, ...]) -> tuple[Mode, ...]:
    """Split a chain of lags into first-order parts.

    Parameters
    ----------
    constants : tuple of float
        Time constants of the chain [s]; those that are zero or below a thousand-millionth of the largest are left out.

    Returns
    -------
    tuple of (weight, time constant [s])
        Largest time constant first; the weights add up to 1.

    References
    ----------
    Partial fractions of a product of first-order lags.

    Examples
    --------
    >>> modes_of((60, 0, 20))
    ((1.5, 60.0), (-0.5, 20.0))
    """
    largest = max(constants)
    ordered = sorted((float(c) for c in constants if c > largest * NEGLIGIBLE), reverse=True)
    if len(ordered) == 1:
        return ((1.0, ordered[0]),)
    _draw_apart(ordered)
    made = []
    for i, own in enumerate(ordered):
        weight = 1.0
        for j, other in enumerate(ordered):
            if j != i:
                weight *= own / (own - other)
        made.append((weight, own))
    return tuple(made)


def _draw_apart(ordered: list[float]) -> None:
    """Separate neighbours of a falling list that are nearly equal, each pair about its mean."""
    count = len(ordered)
    apart = APART_TWO if count == 2 else APART_THREE  # noqa: PLR2004 - two lags
    spread = (ordered[0] - ordered[-1]) / ordered[0]
    if spread < apart * (count - 1):
        mean = sum(ordered) / count
        for i in range(count):
            ordered[i] = mean * (1 + apart * ((count - 1) / 2 - i))
        return
    for i in range(count - 1):
        if ordered[i] - ordered[i + 1] < apart * ordered[i] / 2:
            mean = (ordered[i] + ordered[i + 1]) / 2
            ordered[i], ordered[i + 1] = mean * (1 + apart / 2), mean * (1 - apart / 2)


def full_at_end(constant: float, a: float, b: float) -> float:
    """Return what one lag has reached when the input goes off: ``(1 - e^(-a/T))/(1 - e^(-(a + b)/T))``."""
    return expm1(-a / constant) / expm1(-(a + b) / constant)


def after_off(modes: Sequence[Mode], a: float, b: float, s: float) -> float:
    """Return the settled response a time ``s`` [s] after the input went off, ``0 <= s <= b``."""
    return sum(c * full_at_end(t, a, b) * exp(-s / t) for c, t in modes)


def after_on(modes: Sequence[Mode], a: float, b: float, s: float) -> float:
    """Return the settled response a time ``s`` [s] after the input went on, ``0 <= s <= a``."""
    return 1 - after_off(modes, b, a, s)


def crest(modes: Sequence[Mode], a: float, b: float) -> float:
    """Return the highest value of the settled response [0..1]; the lowest is ``1 - crest(modes, b, a)``.

    Parameters
    ----------
    modes : sequence of (weight, time constant [s])
        The chain, from ``modes_of``.
    a, b : float
        Time on and off [s].

    Notes
    -----
    One lag turns at the switching itself, two lags where ``u1 e^(-s/T1) = u2 e^(-s/T2)``, three where the slope changes its sign.

    Examples
    --------
    >>> round(crest(((1.0, 60.0),), 30, 30), 6)  # 1/(1 + e^-0.5)
    0.622459
    """
    first = modes[0]
    u1 = full_at_end(first[1], a, b)
    if len(modes) == 1:
        return u1
    second = modes[1]
    u2 = full_at_end(second[1], a, b)
    s = _meeting(u1, first[1], u2, second[1])
    if len(modes) == 2:  # noqa: PLR2004 - two lags
        return first[0] * u1 * exp(-s / first[1]) + second[0] * u2 * exp(-s / second[1])
    slopes = [(c / t * full_at_end(t, a, b), t) for c, t in modes]

    def slope(at: float) -> float:
        return sum(k * exp(-at / t) for k, t in slopes)

    s = float(brentq(slope, 0.0, b, xtol=1e-12 * (a + b), rtol=1e-10)) if slope(0.0) < 0 < slope(b) else s
    return after_off(modes, a, b, s)


def _meeting(u1: float, t1: float, u2: float, t2: float) -> float:
    """Return when two falling exponentials of different speed meet [s]."""
    return max(0.0, log(u2 / u1) / (1 / t2 - 1 / t1))


def ramp_crest(modes: Sequence[Mode], a: float, b: float) -> float:
    """Return how far the integral of the chain's output rises above its middle, per unit of the rectangle's height [s].

    Parameters
    ----------
    modes : sequence of (weight, time constant [s])
        The chain ahead of the integrator; may be empty.
    a, b : float
        Time on and off [s]; the rectangle's mean, ``a/(a + b)``, is taken off before integrating.

    Notes
    -----
    The integral of the bare rectangle is a triangle of half height ``a b/(a + b)/2``. Each lag holds the integral back by its time
    constant times its own output, and the integral turns where the chain's output passes its mean.

    Examples
    --------
    >>> ramp_crest((), 20, 20)
    5.0
    """
    share = a / (a + b)
    half = share * b / 2
    if not modes:
        return half
    if len(modes) == 1:
        t = modes[0][1]
        return half - share * max(0.0, t * log(full_at_end(t, a, b) / share))

    def slope(s: float) -> float:
        return after_off(modes, a, b, s) - share

    s = float(brentq(slope, 0.0, b, xtol=1e-12 * (a + b), rtol=1e-10)) if slope(b) < 0 < slope(0.0) else 0.0
    return half - share * s - sum(c * t * (full_at_end(t, a, b) * exp(-s / t) - share) for c, t in modes)

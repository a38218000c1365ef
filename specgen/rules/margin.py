"""Margins and comparisons: 1 at the limit, larger on the good side."""

from math import isfinite

ROUNDING = 1e-9  # figures that sit on their limit by construction differ from it by rounding only
SEARCHED = 1e-3  # a worst case is searched until it moves by less than 0.1 percent


def over(good: float, bad: float) -> float | None:
    """Return ``good/bad``; None where that is no finite number.

    Examples
    --------
    >>> over(1.5, 1.0), over(1.0, 0.0)
    (1.5, None)
    """
    if bad <= 0 or not isfinite(good):
        return None
    return good / bad


def least(*margins: float | None) -> float | None:
    """Return the smallest of the margins that there are.

    Examples
    --------
    >>> least(2.0, None, 1.2), least(None)
    (1.2, None)
    """
    known = [margin for margin in margins if margin is not None]
    return min(known) if known else None


def at_most(figure: float, limit: float, within: float = ROUNDING) -> bool:
    """Tell whether a figure keeps to its limit, within a share of either that does not count.

    Examples
    --------
    >>> at_most(0.1 + 0.2, 0.3), at_most(0.31, 0.3), at_most(1.0005, 1.0, SEARCHED)
    (True, False, True)
    """
    return figure <= limit + within * max(abs(figure), abs(limit))

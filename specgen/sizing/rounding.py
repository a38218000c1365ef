"""Rounding settings to what can be entered: steps and the house series."""

from collections.abc import Sequence
from math import ceil, floor, isfinite, sqrt

SLACK = 1e-6  # a number that is a step but for what a root finder leaves is that step


def up_to_step(value: float, step: float) -> float:
    """Round up to a multiple of the setting step, at least one step.

    Examples
    --------
    >>> round(up_to_step(1.01, 0.1), 9), up_to_step(0.0, 0.5)
    (1.1, 0.5)
    """
    return max(1, ceil(value / step - SLACK)) * step


def chosen_differential(least: float, most: float, step: float, *, even: bool) -> float:
    """Return the geometric mean of least and most on the setting step, never outside the two.

    Parameters
    ----------
    least, most : float
        What the machine and the product allow [same unit as step]; ``most`` may be infinite or below the least: then the
        least is taken.
    step : float
        Setting step.
    even : bool
        Take an even number of steps, so that half the differential can be entered too.

    Examples
    --------
    >>> chosen_differential(1.0, 4.0, 0.1, even=True), chosen_differential(2.0, 1.0, 0.1, even=True)
    (2.0, 2.0)
    >>> chosen_differential(0.21, 0.99, 0.1, even=True)  # sqrt(0.21 x 0.99) is 0.456
    0.4
    """
    unit = 2 * step if even else step
    lowest = up_to_step(least, unit)
    if not isfinite(most) or most <= least:
        return round(lowest, 12)
    highest = floor(most / unit + SLACK) * unit
    if highest < lowest:
        # no even number of steps lies between the two: a single step may
        single = up_to_step(least, step)
        return round(single if single <= most + SLACK * step else lowest, 12)
    middle = round(sqrt(least * most) / unit) * unit
    return round(min(max(middle, lowest), highest), 12)


def down_in_series(longest: float, series: Sequence[float]) -> float | None:
    """Return the largest of the series that is not above ``longest``; None where all are.

    Examples
    --------
    >>> down_in_series(33, (10, 20, 30, 45)), down_in_series(5, (10, 20))
    (30, None)
    """
    fitting = [step for step in series if step <= longest * (1 + SLACK)]
    return fitting[-1] if fitting else None


def up_in_series(least: float, series: Sequence[float]) -> float | None:
    """Return the smallest of the series that is not below ``least``; None where all are.

    Examples
    --------
    >>> up_in_series(0.4, (1, 2, 5)), up_in_series(9, (1, 2, 5))
    (1, None)
    """
    return next((step for step in series if step >= least * (1 - SLACK)), None)



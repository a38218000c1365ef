"""Numbers of the record: nine significant digits, in the loop's own unit."""

from math import isfinite

from specgen.core.quantity import Unit

DIGITS = 9


def rounded(value: float) -> float:
    """Round to nine significant digits; whole numbers stay exact.

    Raises
    ------
    ValueError
        A number that is not finite: the record has no word for it.

    Examples
    --------
    >>> rounded(1 / 3), rounded(65.0), rounded(-0.0)
    (0.333333333, 65.0, 0.0)
    """
    if not isfinite(value):
        raise ValueError("a figure of the record is finite, or absent")
    return float(f"{value:.{DIGITS}g}") + 0.0


def in_unit(value: float, unit: Unit) -> float:
    """Return a base value in a unit, rounded.

    Examples
    --------
    >>> in_unit(600000.0, Unit("bar", 1e-5))
    6.0
    """
    return rounded(value * unit.scale + unit.offset)

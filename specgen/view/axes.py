"""Axes of the drawings: round numbers, scales, and places as SVG writes them."""

from dataclasses import dataclass
from math import ceil, floor, log10

from specgen.core.say import MINUS

_NICE = (1, 2, 2.5, 5, 10)


def ticks(low: float, high: float, most: int = 6) -> tuple[float, ...]:
    """Return round numbers between two ends.

    Examples
    --------
    >>> ticks(60.5, 69.2), ticks(0, 100, 4)
    ((62.0, 64.0, 66.0, 68.0), (0.0, 25.0, 50.0, 75.0, 100.0))
    """
    span = high - low
    raw = span / most
    power = 10.0 ** floor(log10(raw))
    step = next(nice * power for nice in _NICE if nice * power >= raw * (1 - 1e-9))
    first = ceil(low / step - 1e-9)
    last = floor(high / step + 1e-9)
    return tuple(round(index * step, 9) + 0.0 for index in range(first, last + 1))


@dataclass(frozen=True, slots=True)
class Scale:
    """Maps numbers to places of the drawing."""

    low: float
    high: float
    at_low: float
    at_high: float

    def over(self, size: float) -> "Scale":
        """Return the scale whose numbers are in a unit of another size.

        Examples
        --------
        >>> Scale(0.0, 120.0, 48.0, 506.0).over(60.0)
        Scale(low=0.0, high=2.0, at_low=48.0, at_high=506.0)
        """
        return Scale(self.low / size, self.high / size, self.at_low, self.at_high)

    def __call__(self, value: float) -> float:
        """Return the place of a number."""
        return self.at_low + (value - self.low) / (self.high - self.low) * (self.at_high - self.at_low)


def place(value: float) -> str:
    """Write a place with one decimal at most.

    Examples
    --------
    >>> place(12.04), place(3.26)
    ('12', '3.3')
    """
    text = f"{value:.1f}"
    return text.removesuffix(".0")


def tick_text(value: float) -> str:
    """Write a tick's number.

    Examples
    --------
    >>> tick_text(-2.5), tick_text(100.0), tick_text(0.0)
    ('\u22122.5', '100', '0')
    """
    return f"{value:g}".replace("-", MINUS)

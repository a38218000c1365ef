"""Quantities: strict reading of ``number unit`` text, the only place that knows pint."""

from dataclasses import dataclass


class Quantity(float):
    """A number in base units (SI; temperatures in degC, percent as a fraction) that keeps its written form."""

    __slots__ = ("text",)
    text: str

    def __new__(cls, value: float, text: str = "") -> "Quantity":
        """Make a quantity of ``value`` written as ``text``."""
        made = super().__new__(cls, value)
        made.text = text
        return made


@dataclass(frozen=True, slots=True)
class Range:
    """Two numbers in base units, ``low <= high``; equal where one number was written."""

    low: float
    high: float
    text: str = ""


@dataclass(frozen=True, slots=True)
class Unit:
    """A unit to print in: ``shown = base * scale + offset``."""

    symbol: str
    scale: float = 1.0
    offset: float = 0.0


class QuantityError(ValueError):
    """Text that is no quantity of the wanted dimension; ``code``, ``text`` and ``hint`` for a diagnostic."""

    def __init__(self, code: str, text: str, hint: str = "") -> None:
        super().__init__(text)
        self.code = code
        self.text = text
        self.hint = hint


def parse_quantity(text: str, dimension: str) -> Quantity:
    """Read one quantity."""
    raise NotImplementedError


def parse_range(text: str, dimension: str) -> Range:
    """Read a quantity or a range."""
    raise NotImplementedError


def written_unit(text: str) -> Unit:
    """Return the unit a quantity was written in."""
    raise NotImplementedError

"""Quantities: strict reading of ``number unit`` text into base units, with the written form kept.

Base units are SI, with temperatures in degC, shares as a fraction 0..1, pressures in Pa gauge and a valve's
flow coefficient in m3/h. What each dimension is called, what it takes and what it refuses stands in
``specgen.core.dimension``; what the codes mean, in ``specgen.core.codes``.
"""

import re
import sys
from dataclasses import dataclass
from typing import Self

from specgen.core.codes import QUANTITY_CODES, QuantityError, shown
from specgen.core.conversion import ATMOSPHERE, Conversion, Unit, conversion, is_absolute
from specgen.core.dimension import DIMENSIONS, Dimension, Sign, dimension_named, own_dimension
from specgen.core.number import number_and_rest
from specgen.core.unit import fits, meaning

__all__ = [
    "DIMENSIONS", "QUANTITY_CODES", "Dimension", "Quantity", "QuantityError", "Range", "Sign", "Unit",
    "is_a", "own_dimension", "parse_quantity", "parse_range", "unit", "written_unit",
]  # fmt: skip

_LONGEST = 200
_ABSOLUTE_ZERO = -273.15  # degC
_SMALLEST = sys.float_info.min
_TO = re.compile(r"\s+to\s+")


class Quantity(float):
    """A number in base units (SI; temperatures in degC, percent as a fraction) that keeps its written form."""

    __slots__ = ("text",)
    text: str

    def __new__(cls, value: float, text: str = "") -> Self:
        """Make a quantity of ``value`` written as ``text``."""
        made = super().__new__(cls, value)
        made.text = text
        return made

    def __reduce__(self) -> tuple[type["Quantity"], tuple[float, str]]:
        """Return what a copy or a pickle is made of."""
        return Quantity, (float(self), self.text)


@dataclass(frozen=True, slots=True)
class Range:
    """Two numbers in base units, ``low <= high``; equal where one number was written."""

    low: float
    high: float
    text: str = ""


def parse_quantity(text: str, dimension: str | Dimension, *, sign: Sign | None = None) -> Quantity:
    """Read one quantity.

    Parameters
    ----------
    text : str
        ``number unit`` as written in a loop file.
    dimension : str or Dimension
        A name in ``DIMENSIONS``, or ``own_dimension(...)``.
    sign : {"any", "not_negative", "positive"}, optional
        Which numbers suit this field; the dimension's own rule where absent.

    Returns
    -------
    Quantity
        The number in the dimension's base unit, with its text.

    Raises
    ------
    QuantityError
        Any text that is no such quantity; ``QUANTITY_CODES`` lists why.

    Examples
    --------
    >>> parse_quantity("6 bar", "pressure"), parse_quantity("1.5 degC", "difference"), parse_quantity("25 percent", "fraction")
    (600000.0, 1.5, 0.25)
    >>> parse_quantity("3 bar absolute", "pressure")
    198675.0
    """
    row = dimension_named(dimension)
    _require_text(text, row)
    if _TO.search(text):
        raise QuantityError("Q111", f"{shown(text)} is a range; one number is expected here", f"write for example {row.example}")
    digits, exponent, rest = number_and_rest(text)
    if not rest:
        raise _without_unit(text, row)
    return Quantity(_value(text, digits, exponent, conversion(rest.rstrip(), row), row, sign), text.strip())


def parse_range(text: str, dimension: str | Dimension, *, sign: Sign | None = None) -> Range:
    """Read a range, or one quantity as a range of no width.

    Parameters
    ----------
    text : str
        ``number unit``, ``number to number unit`` or ``number unit to number unit``.
    dimension, sign
        As in `parse_quantity`.

    Returns
    -------
    Range
        Both ends in the dimension's base unit, with the text.

    Raises
    ------
    QuantityError
        Any text that is no such range; Q110 where the first number is the larger.

    Examples
    --------
    >>> parse_range("0 to 3.5 kW", "power")
    Range(low=0.0, high=3500.0, text='0 to 3.5 kW')
    >>> parse_range("5 degC to 35 degC", "temperature").high
    35.0
    """
    row = dimension_named(dimension)
    _require_text(text, row)
    parts = _TO.split(text.strip())
    if len(parts) == 1:
        one = parse_quantity(text, row, sign=sign)
        return Range(float(one), float(one), one.text)
    first, last, *more = parts
    if more:
        raise QuantityError("Q111", f"{shown(text)} has more than two ends", f"write for example {row.example}")
    low_digits, low_exponent, low_rest = number_and_rest(first)
    high_digits, high_exponent, high_rest = number_and_rest(last)
    if not high_rest:
        raise _without_unit(text, row, low_rest.strip())
    if low_rest and row.name == "pressure" and is_absolute(low_rest) != is_absolute(high_rest):
        raise QuantityError("Q114", f"{shown(text)} is absolute at one end alone", "write `absolute` at both ends or at none")
    low = _value(text, low_digits, low_exponent, conversion((low_rest or high_rest).rstrip(), row), row, sign)
    high = _value(text, high_digits, high_exponent, conversion(high_rest.rstrip(), row), row, sign)
    if low > high:
        turned = f"write {last} to {first}" if low_rest else "write the smaller number first"
        raise QuantityError("Q110", f"{shown(text)} is upside down", turned)
    return Range(low, high, text.strip())


def is_a(text: str, dimension: str | Dimension) -> bool:
    """Tell whether the unit of a text belongs to a dimension, whatever else may be wrong with the text.

    Examples
    --------
    >>> is_a("20 percent", "fraction"), is_a("0.3 kW", "fraction"), is_a("soon", "time")
    (True, False, False)
    """
    row = dimension_named(dimension)
    rest = _rest_of(text)
    return bool(rest) and fits(rest, row)


def unit(symbol: str, dimension: str | Dimension) -> Unit:
    """Return a unit to print a dimension's numbers in.

    Raises
    ------
    QuantityError
        The unit does not belong to the dimension.

    Examples
    --------
    >>> unit("degF", "temperature")
    Unit(symbol='degF', scale=1.8, offset=32.0)
    >>> unit("degF", "difference")
    Unit(symbol='degF', scale=1.8, offset=0.0)
    """
    return conversion(symbol.strip(), dimension_named(dimension)).unit


def written_unit(text: str, dimension: str | Dimension | None = None) -> Unit:
    """Return the unit a quantity was written in; of a range, its second number's.

    Without ``dimension`` degC and degF count as temperatures, K as a difference, and a pressure as gauge
    unless it says `absolute`.

    Raises
    ------
    QuantityError
        There is no number with a unit, or the unit does not belong to the dimension.

    Examples
    --------
    >>> written_unit("6 bar")
    Unit(symbol='bar', scale=1e-05, offset=0.0)
    """
    rest = _rest_of(text)
    if not rest:
        raise QuantityError("Q104", f"{shown(text)} has no unit", "write for example 1.5 K")
    if dimension is not None:
        return unit(rest, dimension)
    for name in ("temperature", *DIMENSIONS):
        if rest != "K" or name != "temperature":
            row = DIMENSIONS[name]
            if fits(rest, row):
                return conversion(rest, row).unit
    return Unit(rest, float(1 / meaning(rest).factor))


def _rest_of(text: str) -> str:
    """Return the unit part of a text, empty where it has none."""
    if not isinstance(text, str) or len(text) > _LONGEST:
        return ""
    try:
        return number_and_rest(_TO.split(text.strip())[-1]).rest.strip()
    except QuantityError:
        return ""


def _require_text(text: object, row: Dimension) -> None:
    hint = f"write for example {row.example}"
    if not isinstance(text, str):
        raise QuantityError("Q101", f"{row.words} is expected here, not a list or a section", hint)
    if not text.strip():
        raise QuantityError("Q101", f"{row.words} is expected here", hint)
    if len(text) > _LONGEST:
        raise QuantityError("Q101", f"{shown(text)} is longer than any quantity", hint)


def _without_unit(text: str, row: Dimension, other: str = "") -> QuantityError:
    return QuantityError("Q104", f"{shown(text)} has no unit", f"write {text.strip()} {other or row.usual[0]} if that is meant")


def _value(text: str, digits: int, exponent: int, by: Conversion, row: Dimension, sign: Sign | None) -> float:
    """Convert exactly, round once, and refuse what the dimension cannot be."""
    if exponent >= 0:
        top, below = digits * 10**exponent * by.times + by.plus, by.over
    else:
        ten = 10**-exponent
        top, below = digits * by.times + by.plus * ten, by.over * ten
    try:
        value: float = top / below
    except OverflowError:
        value = float("inf")
    if value in (float("inf"), float("-inf")) or (top and abs(value) < _SMALLEST):
        raise QuantityError("Q112", f"{shown(text)} is too large or too small to compute with")
    if row.name == "temperature" and value < _ABSOLUTE_ZERO:
        raise QuantityError("Q109", f"{shown(text)} is below absolute zero", f"write for example {row.example}")
    if row.name == "pressure" and value < -ATMOSPHERE:
        raise QuantityError("Q109", f"{shown(text)} is below vacuum", "a pressure is gauge unless `absolute` follows the unit")
    wanted = sign or row.sign
    hint = f"write for example {row.example}"
    if value < 0 and wanted != "any":
        raise QuantityError("Q108", f"{shown(text)} is negative; {row.words} is written without a sign here", hint)
    if value == 0 and wanted == "positive":
        raise QuantityError("Q108", f"{shown(text)} is zero; {row.words} greater than zero is expected here", hint)
    return value

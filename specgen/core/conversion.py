"""How a written unit turns into a dimension's base unit, worked out once for each pair."""

from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache
from math import gcd, lcm

from specgen.core.codes import QuantityError, shown
from specgen.core.dimension import DIMENSIONS, Dimension
from specgen.core.unit import base_meaning, fits, meaning, plain_unit, right_spelling

ATMOSPHERE = 101325  # Pa, the standard atmosphere that gauge pressures count from


@dataclass(frozen=True, slots=True)
class Unit:
    """A unit to print in: ``shown = base * scale + offset``."""

    symbol: str
    scale: float = 1.0
    offset: float = 0.0


@dataclass(frozen=True, slots=True)
class Conversion:
    """``base = (number * times + plus) / over`` in whole numbers, so that one rounding is all there is."""

    times: int
    plus: int
    over: int
    unit: Unit


def is_absolute(rest: str) -> bool:
    """Tell whether a written unit ends in `absolute`."""
    return rest.rstrip().endswith(" absolute")


@lru_cache(maxsize=2048)
def conversion(written: str, row: Dimension) -> Conversion:
    """Find how a written unit turns into a dimension's base unit."""
    plain = written
    absolute = is_absolute(written)
    if absolute:
        if row.name != "pressure":
            raise QuantityError("Q114", f"`absolute` does not suit {row.words}", f"write for example {row.example}")
        plain = written.rstrip().removesuffix("absolute").rstrip()
    if row.label:
        return _own(plain, row)
    if not fits(plain, row):
        raise _wrong_unit(plain, row)
    factor = Fraction(1) if row.name == "kv" else meaning(plain).factor / base_meaning(row).factor
    plus = Fraction(-ATMOSPHERE) if absolute else Fraction(0)
    if row.name == "temperature":
        plus = {"K": Fraction(-27315, 100), "degF": Fraction(-160, 9)}.get(plain_unit(plain), Fraction(0))
    over = lcm(factor.denominator, plus.denominator)
    times, added = int(factor * over), int(plus * over)
    shared = gcd(times, added, over)
    return Conversion(times // shared, added // shared, over // shared, Unit(written, float(1 / factor), float(-plus / factor)))


def _own(plain: str, row: Dimension) -> Conversion:
    """Convert a designer's own unit: not at all, or a rate of it to one per second."""
    if plain not in row.usual:
        raise QuantityError("Q107", f"{shown(plain)} is not the loop's own unit", f"write for example {row.example}")
    if plain == row.label:
        return Conversion(1, 0, 1, Unit(plain))
    factor = meaning(plain.removeprefix(row.label + "/")).factor
    return Conversion(factor.denominator, 0, factor.numerator, Unit(plain, float(factor)))


def _wrong_unit(plain: str, row: Dimension) -> QuantityError:
    """Say whether a unit is unknown, malformed or of another dimension."""
    usual = ", ".join(row.usual)
    try:
        powers = meaning(plain).powers
    except QuantityError as problem:
        if problem.code == "Q105":
            better = right_spelling(plain, row)
            return QuantityError(problem.code, problem.text, f"write {better}" if better else f"units that fit: {usual}")
        return problem
    if row.name == "kv":
        return QuantityError("Q107", f"{shown(plain)} is no unit of {row.words}", "write it in m3/h; Kv = 0.865 Cv")
    other = next((known.words for known in DIMENSIONS.values() if base_meaning(known).powers == powers), "another dimension")
    hint = f"write for example {row.example}; units that fit: {usual}"
    if row.name == "time" and plain == "m":
        hint = "write min if minutes are meant"
    return QuantityError("Q107", f"{shown(plain)} is the unit of {other}; {row.words} is expected here", hint)

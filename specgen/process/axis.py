"""Axes of the worst-case box: declared ranges that are moved together, each kept so that a case can be named in words."""

from dataclasses import dataclass, field, replace

from specgen.core.quantity import Range
from specgen.core.say import Phrasing, Said

NAMED_APART = 1e-9


@dataclass(frozen=True, slots=True)
class Declared:
    """A declared field and its two ends, ordered by what they do and not by size.

    ``path`` is the field's place in the loop file, ``words`` what a sentence calls it, ``dimension`` one of ``specgen.core.say``.
    """

    path: str
    words: str
    at_zero: float
    at_one: float
    dimension: str

    def at(self, t: float) -> float:
        """Return the field's value a share ``t`` of the way from its first end to its second."""
        if self.at_zero == self.at_one:
            return self.at_zero
        return self.at_zero + t * (self.at_one - self.at_zero)

    @property
    def varies(self) -> bool:
        """Tell whether the two ends differ."""
        return self.at_zero != self.at_one

    def turned(self) -> "Declared":
        """Return the field with its ends exchanged."""
        return replace(self, at_zero=self.at_one, at_one=self.at_zero)

    def said(self, t: float, phrasing: Phrasing) -> str:
        """Return the field's value at ``t`` in words, as ``surroundings 30.0 °C``."""
        value = self.at(t)
        if self.dimension == "supply":
            if abs(value - 1) < NAMED_APART:
                return "rated supply"
            return f"{self.words} {'+' if value > 1 else ''}{phrasing.say(Said(value - 1, 'fraction'))}"
        if value == 0:
            return f"no {self.words}"
        if self.dimension == "rate_of_value":
            return f"{self.words} {phrasing.say(Said(value * 60, 'change'))}/min"
        return f"{self.words} {phrasing.say(Said(value, self.dimension))}"


def declared(path: str, words: str, given: Range, dimension: str) -> Declared:
    """Return a range as a declared field, its low end first."""
    return Declared(path, words, float(given.low), float(given.high), dimension)


@dataclass(frozen=True, slots=True)
class Axis:
    """A sum of products of declared fields that move together from their first ends to their second.

    Examples
    --------
    >>> area = Declared("plant.balance.surfaces.0.area", "area of panels", 14, 14, "area")
    >>> u_value = Declared("plant.balance.surfaces.0.u_value", "U of panels", 1.0, 1.2, "u_value")
    >>> round(Axis(((area, u_value),)).at(0.5), 9)
    15.4
    """

    terms: tuple[tuple[Declared, ...], ...] = ()
    factor: float = 1.0
    # the ends are asked for at nearly every corner of a search
    _first: float = field(init=False, compare=False, repr=False)
    _last: float = field(init=False, compare=False, repr=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "_first", self._sum(0.0))
        object.__setattr__(self, "_last", self._sum(1.0))

    def at(self, t: float) -> float:
        """Return the axis' value a share ``t`` of the way along it."""
        if t == 0:
            return self._first
        return self._last if t == 1 else self._sum(t)

    def _sum(self, t: float) -> float:
        total = 0.0
        for term in self.terms:
            product = self.factor
            for part in term:
                product *= part.at(t)
            total += product
        return total

    @property
    def varies(self) -> bool:
        """Tell whether any field of the axis varies."""
        return any(part.varies for term in self.terms for part in term)

    @property
    def fields(self) -> tuple[Declared, ...]:
        """Return the fields, each once."""
        return tuple(dict.fromkeys(part for term in self.terms for part in term))


def single(path: str, words: str, given: Range | None, dimension: str) -> Axis:
    """Return an axis of one declared field; of nothing, which is zero, where it is not declared."""
    return Axis() if given is None else Axis(((declared(path, words, given, dimension),),))

"""How numbers of one loop are written on its pages: as many digits as its tolerance can use, and none rounded across a limit."""

import re
from dataclasses import dataclass
from math import ceil, floor, inf, isfinite, log10

from specgen.core.printed import SYSTEMS, SystemName, own_unit, system_named
from specgen.core.quantity import Range, Unit
from specgen.core.say import THIN, Phrasing, Said, Words, digits, join, to_step
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel

CELSIUS, KELVIN = Unit("degC"), Unit("K")
_PRINTED = {"degC": "°C", "degF": "°F", "percent": "%", "ohm": "\u03a9", "m3/h": "m³/h", "inch": "in"}
_BEFORE_WORDS = re.compile(f"{THIN}(?=(?:percent|years?|days|an? [hy]|operations))")
_IN_WORDS = frozenset({"time", "years", "per_hour", "per_year", "operations"})
KILO = 1e3
_HAIR = 1e-9  # share of a step by which a number may lie past it and still count as on it


def printed(symbol: str) -> str:
    """Return a unit as tables print it.

    Examples
    --------
    >>> printed("degC"), printed("m3/h"), printed("bar")
    ('°C', 'm³/h', 'bar')
    """
    return _PRINTED.get(symbol, symbol)


def outward(value: float, step: float) -> float:
    """Round away from zero to a step, so that a stated excursion is never less than the computed one.

    Examples
    --------
    >>> round(outward(0.91, 0.1), 6), round(outward(-0.91, 0.1), 6), round(outward(0.9, 0.1), 6)
    (1.0, -1.0, 0.9)
    """
    steps = ceil(abs(value) / step - _HAIR) * step
    return -steps if value < 0 else steps


def inward(value: float, significant: int = 3) -> float:
    """Round a positive number down to significant digits, so that a stated life is never more than the computed one.

    Examples
    --------
    >>> inward(10.4999), inward(0.12399), inward(0)
    (10.4, 0.123, 0.0)
    """
    if value <= 0 or not isfinite(value):
        return float(value)
    places = significant - 1 - floor(log10(value))
    return round(floor(value * 10.0**places + _HAIR) / 10.0**places, max(places, 0))


def upward(value: float, significant: int = 3) -> float:
    """Round a positive number up to significant digits, so that a stated least is never less than the computed one.

    Examples
    --------
    >>> upward(0.94691), upward(209.2), upward(0)
    (0.947, 210.0, 0.0)
    """
    if value <= 0 or not isfinite(value):
        return float(value)
    places = significant - 1 - floor(log10(value))
    return round(ceil(value * 10.0**places - _HAIR) / 10.0**places, max(places, 0))


def plain(value: float, significant: int = 9) -> str:
    """Write a number for a file that machines read.

    Examples
    --------
    >>> plain(0.1 + 0.2), plain(-2.5), plain(1e6)
    ('0.3', '-2.5', '1000000')
    """
    if not isfinite(value):
        return ""
    text = f"{value:.{significant}g}"
    return f"{float(text):.0f}" if "e" in text and abs(value) >= 1 else text


@dataclass(frozen=True, slots=True)
class Writer:
    """Writes one loop's numbers.

    ``step`` is the place that matters to the tolerance, in the unit of the pages: a tenth of it, rounded down to a
    power of ten.
    """

    phrasing: Phrasing
    step: float

    @property
    def value_unit(self) -> str:
        """Return the unit of a value as tables print it."""
        return printed(self.phrasing.value.symbol)

    @property
    def change_unit(self) -> str:
        """Return the unit of a difference as tables print it."""
        return printed(self.phrasing.change.symbol)

    def value_number(self, value: float) -> str:
        """Write a value without its unit."""
        unit = self.phrasing.value
        return to_step(value * unit.scale + unit.offset, self.step)

    def value(self, value: float) -> str:
        """Write a value with its unit."""
        return join(self.value_number(value), self.value_unit)

    def one_digit_more(self, value: float) -> str:
        """Write a value with one decimal more than the tables have."""
        unit = self.phrasing.value
        return join(to_step(value * unit.scale + unit.offset, self.step / 10), self.value_unit)

    def fine_value(self, value: float, apart: float) -> str:
        """Write a value that lies ``apart`` from another, with as many decimals as that distance has (three at most)."""
        shown = round(abs(apart) * self.phrasing.change.scale, 3)
        places = len(f"{shown:.3f}".rstrip("0").partition(".")[2])
        unit = self.phrasing.value
        return join(to_step(value * unit.scale + unit.offset, min(self.step, 10.0**-places)), self.value_unit)

    def far_value(self, value: float) -> str:
        """Write a value far from what is held, to three significant digits, without its unit."""
        return digits(self.shown_value(value))

    def near(self, value: float, apart: float) -> str:
        """Write a value so that its distance ``apart`` from another keeps two digits."""
        shown = abs(apart) * self.phrasing.change.scale
        step = min(self.step, 10.0 ** (floor(log10(shown)) - 1)) if shown > 0 else self.step
        unit = self.phrasing.value
        return join(to_step(value * unit.scale + unit.offset, step), self.value_unit)

    def fine_change(self, change: float) -> str:
        """Write a difference to three significant digits."""
        return join(digits(change * self.phrasing.change.scale), self.change_unit)

    def values(self, span: Range) -> str:
        """Write a range of values, one number where both ends are the same."""
        low, high = self.value_number(span.low), self.value_number(span.high)
        return join(low if low == high else f"{low} to {high}", self.value_unit)

    def setting(self, change: float) -> str:
        """Write a difference that is entered or declared: every digit it has, up to four."""
        return join(digits(change * self.phrasing.change.scale, 4), self.change_unit)

    def bounds(self, least: float, most: float) -> str:
        """Write a range of differences, each end rounded into it."""
        scale = self.phrasing.change.scale
        low, high = upward(least * scale), inward(most * scale)
        if most < least:
            return f"needs {join(digits(low), self.change_unit)}, may be {join(digits(high), self.change_unit)} at most"
        if not isfinite(most):
            return f"{join(digits(low), self.change_unit)} or more" if least > 0 else ""
        return join(f"{digits(low)} to {digits(high)}" if least > 0 else f"up to {digits(high)}", self.change_unit)

    def excursion_number(self, change: float, limit: float = inf) -> str:
        """Write a predicted difference without its unit; never rounded back to a limit that it passes."""
        scale = self.phrasing.change.scale
        if not isfinite(change):
            return digits(change)
        nearest = round(change * scale / self.step) * self.step
        if change > limit and nearest <= limit * scale * (1 + _HAIR):
            nearest = outward(change * scale, self.step)
        return to_step(nearest, self.step)

    def excursion(self, change: float, limit: float = inf) -> str:
        """Write a predicted difference; never rounded back to a limit that it passes."""
        return join(self.excursion_number(change, limit), self.change_unit)

    def bare(self, value: float, significant: int = 3) -> str:
        """Write any number without a unit."""
        return digits(value, significant)

    def years_number(self, years: float) -> str:
        """Write a life without its unit."""
        return digits(years)

    def years(self, years: float) -> str:
        """Write a life in years."""
        number = self.years_number(years)
        return f"{number}\u00a0{'year' if number == '1' else 'years'}"

    def say(self, value: float, dimension: str, significant: int = 3) -> str:
        """Write any number with its unit; shares as percent signs, since tables and lists are no sentences."""
        if dimension == "fraction":
            return join(digits(value * 100, significant), "%")
        if dimension == "value":
            return self.value(value) if isfinite(value) else digits(value)
        if dimension == "change" and isfinite(value):
            return join(digits(value * self.phrasing.change.scale, significant), self.change_unit)
        if dimension == "change_per_second":
            return join(digits(value * self.phrasing.change.scale, significant), f"{self.change_unit}/s")
        if dimension == "share_per_change":
            return join(digits(value / self.phrasing.change.scale, significant), f"1/{self.change_unit}")
        if dimension == "current" and abs(value) >= KILO:
            return join(digits(value / KILO, significant), "kA")
        small = SYSTEMS[self.phrasing.system].small.get(dimension)
        if small is not None and 0 < abs(value) < small[0]:
            return join(digits(value * small[1].scale, significant), small[1].symbol)
        said = self.phrasing.say(Said(value, dimension), significant)
        return _BEFORE_WORDS.sub("\u00a0", said) if dimension in _IN_WORDS else said

    def sentence(self, template: str, words: Words) -> str:
        """Fill a rule's sentence; between a number and a word stands a whole space, not a thin one."""
        return _BEFORE_WORDS.sub("\u00a0", self.phrasing.fill(template, words))

    def time(self, seconds: float) -> str:
        """Write a time."""
        return self.say(seconds, "time")

    def shown_value(self, value: float) -> float:
        """Return a value in the unit of the pages."""
        return value * self.phrasing.value.scale + self.phrasing.value.offset

    def shown_change(self, change: float) -> float:
        """Return a difference in the unit of the pages."""
        return change * self.phrasing.change.scale


def step_for(tolerance: float) -> float:
    """Return the place a tolerance can use: a tenth of it, rounded down to a power of ten.

    Examples
    --------
    >>> step_for(1.5), step_for(4), step_for(0.2), step_for(50)
    (0.1, 0.1, 0.01, 1.0)
    """
    return 10.0 ** floor(log10(tolerance / 10) + _HAIR) if 0 < tolerance < inf else 0.1


def panel_phrasing(panel: Panel | None) -> Phrasing:
    """Return what writes the panel's numbers, in the units it asks its pages to show."""
    return phrasing_in(CELSIUS, KELVIN, system_of(panel))


def system_of(panel: Panel | None) -> SystemName:
    """Return the system of units that the pages of a panel print in."""
    return "si" if panel is None else system_named(panel.show, panel.code_basis)


def phrasing_in(value: Unit, change: Unit, system: SystemName) -> Phrasing:
    """Return what writes numbers of a loop's own units in those of a system."""
    return Phrasing(own_unit(value, system), own_unit(change, system, change=True), system)


def writer_for(decided: DecidedLoop, system: SystemName = "si") -> Writer:
    """Return the writer of a loop, in the units of a system."""
    phrasing = phrasing_in(decided.loop.unit, decided.loop.difference_unit, system)
    tolerance = decided.loop.need.tolerance
    return Writer(phrasing, step_for(min(float(tolerance.above), float(tolerance.below)) * phrasing.change.scale))

"""Numbers inside sentences: what is said, its dimension, and how a person reads it."""

from collections.abc import Mapping
from dataclasses import dataclass
from math import floor, isfinite, log10

from specgen.core.conversion import Unit
from specgen.core.printed import SYSTEMS, Ladder, SystemName

THIN = "\u202f"  # no-break thin space between number and unit
MINUS = "\u2212"


@dataclass(frozen=True, slots=True)
class Said:
    """A number in base units with its dimension's name (``"value"`` and ``"change"``: in the loop's own quantity)."""

    value: float
    dimension: str


def seconds(value: float) -> Said:
    """Say a time [s]."""
    return Said(float(value), "time")


def share(value: float) -> Said:
    """Say a share [0..1] as percent."""
    return Said(float(value), "fraction")


def of_value(value: float) -> Said:
    """Say a value of the loop's quantity."""
    return Said(float(value), "value")


def of_change(value: float) -> Said:
    """Say a difference of the loop's quantity."""
    return Said(float(value), "change")


def years(value: float) -> Said:
    """Say a number of years."""
    return Said(float(value), "years")


def per_hour(value: float) -> Said:
    """Say how often in an hour [1/h]."""
    return Said(float(value), "per_hour")


def amperes(value: float) -> Said:
    """Say a current [A]."""
    return Said(float(value), "current")


def watts(value: float) -> Said:
    """Say a power [W]."""
    return Said(float(value), "power")


def plain(value: float) -> Said:
    """Say a bare number."""
    return Said(float(value), "number")


Words = Mapping[str, "Said | str"]


NOTHING = 1e-12  # what a difference of equal numbers leaves


def digits(value: float, significant: int = 3) -> str:
    """Write a number to significant digits, without exponent where people would not write one.

    Examples
    --------
    >>> digits(10.04), digits(0.123456), digits(1234567.0), digits(-2.0), digits(0)
    ('10', '0.123', '1\u202f230\u202f000', '\u22122', '0')
    """
    if not isfinite(value):
        return "without limit" if value > 0 else f"{MINUS}without limit"
    if abs(value) < NOTHING:
        return "0"
    short = f"{value:.{significant}g}"  # most numbers are done here; what follows is for those it would write with an exponent
    if "e" not in short:
        return short.replace("-", MINUS)
    places = significant - 1 - floor(log10(abs(value)))
    rounded = round(value, places)
    text = f"{abs(rounded):,.{max(places, 0)}f}".replace(",", THIN)
    if "." in text:
        text = text.rstrip("0").rstrip(".")
    whole, _, rest = text.partition(".")
    if len(whole.replace(THIN, "")) <= 4:  # noqa: PLR2004  four digits are read at a glance
        whole = whole.replace(THIN, "")
    text = f"{whole}.{rest}" if rest else whole
    return (MINUS if rounded < 0 else "") + text


def to_step(value: float, step: float) -> str:
    """Write a number to the decimals of a step.

    Examples
    --------
    >>> to_step(65.04, 0.1), to_step(3.0, 1), to_step(-0.25, 0.01)
    ('65.0', '3', '\u22120.25')
    """
    places = max(0, -floor(log10(step) + 1e-9)) if step > 0 else 0
    text = f"{abs(value):.{places}f}"
    negative = value < 0 and float(text) != 0
    return (MINUS if negative else "") + text


_PRINTED = {"degC": "°C", "degF": "°F", "ohm": "\u03a9", "m3/h": "m³/h", "inch": "in"}


@dataclass(frozen=True, slots=True)
class Phrasing:
    """Writes numbers of one loop: its value's unit, the unit of a difference, and the system that all others are printed in."""

    value: Unit
    change: Unit
    system: SystemName = "si"

    def say(self, said: Said, significant: int = 3) -> str:
        """Write one number with its unit.

        Examples
        --------
        >>> phrasing = Phrasing(Unit("degC"), Unit("K"))
        >>> phrasing.say(seconds(10)), phrasing.say(share(0.05)), phrasing.say(of_value(65))
        ('10\u202fs', '5\u202fpercent', '65.0\u202f°C')
        """
        if said.dimension == "value":
            # a value is read against its tolerance: a tenth of the display's unit is enough for degrees
            shown = said.value * self.value.scale + self.value.offset
            text = to_step(shown, 0.1) if self.value.symbol in ("degC", "degF", "percent") else digits(shown, 4)
            return join(text, self.value.symbol)
        if said.dimension == "change":
            return join(digits(said.value * self.change.scale, significant), self.change.symbol)
        system = SYSTEMS[self.system]
        ladder = system.ladders.get(said.dimension)
        if ladder is not None:
            return _on_ladder(said.value, ladder, significant)
        unit = system.fixed.get(said.dimension)
        if unit is None:
            return join(digits(said.value, significant), said.dimension)
        return join(digits(said.value * unit.scale + unit.offset, significant), unit.symbol)

    def fill(self, template: str, words: Words) -> str:
        """Put numbers and words into a sentence's braces."""
        return template.format_map({name: self.say(w) if isinstance(w, Said) else w for name, w in words.items()})


def _on_ladder(value: float, ladder: Ladder, significant: int) -> str:
    """Write a number in the largest unit it reaches, zero in the plain one."""
    size = abs(value)
    if size == 0:
        return join("0", next((unit.symbol for least, unit in ladder if least == 1), ladder[0][1].symbol))
    unit = next((unit for least, unit in ladder if size >= least * (1 - 1e-9)), ladder[-1][1])
    return join(digits(value * unit.scale, significant), unit.symbol)


def as_difference(text: str) -> str:
    """Return a written difference so that nobody takes it for a temperature.

    Examples
    --------
    >>> as_difference("1.5 degC"), as_difference("0.2 bar")
    ('1.5 K', '0.2 bar')
    """
    return text.replace("degC", "K")


def join(number: str, symbol: str) -> str:
    """Join number and unit with a thin no-break space, units in their printed form."""
    printed = _PRINTED.get(symbol, symbol)
    return f"{number}{THIN}{printed}" if printed else number

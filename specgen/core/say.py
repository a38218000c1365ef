"""Numbers inside sentences: what is said, its dimension, and how a person reads it."""

from collections.abc import Mapping
from dataclasses import dataclass
from math import floor, isfinite, log10

from specgen.core.quantity import Unit

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


_FIXED = {
    "years": ("years", 1.0), "per_hour": ("an hour", 1.0), "number": ("", 1.0), "current": ("A", 1.0), "voltage": ("V", 1.0),
    "resistance": ("\u03a9", 1.0), "fraction": ("percent", 100.0), "frequency": ("Hz", 1.0), "length": ("m", 1.0), "area": ("m²", 1.0),
    "loss": ("W/K", 1.0), "mass": ("kg", 1.0), "u_value": ("W/(m² K)", 1.0), "thermal_resistance": ("K/W", 1.0), "kv": ("m³/h", 1.0),
    "per_year": ("a year", 1.0), "operations": ("operations", 1.0), "degrees": ("°", 1.0), "temperature": ("°C", 1.0),
    "difference": ("K", 1.0), "i2t": ("A² s", 1.0), "per_second": ("1/s", 1.0), "density": ("kg/m³", 1.0),
    "flow_volume": ("m³/h", 3600.0),
}  # fmt: skip
_LADDERS = {
    "time": ((365.25 * 86400, "years"), (2 * 86400, "days"), (3 * 3600, "h"), (600, "min"), (1, "s"), (1e-3, "ms")),
    "power": ((1e6, "MW"), (1e3, "kW"), (1, "W"), (1e-3, "mW")),
    "heat_capacity": ((1e6, "MJ/K"), (1e3, "kJ/K"), (1, "J/K")),
    "specific_heat": ((1e3, "kJ/(kg K)"), (1, "J/(kg K)")),
    "energy": ((1e6, "MJ"), (1e3, "kJ"), (1, "J")),
    "pressure": ((1e5, "bar"), (1e2, "mbar"), (1, "Pa")),
    "pressure_difference": ((1e5, "bar"), (1e2, "mbar"), (1, "Pa")),
}
_PRINTED = {"degC": "°C", "degF": "°F", "ohm": "\u03a9", "m3/h": "m³/h"}
_SCALE_OF = {"years": 365.25 * 86400, "days": 86400.0, "h": 3600.0, "min": 60.0}


@dataclass(frozen=True, slots=True)
class Phrasing:
    """Writes numbers of one loop: its value's unit and the unit of a difference."""

    value: Unit
    change: Unit

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
        if said.dimension in _LADDERS:
            return _on_ladder(said, significant)
        symbol, scale = _FIXED.get(said.dimension, (said.dimension, 1.0))
        return join(digits(said.value * scale, significant), symbol)

    def fill(self, template: str, words: Words) -> str:
        """Put numbers and words into a sentence's braces."""
        return template.format_map({name: self.say(w) if isinstance(w, Said) else w for name, w in words.items()})


def _on_ladder(said: Said, significant: int) -> str:
    ladder = _LADDERS[said.dimension]
    size = abs(said.value)
    for step, symbol in ladder:
        if size >= step * (1 - 1e-9):
            return join(digits(said.value / _SCALE_OF.get(symbol, step), significant), symbol)
    step, symbol = ladder[-1]
    base = next(symbol for step, symbol in ladder if step == 1)
    return join("0", base) if size == 0 else join(digits(said.value / step, significant), symbol)


def join(number: str, symbol: str) -> str:
    """Join number and unit with a thin no-break space, units in their printed form."""
    printed = _PRINTED.get(symbol, symbol)
    return f"{number}{THIN}{printed}" if printed else number

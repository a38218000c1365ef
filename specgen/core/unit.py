"""Units: the spellings that are known, the grammar that joins them, and what pint says they are worth."""

import difflib
import re
from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache
from itertools import product
from typing import TYPE_CHECKING

from specgen.core.codes import QuantityError, shown
from specgen.core.dimension import Dimension

if TYPE_CHECKING:
    import pint

_LONGEST = 40
_HIGHEST_POWER = 4
_MOST_REPAIRED = 3

# Spelling -> pint's name. Only these are units; pint's own reading of text is never asked, so that `6 M` or
# `3 a` cannot become something nobody meant.
_SPELLINGS = {
    **dict.fromkeys(("s", "second", "seconds"), "second"),
    **dict.fromkeys(("min", "minute", "minutes"), "minute"),
    **dict.fromkeys(("h", "hour", "hours"), "hour"),
    **dict.fromkeys(("d", "day", "days"), "day"),
    **dict.fromkeys(("week", "weeks"), "week"),
    **dict.fromkeys(("year", "years"), "year"),
    "ms": "millisecond", "us": "microsecond",
    "K": "kelvin", "degC": "delta_degree_Celsius", "degF": "delta_degree_Fahrenheit",
    "W": "watt", "mW": "milliwatt", "kW": "kilowatt", "MW": "megawatt",
    "VA": "volt_ampere", "kVA": "kilovolt_ampere", "MVA": "megavolt_ampere",
    "hp": "horsepower",
    "J": "joule", "kJ": "kilojoule", "MJ": "megajoule", "Wh": "watt_hour", "kWh": "kilowatt_hour", "MWh": "megawatt_hour",
    "Btu": "Btu", "BTU": "Btu", "kcal": "kilocalorie",
    "V": "volt", "mV": "millivolt", "kV": "kilovolt",
    "A": "ampere", "mA": "milliampere", "uA": "microampere", "kA": "kiloampere",
    "ohm": "ohm", "mohm": "milliohm", "kohm": "kiloohm", "Mohm": "megaohm",
    "Hz": "hertz", "kHz": "kilohertz",
    "m": "meter", "mm": "millimeter", "cm": "centimeter", "km": "kilometer", "um": "micrometer",
    "ft": "foot", "inch": "inch", "inches": "inch", "in": "inch",
    "l": "liter", "L": "liter", "ml": "milliliter", "mL": "milliliter", "gal": "gallon",
    "kg": "kilogram", "g": "gram", "mg": "milligram", "t": "metric_ton", "lb": "pound",
    "Pa": "pascal", "hPa": "hectopascal", "kPa": "kilopascal", "MPa": "megapascal",
    "bar": "bar", "mbar": "millibar", "psi": "psi", "atm": "atmosphere",
    "mmHg": "millimeter_Hg", "inHg": "inch_Hg", "cmH2O": "centimeter_H2O", "inH2O": "inch_H2O", "ftH2O": "foot_H2O",
    "percent": "percent", "%": "percent",
}  # fmt: skip

# What people write instead; answered with the right spelling, never read.
_MEANT = {
    "c": "degC", "celsius": "degC", "centigrade": "degC", "f": "degF", "fahrenheit": "degF", "kelvin": "K", "deg": "degC",
    "sec": "s", "secs": "s", "hr": "h", "hrs": "h", "mins": "min", "msec": "ms", "yr": "year", "a": "year",
    "watt": "W", "watts": "W", "volt": "V", "volts": "V", "vac": "V", "vdc": "V", "amp": "A", "amps": "A", "ampere": "A",
    "ohms": "ohm", "hertz": "Hz", "pascal": "Pa",
    "metre": "m", "meter": "m", "metres": "m", "meters": "m", "sqm": "m2", "sqmm": "mm2", "foot": "ft", "feet": "ft",
    "litre": "l", "liter": "l", "litres": "l", "liters": "l", "cbm": "m3", "cum": "m3", "gpm": "gal/min", "lpm": "l/min",
    "cfm": "ft3/min", "gallon": "gal", "gallons": "gal", "kilo": "kg", "kilos": "kg", "tonne": "t", "ton": "t", "tons": "t",
    "pound": "lb", "pounds": "lb", "lbs": "lb",
    "barg": "bar", "bara": "bar absolute", "psig": "psi", "psia": "psi absolute", "kpag": "kPa", "kpaa": "kPa absolute",
    "mmwc": "mbar", "mmws": "mbar", "mws": "bar", "inwc": "inH2O",
    "pct": "percent", "perc": "percent", "percentrh": "percent", "rh": "percent",
    "hp(e)": "hp", "ps": "hp",
}  # fmt: skip

_PLAIN = str.maketrans(
    {"²": "2", "³": "3", "⁴": "4", "¹": "1", "⁻": "-", "−": "-", "°": "deg", "℃": "degC", "℉": "degF", "·": "*", "⋅": "*",
     "\u00b5": "u", "\u03bc": "u",  # micro sign, Greek mu
     "\u03a9": "ohm", "\u2126": "ohm",  # Greek omega, ohm sign
     "\u00a0": " ", "\u202f": " ", "\u2009": " "}  # blanks that do not break, thin blank
)  # fmt: skip

_ATOM = r"(?:(?:cm|in|ft)H2O|%|[A-Za-z]+)(?:(?:\^|\*\*)?[-+]?[0-9]+)?"
_PRODUCT = rf"{_ATOM}(?:(?:\s+|\s*\*\s*){_ATOM})*"
_UNIT = re.compile(rf"{_PRODUCT}(?:\s*/\s*(?:{_ATOM}|\(\s*{_PRODUCT}\s*\)))*")
_TWO_WAYS = re.compile(rf"(?P<above>[^/]+)/\s*(?P<below>{_PRODUCT})")
_SPLIT_ATOM = re.compile(r"(?P<name>(?:cm|in|ft)H2O|%|[A-Za-z]+)(?P<power>(?:\^|\*\*)?[-+]?[0-9]+)?")


@dataclass(frozen=True, slots=True)
class Meaning:
    """What a unit is worth: its size in SI and the powers of its base dimensions, sorted."""

    factor: Fraction
    powers: tuple[tuple[str, int], ...]


@lru_cache(maxsize=1)
def _registry() -> "pint.UnitRegistry[Fraction]":
    """Make pint's registry once, when the first unit is read."""
    import pint  # noqa: PLC0415 - a third of a second that `--help` should not pay

    return pint.UnitRegistry(non_int_type=Fraction, cache_folder=None)


@lru_cache(maxsize=256)
def _worth(spelling: str) -> Meaning:
    """Ask pint for one known spelling; exact fractions, so that 6 bar is 600000 Pa and not a hair beside it."""
    measured = _registry().Quantity(Fraction(1), _SPELLINGS[spelling]).to_base_units()
    powers = {str(name).strip("[]"): int(str(power)) for name, power in dict(measured.dimensionality).items()}
    if spelling in ("percent", "%"):
        # pint takes a percent for a plain number, and so a hertz for a hundred percent per second
        powers = {"share": 1}
    return Meaning(Fraction(measured.magnitude), tuple(sorted(powers.items())))


def _power(written: str | None) -> int:
    digits = (written or "1").lstrip("^*").lstrip("+")
    number = int(digits) if len(digits) <= len("-4") else _HIGHEST_POWER + 1
    if number == 0 or abs(number) > _HIGHEST_POWER:
        raise QuantityError("Q106", f"a power of {shown(digits, 12)} is refused", f"powers run from 1 to {_HIGHEST_POWER}, as in m2")
    return number


def plain_unit(written: str) -> str:
    """Return a unit in plain letters: `m²` as `m2`, `°C` as `degC`, `kΩ` as `kohm`, `µA` as `uA`.

    Examples
    --------
    >>> plain_unit(" °C ")
    'degC'
    """
    return written.translate(_PLAIN).strip()


def split_unit(written: str) -> list[tuple[str, int]]:
    """Split a unit into its spellings with their powers; what stands below the line has a negative power.

    Raises
    ------
    QuantityError
        Q106: no product or quotient, a power above 4, or two ways to read it.

    Examples
    --------
    >>> split_unit("kJ/(kg K)")
    [('kJ', 1), ('kg', -1), ('K', -1)]
    """
    if len(written) > _LONGEST:
        raise QuantityError("Q106", f"the unit {shown(written)} is longer than {_LONGEST} characters")
    text = plain_unit(written)
    if _UNIT.fullmatch(text) is None:
        twofold = _TWO_WAYS.fullmatch(text)
        if twofold is not None:
            right = f"{twofold['above'].strip()}/({twofold['below'].strip()})"
            raise QuantityError("Q106", f"the unit {shown(written)} can be read in two ways", f"write {right} if that is meant")
        raise QuantityError("Q106", f"{shown(written)} is no product or quotient of units", "write for example kJ/(kg K), m3/h or A2 s")
    above, *below = text.split("/")
    atoms = [(found["name"], _power(found["power"])) for found in _SPLIT_ATOM.finditer(above)]
    return atoms + [(found["name"], -_power(found["power"])) for part in below for found in _SPLIT_ATOM.finditer(part)]


@lru_cache(maxsize=1024)
def meaning(written: str) -> Meaning:
    """Return what a written unit is worth in SI.

    Raises
    ------
    QuantityError
        Q105: a spelling is unknown; Q106: no plain product or quotient.

    Examples
    --------
    >>> meaning("kJ/(kg K)").factor
    Fraction(1000, 1)
    """
    factor = Fraction(1)
    total: dict[str, int] = {}
    for name, power in split_unit(written):
        if name not in _SPELLINGS:
            raise QuantityError("Q105", f"{shown(name)} is no known unit")
        worth = _worth(name)
        factor *= worth.factor**power
        for base, times in worth.powers:
            total[base] = total.get(base, 0) + times * power
    return Meaning(factor, tuple(sorted((base, times) for base, times in total.items() if times)))


def right_spelling(written: str, dimension: Dimension) -> str:
    """Return what was probably meant by a unit that is not known, empty where nothing is near.

    Examples
    --------
    >>> from specgen.core.dimension import DIMENSIONS
    >>> right_spelling("KW", DIMENSIONS["power"]), right_spelling("degc", DIMENSIONS["temperature"])
    ('kW', 'degC')
    """
    names = [name for name, _ in split_unit(written) if name not in _SPELLINGS]
    choices = [[(name, other) for other in _near(name)] for name in dict.fromkeys(names)]
    if len(choices) > _MOST_REPAIRED:
        return ""
    repaired = (_with_atoms(plain_unit(written), dict(choice)) for choice in product(*choices))
    return " or ".join(dict.fromkeys(text for text in repaired if fits(text, dimension)))


def _with_atoms(written: str, others: dict[str, str]) -> str:
    return _SPLIT_ATOM.sub(lambda found: others.get(found["name"], found["name"]) + (found["power"] or ""), written)


def _near(name: str) -> list[str]:
    """Return known spellings that differ in case alone, or the one that is usually meant, or look alike."""
    same = [known for known in _SPELLINGS if known.casefold() == name.casefold()]
    if name.casefold() in _MEANT:
        same.append(_MEANT[name.casefold()])
    return same or difflib.get_close_matches(name, [*_SPELLINGS, "degC"], n=2, cutoff=0.6)


def fits(written: str, dimension: Dimension) -> bool:
    """Tell whether a unit belongs to a dimension; a spelling that is not known belongs to none."""
    plain = written.removesuffix(" absolute") if dimension.name == "pressure" else written
    if dimension.label:
        return plain.strip() in dimension.usual
    if dimension.name == "temperature":
        return plain_unit(plain) in dimension.usual
    if dimension.name == "kv":
        return plain_unit(plain).replace(" ", "") == dimension.base
    try:
        return meaning(plain).powers == base_meaning(dimension).powers
    except QuantityError:
        return False


def base_meaning(dimension: Dimension) -> Meaning:
    """Return what the base unit of a dimension is worth in SI."""
    if dimension.base == "1":
        return Meaning(Fraction(1), (("share", 1),))
    if dimension.base == "1/s":
        return Meaning(Fraction(1), (("share", 1), ("time", -1)))
    return meaning(dimension.base)

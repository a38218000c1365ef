"""Numbers as they stand before a unit: one plain form, and a sentence for every other form people write."""

import re
from typing import NamedTuple

from specgen.core.codes import QuantityError, shown

_LONGEST = 40
_LARGEST_EXPONENT = 300
_UNIT_START = r"A-Za-z%°\u00b5\u03bc\u03a9\u2126℃℉"

# Possessive: what was taken for a number is never given back to be read as part of a unit.
_NUMBER = re.compile(
    r"\s*(?P<number>(?P<sign>[-+−]?)(?P<whole>[0-9]++)(?:\.(?P<part>[0-9]++))?+(?:[eE](?P<power>[-+−]?[0-9]++))?+)"
    rf"(?=[\s{_UNIT_START}]|$)\s*(?P<rest>.*)",
    re.DOTALL,
)
_NO_UNIT = re.compile(rf"[^({_UNIT_START}]")
_COMMA = re.compile(r"[-+−]?[0-9.]*,[0-9]+")
_THOUSANDS = re.compile(r"[-+−]?[0-9]{1,3}(?:,[0-9]{3})+(?![0-9])")
_GROUPED = re.compile(r"[-+−]?[0-9]+(?:[\s'_’][0-9]+)+")
_DASH = re.compile(r"(?P<low>[-+−]?[0-9.]+)\s*(?P<unit>[A-Za-z%°]*)\s*(?:-|–|—|\.{2,3}|…|~)\s*(?P<high>[0-9][0-9.]*)")
_PLUS_MINUS = re.compile(r"(?:±|\+/-|\+-)\s*(?P<rest>.*)", re.DOTALL)
_BARE_POINT = re.compile(r"(?P<sign>[-+−]?)(?P<whole>[0-9]*)\.(?P<part>[0-9]*)(?![0-9.])")
_SUM = re.compile(r"[-+−]?[0-9.]+(?:[eE][-+]?[0-9]+)?\s*[-+*/:^(x×]")


class Number(NamedTuple):
    """A number as whole digits times a power of ten, exactly as written, and the text that follows it."""

    digits: int
    exponent: int
    rest: str


def number_and_rest(text: str) -> Number:
    """Read the number at the start of a quantity.

    Raises
    ------
    QuantityError
        Q102, Q103, Q111, Q112, Q113: the number is missing or written in a form that is refused.

    Examples
    --------
    >>> number_and_rest("1.2e3 W")
    Number(digits=12, exponent=2, rest='W')
    """
    found = _NUMBER.match(text)
    if found is None:
        raise _refusal(text.strip())
    number, sign, whole, part, power, rest = found.groups()
    if rest and (_NO_UNIT.match(rest) or " - " in rest):
        raise _refusal(text.strip(), rest)
    if len(number) > _LONGEST:
        raise QuantityError("Q112", f"the number {shown(number)} is longer than {_LONGEST} characters", "fewer digits say as much")
    exponent = int(power.replace("−", "-")) if power else 0
    if abs(exponent) > _LARGEST_EXPONENT:
        raise QuantityError("Q112", f"the number {shown(number)} is too large or too small to compute with")
    digits = int(whole + part) if part else int(whole)
    if part:
        exponent -= len(part)
    return Number(-digits if sign in ("-", "−") else digits, exponent, rest)


def _refusal(text: str, rest: str = "") -> QuantityError:
    """Find out which other form of a number was written, and say how to write it."""
    quoted = shown(text)
    if _THOUSANDS.match(text):
        grouped = _first(_THOUSANDS, text)
        whole, point = text.replace(grouped, grouped.replace(",", ""), 1), text.replace(",", ".", 1)
        return QuantityError("Q103", f"{quoted} has a comma; it can be read in two ways", f"write {whole} or {point}")
    if _COMMA.match(text):
        comma = _first(_COMMA, text)
        plain = comma.replace(".", "").replace(",", ".")
        if plain.startswith("."):
            plain = "0" + plain
        return QuantityError("Q103", f"{quoted} has a decimal comma; write a point", f"write {text.replace(comma, plain, 1)}")
    return _other_form(text, quoted, rest)


def _other_form(text: str, quoted: str, rest: str) -> QuantityError:
    grouped, dash, either, point = _GROUPED.match(text), _DASH.match(text), _PLUS_MINUS.match(text), _BARE_POINT.match(text)
    if dash is not None:
        unit = f" {dash['unit']}" if dash["unit"] else ""
        spread = f"write {dash['low']}{unit} to {dash['high']}{text[dash.end() :]}"
        return QuantityError("Q111", f"{quoted} is no number; a range is written with `to`", spread)
    if grouped is not None:
        together = re.sub(r"[\s'_’]", "", grouped[0])
        return QuantityError("Q113", f"{quoted} groups its digits", f"write {together}{text[grouped.end() :]}")
    if either is not None:
        plain = either["rest"] or "a number"
        return QuantityError("Q102", f"{quoted} starts with no number", f"write {plain}: the field says which way it counts")
    if point is not None and (point["whole"] or point["part"]):
        plain = f"{point['sign']}{point['whole'] or '0'}" + (f".{point['part']}" if point["part"] else "")
        return QuantityError("Q102", f"{quoted} has a point without digits on both sides", f"write {plain}{text[point.end() :]}")
    if _SUM.match(text):
        return QuantityError("Q113", f"{quoted} is a calculation, a fraction or a time of day", "write the one number it comes to")
    if rest:
        return QuantityError("Q106", f"{shown(rest)} is no unit", "write for example 1.5 K")
    return QuantityError("Q102", f"{quoted} does not start with a number", "write for example 1.5 K")


def _first(pattern: "re.Pattern[str]", text: str) -> str:
    found = pattern.match(text)
    return found[0] if found else ""

"""Ready texts with their quantities turned into the units that pages print in."""

import re
from functools import lru_cache

from specgen.core.conversion import Unit
from specgen.core.printed import SYSTEMS, Meaning, SystemName
from specgen.core.say import THIN, digits, to_step

_NUMBER = f"[\u2212-]?[0-9]+(?:{THIN}[0-9]{{3}})*(?:\\.[0-9]+)?"
_DIGITS = 3


def retold(text: str, system: SystemName, degrees: Meaning | None = None) -> str:
    """Return a ready text with every quantity in the units of a system; what already is in them stays as it is.

    Parameters
    ----------
    text : str
        A sentence, or a quantity as somebody wrote it: ``5 degC to 35 degC``.
    system : {"si", "us", "us_iec"}
        What the pages print in.
    degrees : {"temperature", "difference"}, optional
        What a number of degrees is, where the caller knows: 4 degF may be a temperature or a difference, and a text does not tell.

    Examples
    --------
    >>> retold("surroundings 30 degC, 2 to 3 m away", "us"), retold("200 psi for 5 min", "si")
    ('surroundings 86\u202f°F, 6.56 to 9.84\u202fft away', '13.8\u202fbar for 5 min')
    """
    units = SYSTEMS[system].texts
    meant = degrees or SYSTEMS[system].unsure

    def turned(found: re.Match[str]) -> str:
        first, to, last, symbol = found.groups()
        unit = units.get(symbol) or _degrees(symbol, system, meant)
        if unit is None:
            return found[0]
        return f"{_one(first, unit)}{to + _one(last, unit) if to else ''}{THIN}{unit.symbol}"

    return _pattern(system).sub(turned, text)


@lru_cache(maxsize=len(SYSTEMS))
def _pattern(system: SystemName) -> re.Pattern[str]:
    known = {*SYSTEMS[system].texts, *SYSTEMS[system].degrees}
    units = "|".join(re.escape(unit) for unit in sorted(known, key=lambda unit: (-len(unit), unit)))
    # a unit ends where no letter, digit, power or further unit follows
    return re.compile(f"(?<![\\w.])({_NUMBER})(?:( to )({_NUMBER}))?[{THIN}\u00a0 ]({units})(?![\\w/²³(%])")


def _degrees(symbol: str, system: SystemName, meant: Meaning | None) -> Unit | None:
    unit = SYSTEMS[system].degrees[symbol]
    if meant == "difference":
        return Unit("K" if unit.symbol == "°C" else unit.symbol, unit.scale)
    return unit if meant == "temperature" else None


def _one(number: str, unit: Unit) -> str:
    if unit.scale == 1.0 and unit.offset == 0.0:
        return number
    value = float(number.replace("\u2212", "-").replace(THIN, ""))
    if unit.offset:
        # a temperature is read against others: a tenth of a degree, whatever its size
        return to_step(value * unit.scale + unit.offset, 0.1).removesuffix(".0")
    return digits(value * unit.scale, _DIGITS)

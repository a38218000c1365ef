"""The drawing of how firm decisions are: one bar an input, as long as the way to the nearer change."""

from collections.abc import Iterator, Sequence
from math import isfinite, log10

from specgen.core.printed import Meaning
from specgen.core.retell import retold
from specgen.design.types import Firm
from specgen.view.bars import LETTER, WIDTH, Bar, BarChart, bar_drawing
from specgen.view.shapes import Drawing, Note
from specgen.view.writer import Writer

ROOM = 10.0  # around names and values
LEAST_APART = 34.0  # of two ticks
LEAST_AXIS = 120.0
MOST = 12  # inputs that are drawn; the table has all
FACTORS = (1, 1.02, 1.05, 1.1, 1.2, 1.5, 2, 3, 5, 10)
Drawn = tuple[str, Writer, Firm]


def firmness_drawing(drawn: Sequence[Drawn], caption: str) -> Drawing | None:
    """Draw inputs with their names, the nearest to a change first; None where none changes anything."""
    kept = [one for one in drawn if isfinite(one[2].nearness)][:MOST]
    if not kept:
        return None
    left = max(LETTER * len(name) for name, _, _ in kept) + ROOM
    letters = int((WIDTH - left - LEAST_AXIS - ROOM) / LETTER)
    bars = tuple(Bar(name, 0.0, firm.nearness, shortened(nearest_change(writer, firm), letters)) for name, writer, firm in kept)
    right = WIDTH - max(LETTER * len(bar.value) for bar in bars) - ROOM
    told = "; ".join(f"{name} {nearest_change(writer, firm)}" for name, writer, firm in kept)
    chart = BarChart(
        anchor="firm",
        title=f"Nearest changes: {told}.",
        caption=caption,
        axis="factor",
        bars=bars,
        notes=(
            Note("Reading it", "the shorter the bar, the nearer the input is to changing mode, output or verdict: measure or challenge it "
                 "first. A temperature is moved instead of multiplied, by at most its distance from the setpoint."),
        ),
        ticks=tuple(_ticks(max(bar.end for bar in bars), right - left)),
        left=left,
        right=right,
    )  # fmt: skip
    return bar_drawing(chart)


def shortened(text: str, letters: int) -> str:
    """Return a text cut at a comma where it is longer than its place; the table beside has the whole.

    Examples
    --------
    >>> shortened("2 kW: analogue, power controller, held", 34), shortened("2 kW: held", 34)
    ('2 kW: analogue, power controller …', '2 kW: held')
    """
    while len(text.removesuffix(" …")) > letters and ", " in text:
        text = text.removesuffix(" …").rpartition(", ")[0] + " …"
    return text


def _ticks(longest: float, room: float) -> Iterator[tuple[float, str]]:
    """Yield factors up to the first beyond the longest bar, none nearer to another than their words allow."""
    high = next((log10(factor) for factor in FACTORS if log10(factor) >= longest), 1.0)
    reached = -high
    for factor in FACTORS:
        at = log10(factor)
        if at <= high and (at - reached) * room / high >= LEAST_APART:
            reached = at
            yield at, f"{factor:g}"


def declared(writer: Writer, firm: Firm) -> str:
    """Return an input as it was written, in the units of the pages."""
    degrees: Meaning = "temperature" if firm.dimension == "value" else "difference"
    return retold(firm.text, writer.phrasing.system, degrees)


def nearest_change(writer: Writer, firm: Firm) -> str:
    """Say at which value the decision changes first, and to what.

    Which side is nearer is known by its distance from what is declared, as a ratio where the input is multiplied.
    """
    sides = [(firm.below, firm.below_to), (firm.above, firm.above_to)]
    known = [(value, to) for value, to in sides if value is not None]
    value, to = min(known, key=lambda side: _way(firm, side[0]))
    return f"{writer.say(value, firm.dimension)}: {to}"


def _way(firm: Firm, value: float) -> float:
    if firm.dimension != "value" and firm.declared * value > 0:
        return abs(log10(value / firm.declared))
    return abs(value - firm.declared)

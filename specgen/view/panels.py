"""A drawing of one or more panels one above the other: axes with their units, curves, and labels that keep clear of each other."""

from collections.abc import Sequence
from dataclasses import dataclass, field
from itertools import pairwise
from math import floor, hypot, log10

from specgen.core.say import MINUS
from specgen.view.axes import Scale, place, ticks
from specgen.view.shapes import Box, Label, Path, Point

WIDTH = 640
LEFT, RIGHT = 52.0, 492.0
LETTER = 6.7  # a letter of the drawings' sans, on the wide side
RISE, FALL = 10.0, 3.0  # of a line of text, from its foot
LINE = 14.0  # between texts that stand one below the other
GAP = 7.0
NEAR = 0.15  # how far, in the drawing's unit, a thinned curve may leave the whole one
UNITS = ((172800.0, 86400.0, "days"), (10800.0, 3600.0, "h"), (1200.0, 60.0, "min"), (0.0, 1.0, "s"))
Spot = tuple[float, float]
Rectangle = tuple[float, float, float, float]


@dataclass(frozen=True, slots=True)
class TimeUnit:
    """The unit a time axis is written in: its size [s] and its word."""

    size: float
    word: str


def time_unit(end: float) -> TimeUnit:
    """Return the unit in which times up to ``end`` [s] are read with ease.

    Examples
    --------
    >>> time_unit(90).word, time_unit(3600).word, time_unit(40000).word
    ('s', 'min', 'h')
    """
    return next(TimeUnit(size, name) for least, size, name in UNITS if end >= least)


def rectangle(label: Label) -> Rectangle:
    """Return about where a label stands: left, top, right, bottom."""
    x, y, width = float(label.x), float(label.y), LETTER * len(label.text)
    if label.kind in ("end", "tick-end"):
        left = x - width
    elif label.kind in ("tick", "inside"):
        left = x - width / 2
    else:
        left = x
    return left, y - RISE, left + width, y + FALL


def overlap(a: Rectangle, b: Rectangle) -> bool:
    """Tell whether two rectangles have a part in common."""
    return a[0] < b[2] and b[0] < a[2] and a[1] < b[3] and b[1] < a[3]


def thinned(spots: Sequence[Spot], keep: Sequence[Spot] = ()) -> list[Spot]:
    """Leave out what cannot be seen: points that the line between their neighbours passes closely; those of ``keep`` stay.

    Examples
    --------
    >>> thinned([(0, 0), (1, 0.01), (2, 0), (3, 5)])
    [(0, 0), (2, 0), (3, 5)]
    """
    if len(spots) < 3:  # noqa: PLR2004  nothing lies between two
        return list(spots)
    kept, held = [spots[0]], set(keep)
    low, high = -1e300, 1e300
    for before, spot in pairwise(spots[1:]):
        start = kept[-1]
        wide = before[0] - start[0]
        if wide > 0:
            low = max(low, (before[1] - NEAR - start[1]) / wide)
            high = min(high, (before[1] + NEAR - start[1]) / wide)
        ahead = spot[0] - start[0]
        slope = (spot[1] - start[1]) / ahead if ahead > 0 else None
        if slope is None or wide <= 0 or not low <= slope <= high or before in held:
            kept.append(before)
            low, high = -1e300, 1e300
    return [*kept, spots[-1]]


def inside(spots: Sequence[Spot], low: Spot, high: Spot) -> list[list[Spot]]:
    """Cut a curve that runs to the right to a window between two corners; return its pieces."""
    pieces: list[list[Spot]] = []
    piece: list[Spot] = []
    for a, b in pairwise(spots):
        cut = (a, b) if _holds(a, low, high) and _holds(b, low, high) else _clipped(a, b, low, high)
        if cut is None:
            piece = []
            continue
        if not piece or hypot(piece[-1][0] - cut[0][0], piece[-1][1] - cut[0][1]) > 1e-9:  # noqa: PLR2004  a rounding apart
            piece = [cut[0]]
            pieces.append(piece)
        piece.append(cut[1])
    return pieces


def _holds(spot: Spot, low: Spot, high: Spot) -> bool:
    return low[0] <= spot[0] <= high[0] and low[1] <= spot[1] <= high[1]


def _clipped(a: Spot, b: Spot, low: Spot, high: Spot) -> tuple[Spot, Spot] | None:
    """Return the part of a line inside a window."""
    first, last = 0.0, 1.0
    for axis in (0, 1):
        step = b[axis] - a[axis]
        for edge, turn in ((low[axis], 1.0), (high[axis], -1.0)):
            room, moves = turn * (a[axis] - edge), turn * step
            if moves == 0:
                if room < 0:
                    return None
            elif moves > 0:
                first = max(first, -room / moves)
            else:
                last = min(last, -room / moves)
    if first >= last:
        return None
    made = [(a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])) for t in (first, last)]
    return made[0], made[1]


def _crosses(line: Sequence[Spot], low: Spot, high: Spot) -> bool:
    """Tell whether a curve that runs to the right enters a window."""
    for a, b in pairwise(line):
        if b[0] < low[0]:
            continue
        if a[0] > high[0]:
            return False
        if min(a[1], b[1]) <= high[1] and max(a[1], b[1]) >= low[1] and _clipped(a, b, low, high) is not None:
            return True
    return False


@dataclass(slots=True)
class Panels:
    """What is drawn so far; labels are placed last, when it is known what they must keep clear of."""

    boxes: list[Box] = field(default_factory=list)
    paths: list[Path] = field(default_factory=list)
    points: list[Point] = field(default_factory=list)
    labels: list[Label] = field(default_factory=list)
    curves: list[list[Spot]] = field(default_factory=list)
    levels: list[float] = field(default_factory=list)

    def value_axis(self, y: Scale, name: str, most: int = 5) -> None:
        """Draw a panel's upright axis with its numbers and, above it, its name."""
        at = ticks(y.low, y.high, most)
        top, bottom = y.at_high, y.at_low
        marks = "".join(f"M{place(LEFT - 4)} {place(y(value))}h4" for value in at)
        self.paths.append(Path("axis", f"M{place(LEFT)} {place(top)}V{place(bottom)}{marks}"))
        self.labels += [Label("tick-end", place(LEFT - 7), place(y(v) + 4), text) for v, text in zip(at, tick_texts(at), strict=True)]
        self.labels.append(Label("plain", place(LEFT - 44), place(top - 10), name))

    def across(self, kind: str, y: float, start: float = LEFT) -> None:
        """Draw a level line."""
        self.levels.append(y)
        self.paths.append(Path(kind, f"M{place(start)} {place(y)}H{place(RIGHT)}"))

    def time_axis(self, x: Scale, unit: TimeUnit, y: float) -> None:
        """Draw a level axis of times."""
        at = ticks(x.low / unit.size, x.high / unit.size)
        self.axis_below(x, [(value * unit.size, text) for value, text in zip(at, tick_texts(at), strict=True)], y, f"time, {unit.word}")

    def axis_below(self, x: Scale, at: Sequence[tuple[float, str]], y: float, name: str) -> None:
        """Draw a level axis with the numbers given; without a name, ticks alone."""
        marks = "".join(f"M{place(x(value))} {place(y)}v4" for value, _ in at)
        self.paths.append(Path("axis", f"M{place(LEFT)} {place(y)}H{place(RIGHT)}{marks}"))
        if name:
            self.labels += [Label("tick", place(x(v)), place(y + 17), text) for v, text in at]
            self.labels.append(Label("soft", place(RIGHT + 2 * GAP), place(y + 17), name))

    def curve(self, kind: str, spots: Sequence[Spot], keep: Sequence[Spot] = ()) -> None:
        """Draw a curve that runs to the right, thinned to what can be seen."""
        if len(spots) < 2:  # noqa: PLR2004  a single point is no line
            return
        line = thinned(spots, keep)
        self.curves.append(line)
        self.paths.append(Path(kind, "M" + "L".join(f"{place(a)} {place(b)}" for a, b in line)))

    def right(self, texts: Sequence[tuple[float, str, str]], low: float, high: float) -> None:
        """Write labels at the right, each beside its line as far as they keep apart: place, text, kind; between two places."""
        for at, text, kind in apart(texts, low, high):
            self.labels.append(Label(kind, place(RIGHT + GAP), place(at + 4), text))

    def mark(self, x: float, y: float, text: str, *, upwards: bool = True) -> None:
        """Mark a point, and write beside it where nothing else stands."""
        self.points.append(Point(place(x), place(y)))
        self.beside(x, y, text, upwards=upwards)

    def beside(self, x: float, y: float, text: str, *, upwards: bool = True) -> None:
        """Write a label near a point where nothing else stands."""
        above, below = y - 7.0, y + 16.0
        near = (above, below) if upwards else (below, above)
        feet = [(foot, 0.0) for foot in near]
        feet += [(y + 4, 5.0), (above - LINE, 6.0), (below + LINE, 6.0), (above - 2 * LINE, 9.0), (below + 2 * LINE, 9.0)]
        tries = [
            (Label(kind, place(x + step), place(foot), text), far) for foot, far in feet for kind, step in (("plain", GAP), ("end", -GAP))
        ]
        self.labels.append(min(tries, key=lambda each: self._crowding(each[0]) + each[1])[0])

    def _crowding(self, label: Label) -> float:
        """Return how badly a label would stand: over a label or off the drawing is worse than across a curve."""
        left, top, right, bottom = rectangle(label)
        bad = 100.0 * sum(overlap((left, top, right, bottom), rectangle(other)) for other in self.labels)
        bad += 100.0 * (left < LEFT + 2) + 50.0 * (right > RIGHT) + 100.0 * (right > WIDTH) + 100.0 * (top < 0)
        bad += 4.0 * sum(top < y < bottom for y in self.levels)
        return bad + 10.0 * sum(_crosses(line, (left - 1, top - 1), (right + 1, bottom + 1)) for line in self.curves)


def tick_texts(at: Sequence[float]) -> list[str]:
    """Write the numbers of an axis, all with as many decimals as its step needs.

    Examples
    --------
    >>> tick_texts((0.0, 0.5, 1.0)), tick_texts((-10.0, 0.0)), tick_texts((0.0, 2.5, 5.0))
    (['0.0', '0.5', '1.0'], ['\u221210', '0'], ['0.0', '2.5', '5.0'])
    """
    if len(at) < 2:  # noqa: PLR2004  a single number has no step
        return [f"{value:g}".replace("-", MINUS) for value in at]
    step = at[1] - at[0]
    places = max(0, -floor(log10(step) + 1e-9))
    if round(step * 10**places) != round(step * 10**places, 6):
        places += 1
    return [f"{value:.{places}f}".replace("-", MINUS) for value in at]


def apart(texts: Sequence[tuple[float, str, str]], low: float, high: float) -> list[tuple[float, str, str]]:
    """Move labels that would overlap apart, as little as needed, in the order they stand, between two places."""
    ordered = sorted(texts)
    places = [at for at, _, _ in ordered]
    for _ in range(60):
        moved = False
        for index in range(len(places) - 1):
            close = LINE - (places[index + 1] - places[index])
            if close > 1e-6:  # noqa: PLR2004  a rounding apart
                places[index] -= close / 2
                places[index + 1] += close / 2
                moved = True
        if places and places[0] < low:
            places[0] = low
        if places and places[-1] > high:
            places[-1] = high
        if not moved:
            break
    return [(at, text, kind) for at, (_, text, kind) in zip(places, ordered, strict=True)]

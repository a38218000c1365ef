"""Where everything of a circuit stands: columns from the widths of what is in them, rows from the heights."""

from collections.abc import Sequence
from dataclasses import dataclass, field
from math import ceil

from specgen.design.wiring.types import TERMINAL, Circuit, Joint, Path, Rail
from specgen.view.schematic.marks import NAME, PIN, SMALL, Line, Mark
from specgen.view.schematic.text_width import text_width

GAP = 5.0  # between columns
NEXT = 5.0  # between a symbol and the text beside it
ROW = 7.0  # between rows
BYPASS = 27.0  # of a suppressor beside its coil
TITLE = 34.0  # over the rows: title and numbers of the paths
RAIL = 30.0  # what a path that begins at a rail of its own takes for its words
BRIDGE = 24.0  # a suppressor between two paths


@dataclass(slots=True)
class Layout:
    """A circuit with the places of its columns and rows, its own upper left corner at the origin."""

    circuit: Circuit
    marks: list[Mark]
    feed: Mark | None
    xs: list[float] = field(default_factory=list)
    centres: dict[int, float] = field(default_factory=dict)
    tops: dict[int, float] = field(default_factory=dict)
    width: float = 0.0
    height: float = 0.0
    feed_x: float = 0.0
    bus: float = 0.0
    back: float = 0.0
    numbers: float = 0.0
    bridges: int = 0

    @property
    def bused(self) -> bool:
        """Tell whether the circuit has a bus of its own."""
        return self.feed is not None

    def foot_of(self, mark: Mark) -> float:
        """Return where a mark ends."""
        return self.centres[mark.row] + mark.half


def rail_words(rail: Rail) -> tuple[Line, ...]:
    """Return what stands at a rail: its potential, and below it what it lies behind.

    Examples
    --------
    >>> [line.text for line in rail_words(Rail("+24 V behind -F90", "=TIC101-F90:2"))]
    ['+24 V', '-F90']
    """
    name, _, after = rail.potential.partition(" behind ")
    return tuple(Line("rail", text) for text in (name, after) if text)


def lay_out(circuit: Circuit, marks: list[Mark], feed: Mark | None) -> Layout:
    """Place a circuit's columns and rows."""
    made = Layout(circuit, marks, feed)
    made.bridges = sum(1 for item in circuit.across if item.last is not None)
    left, right = _reaches(circuit, marks)
    start = 0.0
    if feed is not None:
        start = float(ceil(feed.beside + NEXT + feed.left))
        made.feed_x = start
        start += feed.right + NEXT + 16 + GAP
    at = start
    for index in range(len(circuit.paths)):
        at = float(ceil(at + left[index]))
        made.xs.append(at)
        at += right[index] + GAP
    made.width = ceil(max(at, text_width(circuit.title, NAME) + 12))
    _rows(made)
    return made


def _reaches(circuit: Circuit, marks: Sequence[Mark]) -> tuple[list[float], list[float]]:
    """Return how far each column reaches to its left and right."""
    left, right = [10.0] * len(circuit.paths), [10.0] * len(circuit.paths)
    for mark in marks:
        first, last = mark.steps[0][0], mark.steps[-1][0]
        left[first] = max(left[first], mark.left + (NEXT + mark.beside if mark.lines else 0))
        right[last] = max(right[last], mark.right)
        for index, step in mark.steps if mark.symbol != "shield" else ():
            pins = [step.enter] if step.symbol == TERMINAL else [step.enter, step.leave]
            beyond = mark.right + 4 if step.symbol == TERMINAL else 4.0 if mark.spans else mark.single.pin
            right[index] = max(right[index], beyond + max(text_width(pin, PIN) for pin in pins))
            if not mark.spans:
                left[index], right[index] = max(left[index], mark.left), max(right[index], mark.right)
        if mark.below:
            half = text_width(mark.below, SMALL) / 2
            left[first], right[first] = max(left[first], half), max(right[first], half)
    for path_at, path in enumerate(circuit.paths):
        rails = [rail for rail in (path.feed, path.back) if isinstance(rail, Rail) and not rail.bus]
        for half in (line.width / 2 for rail in rails for line in rail_words(rail)):
            left[path_at], right[path_at] = max(left[path_at], half), max(right[path_at], half)
    for item in circuit.across:
        if item.last is None:
            words = text_width(item.element[item.element.index("-") :], NAME) * 1.08
            right[item.first.path] = max(right[item.first.path], BYPASS + 8 + words)
        else:
            left[item.last.path] = max(left[item.last.path], 38.0)
    return left, right


def _rows(made: Layout) -> None:
    """Place the rows; a bus takes a row above and one below."""
    circuit = made.circuit
    y = TITLE
    made.numbers = y - 8
    rails = any(isinstance(path.feed, Rail) and not path.feed.bus for path in circuit.paths)
    if made.feed is not None:
        y += RAIL + ceil(max(2 * made.feed.half, made.feed.tall)) + 10
        made.bus = y
        made.numbers = y - 8
        y += 8
    elif rails:
        y += RAIL
    bridged = min((item.first.row for item in circuit.across if item.last is not None), default=-1)
    rows = sorted({mark.row for mark in made.marks})
    for row in rows:
        here = [mark for mark in made.marks if mark.row == row]
        half = float(ceil(max(size for mark in here for size in (mark.half, mark.tall / 2))))
        if row == bridged:
            y += BRIDGE * made.bridges
        made.tops[row] = y
        made.centres[row] = y + half
        y += 2 * half + ROW
    if made.feed is not None:
        made.back = y + 4
        y = made.back + (16 if any(mark.below for mark in made.marks) else 6)
    elif any(_own_end(path) for path in circuit.paths):
        y = max(y, *(made.foot_of(_last(made, at)) + 34 for at, path in enumerate(circuit.paths) if _own_end(path)))
    if made.feed is None and any(mark.below for mark in made.marks):
        y += 14
    made.height = float(ceil(y))


def _own_end(path: Path) -> bool:
    return path.back is not None and not path.back.bus


def _last(made: Layout, at: int) -> Mark:
    return max((mark for mark in made.marks if at in [index for index, _ in mark.steps]), key=lambda mark: mark.row)


def joint_height(made: Layout, joint: Joint) -> float:
    """Return the height of a joint: just above the row of the step it lies over."""
    return made.tops[joint.row] - 4

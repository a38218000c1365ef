"""The schematic of a loop as a drawing: circuits put side by side, every element a group with its designation."""

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from math import ceil

from specgen.design.wiring.types import TERMINAL, Across, Joint, Path, Rail, Step, Wiring
from specgen.view.schematic.layout import BRIDGE, BYPASS, NEXT, Layout, joint_height, lay_out, rail_words
from specgen.view.schematic.marks import SIZES, Mark, Marking
from specgen.view.schematic.packing import Placed, packed
from specgen.view.schematic.spans import SPANS, Pin, n, p
from specgen.view.schematic.symbols import ACROSS
from specgen.view.shapes import Drawing, Group, Label, Note
from specgen.view.shapes import Path as Stroke
from specgen.view.writer import Writer

WIDTH = 760.0
EDGE = 4.0


def identifier(designation: str) -> str:
    """Make a designation an identifier of a page.

    Examples
    --------
    >>> identifier("=TIC101-X1:5"), identifier("=TIC101-Q1")
    ('TIC101-X1.5', 'TIC101-Q1')
    """
    return designation.removeprefix("=").replace(":", ".")


def schematic(wiring: Wiring, writer: Writer, notes: tuple[Note, ...] = ()) -> Drawing:
    """Draw a loop's circuits.

    Parameters
    ----------
    wiring : Wiring
        The circuits.
    writer : Writer
        Writes the figures beside the symbols.
    notes : tuple of Note
        Side notes.
    """
    marking = Marking(wiring, writer)
    layouts = [
        lay_out(circuit, marking.marks(circuit), marking.supply(circuit.supply.steps[0]) if circuit.supply else None)
        for circuit in wiring.circuits
    ]
    placed, width, height = packed(layouts, WIDTH)
    pen = _Pen()
    for item in placed:
        _Circuit(pen, item).draw()
    shown = ", ".join(circuit.title.lower() for circuit in wiring.circuits)
    carries = {terminal.designation: terminal.potential for terminal in wiring.terminals}
    return Drawing(
        anchor=f"schematic-{wiring.tag}",
        title=f"Schematic of {wiring.tag}: {shown}. The terminal table below says the same.",
        caption="Current paths are numbered from left to right; the words under a coil say in which paths its contacts are.",
        width=n(width + 2 * EDGE),
        height=n(height + 2 * EDGE),
        paths=(Stroke("wire", "".join(pen.wires)), Stroke("dot", "".join(pen.dots)), Stroke("frame", "".join(pen.dashes))),
        labels=tuple(pen.labels),
        groups=tuple(pen.groups(carries)),
        notes=notes,
        kind="schematic",
    )


class _Pen:
    """Gathers strokes, words and what belongs to each element."""

    def __init__(self) -> None:
        self.wires: list[str] = []
        self.dots: list[str] = []
        self.dashes: list[str] = []
        self.labels: list[Label] = []
        self._strokes: dict[str, tuple[list[str], list[str], list[Label]]] = {}

    def add(self, designation: str, strokes: str, dashed: str, labels: Iterable[Label]) -> None:
        """Add symbols to an element's group."""
        symbols, links, words = self._strokes.setdefault(designation, ([], [], []))
        symbols.append(strokes)
        links.append(dashed)
        words += labels

    def groups(self, carries: Mapping[str, str]) -> Iterator[Group]:
        """Yield the group of every element; ``carries`` are the potentials of the terminals."""
        for designation, (symbols, links, words) in self._strokes.items():
            paths = tuple(Stroke(kind, d) for kind, parts in (("symbol", symbols), ("link", links)) if (d := "".join(parts)))
            yield Group(identifier(designation), designation, paths, tuple(words), carries.get(designation, ""))

    def dot(self, x: float, y: float) -> None:
        """Mark a joint."""
        self.dots.append(p(x - 2, y, "a2 2 0 1 0 4 0 2 2 0 1 0-4 0"))


@dataclass(slots=True)
class _Circuit:
    """Draws one circuit at its place."""

    pen: _Pen
    at: Placed
    _halves: dict[tuple[int, int], float] = field(init=False)

    def __post_init__(self) -> None:
        self._halves = {
            (index, mark.row): 0.0 if mark.symbol == "shield" else mark.half for mark in self.lay.marks for index, _ in mark.steps
        }

    @property
    def lay(self) -> Layout:
        return self.at.layout

    def x(self, index: int) -> float:
        return EDGE + self.at.x + self.lay.xs[index]

    def y(self, height: float) -> float:
        return EDGE + self.at.y + height

    def draw(self) -> None:
        self._say("head", EDGE + self.at.x, self.y(11), self.lay.circuit.title)
        self._bus()
        for index, path in enumerate(self.lay.circuit.paths):
            self._say("number", self.x(index), self.y(self.lay.numbers), str(path.number))
            self._path(index, path)
        for mark in self.lay.marks:
            self._mark(mark)
        bridges = 0
        for item in self.lay.circuit.across:
            self._across(item, bridges)
            bridges += item.last is not None

    def _say(self, kind: str, x: float, y: float, text: str) -> None:
        self.pen.labels.append(Label(kind, n(x), n(y), text))

    def _bus(self) -> None:
        lay, feed = self.lay, self.lay.feed
        supply = lay.circuit.supply
        if feed is None or supply is None:
            return
        x = EDGE + self.at.x + lay.feed_x
        top = self.y(34 + 30)
        self._rail(supply, x, top, up=True)
        centre = top + ceil(max(feed.half, feed.tall / 2))
        self._single(feed, supply.steps[0], x, centre)
        self._beside(feed, x, centre)
        bus = self.y(lay.bus)
        onto = [self.x(at) for at, path in enumerate(lay.circuit.paths) if isinstance(path.feed, Rail) and path.feed.bus]
        off = [self.x(at) for at, path in enumerate(lay.circuit.paths) if path.back is not None and path.back.bus]
        self.pen.wires.append(p(x, centre + feed.half, f"V{n(bus)}") + p(x, bus, f"H{n(max(onto, default=x))}"))
        self.pen.wires.append(p(x, self.y(lay.back), f"H{n(max(off, default=x))}"))
        back = next((path.back for path in lay.circuit.paths if path.back is not None and path.back.bus), None)
        if back is not None:
            self._say("rail-end", x - NEXT, self.y(lay.back) + 4, back.potential)
        for at, path in enumerate(lay.circuit.paths):
            if isinstance(path.feed, Rail) and path.feed.bus and self.x(at) < max(onto):
                self.pen.dot(self.x(at), bus)
            if path.back is not None and path.back.bus and self.x(at) < max(off):
                self.pen.dot(self.x(at), self.y(lay.back))

    def _rail(self, path: Path, x: float, y: float, *, up: bool) -> None:
        rail = path.feed if up else path.back
        assert isinstance(rail, Rail)  # noqa: S101  asked for rails alone
        words = rail_words(rail)
        size = SIZES["rail"] * 1.2
        first = y - 6 - size * (len(words) - 1) if up else y + 13
        for number, line in enumerate(words):
            self._say("rail", x, first + number * size, line.text)
        self.pen.wires.append(p(x - 3.5, y - 3.5 if up else y + 3.5, "h7"))
        if up:
            self.pen.wires.append(p(x, y - 3.5, "v3.5"))
        else:
            self.pen.wires.append(p(x, y, "v3.5"))

    def _path(self, index: int, path: Path) -> None:
        """Draw the wires between the steps."""
        lay, x = self.lay, self.x(index)
        spots = [(lay.centres[step.row], self._halves[index, step.row], step) for step in path.steps]
        if path.steps[-1].symbol == "shield":
            self._shield(index, spots)
        start: float | None = None
        if isinstance(path.feed, Joint):
            start = joint_height(lay, path.feed)
            from_x = self.x(path.feed.path)
            self.pen.wires.append(p(from_x, self.y(start), f"H{n(x)}"))
            self.pen.dot(from_x, self.y(start))
        elif path.feed is not None and path.feed.bus:
            start = lay.bus
        elif path.feed is not None:
            start = 34 + 30
            self._rail(path, x, self.y(start), up=True)
        for centre, half, step in spots:
            if start is not None:
                self.pen.wires.append(p(x, self.y(start), f"V{n(self.y(centre - half))}"))
            start = centre + half if step.leave else None
        if path.back is not None and start is not None:
            end = lay.back if path.back.bus else start + 12
            self.pen.wires.append(p(x, self.y(start), f"V{n(self.y(end))}"))
            if not path.back.bus:
                self._rail(path, x, self.y(end), up=False)

    def _shield(self, index: int, spots: list[tuple[float, float, Step]]) -> None:
        """Draw the shield around the wires that run beside its own path."""
        y = self.y(spots[-1][0])
        row = spots[-2][2].row
        inside = [
            at for at, path in enumerate(self.lay.circuit.paths)
            if at != index and any(step.symbol == TERMINAL and step.row == row for step in path.steps)
        ]  # fmt: skip
        left, right = self.x(inside[0]) - 9, self.x(inside[-1]) + 9
        self.pen.dashes.append(p(left, y, f"a9 6 0 0 1 9 -6H{n(right - 9)}a9 6 0 0 1 0 12H{n(left + 9)}a9 6 0 0 1 -9 -6"))
        self.pen.wires.append(p(right, y, f"H{n(self.x(index))}"))

    def _mark(self, mark: Mark) -> None:
        if mark.symbol == "shield":
            return
        first = self.x(mark.steps[0][0])
        centre = self.y(self.lay.centres[mark.row])
        if mark.spans:
            self._span(mark, centre)
        else:
            for at, step in mark.steps:
                self._single(mark, step, self.x(at), centre)
            if len(mark.steps) > 1 and mark.symbol != TERMINAL:
                last = self.x(mark.steps[-1][0])
                self.pen.add(mark.element.designation, "", p(first - 4, centre, f"H{n(last - 4)}"), [])
        self._beside(mark, first, centre)
        if mark.below:
            under = self.lay.back + 12 if self.lay.bused else self.lay.foot_of(mark) + 12
            self._say("below", first, self.y(under), mark.below)

    def _beside(self, mark: Mark, x: float, centre: float) -> None:
        y = centre - mark.tall / 2
        labels = []
        for line in mark.lines:
            y += line.height
            labels.append(Label(line.kind, n(x - mark.left - NEXT), n(y - 0.22 * line.height), line.text))
        self.pen.add(mark.element.designation, "", "", labels)

    def _single(self, mark: Mark, step: Step, x: float, centre: float) -> None:
        symbol = mark.single
        strokes = "".join(p(x + dx, centre + dy, rest) for dx, dy, rest in symbol.strokes)
        dashed = "".join(p(x + dx, centre + dy, rest) for dx, dy, rest in symbol.dashed)
        if step.symbol == TERMINAL:
            label = Label("", n(x + symbol.right + 4), n(centre + 3.6), step.enter)
            self.pen.add(step.top, strokes, dashed, [label])
            return
        labels = [Label("letter", n(x + dx), n(centre + dy), text) for dx, dy, text in ([symbol.letter] if symbol.letter else [])]
        labels += list(_pins(step, x if step.symbol == "box" else x + symbol.pin, centre, symbol.half, boxed=step.symbol == "box"))
        self.pen.add(step.element, strokes, dashed, labels)

    def _span(self, mark: Mark, centre: float) -> None:
        pins = [Pin(self.x(at), step.enter or step.leave) for at, step in mark.steps]
        drawn = SPANS[mark.symbol][0](pins, centre)
        labels = [Label("letter", n(x), n(y), text) for x, y, text in drawn.letters]
        boxed = mark.symbol in ("box", "input", "transmitter")
        for at, step in mark.steps:
            if boxed:
                labels += _pins(step, self.x(at), centre, mark.half, boxed=True)
            else:
                labels.append(Label("", n(self.x(at) + 4), n(centre - mark.half + 3), step.enter))
        self.pen.add(mark.element.designation, "".join(drawn.strokes), "".join(drawn.dashed), labels)

    def _across(self, item: Across, number: int) -> None:
        name = item.element[item.element.index("-") :]
        if item.last is None:
            x = self.x(item.first.path) + BYPASS
            centre, half = self.y(self.lay.centres[item.first.row]), self._halves[item.first.path, item.first.row]
            top, foot = centre - half, centre + half
            self.pen.wires.append(p(x - BYPASS, top, f"H{n(x)}v8") + p(x - BYPASS, foot, f"H{n(x)}v-6"))
            self.pen.dot(x - BYPASS, top)
            self.pen.dot(x - BYPASS, foot)
            rest = {"diode": 9, "rc": 3, "varistor": 6}[item.symbol]
            strokes = p(x, top + 8, ACROSS[item.symbol].format(rest=rest))
            self.pen.add(item.element, strokes, "", [Label("name-start", n(x + 8), n((top + foot) / 2 + 4), name)])
            return
        left, right = self.x(item.first.path), self.x(item.last.path)
        y = self.y(self.lay.tops[item.first.row]) - BRIDGE * (number + 0.5)
        middle = right - 19
        self.pen.wires.append(p(left, y, f"H{n(middle - 11)}") + p(middle + 11, y, f"H{n(right)}"))
        self.pen.dot(left, y)
        self.pen.dot(right, y)
        strokes = p(middle - 11, y, _LYING[item.symbol])
        self.pen.add(item.element, strokes, "", [Label("name-middle", n(middle), n(y - 7), name)])


_LYING = {
    "diode": "h7m8 -4.5v9l-8 -4.5zm-8 -4.5v9m8 -4.5h7", "rc": "h4v-3.5h8v7h-8v-3.5m8 0h3m0 -4.5v9m3 -9v9m0 -4.5h4",
    "varistor": "h5v-3.5h12v7h-12v-3.5m12 0h5",
}  # fmt: skip


def _pins(step: Step, x: float, centre: float, half: float, *, boxed: bool) -> Iterator[Label]:
    """Say the connection points from ``x`` on; those of a box in its middle."""
    enter, leave = (centre - half + 11, centre + half - 4) if boxed else (centre - half + 8, centre + half - 1)
    place, kind = x, "pin-middle" if boxed else ""
    if step.enter:
        yield Label(kind, n(place), n(enter), step.enter)
    if step.leave:
        yield Label(kind, n(place), n(leave), step.leave)

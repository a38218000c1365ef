"""What of a circuit is drawn as one: the poles of a switch in one row, a device over its paths, and what stands beside them."""

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

from specgen.design.designation import designation
from specgen.design.wiring.types import TERMINAL, Circuit, Element, Step, Wiring
from specgen.view.schematic.spans import SPANS
from specgen.view.schematic.symbols import SYMBOLS, Symbol
from specgen.view.schematic.text_width import HEIGHT, text_width, wrapped
from specgen.view.writer import Writer

_UNIT = re.compile(r"(?<=\d) (?=(?:A|V|kV|W|kW|mA|bar|percent)\b)")
NAME, SMALL, PIN = 12.0, 10.5, 10.0
SIZES = {"name": NAME, "small": SMALL, "open": SMALL, "pin": PIN, "number": PIN, "head": SMALL, "rail": SMALL}
_WIDE = 92.0
_MOST = 4
DRIVERS = ("coil", "input", "box")
CONTACTS = ("pole", "make_contact", "break_contact", "semiconductor", "power_controller", "limiter_contact")


@dataclass(frozen=True, slots=True)
class Line:
    """A line of text beside a symbol."""

    kind: str
    text: str

    @property
    def width(self) -> float:
        """Return how wide it is."""
        return text_width(self.text, SIZES[self.kind]) * (1.08 if self.kind in ("name", "head") else 1.0)

    @property
    def height(self) -> float:
        """Return how high it is."""
        return SIZES[self.kind] * HEIGHT


@dataclass(slots=True)
class Mark:
    """Symbols of one element in one row: the paths they stand in, and the lines to the left of the first.

    ``spans`` tells that it is drawn over its paths as one; ``half`` is half its height, ``left`` and ``right`` how far it reaches beyond
    its first and last path.
    """

    element: Element
    symbol: str
    row: int
    steps: list[tuple[int, Step]] = field(default_factory=list)
    lines: tuple[Line, ...] = ()
    below: str = ""
    numbers: list[int] = field(default_factory=list)
    spans: bool = False
    half: float = 0.0
    left: float = 0.0
    right: float = 0.0

    def measure(self) -> None:
        """Take the symbol's size, once every path it stands in is known."""
        self.spans = self.symbol in SPANS and (len(self.steps) > 1 or self.symbol not in SYMBOLS)
        if self.spans:
            _, self.half, self.left = SPANS[self.symbol]
            self.right = self.left
        else:
            self.half, self.left, self.right = self.single.half, self.single.left, self.single.right

    @property
    def single(self) -> Symbol:
        """Return the symbol of one path."""
        return SYMBOLS[self.symbol]

    @property
    def beside(self) -> float:
        """Return the width of the lines beside it."""
        return max((line.width for line in self.lines), default=0.0)

    @property
    def tall(self) -> float:
        """Return the height of the lines beside it."""
        return sum(line.height for line in self.lines)


class Marking:
    """Makes the marks of a loop's circuits; an element says what it is where it is first drawn, and where its other symbols stand."""

    def __init__(self, wiring: Wiring, writer: Writer) -> None:
        self._elements: Mapping[str, Element] = {element.designation: element for element in wiring.elements}
        self._writer = writer
        self._own = designation(wiring.tag, "")
        self._said: set[str] = set()
        self._drivers: dict[str, list[int]] = {}
        self._contacts: dict[str, list[int]] = {}
        self._words: dict[str, str] = {}
        for path in (path for circuit in wiring.circuits for path in circuit.paths):
            for step in path.steps:
                place = self._contacts if step.symbol in CONTACTS else self._drivers if step.symbol in DRIVERS else None
                if place is not None and path.number not in place.setdefault(step.element, []):
                    place[step.element].append(path.number)
                if place is self._drivers:
                    self._words.setdefault(step.element, "coil" if step.symbol == "coil" else "input")

    def marks(self, circuit: Circuit) -> list[Mark]:
        """Return the marks of a circuit, row by row."""
        found: dict[tuple[str, int, str], Mark] = {}
        order: list[Mark] = []
        last: dict[tuple[str, int, str], int] = {}
        for at, path in enumerate(circuit.paths):
            for step in path.steps:
                key = (step.element, step.row, step.symbol)
                mark = found.get(key)
                # a device is drawn over neighbouring paths alone
                if mark is None or (last[key] != at - 1 and step.symbol in ("box", "input", TERMINAL)):
                    mark = found[key] = Mark(self._elements[step.element], step.symbol, step.row)
                    order.append(mark)
                mark.steps.append((at, step))
                mark.numbers.append(path.number)
                last[key] = at
        for mark in order:
            self._write(mark)
        return order

    def supply(self, step: Step) -> Mark:
        """Return the mark of what feeds a circuit's bus."""
        mark = Mark(self._elements[step.element], step.symbol, step.row, [(0, step)])
        self._write(mark)
        return mark

    def _write(self, mark: Mark) -> None:
        mark.measure()
        element = mark.element
        shared = "" if element.designation.startswith(self._own) else element.designation
        lines = [Line("name", shared or element.product)]
        if mark.symbol == "shield":
            mark.lines = ()
            return
        if mark.symbol != TERMINAL and element.designation not in self._said:
            self._said.add(element.designation)
            lines += self._what(element)
        words = dict.fromkeys(step.text for _, step in mark.steps if step.text)
        lines += [Line("small", line) for text in words for line in wrapped(text, SMALL, _WIDE, _MOST)]
        drivers, contacts = self._drivers.get(element.designation, []), self._contacts.get(element.designation, [])
        if mark.symbol in CONTACTS and drivers:
            word = "unit" if mark.symbol == "limiter_contact" else self._words[element.designation]
            lines.append(Line("small", f"{word} in {drivers[0]}"))
        if mark.symbol in DRIVERS and contacts and drivers and drivers[0] in mark.numbers:
            listed = ", ".join(str(number) for number in contacts)
            if mark.symbol == "box":
                lines.append(Line("small", f"contact in {listed}"))
            else:
                mark.below = f"in {listed}"
        mark.lines = tuple(lines)

    def _what(self, element: Element) -> list[Line]:
        figures = (f"{word} {self._writer.say(value, dimension)}".strip() for word, value, dimension in element.figures)
        said = _UNIT.sub("\u202f", ", ".join((element.what, *figures)))
        lines = [Line("small", line) for line in wrapped(said, SMALL, _WIDE, _MOST)]
        return lines + [Line("open", line) for line in wrapped(element.open, SMALL, _WIDE, _MOST) if element.open]


def widest(lines: Sequence[Line]) -> float:
    """Return the width of the widest line."""
    return max((line.width for line in lines), default=0.0)

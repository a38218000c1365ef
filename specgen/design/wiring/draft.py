"""Drawing up the circuits of a loop step by step: terminals are numbered as they come, wires follow from the paths."""

from collections.abc import Sequence
from dataclasses import replace

from specgen.design.designation import designation
from specgen.design.wiring.types import (
    TERMINAL,
    Across,
    Circuit,
    Element,
    Joint,
    Path,
    Rail,
    Side,
    Step,
    Terminal,
    Wire,
    Wiring,
)

_DRAWN = ("switching", "power", "demand", "output", "sensor", "limiter", "alarm", "control", "chain", "valves")


class Draft:
    """What is drawn so far; terminals count on from circuit to circuit, so that only the loop's own wiring numbers them."""

    def __init__(self, tag: str) -> None:
        self.tag = tag
        self._terminals = 0
        self._circuits: list[Circuit] = []
        self._elements: dict[str, Element] = {}
        self._open: list[str] = []

    def name(self, product: str) -> str:
        """Return the designation of one of the loop's own elements."""
        return designation(self.tag, product)

    def element(self, name: str, what: str, *figures: tuple[str, float, str], unknown: str = "") -> str:
        """Enter an element by its complete designation and return that; what is known of it first stays."""
        self._elements.setdefault(name, Element(name, what, figures, unknown))
        return name

    def leave_open(self, sentence: str) -> None:
        """Note something that the wiring leaves open, once."""
        if sentence not in self._open:
            self._open.append(sentence)

    def terminal(self, row: int, field: Side) -> Step:
        """Take the next terminal; ``field`` is the side on which the field lies."""
        self._terminals += 1
        strip = self.element(self.name("X1"), "terminals")
        return Step(strip, TERMINAL, str(self._terminals), str(self._terminals), row, field)

    def path(self, steps: Sequence[Step], feed: Rail | Joint | None = None, back: Rail | None = None, base: str = "") -> Path:
        """Make a path; it is numbered when all are there."""
        return Path(0, tuple(steps), feed, back, base)

    def circuit(
        self, name: str, title: str, paths: Sequence[Path], across: Sequence[Across] = (), supply: Path | None = None,
        shielded: int | None = None,
    ) -> None:  # fmt: skip
        """Add a circuit, rows closed up; one without paths is left away."""
        if paths:
            self._circuits.append(_closed_up(Circuit(name, title, tuple(paths), tuple(across), supply, shielded)))

    def finish(self) -> Wiring:
        """Return the wiring with its wires and terminals."""
        wires: list[Wire] = []
        terminals: list[Terminal] = []
        taken: dict[str, str] = {}
        for circuit in self._circuits:
            along, across = _wires(circuit, taken)
            wires += (*along, *across)
            terminals += _terminals(circuit, along, across)
        circuits, elements = _in_order(self._circuits), tuple(self._elements.values())
        return Wiring(self.tag, circuits, elements, tuple(terminals), tuple(wires), tuple(self._open))


def _in_order(circuits: Sequence[Circuit]) -> tuple[Circuit, ...]:
    """Put circuits in the order in which they are drawn, signals beside the power they act on, and number their paths through."""
    number = 0

    def next_number(path: Path) -> Path:
        nonlocal number
        number += 1
        return replace(path, number=number)

    made = []
    for circuit in sorted(circuits, key=lambda one: _DRAWN.index(one.name)):
        supply = next_number(circuit.supply) if circuit.supply else None
        made.append(replace(circuit, supply=supply, paths=tuple(next_number(path) for path in circuit.paths)))
    return tuple(made)


def behind(potential: str, element: str) -> str:
    """Name the potential after an element.

    Examples
    --------
    >>> behind("L1", "=TIC101-F1"), behind("L1 behind -F1", "=TIC101-Q1")
    ('L1 behind -F1', 'L1 behind -Q1')
    """
    return f"{potential.partition(' behind ')[0]} behind {element[element.index('-') :]}"


def _closed_up(circuit: Circuit) -> Circuit:
    paths = circuit.paths
    rows = {row: at for at, row in enumerate(sorted({step.row for path in paths for step in path.steps}))}

    def joint(place: Joint) -> Joint:
        return Joint(place.path, rows[place.row])

    return replace(
        circuit,
        paths=tuple(
            replace(
                path,
                steps=tuple(replace(step, row=rows[step.row]) for step in path.steps),
                feed=joint(path.feed) if isinstance(path.feed, Joint) else path.feed,
            )
            for path in paths
        ),
        across=tuple(
            replace(item, first=joint(item.first), last=None if item.last is None else joint(item.last)) for item in circuit.across
        ),
        shielded=None if circuit.shielded is None else rows[circuit.shielded],
    )


def step_at(paths: Sequence[Path], place: Joint) -> Step:
    """Return the step at a place."""
    return next(step for step in paths[place.path].steps if step.row == place.row)


def _wires(circuit: Circuit, taken: dict[str, str]) -> tuple[list[Wire], list[Wire]]:
    """Return the wires of a circuit path by path, downwards, and those of its suppressors apart.

    ``taken`` holds the names given to potentials by where they begin: a second of the same name is told by its connection point.
    """
    found: list[Wire] = []
    named: dict[str, str] = {}
    for path in ((circuit.supply, *circuit.paths) if circuit.supply else circuit.paths):
        potential, last = path.base, ""
        if isinstance(path.feed, Rail):
            potential, last = path.feed.potential, path.feed.source
        elif isinstance(path.feed, Joint):
            last = step_at(circuit.paths, path.feed).top
            potential = named[last]
        through = [step for step in path.steps if step.symbol != TERMINAL]
        outside = False
        for step in path.steps:
            outside = outside or (step.symbol == TERMINAL and step.field == "above")
            if last and last != step.top:
                found.append(Wire(potential, last, step.top, outside))
            named[step.top] = potential
            last = step.foot if step.leave else ""
            if step.symbol == TERMINAL:
                outside = step.field == "below"
                continue
            if step.enter:
                ends = path.back if step is through[-1] else None
                potential = ends.potential if ends else behind(potential, step.element)
                if not ends and taken.setdefault(potential, step.foot) != step.foot:
                    potential = f"{potential}:{step.leave}"
            named[step.foot] = potential
        if path.back is not None and last and last != path.back.source:
            found.append(Wire(path.back.potential, last, path.back.source, outside))
    return found, [wire for item in circuit.across for wire in _across(circuit, item, named)]


def _across(circuit: Circuit, item: Across, named: dict[str, str]) -> tuple[Wire, Wire]:
    first = step_at(circuit.paths, item.first)
    last = first.foot if item.last is None else step_at(circuit.paths, item.last).top
    return Wire(named[first.top], first.top, f"{item.element}:1", field=False), Wire(named[last], f"{item.element}:2", last, field=False)


def _terminals(circuit: Circuit, wires: Sequence[Wire], across: Sequence[Wire]) -> list[Terminal]:
    found: list[Terminal] = []
    starts = {wire.start: wire for wire in wires}
    ends = {wire.end: wire for wire in wires}
    for step in (step for path in circuit.paths for step in path.steps if step.symbol == TERMINAL):
        above = [ends[step.top].start] if step.top in ends else []
        below = [starts[step.top].end] if step.top in starts else []
        potential = (ends.get(step.top) or starts[step.top]).potential
        inside, outside = (above, below) if step.field == "below" else (below, above)
        inside += [wire.end for wire in across if wire.start == step.top] + [wire.start for wire in across if wire.end == step.top]
        found.append(Terminal(step.top, potential, ", ".join(inside), ", ".join(outside), circuit.name))
    return found

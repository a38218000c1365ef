"""The circuits of one loop as data: schematic, terminal table and lists of conductors are all read from here.

A circuit is a row of current paths, a path a column of steps from what feeds it to where it ends. A step is one symbol of one element;
an element may have several (a coil here, its contacts there). Wires, potentials and terminals follow from the steps alone, so that no
drawing and no table can disagree.
"""

from dataclasses import dataclass
from typing import Literal

Side = Literal["", "above", "below"]
TERMINAL = "terminal"


@dataclass(frozen=True, slots=True)
class Element:
    """An element by its complete designation: what it is, and the figures that stand beside it: a word before it, number, dimension.

    ``open`` says what is not known of it; empty where nothing is.
    """

    designation: str
    what: str
    figures: tuple[tuple[str, float, str], ...] = ()
    open: str = ""

    @property
    def product(self) -> str:
        """Return the product aspect with its sign.

        Examples
        --------
        >>> Element("=TIC101-Q1", "contactor").product
        '-Q1'
        """
        return self.designation[self.designation.index("-") :]


@dataclass(frozen=True, slots=True)
class Step:
    """One symbol in a path: its element, its connection points above and below, and its row.

    A step without ``enter`` begins its path, one without ``leave`` ends it. Steps of one element in one row of a circuit are drawn
    together: poles of a switch, or a device that several paths enter. Of a terminal ``field`` says on which side the field lies.
    ``text`` is what the symbol says (the function of an input).
    """

    element: str
    symbol: str
    enter: str
    leave: str
    row: int
    field: Side = ""
    text: str = ""

    @property
    def top(self) -> str:
        """Return the upper connection point with its element."""
        return f"{self.element}:{self.enter}"

    @property
    def foot(self) -> str:
        """Return the lower connection point with its element."""
        return f"{self.element}:{self.leave}"


@dataclass(frozen=True, slots=True)
class Rail:
    """What feeds a path or takes it back: a potential and the connection point it comes from. ``bus``: drawn along the circuit."""

    potential: str
    source: str
    bus: bool = False


@dataclass(frozen=True, slots=True)
class Joint:
    """A place on another path of the circuit: above the step that stands there."""

    path: int
    row: int


@dataclass(frozen=True, slots=True)
class Path:
    """A current path from what feeds it to where it ends; ``base`` names its potential where a device begins it."""

    number: int
    steps: tuple[Step, ...]
    feed: Rail | Joint | None = None
    back: Rail | None = None
    base: str = ""


@dataclass(frozen=True, slots=True)
class Across:
    """A suppressor: from above the step at ``first`` to below it, or to above the step at ``last`` where another is given."""

    element: str
    symbol: str
    first: Joint
    last: Joint | None = None


@dataclass(frozen=True, slots=True)
class Circuit:
    """Paths that belong together; ``supply`` is the path that feeds their bus, ``shielded`` the row behind which a shield lies."""

    name: str
    title: str
    paths: tuple[Path, ...]
    across: tuple[Across, ...] = ()
    supply: Path | None = None
    shielded: int | None = None


@dataclass(frozen=True, slots=True)
class Wire:
    """A conductor with both its ends; ``field`` where it lies outside the panel."""

    potential: str
    start: str
    end: str
    field: bool


@dataclass(frozen=True, slots=True)
class Terminal:
    """A terminal with the connection points on its two sides, and the circuit it belongs to."""

    designation: str
    potential: str
    inside: str
    outside: str
    circuit: str


@dataclass(frozen=True, slots=True)
class Wiring:
    """Every circuit of a loop with what follows from it.

    ``elements`` by designation, in the order of their first symbols; ``open_points`` say what the wiring leaves open.
    """

    tag: str
    circuits: tuple[Circuit, ...]
    elements: tuple[Element, ...]
    terminals: tuple[Terminal, ...]
    wires: tuple[Wire, ...]
    open_points: tuple[str, ...] = ()

    @property
    def potentials(self) -> tuple[str, ...]:
        """Return every potential once, in the order of the wires."""
        return tuple(dict.fromkeys(wire.potential for wire in self.wires))

"""What the panel comes to: demand, incomer, findings, and the rows of its schedules."""

from collections.abc import Mapping
from dataclasses import dataclass

from specgen.catalogue.table import Row
from specgen.core.figure import Figure
from specgen.core.quantity import Unit
from specgen.core.say import Phrasing, Said
from specgen.design.panel.lines import Place
from specgen.design.types import Missing, Verdict
from specgen.rules.base import Finding
from specgen.rules.panel_case import OutputCount
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.control_supply import ControlLoad
from specgen.sizing.enclosure import Interior


@dataclass(frozen=True, slots=True)
class Placed:
    """Where a loop's load stands; ``written`` where the loop file says so. ``resistive``: its current is in phase with its voltage.

    ``current`` [A] in each of its line conductors at the supply's worse end; ``distorted`` where it is far from a sine.
    """

    tag: str
    place: Place
    current: float
    written: bool
    resistive: bool
    distorted: bool

    @property
    def phases(self) -> str:
        """Return the conductors as they are written in a loop file.

        Examples
        --------
        >>> Placed("A", ("L1", "N"), 4.0, written=True, resistive=True, distorted=False).phases
        'L1-N'
        """
        return "-".join(self.place)


@dataclass(frozen=True, slots=True)
class Moved:
    """A loop that balancing put elsewhere than its turn: where it is, where it would be, and what moved it."""

    tag: str
    phases: str
    in_turn: str
    text: str
    words: Mapping[str, Said | str]


@dataclass(frozen=True, slots=True)
class Remark:
    """A sentence about the panel with its numbers."""

    text: str
    words: Mapping[str, Said | str]


@dataclass(frozen=True, slots=True)
class Demand:
    """Currents of the conductors with the declared coincidence [A], the neutral among them where there is one.

    ``upper`` [A] are the lines' with every current that is not a resistance's added as if in phase; ``neutral`` [A] is the largest
    that the neutral can carry while only some of the loops are on.
    """

    currents: Mapping[str, float]
    imbalance: float | None
    upper: Mapping[str, float]
    neutral: float
    figures: tuple[Figure, ...]


@dataclass(frozen=True, slots=True)
class Incoming:
    """The incoming protection: its rating [A], what it has to carry [A], and whether panel.yml declares it."""

    rating: float | Unsized
    carries: float
    figures: tuple[Figure, ...]
    rows: tuple[Row, ...] = ()
    declared: bool = False


@dataclass(frozen=True, slots=True)
class ProtectionRow:
    """One protective device [A]; ``setting`` of a motor's overload release."""

    designation: str
    loop: str
    kind: str
    rating: float
    design_current: float
    curve: str | None
    setting: float | None
    setting_range: tuple[float, float] | None
    phases: str


@dataclass(frozen=True, slots=True)
class ConductorRow:
    """One run of conductors: sizes [m2], currents [A], drop as a share; ``designation`` and ``drop`` of a cable only."""

    loop: str
    designation: str | None
    start: str
    end: str
    size: float
    earth: float
    gauge: str | None
    method: str
    length: float | None
    current: float
    capacity: float
    protection: float
    drop: float | None
    phases: str


@dataclass(frozen=True, slots=True)
class PartRow:
    """One part by its designation; ``rating`` [A] where it has one; ``loops`` more than one only where it is shared."""

    designation: str
    what: str
    rating: float | None
    quantity: int
    loops: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class PanelDesign:
    """Everything about the panel that follows from its decided loops."""

    demand: Demand
    incoming: Incoming
    findings: tuple[Finding, ...]
    verdict: Verdict
    placed: tuple[Placed, ...]
    moved: tuple[Moved, ...]
    outputs: tuple[OutputCount, ...]
    protection: tuple[ProtectionRow, ...]
    conductors: tuple[ConductorRow, ...]
    parts: tuple[PartRow, ...]
    open_points: tuple[Missing, ...]
    assumptions: tuple[Assumption, ...]
    remarks: tuple[Remark, ...]
    basis: tuple[Figure, ...]
    interior: Interior | None = None
    control: ControlLoad | None = None

    @property
    def phrasing(self) -> Phrasing:
        """Return what writes the panel's numbers."""
        return Phrasing(Unit("degC"), Unit("K"))

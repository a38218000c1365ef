"""What a decided loop and a whole design are."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING, Literal

from specgen.core.diagnostic import Diagnostic
from specgen.core.figure import Figure
from specgen.core.say import Phrasing
from specgen.design.safety import SafetyDesign
from specgen.model.loop import Loop
from specgen.model.loops import ReadLoop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.process.box import Box, Unmodelled
from specgen.rules.base import Case, Finding
from specgen.sizing.candidate import Assumption
from specgen.sizing.limiter import LimiterDesign

if TYPE_CHECKING:
    from specgen.design.panel.types import PanelDesign
    from specgen.design.wiring.types import Wiring

Verdict = Literal["meets", "deviates", "open", "held"]
VERDICTS: tuple[Verdict, ...] = ("held", "open", "deviates", "meets")


@dataclass(frozen=True, slots=True)
class Examined:
    """A candidate with everything computed for it and every rule's finding."""

    case: Case
    findings: tuple[Finding, ...]


@dataclass(frozen=True, slots=True)
class Rejected:
    """A candidate that was not taken, with the rules that ended it (never empty) and the sentence that says so."""

    examined: Examined
    ruled_out_by: tuple[str, ...]
    text: str


@dataclass(frozen=True, slots=True)
class Decision:
    """The candidate taken, why it is the one, and every other that was considered."""

    chosen: Examined
    because: str
    rejected: tuple[Rejected, ...]
    by_designer: bool


@dataclass(frozen=True, slots=True)
class Missing:
    """An input that is not there: its path, the rules it would settle, and how to get it."""

    field: str
    settles: tuple[str, ...]
    how: str


@dataclass(frozen=True, slots=True)
class Firm:
    """How far one uncertain input may be off before the decision changes.

    Attributes
    ----------
    input : str
        The input's path, of the plant without the form's name: ``plant.dead_time``, ``need.tolerance``, ``house.contact_life``.
    words : str
        What a sentence calls it: ``dead time``.
    dimension : str
        What the figures are, a dimension of ``specgen.core.say`` (``value`` and ``change`` in the loop's quantity).
    declared : float
        The figure as declared [base units]: of a range the end of larger size, of a temperature the end farthest from the setpoint.
        A range is moved as a whole, so that ``declared``, ``below`` and ``above`` are the same end of it.
    text : str
        As it was written.
    below, above : float or None
        Nearest smaller and larger figure at which mode, output or verdict is another [base units]; None where none is within a factor
        of ten (of a temperature: within its distance from the setpoint).
    below_to, above_to : str
        What it changes to: ``time-proportioned, contactor`` or ``held``; empty where nothing changes.
    nearness : float
        Way to the nearer change as a share of the span that was looked at, 0 to 1 (0.3 is a factor of 2); infinite where there is none.
    """

    input: str
    words: str
    dimension: str
    declared: float
    text: str
    below: float | None
    below_to: str
    above: float | None
    above_to: str
    nearness: float


@dataclass(frozen=True, slots=True)
class DecidedLoop:
    """One loop, decided.

    ``findings`` are the chosen candidate's, overrides marked; ``assumptions`` everything taken for granted;
    ``basis`` every number shown anywhere, in the order of the calculation; ``firmness`` how far each uncertain input may be off,
    empty where that was not asked for; ``safety`` what stops a stuck output, ``inject`` what stands for the sensor at site.
    """

    read: ReadLoop
    traits: Traits
    box: Box | Unmodelled
    decision: Decision
    findings: tuple[Finding, ...]
    verdict: Verdict
    assumptions: tuple[Assumption, ...]
    missing: tuple[Missing, ...]
    basis: tuple[Figure, ...]
    firmness: tuple[Firm, ...] = ()
    inject: tuple[Figure, ...] = ()
    safety: SafetyDesign | None = None

    @property
    def loop(self) -> Loop:
        """Return the loop as declared."""
        return self.read.loop

    @property
    def tag(self) -> str:
        """Return the loop's tag."""
        return self.read.loop.tag

    @property
    def limiter(self) -> LimiterDesign | None:
        """Return the independent limiter, None where there is none."""
        return self.safety.limiter if self.safety is not None else None

    @property
    def phrasing(self) -> Phrasing:
        """Return what writes numbers in this loop's units."""
        return Phrasing(self.read.loop.unit, self.read.loop.difference_unit)


@dataclass(frozen=True, slots=True)
class SourceFile:
    """A file the dossier was made from."""

    name: str
    content: bytes


@dataclass(frozen=True, slots=True)
class Design:
    """The whole panel: every loop that could be read, decided, and every problem of the rest.

    ``panel`` is None where panel.yml itself could not be read: then there are problems and no loops.
    ``rules_digest`` and ``catalogue_digest`` change when a rule or a table changes. ``verdict`` is the worst of the loops' and
    of the panel's own; ``panel_design`` is what the loops come to together, ``wirings`` the circuits of each by its tag.
    """

    panel: Panel | None
    loops: tuple[DecidedLoop, ...]
    problems: tuple[Diagnostic, ...]
    sources: tuple[SourceFile, ...]
    rules_digest: str
    catalogue_digest: str
    verdict: Verdict
    panel_design: "PanelDesign | None" = None
    wirings: "Mapping[str, Wiring]" = field(default_factory=dict)

"""What a rule is: its declaration, the case it examines, and the finding it makes."""

from dataclasses import dataclass, field
from typing import Literal

from specgen.core.say import Said
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.process.box import Box, Unmodelled
from specgen.sizing.candidate import Candidate, Unsized
from specgen.sizing.device import DeviceChoice
from specgen.sizing.faults import Faults
from specgen.sizing.feeder import Feeder
from specgen.sizing.measurement import MeasuringError
from specgen.sizing.settings import OnOffSettings, Settings

Weight = Literal["must", "should", "note"]
Scope = Literal["loop", "pair", "panel"]
Outcome = Literal["holds", "broken", "overridden", "unanswered", "does_not_apply"]
NOT_SIZED = Unsized("what feeds the element is not sized")


@dataclass(frozen=True, slots=True)
class Finding:
    """What a rule says of one case: its outcome and one sentence with this loop's numbers.

    ``margin`` is 1 at the limit, larger on the good side; None where the rule has no figure. ``words`` fill the
    braces of ``text``. ``needs`` are the paths that would answer it.
    """

    rule: str
    weight: Weight
    scope: Scope
    outcome: Outcome
    text: str
    margin: float | None = None
    words: dict[str, Said | str] = field(default_factory=dict)
    needs: tuple[str, ...] = ()
    cites: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Case:
    """All that is known of one candidate of one loop; rules read it and nothing else.

    ``settings`` are the candidate's own; ``on_off`` are those of on-off through the same device (through a contactor
    for analogue candidates), so that a rule can ask whether on-off would do.
    """

    loop: Loop
    panel: Panel
    traits: Traits
    candidate: Candidate
    box: Box | Unmodelled
    device: DeviceChoice | Unsized
    settings: Settings | Unsized
    on_off: OnOffSettings | Unsized
    error: MeasuringError | Unsized
    faults: Faults | Unsized
    feeder: Feeder | Unsized = NOT_SIZED


@dataclass(frozen=True, slots=True)
class Rule:
    """A rule's declaration. ``needs`` are paths below the loop that must be declared where the rule applies.

    A rule's file holds ``rule``, ``examine(case)`` and, where it does not apply to every case, ``applies(case)``.
    The engine answers ``does_not_apply`` from ``applies`` and ``unanswered`` from ``needs`` before it asks ``examine``.
    """

    code: str
    name: str
    weight: Weight
    scope: Scope = "loop"
    needs: tuple[str, ...] = ()
    cites: tuple[str, ...] = ("common practice, no source",)

    def judge(self, *, holds: bool, text: str, margin: float | None = None, **words: Said | str) -> Finding:
        """Make the finding: holds or broken, with its margin and its sentence."""
        outcome: Outcome = "holds" if holds else "broken"
        return Finding(self.code, self.weight, self.scope, outcome, text, margin, dict(words), (), self.cites)

    def does_not_apply(self, text: str = "") -> Finding:
        """Make the finding of a rule that has nothing to say here."""
        return Finding(self.code, self.weight, self.scope, "does_not_apply", text or self.name, None, {}, (), self.cites)

    def unanswered(self, because: str, /, needs: tuple[str, ...] = (), **words: Said | str) -> Finding:
        """Make the finding of a rule that lacks an input; ``needs`` names the fields that would answer it."""
        return Finding(self.code, self.weight, self.scope, "unanswered", because, None, dict(words), needs, self.cites)

    def unsized(self, unsized: "Unsized | Unmodelled") -> Finding:
        """Make the finding of a rule whose figure could not be computed."""
        return self.unanswered("{because}", unsized.needs, because=unsized.because)

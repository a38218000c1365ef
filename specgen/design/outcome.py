"""What a loop is decided to be, and nothing else: mode, device and verdict, by no more rules than that takes.

Deciding a loop asks every rule about every candidate, since the sheet shows them all. To know the outcome alone, a candidate is left as
soon as the rules it breaks put it behind the best one found, and what a rule does not ask for is not computed.
"""

from collections.abc import Mapping
from dataclasses import dataclass, fields
from functools import lru_cache
from math import inf

from specgen.catalogue.load import Catalogue
from specgen.design.choice import LEVELS, best
from specgen.design.decide import Examination, verdict_of
from specgen.design.types import Examined, Verdict
from specgen.design.wish import wished
from specgen.model.fitted import Fitted
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import traits_of
from specgen.process.limit_cycle import NoCycle
from specgen.rules.base import Case, Finding
from specgen.rules.engine import LoadedRule, all_rules, ask, examine_all, examine_own
from specgen.sizing.candidate import CANDIDATES, ORDER, Candidate, Unsized
from specgen.sizing.settings import OnOffSettings

_ASIDE = Unsized("what on-off would do is not asked where steady control is")


@dataclass(frozen=True, slots=True)
class Outcome:
    """What a loop is decided to be."""

    mode: str
    device: str
    verdict: Verdict


@dataclass(frozen=True, slots=True)
class Subject:
    """What an outcome depends on besides the catalogue: the loop, the panel, and what a recorded step test says."""

    loop: Loop
    panel: Panel
    fitted: Fitted | None = None


@dataclass(frozen=True, slots=True)
class Standing:
    """An outcome with its evidence: the chosen candidate's findings, notes left out, and of every other those that were needed.

    ``findings`` has no entry for a pair that nobody would wire; that of one that was never asked about is empty. ``own`` are the
    findings that rules of the panel make about the chosen candidate: they count for the verdict, not for the choice.
    """

    outcome: Outcome
    chosen: Candidate
    findings: Mapping[Candidate, tuple[Finding, ...]]
    own: tuple[Finding, ...]


def verdict_of_loop(loop: Loop, panel: Panel, catalogue: Catalogue, fitted: Fitted | None = None) -> Outcome:
    """Return what a loop is decided to be; the same as ``decide`` says.

    A ``choose`` that ``decide`` refuses for want of a reason counts as the deviation it would be with one; one that names no pair
    wired here, as held.
    """
    return standing_of(Subject(loop, panel, fitted), catalogue).outcome


def standing_of(subject: Subject, catalogue: Catalogue, hint: Standing | None = None) -> Standing:
    """Return a loop's outcome with its evidence.

    Parameters
    ----------
    subject : Subject
        The loop.
    catalogue : Catalogue
        What is looked up.
    hint : Standing or None
        That of a loop much like it: its choice is looked at first, and of the others the rules they broke. It saves time and
        changes nothing.
    """
    if subject.loop.choose is not None:
        return _chosen_by_designer(subject, catalogue)
    try:
        return _standing(subject, catalogue, hint, told=False)
    except NoCycle:
        # a worst case that is looked for late has none: where all are looked for at once the candidate has no settings
        return _standing(subject, catalogue, hint, told=True)


def _standing(subject: Subject, catalogue: Catalogue, hint: Standing | None, *, told: bool) -> Standing:
    asked = _Asked(subject, catalogue, told=told)
    order = sorted(CANDIDATES, key=lambda candidate: hint is None or candidate != hint.chosen)
    found: dict[Candidate, tuple[Finding, ...]] = {}
    leader: tuple[float, ...] | None = None
    chosen = order[0]
    for candidate in order:
        place = ORDER.index(candidate.device)
        if leader is not None and (0, 0, 0, 0, place) > leader[:5]:
            found[candidate] = ()
            continue
        if not asked.examination.wired(candidate):
            continue
        counts, found[candidate], whole = asked.about(candidate, leader, hint)
        rank = (*counts, place, -margin_of(found[candidate]), CANDIDATES.index(candidate))
        if whole and (leader is None or rank < leader):
            leader, chosen = rank, candidate
    own = examine_own(asked.case(chosen))
    outcome = Outcome(chosen.mode, chosen.device, verdict_of((*found[chosen], *own)))
    return Standing(outcome, chosen, found, own)


def _chosen_by_designer(subject: Subject, catalogue: Catalogue) -> Standing:
    """Examine every candidate that the designer's words leave, as ``decide`` does; all of them where the words leave none."""
    loop = subject.loop
    wish = loop.choose
    assert wish is not None  # noqa: S101  asked only then
    examination = Examination(loop, subject.panel, traits_of(loop.element), catalogue, subject.fitted)
    wired = [candidate for candidate in CANDIDATES if examination.wired(candidate)]
    named = [candidate for candidate in wired if wish.mode in (None, candidate.mode) and wish.output in (None, candidate.device)]
    cases = [examination.case(candidate) for candidate in named or wired]
    examined = tuple(Examined(case, examine_all(case)) for case in cases)
    left = wished(wish, examined)
    taken = best(left or examined)
    findings = {e.case.candidate: tuple(f for f in e.findings if f.weight != "note") for e in left or examined}
    chosen, own = taken.case.candidate, examine_own(taken.case)
    verdict = verdict_of((*taken.findings, *own)) if left else "held"
    return Standing(Outcome(chosen.mode, chosen.device, verdict), chosen, findings, own)


def margin_of(findings: tuple[Finding, ...]) -> float:
    """Return the least margin of what holds."""
    return min((f.margin for f in findings if f.margin is not None and f.outcome == "holds"), default=inf)


class _Asked:
    """The rules asked about a loop's candidates, one by one."""

    def __init__(self, subject: Subject, catalogue: Catalogue, *, told: bool) -> None:
        traits = traits_of(subject.loop.element)
        self.examination = Examination(subject.loop, subject.panel, traits, catalogue, subject.fitted, told=told)
        self._known = {
            "loop": subject.loop, "panel": subject.panel, "traits": traits, "box": self.examination.box, "error": self.examination.error,
        }  # fmt: skip
        self._cases: dict[Candidate, _UnmadeCase] = {}

    def case(self, candidate: Candidate) -> "_UnmadeCase":
        """Return a candidate's case, made as far as it was asked for."""
        if candidate not in self._cases:
            self._cases[candidate] = _UnmadeCase.of(self.examination, {**self._known, "candidate": candidate})
        return self._cases[candidate]

    def about(
        self, candidate: Candidate, leader: tuple[float, ...] | None, hint: Standing | None
    ) -> tuple[list[int], tuple[Finding, ...], bool]:
        """Ask the rules about a candidate until it is behind; return its counts, the findings, and whether all were asked.

        What can be answered without making the case is asked first, then what spoke against the candidate before.
        """
        before = hint.findings.get(candidate, ()) if hint is not None else ()
        against = {f.rule for f in before if (f.outcome, f.weight) in LEVELS}
        case, place = self.case(candidate), ORDER.index(candidate.device)
        counts = [0, 0, 0, 0]
        findings: list[Finding] = []

        def behind(loaded: LoadedRule) -> bool:
            finding = ask(loaded, case)
            findings.append(finding)
            level = (finding.outcome, finding.weight)
            if level in LEVELS:
                counts[LEVELS.index(level)] += 1
            return leader is not None and (*counts, place) > leader[:5]

        waiting = []
        for loaded in _binding():
            try:
                if behind(loaded):
                    return counts, tuple(findings), False
            except _NotMadeYetError:
                waiting.append(loaded)
        case.make()
        for loaded in sorted(waiting, key=lambda loaded: loaded.rule.code not in against):
            if behind(loaded):
                return counts, tuple(findings), False
        return counts, tuple(findings), True


class _NotMadeYetError(Exception):
    """A rule asked for a part of a case that is not made yet."""


class _UnmadeCase(Case):
    """A case whose costly parts are made later; rules cannot tell it from one made at once.

    Before ``make`` a rule that asks for such a part is stopped; after it the part is made.
    """

    __slots__ = ("_examination", "_may_make")
    _examination: Examination
    _may_make: bool

    @classmethod
    def of(cls, examination: Examination, known: Mapping[str, object]) -> "_UnmadeCase":
        """Return the case of which only the parts given are there."""
        case = object.__new__(cls)
        for name, value in {**known, "_examination": examination, "_may_make": False}.items():
            object.__setattr__(case, name, value)
        return case

    def make(self) -> None:
        """Let the costly parts be made when they are asked for."""
        object.__setattr__(self, "_may_make", True)

    def __getattr__(self, name: str) -> object:
        """Make the parts that are not there yet."""
        if name not in _PARTS:
            raise AttributeError(name)
        if not self._may_make:
            raise _NotMadeYetError
        made: object
        match name:
            case "on_off":
                made = self._beside()
            case "faults":
                made = self._examination.faults(self.settings)
            case "feeder":
                made = self._examination.feeder(self.candidate, self.device)
            case _:
                device, settings = self._examination.sized(self.candidate)
                object.__setattr__(self, "device", device)
                object.__setattr__(self, "settings", settings)
                return getattr(self, name)
        object.__setattr__(self, name, made)
        return made

    def _beside(self) -> OnOffSettings | Unsized:
        """Return on-off beside the candidate; of a steady proportional one only M5 looks at it, and only to say what on-off would do."""
        proportional = self.candidate.mode != "on_off"
        if proportional and self.loop.need.stability == "steady" and not isinstance(self.error, Unsized):
            return _ASIDE
        return self._examination.on_off_beside(self.candidate)


_PARTS = frozenset(field.name for field in fields(Case))


@lru_cache(maxsize=1)
def _binding() -> tuple[LoadedRule, ...]:
    return tuple(loaded for loaded in all_rules() if loaded.rule.scope == "loop" and loaded.rule.weight != "note")

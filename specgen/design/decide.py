"""Deciding one loop: every candidate sized and examined, the best or the designer's own taken, the rest explained."""

from collections.abc import Mapping
from dataclasses import replace

from specgen.catalogue.load import Catalogue
from specgen.core.diagnostic import Diagnostic, Span
from specgen.core.say import Phrasing
from specgen.design.assumptions import loop_assumptions
from specgen.design.basis import basis_of
from specgen.design.choice import because, best, codes, rank, reject
from specgen.design.missing import missing_inputs
from specgen.design.types import DecidedLoop, Decision, Examined, Verdict
from specgen.model.fitted import Fitted
from specgen.model.loop import Choose, Loop
from specgen.model.loops import ReadLoop
from specgen.model.panel import Panel
from specgen.model.traits import Traits, traits_of
from specgen.process.box import Box, Unmodelled
from specgen.process.box_of import box_of
from specgen.rules.base import Case, Finding
from specgen.rules.engine import examine_all
from specgen.sizing.candidate import CANDIDATES, Assumption, Candidate, Device, NoCandidate, Unsized
from specgen.sizing.continuous import continuous_settings, three_point_settings
from specgen.sizing.device import DeviceChoice
from specgen.sizing.device_choice import devices_by_rating
from specgen.sizing.lasting import longer_lasting
from specgen.sizing.measurement import MeasuringError, measuring_error
from specgen.sizing.on_off import on_off_settings
from specgen.sizing.remembered import same_box
from specgen.sizing.settings import OnOffSettings, Settings
from specgen.sizing.stuck import faults_of, with_times
from specgen.sizing.time_proportioned import proportioned_settings

PAIRS = (
    "on_off and time_proportioned go with relay, contactor, ssr; analogue with power_controller, signal; three_point with relay_pair; "
    "a relay is no choice for motors, three-phase loads or more than its rating"
)
Sized = DeviceChoice | Unsized
Sizes = tuple[DeviceChoice, ...] | Unsized
_CONTACTOR = Candidate("on_off", "contactor")


def decide(read: ReadLoop, panel: Panel, catalogue: Catalogue) -> tuple[DecidedLoop | None, tuple[Diagnostic, ...]]:
    """Decide a loop.

    Returns
    -------
    DecidedLoop or None, tuple of Diagnostic
        None with the problems where the loop's own text makes a decision impossible: a ``choose`` that names no pair of
        mode and output, or overrides a recommendation without a reason.
    """
    loop = read.loop
    traits = traits_of(loop.element)
    examined = examine_candidates(loop, panel, traits, catalogue, read.fitted)
    decision, problem = _decision(read, examined)
    if decision is None:
        return None, (problem,) if problem is not None else ()
    findings = _marked(decision, loop.choose, examined)
    case = decision.chosen.case
    assumptions = _assumptions(read, traits, case)
    decided = DecidedLoop(
        read=read,
        traits=traits,
        box=case.box,
        decision=decision,
        findings=findings,
        verdict=verdict_of(findings),
        assumptions=assumptions,
        missing=missing_inputs(findings, case),
        basis=basis_of(case, read.fitted.figures if read.fitted is not None else ()),
    )
    return decided, ()


def examine_candidates(
    loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue, fitted: Fitted | None = None
) -> tuple[Examined, ...]:
    """Size every candidate and ask every rule about it; pairs that nobody would wire are left out."""
    box = box_of(loop, panel, fitted.ranges if fitted is not None else None)
    if not isinstance(box, Unmodelled):
        box = same_box(box)  # equal boxes share what was computed for one of them
    error = measuring_error(loop, panel, catalogue)
    faults = faults_of(loop, box)
    devices = {c.device: devices_by_rating(c, loop, panel, traits, catalogue) for c in CANDIDATES if c.mode != "time_proportioned"}
    sizer = _Sizer(loop, panel, box, error, devices)
    found = []
    for candidate in CANDIDATES:
        if isinstance(devices[candidate.device], NoCandidate):
            continue
        device, settings = sizer.sized(candidate)
        timed = with_times(faults, loop, box, settings)
        case = Case(loop, panel, traits, candidate, box, device, settings, sizer.on_off_beside(candidate), error, timed)
        found.append(Examined(case, examine_all(case)))
    return tuple(found)


class _Sizer:
    """Sizes the settings of candidates; what two of them share is computed once."""

    def __init__(
        self, loop: Loop, panel: Panel, box: Box | Unmodelled, error: MeasuringError | Unsized, devices: Mapping[Device, Sizes]
    ) -> None:
        self._loop = loop
        self._panel = panel
        self._box = box
        self._error = error
        self._devices = devices
        self._on_off: dict[Device, tuple[Sized, Settings | Unsized]] = {}

    def on_off_beside(self, candidate: Candidate) -> OnOffSettings | Unsized:
        """Return on-off through the same device, through a contactor for the rest."""
        device: Device = candidate.device if candidate.device in ("relay", "contactor", "ssr") else _CONTACTOR.device
        settings = self.sized(Candidate("on_off", device))[1]
        assert isinstance(settings, OnOffSettings | Unsized)  # noqa: S101  an on-off candidate has no other settings
        return settings

    def sized(self, candidate: Candidate) -> tuple[Sized, Settings | Unsized]:
        """Return a candidate's device and settings: the smallest device, or a larger one where only that lasts long enough."""
        if candidate.mode == "on_off" and candidate.device in self._on_off:
            return self._on_off[candidate.device]
        found = self._devices[candidate.device]
        device: Sized = found if isinstance(found, Unsized) else found[0]
        settings = self._settings(candidate, device)
        if not isinstance(found, Unsized):
            wanted = self._panel.house.contact_life_years
            lasting = longer_lasting(found, settings, wanted, lambda larger: self._settings(candidate, larger))
            device, settings = lasting or (device, settings)
        if candidate.mode == "on_off":
            self._on_off[candidate.device] = device, settings
        return device, settings

    def _settings(self, candidate: Candidate, device: Sized) -> Settings | Unsized:
        match candidate.mode:
            case "on_off":
                return on_off_settings(self._loop, self._panel, self._box, device, self._error)
            case "time_proportioned":
                return proportioned_settings(candidate, self._loop, self._panel, self._box, device, self._error)
            case "analogue":
                return continuous_settings(candidate, self._loop, self._panel, self._box, device)
            case "three_point":
                return three_point_settings(self._loop, self._panel, self._box, device)


def _decision(read: ReadLoop, examined: tuple[Examined, ...]) -> tuple[Decision | None, Diagnostic | None]:
    loop = read.loop
    free = best(examined)
    chosen, by_designer = free, False
    wish = loop.choose
    if wish is not None and (wish.mode is not None or wish.output is not None):
        wished = [e for e in examined if wish.mode in (None, e.case.candidate.mode) and wish.output in (None, e.case.candidate.device)]
        if not wished:
            return None, _problem(
                read, ("choose", "output" if wish.output else "mode"), "L301", "no such pair of mode and output is wired here", PAIRS
            )
        chosen, by_designer = best(wished), True
    overridden = _overridden(chosen, free, wish)
    if overridden and wish is not None and wish.because is None:
        first = overridden[0]
        return None, _problem(
            read, ("choose",), "L302", f"choose sets aside rule {first.rule} without a reason: {_sentence(loop, first)}",
            "write because: with the reason, or leave the choice to the rules",
        )
    phrasing = Phrasing(loop.unit, loop.difference_unit)
    others = sorted((e for e in examined if e is not chosen), key=rank)
    rejected = tuple(reject(chosen, other, phrasing, by_designer=by_designer) for other in others)
    why = wish.because if by_designer and wish is not None and wish.because else because(chosen, rejected, phrasing)
    return Decision(chosen, why, rejected, by_designer), None


def _overridden(chosen: Examined, free: Examined, wish: Choose | None) -> list[Finding]:
    """Return the recommendations that the designer's choice breaks and the rules' own would not."""
    if wish is None:
        return []
    own = set() if chosen is free else set(codes(free, "broken", "should"))
    return [f for f in chosen.findings if f.outcome == "broken" and f.weight == "should" and f.rule not in own]


def _marked(decision: Decision, wish: Choose | None, examined: tuple[Examined, ...]) -> tuple[Finding, ...]:
    overridden = {f.rule for f in _overridden(decision.chosen, best(examined), wish)} if wish is not None and wish.because else set()
    return tuple(replace(f, outcome="overridden") if f.rule in overridden and f.weight == "should" else f for f in decision.chosen.findings)


def verdict_of(findings: tuple[Finding, ...]) -> Verdict:
    """Return the verdict that findings add up to: held, open, deviates or meets."""
    binding = {f.outcome for f in findings if f.weight == "must"}
    if "broken" in binding:
        return "held"
    if "unanswered" in binding:
        return "open"
    advice = {f.outcome for f in findings if f.weight == "should"}
    return "deviates" if advice & {"broken", "overridden"} else "meets"


def _assumptions(read: ReadLoop, traits: Traits, case: Case) -> tuple[Assumption, ...]:
    parts: list[Assumption] = list(loop_assumptions(read, traits))
    if not isinstance(case.device, Unsized):
        parts += case.device.assumptions
    if not isinstance(case.settings, Unsized):
        parts += case.settings.assumptions
        if not isinstance(case.settings, OnOffSettings):
            parts += case.settings.tuning.assumptions
    if not isinstance(case.error, Unsized):
        parts += case.error.assumptions
    return tuple(dict.fromkeys(parts))


def _sentence(loop: Loop, finding: Finding) -> str:
    return Phrasing(loop.unit, loop.difference_unit).fill(finding.text, finding.words)


def _problem(read: ReadLoop, path: tuple[str, ...], code: str, text: str, hint: str) -> Diagnostic:
    spans = read.spans
    span = next((spans[path[:n]] for n in range(len(path), 0, -1) if path[:n] in spans), Span(read.file, read.line, 1))
    return Diagnostic(span, code, text, hint)



"""Deciding one loop: every candidate sized and examined, the best or the designer's own taken, the rest explained."""

from specgen.catalogue.load import Catalogue
from specgen.core.diagnostic import Diagnostic
from specgen.design.assumptions import loop_assumptions
from specgen.design.basis import basis_of
from specgen.design.defaults import panel_defaults
from specgen.design.missing import missing_inputs
from specgen.design.safety import safety_of
from specgen.design.types import DecidedLoop, Examined, Verdict
from specgen.design.wish import decided_by, marked, sets_something, unused
from specgen.model.fitted import Fitted
from specgen.model.loop import Loop
from specgen.model.loops import ReadLoop
from specgen.model.panel import Panel
from specgen.model.traits import Traits, traits_of
from specgen.process.box import Box, Unmodelled
from specgen.process.box_of import box_of
from specgen.rules.base import Case, Finding
from specgen.rules.engine import examine_all, examine_own
from specgen.sizing.candidate import CANDIDATES, Assumption, Candidate, Device, NoCandidate, Unsized
from specgen.sizing.continuous import continuous_settings, three_point_settings
from specgen.sizing.device import DeviceChoice
from specgen.sizing.device_choice import devices_by_rating
from specgen.sizing.faults import Faults
from specgen.sizing.feeder import Feeder, feeder_of, surviving
from specgen.sizing.injection import inject_values
from specgen.sizing.lasting import longer_lasting
from specgen.sizing.measurement import measuring_error
from specgen.sizing.on_off import on_off_settings
from specgen.sizing.remembered import remembered_for, same_box
from specgen.sizing.settings import OnOffSettings, Settings
from specgen.sizing.stuck import faults_of, with_times
from specgen.sizing.time_proportioned import proportioned_settings

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
    own = examined
    if loop.choose is not None and sets_something(loop.choose):
        # what the rules would take is asked of the loop without the designer's settings
        own = examine_candidates(loop.model_copy(update={"choose": None}), panel, traits, catalogue, read.fitted)
    decision, problem = decided_by(read, examined, own)
    if decision is None:
        return None, (problem,) if problem is not None else ()
    case = decision.chosen.case
    findings = (*marked(decision, loop.choose, own), *examine_own(case))
    safety = safety_of(case)
    inject = inject_values(loop, catalogue)
    put_in = () if isinstance(inject, Unsized) else inject
    decided = DecidedLoop(
        read=read,
        traits=traits,
        box=case.box,
        decision=decision,
        findings=findings,
        verdict=verdict_of(findings),
        assumptions=(*_assumptions(read, traits, case), *safety.assumptions),
        missing=missing_inputs(findings, case),
        basis=(
            *basis_of(case, read.fitted.figures if read.fitted is not None else ()),
            *safety.figures,
            *put_in,
        ),
        safety=safety,
        inject=put_in,
    )
    return decided, ()


def examine_candidates(
    loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue, fitted: Fitted | None = None
) -> tuple[Examined, ...]:
    """Size every candidate and ask every rule about it; pairs that nobody would wire are left out, unless the designer names one."""
    examination = Examination(loop, panel, traits, catalogue, fitted)
    named = _named_pair(loop)
    wired = [candidate for candidate in CANDIDATES if candidate == named or examination.wired(candidate)]
    if named is not None and named not in wired:
        wired.append(named)
    cases = (examination.case(candidate) for candidate in wired)
    return tuple(Examined(case, examine_all(case)) for case in cases)


def _named_pair(loop: Loop) -> Candidate | None:
    """Return the pair that the designer names in full: it is held against the rules even where no trade uses it."""
    wish = loop.choose
    if wish is None or wish.mode is None or wish.output is None:
        return None
    return Candidate(wish.mode, wish.output)


def _looked_at(device: Device, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[object, ...]:
    """Return what the devices of a kind depend on: of the loop on element and cable alone."""
    return device, loop.element, loop.cable, panel, traits, catalogue


@remembered_for(_looked_at)
def _sizes_of(device: Device, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> Sizes:
    """Return the devices of a kind that carry the load and survive a fault; they do not depend on the mode."""
    found = devices_by_rating(Candidate("on_off", device), loop, panel, traits, catalogue)
    return surviving(device, found, loop, panel, traits, catalogue)


def _fed(
    device: Device, choice: Sized, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue
) -> tuple[object, ...]:
    """Return what a feeder depends on, as the devices."""
    return choice, *_looked_at(device, loop, panel, traits, catalogue)


_feeder_of = remembered_for(_fed)(feeder_of)


class Examination:
    """Makes the cases of one loop's candidates; what two of them share is computed once, and nothing before it is asked for."""

    def __init__(
        self, loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue, fitted: Fitted | None = None, *, told: bool = True
    ) -> None:
        """Without ``told`` what only the sheet tells is left out."""
        self._told = told
        box = box_of(loop, panel, fitted.ranges if fitted is not None else None)
        self._loop = loop
        self._panel = panel
        self._traits = traits
        self._catalogue = catalogue
        # equal boxes share what was computed for one of them
        self.box: Box | Unmodelled = box if isinstance(box, Unmodelled) else same_box(box)
        self.error = measuring_error(loop, panel, catalogue)
        self._faults = faults_of(loop, box)
        self._devices: dict[Device, Sizes] = {}
        self._on_off: dict[Device, tuple[Sized, Settings | Unsized]] = {}

    def wired(self, candidate: Candidate) -> bool:
        """Tell whether anybody would wire such a pair."""
        return not isinstance(self._sizes(candidate), NoCandidate)

    def case(self, candidate: Candidate) -> Case:
        """Return a candidate's case."""
        device, settings = self.sized(candidate)
        timed = self.faults(settings)
        beside = self.on_off_beside(candidate)
        feeder = self.feeder(candidate, device)
        return Case(self._loop, self._panel, self._traits, candidate, self.box, device, settings, beside, self.error, timed, feeder)

    def faults(self, settings: Settings | Unsized) -> Faults | Unsized:
        """Return what a stuck output does to a candidate with these settings."""
        return with_times(self._faults, self._loop, self.box, settings)

    def feeder(self, candidate: Candidate, device: Sized) -> Feeder | Unsized:
        """Return what feeds the element through a candidate's device."""
        return _feeder_of(candidate.device, device, self._loop, self._panel, self._traits, self._catalogue)

    def _sizes(self, candidate: Candidate) -> Sizes:
        if candidate.device not in self._devices:
            self._devices[candidate.device] = _sizes_of(candidate.device, self._loop, self._panel, self._traits, self._catalogue)
        return self._devices[candidate.device]

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
        found = self._sizes(candidate)
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
        if candidate not in CANDIDATES:
            return Unsized("no trade uses this mode with this output")
        match candidate.mode:
            case "on_off":
                return on_off_settings(self._loop, self._panel, self.box, device, self.error, told=self._told)
            case "time_proportioned":
                return proportioned_settings(candidate, self._loop, self._panel, self.box, device, self.error, told=self._told)
            case "analogue":
                return continuous_settings(candidate, self._loop, self._panel, self.box, device, told=self._told)
            case "three_point":
                return three_point_settings(self._loop, self._panel, self.box, device, told=self._told)


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
    if not isinstance(case.feeder, Unsized):
        parts += case.feeder.assumptions
    parts += panel_defaults(case, traits)
    parts += unused(read.loop.choose, case.candidate)
    return tuple(dict.fromkeys(parts))

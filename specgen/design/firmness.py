"""How firm a decision is: for each uncertain input alone, the nearest value at which mode, output or verdict changes.

The span of an input, a factor of ten each way, is looked at outwards from what is declared. Between two values with the same outcome
nothing is taken to change where what separates the choice from every other candidate, and what the verdict rests on, is the same at
both; else the stretch is halved. Where the outcome differs, the margins of the rules that turned (1 at the limit) tell where to look, by
false position on their logarithms, until the change is enclosed within one percent (of a shift: within 0.4 percent of its span).
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from math import inf, isfinite, log

from specgen.catalogue.load import Catalogue
from specgen.design.choice import DEVICE_WORDS, LEVELS, MODE_WORDS
from specgen.design.decide import verdict_of
from specgen.design.outcome import Outcome, Standing, Subject, margin_of, standing_of
from specgen.design.types import VERDICTS, DecidedLoop, Firm
from specgen.design.varied import Uncertain, uncertain_inputs
from specgen.rules.base import Finding
from specgen.sizing.candidate import ORDER, Candidate

LOOKED_AT = (0.3, 1.0)  # ways along the span that are always looked at: factors of 2 and 10
NEAR = 0.004  # a change is enclosed this closely: within one percent of a factor
FINE = 0.04  # stretches shorter than this (10 percent) are not halved for what might hide between equal outcomes
HALF = 0.5
MOST = 40  # values looked at on one side; more is never needed but where outcomes flicker
_WORSE = {"holds": 0, "does_not_apply": 0, "overridden": 1, "unanswered": 2, "broken": 3}


def firmness_of(subject: Subject, catalogue: Catalogue) -> tuple[Firm, ...]:
    """Return, for every uncertain input of a loop, the nearest values at which its decision changes.

    Parameters
    ----------
    subject : Subject
        The loop as declared, its panel, and what its step test says.
    catalogue : Catalogue
        What is looked up.

    Returns
    -------
    tuple of Firm
        One entry an input, in the order of the loop file; without values where nothing changes within a factor of ten.
    """
    declared = standing_of(subject, catalogue)
    found = [_firm(one, declared, catalogue) for one in uncertain_inputs(subject)]
    return tuple(sorted(found, key=lambda firm: _ORDER.index(firm.input.rpartition(".")[2])))


_ORDER = (
    "dead_time", "time_constant", "heat_capacity", "power", "capacity", "change", "with_output", "without_output", "load", "surroundings",
    "rest_value", "tolerance", "min_run", "contact_life",
)  # fmt: skip


def nearest_first(loops: Iterable[DecidedLoop]) -> tuple[tuple[DecidedLoop, Firm], ...]:
    """Return every input of every loop of a panel, those first that are nearest to changing a decision.

    Inputs that change nothing come last, in the order of the loops.
    """
    return tuple(sorted(((loop, firm) for loop in loops for firm in loop.firmness), key=lambda pair: pair[1].nearness))


def _firm(one: Uncertain, declared: Standing, catalogue: Catalogue) -> Firm:
    down, up = (_Side(one, sign, declared, catalogue).nearest_change() for sign in (-1.0, 1.0))
    return Firm(
        input=one.name,
        words=one.words,
        dimension=one.dimension,
        declared=one.declared,
        text=one.text,
        below=None if down is None else one.value(-down[0]),
        below_to="" if down is None else in_words(declared.outcome, down[1]),
        above=None if up is None else one.value(up[0]),
        above_to="" if up is None else in_words(declared.outcome, up[1]),
        nearness=min((found[0] for found in (down, up) if found is not None), default=inf),
    )


def in_words(before: Outcome, after: Outcome) -> str:
    """Say what a decision changes to.

    Examples
    --------
    >>> in_words(Outcome("on_off", "contactor", "meets"), Outcome("time_proportioned", "contactor", "meets"))
    'time-proportioned, contactor'
    >>> in_words(Outcome("on_off", "contactor", "meets"), Outcome("on_off", "contactor", "held"))
    'held'
    """
    parts = []
    if (before.mode, before.device) != (after.mode, after.device):
        parts += [MODE_WORDS[after.mode], DEVICE_WORDS[after.device].removeprefix("a ")]
    if before.verdict != after.verdict:
        parts.append(after.verdict)
    return ", ".join(parts)


@dataclass(slots=True)
class _Side:
    """One input, varied one way."""

    one: Uncertain
    sign: float
    declared: Standing
    catalogue: Catalogue
    looked: int = field(default=0)

    def nearest_change(self) -> tuple[float, Outcome] | None:
        """Return the nearest way along the span at which the outcome is another, and that outcome."""
        if self.one.shifts and (self.one.up if self.sign > 0 else self.one.down) <= 0:
            return None
        way, here = 0.0, self.declared
        for following in LOOKED_AT:
            there = self._look(following, here)
            found = self._change(way, here, following, there)
            if found is not None:
                return found
            way, here = following, there
        return None

    def _look(self, way: float, hint: Standing) -> Standing:
        self.looked += 1
        return standing_of(self.one.at(self.sign * way), self.catalogue, hint)

    def _change(
        self, low: float, at_low: Standing, high: float, at_high: Standing, pace: "_Pace | None" = None
    ) -> tuple[float, Outcome] | None:
        """Return the nearest change between two ways, None where there is none."""
        pace = pace or _Pace()
        if at_low.outcome == at_high.outcome:
            if high - low <= FINE or self.looked >= MOST or nothing_hides(at_low, at_high):
                return None
            way = (low + high) / 2
        else:
            if high - low <= NEAR:
                return high, at_high.outcome
            way = pace.way(low, high, _share(at_low, at_high))
        between = self._look(way, at_low)
        first = self._change(low, at_low, way, between, pace.after((way - low) / (high - low), lifted=False))
        if first is not None:
            return first
        return self._change(way, between, high, at_high, pace.after((high - way) / (high - low), lifted=True))


@dataclass(frozen=True, slots=True)
class _Pace:
    """How the next look at an enclosed change is chosen: where the margins say; beyond that; and where they mislead, in the middle.

    ``failed`` counts the looks by margins that did not halve the stretch; ``lifted`` tells whether the last one moved its lower end.
    """

    failed: int = 0
    lifted: bool = False

    def way(self, low: float, high: float, share: float | None) -> float:
        """Return where to look between two ways; ``share`` is where the margins expect the change."""
        if share is None or high - low <= 2 * NEAR or self.failed > 1:
            return (low + high) / 2
        way = low + share * (high - low)
        if self.failed == 0:
            # just beyond where the limit is expected, which encloses it at once
            way += NEAR / 3
        elif self.lifted:
            way += 2 * NEAR + (way - low) / 4
        else:
            way -= 2 * NEAR + (high - way) / 4
        return min(max(way, low + 0.9 * NEAR), high - 0.9 * NEAR)

    def after(self, left: float, *, lifted: bool) -> "_Pace":
        """Return the pace for the stretch that is left, a share of the one before."""
        return _Pace(self.failed if left <= HALF or self.failed > 1 else self.failed + 1, lifted)


def nothing_hides(one: Standing, other: Standing) -> bool:
    """Tell whether rules that turn once between two standings of the same outcome, in any order, leave the outcome as it is."""
    chosen = one.chosen
    ours = one.findings[chosen], other.findings[chosen]
    worse = _joined(*ours, larger=True)
    for larger in (True, False):
        joined = (*_joined(*ours, larger=larger), *_joined(one.own, other.own, larger=larger))
        if verdict_of(joined) != one.outcome.verdict:
            return False
    most = (*_counts(worse), ORDER.index(chosen.device))
    for candidate in {*one.findings, *other.findings} - {chosen}:
        theirs = [standing.findings[candidate] for standing in (one, other) if candidate in standing.findings]
        least = (*_counts(_joined(theirs[0], theirs[-1], larger=False)), ORDER.index(candidate.device))
        if least < most or (least == most and not _wins_by_margin(one, other, candidate)):
            return False
    return True


def _wins_by_margin(one: Standing, other: Standing, candidate: Candidate) -> bool:
    return all(
        candidate not in standing.findings or margin_of(standing.findings[standing.chosen]) > margin_of(standing.findings[candidate])
        for standing in (one, other)
    )


def _joined(one: Sequence[Finding], other: Sequence[Finding], *, larger: bool) -> tuple[Finding, ...]:
    """Return of each rule asked on both sides the finding with the worse outcome, or the better."""
    there = {finding.rule: finding for finding in other}
    pick = max if larger else min
    return tuple(pick(mine, there[mine.rule], key=lambda f: _WORSE[f.outcome]) for mine in one if mine.rule in there)


def _counts(findings: Iterable[Finding]) -> tuple[int, ...]:
    levels: list[tuple[str, str]] = [(finding.outcome, finding.weight) for finding in findings]
    return tuple(levels.count(level) for level in LEVELS)


def _share(at_low: Standing, at_high: Standing) -> float | None:
    """Return where between two standings the rule that makes the change is expected to meet its limit, 0..1; None where no margin tells.

    What takes the first choice down is the first of its rules to turn for the worse; what lifts another, or the verdict, the last of
    those that turn for the better.
    """
    worse: list[float] = []
    better: list[float] = []
    for candidate in (at_low.chosen, at_high.chosen):
        there = {finding.rule: finding for finding in (*at_high.findings.get(candidate, ()), *at_high.own)}
        for finding in (*at_low.findings.get(candidate, ()), *at_low.own):
            other = there.get(finding.rule)
            if other is not None and _bears(finding, other, at_high.outcome):
                turned = worse if _WORSE[other.outcome] > _WORSE[finding.outcome] else better
                turned += _crossing(finding.margin, other.margin)
    if not worse and not better:
        return None
    sinks = at_low.chosen != at_high.chosen or VERDICTS.index(at_high.outcome.verdict) < VERDICTS.index(at_low.outcome.verdict)
    return min(worse) if worse and (sinks or not better) else max(better or worse)


def _bears(finding: Finding, other: Finding, after: Outcome) -> bool:
    """Tell whether a rule that turned can be what made the outcome: a recommendation that breaks makes nothing held."""
    if finding.outcome == other.outcome:
        return False
    return finding.weight == "must" or after.verdict != "held" or other.outcome != "broken"


def _crossing(here: float | None, there: float | None) -> list[float]:
    """Return the share of the way at which a margin passes 1, its logarithm taken as straight."""
    if here is None or there is None or here <= 0 or there <= 0 or not (isfinite(here) and isfinite(there)):
        return []
    a, b = log(here), log(there)
    return [a / (a - b)] if a * b < 0 else []

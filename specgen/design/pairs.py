"""Loops that share a body: judged two by two once all are decided, and kept apart in the hardware where the dead band is too narrow."""

from collections.abc import Sequence
from dataclasses import replace
from itertools import combinations

from specgen.core.figure import Figure
from specgen.core.say import Said
from specgen.design.decide import verdict_of
from specgen.design.safety import with_pairs
from specgen.design.types import DecidedLoop
from specgen.rules.base import Finding
from specgen.rules.engine import examine_pair, no_pair
from specgen.rules.pair_case import PairCase

_WORST = ("broken", "unanswered", "holds")
Judged = tuple[DecidedLoop, DecidedLoop, PairCase]


def with_pair_rules(loops: Sequence[DecidedLoop]) -> tuple[DecidedLoop, ...]:
    """Add what the rules of scope pair find to both loops of each pair.

    Parameters
    ----------
    loops : sequence of DecidedLoop
        Decided one by one; their order stays.

    Returns
    -------
    tuple of DecidedLoop
        With the findings, the verdicts that follow from them, and the interlocks made part of both chains. A loop that shares its body with
        none that acts the other way has the rule as not applying.
    """
    found: dict[str, list[Finding]] = {loop.tag: [] for loop in loops}
    kept_apart: dict[str, list[str]] = {loop.tag: [] for loop in loops}
    figures: dict[str, list[Figure]] = {loop.tag: [] for loop in loops}
    for one, other, case in opposed(loops):
        for finding in examine_pair(case):
            found[one.tag].append(finding)
            found[other.tag].append(finding)
        for tag in (one.tag, other.tag):
            figures[tag] += case.figures
        if case.needs_interlock:
            kept_apart[one.tag].append(other.tag)
            kept_apart[other.tag].append(one.tag)
    judged = (_judged(loop, found[loop.tag], tuple(sorted(kept_apart[loop.tag]))) for loop in loops)
    return tuple(replace(loop, basis=(*loop.basis, *figures[loop.tag])) for loop in judged)


def opposed(loops: Sequence[DecidedLoop]) -> tuple[Judged, ...]:
    """Return every two loops that raise and lower the same quantity of the same body, by tag."""
    made = []
    for one, other in combinations(sorted(loops, key=lambda loop: loop.tag), 2):
        body, its = _body(one), _body(other)
        same = body and body == its and one.loop.need.quantity == other.loop.need.quantity and one.loop.unit == other.loop.unit
        if same and one.loop.raises != other.loop.raises:
            up, down = (one, other) if one.loop.raises else (other, one)
            made.append((one, other, PairCase(up.decision.chosen.case, down.decision.chosen.case)))
    return tuple(made)


def _body(loop: DecidedLoop) -> str:
    return " ".join((loop.loop.acts_on or "").casefold().split())


def _judged(loop: DecidedLoop, found: list[Finding], apart: tuple[str, ...]) -> DecidedLoop:
    made = (_together(found),) if found else no_pair()
    findings = (*loop.findings, *made)
    safety = loop.safety
    if safety is not None and apart:
        safety = with_pairs(safety, loop.decision.chosen.case, apart)
    return replace(loop, findings=findings, verdict=verdict_of(findings), safety=safety)


def _together(found: list[Finding]) -> Finding:
    """Put what a rule says of several pairs into one finding: the worst outcome, every sentence."""
    if len(found) == 1:
        return found[0]
    texts: list[str] = []
    words: dict[str, Said | str] = {}
    for number, finding in enumerate(found):
        text = finding.text
        for name, said in finding.words.items():
            text = text.replace(f"{{{name}}}", f"{{{name}_{number}}}")
            words[f"{name}_{number}"] = said
        texts.append(text)
    worst = min(found, key=lambda finding: _WORST.index(finding.outcome))
    margins = [finding.margin for finding in found if finding.margin is not None]
    return replace(worst, text=" ".join(texts), words=words, margin=min(margins) if len(margins) == len(found) else None)

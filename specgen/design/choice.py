"""The order of choice among candidates, and why each of the others was left."""

from collections.abc import Sequence
from math import inf

from specgen.core.say import Phrasing
from specgen.design.types import Examined, Rejected
from specgen.rules.base import Finding
from specgen.sizing.candidate import ORDER, Candidate

LEVELS = (("broken", "must"), ("broken", "should"), ("unanswered", "must"), ("unanswered", "should"))
BY_ORDER = "M13"


def rank(examined: Examined) -> tuple[int, int, int, int, int, float]:
    """Return the order of choice: fewest broken musts and shoulds, fewest unanswered, device, larger margin."""
    counts = [len(codes(examined, outcome, weight)) for outcome, weight in LEVELS]
    return counts[0], counts[1], counts[2], counts[3], ORDER.index(examined.case.candidate.device), -margin(examined)


def codes(examined: Examined, outcome: str, weight: str) -> tuple[str, ...]:
    """Return the rules of one weight with one outcome."""
    return tuple(f.rule for f in examined.findings if f.outcome == outcome and f.weight == weight)


def margin(examined: Examined) -> float:
    """Return the least margin of what holds."""
    held = [f.margin for f in examined.findings if f.margin is not None and f.outcome == "holds" and f.weight != "note"]
    return min(held, default=inf)


def best(candidates: Sequence[Examined]) -> Examined:
    """Return the first candidate in the order of choice."""
    return min(candidates, key=rank)


def separation(chosen: Examined, other: Examined) -> tuple[Finding, ...]:
    """Return the findings of ``other`` that separate it from ``chosen``; empty where only order or margin do."""
    ours, theirs = rank(chosen), rank(other)
    for level, (outcome, weight) in enumerate(LEVELS):
        if theirs[level] > ours[level]:
            mine = set(codes(chosen, outcome, weight))
            return tuple(f for f in other.findings if f.outcome == outcome and f.weight == weight and f.rule not in mine)
        if theirs[level] < ours[level]:
            return ()
    return ()


def reject(chosen: Examined, other: Examined, phrasing: Phrasing, *, by_designer: bool) -> Rejected:
    """Say why a candidate was not taken."""
    ending = separation(chosen, other)
    if ending:
        first = ending[0]
        return Rejected(other, tuple(f.rule for f in ending), phrasing.fill(first.text, first.words))
    if by_designer and rank(other) < rank(chosen):
        return Rejected(other, (BY_ORDER,), "not taken: the designer chose otherwise")
    ours, theirs = ORDER.index(chosen.case.candidate.device), ORDER.index(other.case.candidate.device)
    text = "equal in the rules; later in the order of devices" if theirs != ours else "equal in the rules; the smaller margin"
    return Rejected(other, (BY_ORDER,), text)


def because(chosen: Examined, rejected: Sequence[Rejected], phrasing: Phrasing) -> str:
    """Explain the choice by the first rule that separates it from the next candidate."""
    if not rejected:
        return "nothing else can be wired here"
    following = min(rejected, key=lambda r: rank(r.examined))
    ending = separation(chosen, following.examined)
    other = named(following.examined.case.candidate)
    if not ending:
        return f"M13: {other} keeps the same rules; {following.text.removeprefix('equal in the rules; ')}"
    first = ending[0]
    return f"{first.rule} rules out {other}: {phrasing.fill(first.text, first.words)}"


def named(candidate: Candidate) -> str:
    """Return a candidate in words.

    Examples
    --------
    >>> named(Candidate("on_off", "contactor"))
    'on-off through a contactor'
    """
    return f"{MODE_WORDS[candidate.mode]} through {DEVICE_WORDS[candidate.device]}"


MODE_WORDS = {"on_off": "on-off", "time_proportioned": "time-proportioned", "analogue": "analogue", "three_point": "three-point"}
DEVICE_WORDS = {
    "relay": "a relay", "contactor": "a contactor", "ssr": "a solid-state switch", "power_controller": "a power controller",
    "signal": "a signal", "relay_pair": "a pair of relays",
}  # fmt: skip

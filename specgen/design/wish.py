"""The designer's own decision: the candidate it names, the recommendations it sets aside, and what of it is of no use here."""

from collections.abc import Sequence
from dataclasses import replace

from specgen.core.diagnostic import Diagnostic, Span
from specgen.core.say import Phrasing
from specgen.design.choice import because, best, codes, named, rank, reject
from specgen.design.types import Decision, Examined
from specgen.model.loop import Choose, Mode
from specgen.model.loops import ReadLoop
from specgen.rules.base import Finding
from specgen.sizing.candidate import Assumption, Candidate

PAIRS = (
    "on_off and time_proportioned go with relay, contactor, ssr; analogue with power_controller, signal; three_point with relay_pair; "
    "a relay is no choice for motors, three-phase loads or more than its rating"
)
_PROPORTIONAL: tuple[Mode, ...] = ("time_proportioned", "analogue", "three_point")
SERVES: dict[str, tuple[Mode, ...]] = {
    "differential": ("on_off",), "placement": ("on_off",), "cycle_time": ("time_proportioned",),
    "proportional_band": _PROPORTIONAL, "integral_time": _PROPORTIONAL, "derivative_time": _PROPORTIONAL,
}  # fmt: skip
"""The modes that each setting of ``choose`` is of use for."""


def sets_something(wish: Choose) -> bool:
    """Tell whether the designer chose a setting, beside or without mode and output."""
    return any(getattr(wish, name) is not None for name in SERVES)


def decided_by(read: ReadLoop, examined: Sequence[Examined], own: Sequence[Examined]) -> tuple[Decision | None, Diagnostic | None]:
    """Take the rules' own choice, or the designer's.

    Parameters
    ----------
    read : ReadLoop
        The loop, with ``choose`` where there is one.
    examined : sequence of Examined
        Every candidate with the designer's settings.
    own : sequence of Examined
        Every candidate as the rules alone would set it.

    Returns
    -------
    Decision or None, Diagnostic or None
        A problem instead of a decision where ``choose`` names no pair of mode and output (L301), or sets aside a
        recommendation that the rules' own choice keeps, without a reason (L302).
    """
    wish = read.loop.choose
    chosen, by_designer = best(examined), False
    if wish is not None:
        left = wished(wish, examined)
        if not left:
            path = ("choose", "output" if wish.output else "mode")
            return None, _problem(read, path, "L301", "no such pair of mode and output is wired here", PAIRS)
        chosen, by_designer = best(left), wish.mode is not None or wish.output is not None
    set_aside = _set_aside(chosen, own)
    phrasing = Phrasing(read.loop.unit, read.loop.difference_unit)
    if wish is not None and wish.because is None and set_aside:
        first = set_aside[0]
        said = f"choose sets aside rule {first.rule} without a reason: {phrasing.fill(first.text, first.words)}"
        never = next((f for f in chosen.findings if f.outcome == "broken" and f.weight == "must"), None)
        if never is not None:
            said += f" And no reason would do for {never.rule}: {phrasing.fill(never.text, never.words)}"
        return None, _problem(read, ("choose",), "L302", said, "write because: with the reason, or leave the choice to the rules")
    others = sorted((e for e in examined if e is not chosen), key=rank)
    rejected = tuple(reject(chosen, other, phrasing, by_designer=by_designer) for other in others)
    why = because(chosen, rejected, phrasing)
    if wish is not None and by_designer:
        free = best(own).case.candidate
        if wish.because is not None:
            why = wish.because
        elif free != chosen.case.candidate:
            why = f"the designer chose it; the rules alone would take {named(free)}"
    return Decision(chosen, why, rejected, by_designer), None


def wished(wish: Choose, examined: Sequence[Examined]) -> list[Examined]:
    """Return the candidates that the designer's words leave; a setting that only one mode has asks for that mode where it may be had."""
    named_ones = [e for e in examined if wish.mode in (None, e.case.candidate.mode) and wish.output in (None, e.case.candidate.device)]
    if wish.mode is not None:
        return named_ones
    asked: set[Mode] = {SERVES[name][0] for name in ("differential", "cycle_time") if getattr(wish, name) is not None}
    meant = [e for e in named_ones if {e.case.candidate.mode} == asked and not codes(e, "broken", "must")]
    return meant or named_ones


def _set_aside(chosen: Examined, own: Sequence[Examined]) -> list[Finding]:
    """Return the recommendations that a choice breaks and the rules' own would not."""
    kept_anyway = set(codes(best(own), "broken", "should"))
    return [f for f in chosen.findings if f.outcome == "broken" and f.weight == "should" and f.rule not in kept_anyway]


def marked(decision: Decision, wish: Choose | None, own: Sequence[Examined]) -> tuple[Finding, ...]:
    """Return the chosen candidate's findings, with what the designer sets aside for a reason marked as overridden."""
    if wish is None or wish.because is None:
        return decision.chosen.findings
    overridden = {f.rule for f in _set_aside(decision.chosen, own)}
    return tuple(replace(f, outcome="overridden") if f.rule in overridden and f.weight == "should" else f for f in decision.chosen.findings)


def unused(wish: Choose | None, candidate: Candidate) -> list[Assumption]:
    """Return the chosen settings that the decided mode has no use for, so that none is passed over in silence."""
    if wish is None:
        return []
    why = f"the loop is {named(candidate)}: it has no such setting"
    return [
        Assumption(f"choose.{name}", "not used", why)
        for name, modes in SERVES.items()
        if getattr(wish, name) is not None and candidate.mode not in modes
    ]


def _problem(read: ReadLoop, path: tuple[str, ...], code: str, text: str, hint: str) -> Diagnostic:
    spans = read.spans
    span = next((spans[path[:n]] for n in range(len(path), 0, -1) if path[:n] in spans), Span(read.file, read.line, 1))
    return Diagnostic(span, code, text, hint)

"""M2: what has an analogue input takes a continuous output."""

from specgen.core.say import Said, share
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number, word

rule = Rule(code="M2", name="An analogue input is used", weight="must")


def applies(case: Case) -> bool:
    """Ask it of elements that take a continuous signal themselves."""
    return case.traits.analogue_input


def examine(case: Case) -> Finding:
    """Refuse to drive such an element from end to end, and say where a machine runs below its lowest speed."""
    signal = word(case, "element.signal") or "a continuous signal"
    if case.candidate.mode == "analogue" and case.candidate.device == "signal":
        below, words = _below_lowest_speed(case)
        return rule.judge(holds=True, margin=None, text="The element takes {signal} and follows it." + below, signal=signal, **words)
    return rule.judge(
        holds=False,
        text="The element takes {signal}; anything else would drive it from end to end and leave its input unused.",
        signal=signal,
    )


def _below_lowest_speed(case: Case) -> tuple[str, dict[str, Said]]:
    lowest = number(case, "element.lowest_speed")
    if lowest is None:
        return "", {}
    words = {"lowest": share(lowest)}
    if isinstance(case.box, Unmodelled):
        return " Below {lowest} it stops and starts.", words
    duty = case.box.duty_low[0]
    if duty >= lowest:
        return " Its lowest duty of {duty} is not below its lowest speed of {lowest}.", {**words, "duty": share(duty)}
    said = " Its lowest duty of {duty} is below its lowest speed of {lowest}: there it stops and starts, and how often is not computed."
    return said, {**words, "duty": share(max(duty, 0.0))}

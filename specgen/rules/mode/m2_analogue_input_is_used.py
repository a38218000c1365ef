"""M2: what has an analogue input takes a continuous output."""

from specgen.core.say import share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number, word

rule = Rule(code="M2", name="An analogue input is used", weight="must")


def applies(case: Case) -> bool:
    """Ask it of elements that take a continuous signal themselves."""
    return case.traits.analogue_input


def examine(case: Case) -> Finding:
    """Refuse to drive such an element from end to end; below its lowest speed a machine stops and starts."""
    signal = word(case, "element.signal") or "a continuous signal"
    lowest = number(case, "element.lowest_speed")
    if case.candidate.mode == "analogue" and case.candidate.device == "signal":
        below = "" if lowest is None else " Below {lowest} it stops and starts."
        return rule.judge(holds=True, text="The element takes {signal} and follows it." + below, signal=signal, lowest=share(lowest or 0.0))
    return rule.judge(
        holds=False,
        text="The element takes {signal}; anything else would drive it from end to end and leave its input unused.",
        signal=signal,
    )

"""T3: what to watch at start-up tells a long cycle from too much gain."""

from specgen.core.say import seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.settled import proportioned, tuning
from specgen.sizing.candidate import Unsized

rule = Rule(code="T3", name="What to watch at start-up", weight="note")


def applies(case: Case) -> bool:
    """Ask it of proportional candidates."""
    return case.candidate.mode != "on_off"


def examine(case: Case) -> Finding:
    """Name the cause of a swing by its period."""
    values = tuning(case)
    if isinstance(values, Unsized):
        return rule.unsized(values)
    if case.candidate.mode != "time_proportioned":
        return rule.judge(
            holds=True,
            text="A swing slower than the delay of {delay} that does not die away means too much gain: widen the proportional band.",
            delay=seconds(values.effective_delay),
        )
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    return rule.judge(
        holds=True,
        text="A swing with a period of {cycle} means that the cycle is too long; a slower one that does not die away means too much gain.",
        cycle=seconds(settings.cycle_time),
    )

"""D4: the worst excursion and the measuring error stay inside the tolerance."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.deviation import deviation
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="D4", name="Inside the tolerance", weight="must")


def applies(case: Case) -> bool:
    """Ask it of on-off candidates."""
    return case.candidate.mode == "on_off"


def examine(case: Case) -> Finding:
    """Judge the true value over every declared case, with the least times enforced, each side against its own tolerance."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    found = deviation(case, settings.enforced.above.value, settings.enforced.below.value)
    if isinstance(found, Unsized):
        return rule.unsized(found)
    return rule.judge(
        holds=found.inside,
        margin=found.margin,
        text="The true value leaves the setpoint by up to {above} above and {below} below, measuring error of {error} included; "
        "{allowed_above} and {allowed_below} are allowed.",
        **found.words,
    )

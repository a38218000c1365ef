"""T4: the overshoot at start-up stays within what is allowed."""

from specgen.core.say import of_change
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.deviation import allowed_overshoot
from specgen.rules.margin import at_most, over
from specgen.rules.settled import tuning
from specgen.sizing.candidate import Unsized

rule = Rule(code="T4", name="Overshoot at start-up", weight="should")


def applies(case: Case) -> bool:
    """Ask it of proportional candidates."""
    return case.candidate.mode != "on_off"


def examine(case: Case) -> Finding:
    """Allow the declared overshoot, or the tolerance on the side that the output drives to."""
    values = tuning(case)
    if isinstance(values, Unsized):
        return rule.unsized(values)
    if values.overshoot is None:
        return rule.unanswered("The start-up was not simulated, so the overshoot is not known.")
    allowed = allowed_overshoot(case)
    return rule.judge(
        holds=at_most(values.overshoot, allowed),
        margin=over(allowed, values.overshoot),
        text="At start-up the value overshoots by {overshoot}; {allowed} is allowed.",
        overshoot=of_change(values.overshoot), allowed=of_change(allowed),
    )  # fmt: skip

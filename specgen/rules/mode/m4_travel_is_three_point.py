"""M4: what a motor drives open and closed takes a three-point output, and nothing else does."""

from specgen.core.say import seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number

rule = Rule(code="M4", name="Travel is driven three-point", weight="must")


def applies(case: Case) -> bool:
    """Ask it of elements that travel, and of every three-point candidate."""
    return case.traits.travels or case.candidate.mode == "three_point"


def examine(case: Case) -> Finding:
    """Ask for raise, lower and a neutral zone between, in which the motor stands still."""
    if not case.traits.travels:
        return rule.judge(holds=False, text="The element has no motor that could be driven open and closed.")
    travel = number(case, "element.travel_time")
    needs_time = "" if travel is None else " and needs {travel} from end to end"
    return rule.judge(
        holds=case.candidate.mode == "three_point",
        text="The element has no input" + needs_time + ": its motor is driven to raise, to lower, or not at all.",
        travel=seconds(travel or 0.0),
    )

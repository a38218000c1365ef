"""C6: where the contacts need a longer cycle than control allows, the window is shown."""

from specgen.core.say import seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(code="C6", name="The window of the cycle time", weight="note")


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates."""
    return case.candidate.mode == "time_proportioned"


def examine(case: Case) -> Finding:
    """Show the window: where it is closed, a device that wears less or a plant that swings less opens it."""
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    # what a public network asks for is no device's: C7 shows that window
    longest = max((bound for bound in settings.least_bounds if bound.rule != "C7"), key=lambda bound: bound.limit, default=None)
    shortest = min(settings.most_bounds, key=lambda bound: bound.limit, default=None)
    if longest is None or shortest is None:
        return rule.does_not_apply("Nothing bounds the cycle time on both sides.")
    fits = at_most(longest.limit, shortest.limit)
    return rule.judge(
        holds=fits,
        margin=over(shortest.limit, longest.limit),
        text="The device asks for a cycle of {least} or more ({least_rule}) and control for {most} or less ({most_rule})"
        + ("." if fits else ": no cycle serves both."),
        least=seconds(longest.limit), least_rule=longest.rule, most=seconds(shortest.limit), most_rule=shortest.rule,
    )  # fmt: skip

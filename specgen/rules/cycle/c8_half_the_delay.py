"""C8: the cycle lengthens the loop's delay by at most half."""

from specgen.core.say import seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(code="C8", name="Half the delay", weight="should")


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates without a declared sudden load, which would judge the cycle by its deviation."""
    return case.candidate.mode == "time_proportioned" and case.loop.need.sudden_load is None


def examine(case: Case) -> Finding:
    """Set what the starting values are charged for the cycle against half of the delay that the loop has without it."""
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    without = settings.tuning.delay_without_cycle
    charged = settings.tuning.effective_delay - without
    return rule.judge(
        holds=at_most(charged, without / 2),
        margin=over(without / 2, charged),
        text="A cycle of {cycle} adds {charged} to a delay of {without}, of which half is {half}.",
        cycle=seconds(settings.cycle_time), charged=seconds(charged), without=seconds(without), half=seconds(without / 2),
    )  # fmt: skip

"""C1: the ripple from switching takes no more than the house's share of the tolerance."""

from specgen.core.say import of_change, seconds, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import SEARCHED, at_most, least, over
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(code="C1", name="Ripple from switching", weight="must")


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates."""
    return case.candidate.mode == "time_proportioned"


def examine(case: Case) -> Finding:
    """Compare the steady excursion from the mean, worst over the duty range, on each side by itself."""
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    part, tolerance = float(case.panel.house.swing_share), case.loop.need.tolerance
    above, below = part * tolerance.above, part * tolerance.below
    up, down = settings.ripple.above, settings.ripple.below
    return rule.judge(
        holds=at_most(up.value, above, SEARCHED) and at_most(down.value, below, SEARCHED),
        margin=least(over(above, up.value), over(below, down.value)),
        text="A cycle of {cycle} moves the value by up to {above} above and {below} below its mean; {part} of the tolerance is "
        "{allowed_above} above and {allowed_below} below.",
        cycle=seconds(settings.cycle_time), above=of_change(up.value), below=of_change(down.value), part=share(part),
        allowed_above=of_change(above), allowed_below=of_change(below),
    )  # fmt: skip

"""I1: the measuring error takes no more than the house's share of the tolerance."""

from specgen.core.say import of_change, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.sizing.candidate import Unsized

rule = Rule(code="I1", name="Measuring error", weight="should")


def examine(case: Case) -> Finding:
    """Take sensor class, wiring and converter together, as the root of the sum of squares, against the narrower side."""
    if isinstance(case.error, Unsized):
        return rule.unsized(case.error)
    part, tolerance = float(case.panel.house.sensor_share), case.loop.need.tolerance
    allowed = part * min(tolerance.above, tolerance.below)
    return rule.judge(
        holds=at_most(case.error.root_sum, allowed),
        margin=over(allowed, case.error.root_sum),
        text="The measuring error is {error}; {part} of the tolerance is {allowed}.",
        error=of_change(case.error.root_sum), part=share(part), allowed=of_change(allowed),
    )  # fmt: skip

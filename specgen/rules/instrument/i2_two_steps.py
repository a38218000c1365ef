"""I2: the tolerance is at least two steps of the measurement."""

from specgen.core.say import of_change
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most, over

rule = Rule(code="I2", name="Two steps of the measurement", weight="must", needs=("sensor.step",))


def examine(case: Case) -> Finding:
    """Ask for nothing finer than what is seen; the narrower side counts."""
    step, tolerance = number(case, "sensor.step") or 0.0, case.loop.need.tolerance
    narrow = min(tolerance.above, tolerance.below)
    return rule.judge(
        holds=at_most(2 * step, narrow),
        margin=over(narrow, 2 * step),
        text="The tolerance of {tolerance} is set against two steps of the measurement, {steps}.",
        tolerance=of_change(narrow), steps=of_change(2 * step),
    )  # fmt: skip

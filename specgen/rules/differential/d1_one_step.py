"""D1: the differential is at least one step of the measurement."""

from specgen.core.say import of_change
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="D1", name="One step of the measurement", weight="must", needs=("sensor.step",))


def applies(case: Case) -> bool:
    """Ask it of on-off candidates."""
    return case.candidate.mode == "on_off"


def examine(case: Case) -> Finding:
    """Refuse a differential below what the controller resolves."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    step = number(case, "sensor.step") or 0.0
    return rule.judge(
        holds=at_most(step, settings.differential),
        margin=over(settings.differential, step),
        text="The differential of {differential} is set against a measurement in steps of {step}.",
        differential=of_change(settings.differential), step=of_change(step),
    )  # fmt: skip

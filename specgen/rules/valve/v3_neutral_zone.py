"""V3: the neutral zone is at least twice the effect of the shortest pulse and one step of the measurement."""

from math import isinf

from specgen.core.say import of_change, share
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most, over
from specgen.rules.settled import three_point
from specgen.sizing.candidate import Unsized

rule = Rule(code="V3", name="Neutral zone", weight="must", needs=("sensor.step",))


def applies(case: Case) -> bool:
    """Ask it of three-point candidates of what travels."""
    return case.candidate.mode == "three_point" and case.traits.travels


def examine(case: Case) -> Finding:
    """Compute the pulse's effect at the highest gain of the plant: a narrower zone makes the valve hunt."""
    settings = three_point(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    if isinstance(case.box, Unmodelled):
        return rule.unsized(case.box)
    step = number(case, "sensor.step") or 0.0
    gain = max(case.box.plant_at(point).gain for point in case.box.ends("strength", "load", "loss"))
    if isinf(gain):
        return rule.unanswered("The value does not settle, so the effect of one pulse has no end to be measured at.")
    effect = gain * settings.travel_step
    needed = max(2 * effect, step)
    return rule.judge(
        holds=at_most(needed, settings.neutral_zone),
        margin=over(settings.neutral_zone, needed),
        text="The shortest pulse moves the valve by {travel} and the value by {effect}; the neutral zone is {zone}, of {needed} needed "
        "with a measurement in steps of {step}.",
        travel=share(settings.travel_step), effect=of_change(effect), zone=of_change(settings.neutral_zone), needed=of_change(needed),
        step=of_change(step),
    )  # fmt: skip

"""C2: the starting values pay for the cycle's delay, and a sudden load stays inside the tolerance."""

from specgen.core.say import Said, of_change, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.deviation import deviation
from specgen.rules.margin import at_most
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(code="C2", name="The cycle's delay is paid for", weight="must")


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates."""
    return case.candidate.mode == "time_proportioned"


def examine(case: Case) -> Finding:
    """Make a long cycle pay: its delay must be in the starting values, and the deviation that follows must be inside the tolerance.

    A latched output delays by half a cycle at the least; only one that is compared with a ramp may be charged less.
    """
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    tuning = settings.tuning
    charged = tuning.effective_delay - tuning.delay_without_cycle
    latched = not case.panel.controllers or any(controller.pulse == "latched" for controller in case.panel.controllers)
    words: dict[str, Said] = {"charged": seconds(charged), "cycle": seconds(settings.cycle_time), "delay": seconds(tuning.effective_delay)}
    counted = "The starting values count {charged} of delay for the cycle of {cycle}, {delay} in all"
    if latched and not at_most(settings.cycle_time / 2, charged):
        return rule.judge(holds=False, margin=None, text=counted + ": less than the half cycle of a latched output.", **words)
    if not tuning.stable:
        return rule.judge(holds=False, margin=None, text=counted + "; the loop with this cycle is not stable over its duties.", **words)
    counted += "; with this cycle the loop is stable at 10 and 90 percent and over its duties"
    if case.loop.need.sudden_load is None:
        return rule.judge(holds=True, margin=None, text=counted + "; no sudden load is declared, so no deviation is judged.", **words)
    if tuning.load_deviation is None:
        return rule.unanswered("The deviation after the sudden load could not be computed.")
    found = deviation(case, tuning.load_deviation + settings.ripple.above.value, tuning.load_deviation + settings.ripple.below.value)
    if isinstance(found, Unsized):
        return rule.unsized(found)
    return rule.judge(
        holds=found.inside,
        margin=found.margin,
        text=counted + "; after the sudden load the value leaves by {load}, with ripple and measuring error up to {above} above or {below} "
        "below, of {allowed_above} and {allowed_below} allowed.",
        load=of_change(tuning.load_deviation), **words, **found.words,
    )  # fmt: skip

"""C4: the shortest on and off times are pulses the device can make."""

from specgen.core.say import seconds, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(code="C4", name="Pulses the device can make", weight="must")


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates."""
    return case.candidate.mode == "time_proportioned"


def examine(case: Case) -> Finding:
    """Look from the lowest duty, or 5 % where that is lower, to the highest, or 95 %; beyond, pulses are skipped or stretched."""
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    shortest = min(settings.shortest_on, settings.shortest_off)
    return rule.judge(
        holds=at_most(settings.least_pulse, shortest),
        margin=over(shortest, settings.least_pulse),
        text="A cycle of {cycle} is on for {on} at {low} and off for {off} at {high}; the shortest pulse the device can make is {pulse}.",
        cycle=seconds(settings.cycle_time), on=seconds(settings.shortest_on), off=seconds(settings.shortest_off),
        low=share(settings.lowest_duty), high=share(settings.highest_duty), pulse=seconds(settings.least_pulse),
    )  # fmt: skip

"""V4: pulses an hour and motor duty stay within the actuator's."""

from specgen.core.say import plain, seconds, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most, over
from specgen.rules.settled import three_point
from specgen.sizing.candidate import Unsized
from specgen.sizing.continuous import SWEEP

rule = Rule(code="V4", name="Work of the actuator", weight="should", needs=("element.starts_per_hour",))


def applies(case: Case) -> bool:
    """Ask it of three-point candidates of what travels."""
    return case.candidate.mode == "three_point" and case.traits.travels


def examine(case: Case) -> Finding:
    """Let the load sweep its declared range there and back once an hour, every step of travel by a pulse of its own.

    How often a load sweeps its range is taken (common practice, no source); the sentence says at which time the limit is reached. No
    limit of the motor's duty is declared anywhere: its share of the time is given to be held against the data sheet.
    """
    settings = three_point(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    pulses, motor = settings.pulses_per_hour, settings.motor_share
    if pulses is None or motor is None:
        return rule.unanswered("The pulses of the actuator were not computed.")
    allowed = number(case, "element.starts_per_hour") or 0.0
    reached = SWEEP * pulses / allowed if allowed > 0 else 0.0
    return rule.judge(
        holds=at_most(pulses, allowed),
        margin=over(allowed, pulses),
        text="Where the load sweeps its declared range there and back in {sweep} the actuator makes up to {pulses} pulses an hour, of "
        "{allowed} allowed; a sweep in {reached} would take them all. Its motor then runs {motor} of the time.",
        sweep=seconds(SWEEP), pulses=plain(pulses), allowed=plain(allowed), reached=seconds(reached), motor=share(motor),
    )  # fmt: skip

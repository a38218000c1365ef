"""D2: the differential is at least twice the measurement noise."""

from specgen.core.say import of_change
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="D2", name="Twice the noise", weight="should", needs=("sensor.noise",))


def applies(case: Case) -> bool:
    """Ask it of on-off candidates."""
    return case.candidate.mode == "on_off"


def examine(case: Case) -> Finding:
    """Keep clear of the noise: as wide as the differential, it makes the contact chatter."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    noise = number(case, "sensor.noise") or 0.0
    return rule.judge(
        holds=at_most(2 * noise, settings.differential),
        margin=over(settings.differential, 2 * noise),
        text="The differential of {differential} is set against twice the noise of {noise}, {twice}.",
        differential=of_change(settings.differential), noise=of_change(noise), twice=of_change(2 * noise),
    )  # fmt: skip

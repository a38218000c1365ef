"""M10: the output's share at both ends is known, and where the loop rests."""

from specgen.core.say import share
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding, Rule

rule = Rule(code="M10", name="Duty at both ends", weight="note")

LOWEST, HIGHEST = 0.05, 0.90  # below and above these little room is left to control with


def examine(case: Case) -> Finding:
    """Name the cases at both ends; one that needs no output is left out of period, duty and ripple."""
    box = case.box
    if isinstance(box, Unmodelled):
        return rule.unsized(box)
    (low, mildest), (high, hardest) = box.duty_low, box.duty_high
    rests = "; where none is needed the loop rests, and such cases are left out of period, duty and ripple" if box.rests else ""
    return rule.judge(
        holds=low >= LOWEST and high <= HIGHEST,
        text="The setpoint takes between {low} ({mildest}) and {high} ({hardest}) of full output" + rests + ".",
        low=share(max(low, 0.0)), mildest=box.text(mildest), high=share(high), hardest=box.text(hardest),
    )  # fmt: skip

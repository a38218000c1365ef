"""M6: steady control is proportional; relaxed control is on-off where on-off fits."""

from specgen.core.say import of_change
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import OnOffSettings

rule = Rule(code="M6", name="Steady or relaxed", weight="should")


def applies(case: Case) -> bool:
    """Ask it where the mode is free: not of what is switched whole, and under relaxed not of what must be throttled."""
    traits = case.traits
    if traits.starts_limited or traits.runs_whole:
        return False
    throttled = traits.analogue_input or traits.travels or traits.not_burst_fired
    return case.loop.need.stability == "steady" or not throttled


def examine(case: Case) -> Finding:
    """Take on-off, which needs no tuning, where its swing is accepted and fits; else proportional control with starting values."""
    switched = case.candidate.mode == "on_off"
    if case.loop.need.stability == "steady":
        return rule.judge(
            holds=not switched,
            text="Steady control is asked for (need.stability), and on-off never stops swinging."
            if switched
            else "Steady control is asked for (need.stability), and a proportional output can settle.",
        )
    on_off = case.settings if switched else case.on_off
    if isinstance(on_off, Unsized):
        return rule.unsized(on_off)
    if not isinstance(on_off, OnOffSettings):
        return rule.does_not_apply()
    fits = at_most(on_off.least, on_off.most)
    words = {"least": of_change(on_off.least), "most": of_change(on_off.most)}
    if not fits:
        return rule.judge(
            holds=not switched,
            margin=over(on_off.most, on_off.least) if switched else over(on_off.least, on_off.most),
            text="A swing is accepted (need.stability), but on-off needs a differential of {least} and the tolerance allows {most}.",
            **words,
        )
    return rule.judge(
        holds=switched,
        margin=over(on_off.most, on_off.least) if switched else over(on_off.least, on_off.most),
        text="A swing is accepted (need.stability), and on-off fits: a differential of {least} is enough and the tolerance allows {most}.",
        **words,
    )

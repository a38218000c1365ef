"""T2: peak sensitivity is at most 2 and the gain margin at least 2 in the worst case."""

from specgen.core.say import Said, plain
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, least, over
from specgen.rules.settled import tuning
from specgen.sizing.candidate import Unsized

rule = Rule(code="T2", name="Stability margins", weight="must")

HIGHEST_SENSITIVITY, LEAST_GAIN_MARGIN = 2.0, 2.0


def applies(case: Case) -> bool:
    """Ask it of proportional candidates."""
    return case.candidate.mode != "on_off"


def examine(case: Case) -> Finding:
    """Judge the worst of all cases, the delay that the cycle adds included."""
    values = tuning(case)
    if isinstance(values, Unsized):
        return rule.unsized(values)
    sensitivity, gain = values.peak_sensitivity, values.gain_margin
    words: dict[str, Said] = {"sensitivity": plain(sensitivity), "gain": plain(gain), "two": plain(HIGHEST_SENSITIVITY)}
    return rule.judge(
        holds=at_most(sensitivity, HIGHEST_SENSITIVITY) and at_most(LEAST_GAIN_MARGIN, gain),
        # a sensitivity of 1 is no loop at all: its distance from 1 is what the limit is about
        margin=least(over(HIGHEST_SENSITIVITY - 1, sensitivity - 1), over(gain, LEAST_GAIN_MARGIN)),
        text="The peak sensitivity is {sensitivity}, at most {two}; the gain margin {gain}, at least {two}.",
        **words,
    )

"""E3: the incoming demand is within the incomer."""

from specgen.core.say import amperes
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.panel_case import PanelCase
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import NotFed

rule = Rule(code="E3", name="Incomer", weight="must", scope="panel")


def examine(case: PanelCase) -> Finding:
    """Hold what the incomer has to carry against its rating; a loop whose current is not known leaves it open."""
    unknown = [loop for loop in case.fed if isinstance(loop.feeder, Unsized) and not isinstance(loop.feeder, NotFed)]
    carries = amperes(case.carries)
    if isinstance(case.incomer, Unsized):
        return rule.judge(holds=False, text="The incomer has to carry {carries}: {because}.", carries=carries, because=case.incomer.because)
    which = "declared" if case.declared else "chosen"
    within = at_most(case.carries, case.incomer)
    if within and unknown:
        needs = tuple(f"{loop.tag}: {field}" for loop in unknown if isinstance(loop.feeder, Unsized) for field in loop.feeder.needs)
        text = "The incomer has to carry {carries} and what these loops take, which is not known: {which}."
        return rule.unanswered(text, needs, carries=carries, which=", ".join(loop.tag for loop in unknown))
    return rule.judge(
        holds=within,
        margin=over(case.incomer, case.carries),
        text="The {which} incomer of {rating} has to carry {carries}.",
        which=which, rating=amperes(case.incomer), carries=carries,
    )  # fmt: skip

"""M5: where on-off would leave the tolerance, proportional control is used."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.deviation import deviation
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import OnOffSettings

rule = Rule(code="M5", name="Proportional where on-off leaves the tolerance", weight="should")


def applies(case: Case) -> bool:
    """Ask it of everything but what is switched whole: there the tolerance is judged by the differential."""
    return not (case.traits.starts_limited or case.traits.runs_whole)


def examine(case: Case) -> Finding:
    """Look at the worst excursion of on-off, measuring error included, on both sides."""
    switched = case.candidate.mode == "on_off"
    on_off = case.settings if switched else case.on_off
    if isinstance(on_off, Unsized) and switched:
        return rule.unsized(on_off)
    if not isinstance(on_off, OnOffSettings):
        return rule.judge(holds=True, text="The output is proportional; what on-off would do was not computed.")
    found = deviation(case, on_off.enforced.above.value, on_off.enforced.below.value)
    if isinstance(found, Unsized):
        return rule.unsized(found)
    sentence = (
        "On-off would reach {above} above and {below} below the setpoint, measuring error of {error} included, {against} the tolerance of "
        "{allowed_above} above and {allowed_below} below{so}."
    )
    so = "" if switched else ("; proportional control is not needed for that" if found.inside else ": proportional control is used")
    return rule.judge(
        holds=found.inside or not switched,
        margin=found.margin if switched else None,
        text=sentence,
        against="inside" if found.inside else "beyond", so=so, **found.words,
    )  # fmt: skip

"""D5: every contact in the chain lasts the house's contact life."""

from specgen.core.say import plain, years
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(
    code="D5",
    name="Contact life",
    weight="should",
    cites=("ISO 13849-1:2015, C.4.2 (number of operations)", "common practice, no source"),
)


def applies(case: Case) -> bool:
    """Ask it of on-off candidates."""
    return case.candidate.mode == "on_off"


def examine(case: Case) -> Finding:
    """Name the weakest of the controller's relay, an interposing relay, the contactor and a solenoid: all operate at every switching."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    operations = plain(settings.operations_per_year)
    if settings.contact_life is None:
        return rule.judge(holds=True, text="Nothing in the chain wears at {operations} operations a year.", operations=operations)
    wanted = case.panel.house.contact_life_years
    return rule.judge(
        holds=at_most(wanted, settings.contact_life),
        margin=over(settings.contact_life, wanted),
        text="At {operations} operations a year the weakest contact, {weakest}, lasts {life}; {wanted} are asked for.",
        operations=operations, weakest=settings.weakest, life=years(settings.contact_life), wanted=years(wanted),
    )  # fmt: skip

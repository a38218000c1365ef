"""C3: every contact in the chain lasts the house's contact life at this cycle time."""

from specgen.core.say import plain, seconds, years
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(
    code="C3",
    name="Contact life",
    weight="should",
    cites=("ISO 13849-1:2015, C.4.2 (number of operations)", "common practice, no source"),
)


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates."""
    return case.candidate.mode == "time_proportioned"


def examine(case: Case) -> Finding:
    """Count one operation of every contact a cycle: life falls with the cycle, so the least cycle time follows in proportion."""
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    operations, cycle = plain(settings.operations_per_year), seconds(settings.cycle_time)
    if settings.contact_life is None:
        return rule.judge(
            holds=True,
            text="Nothing in the chain wears at {operations} operations a year, one in each cycle of {cycle}.",
            operations=operations, cycle=cycle,
        )  # fmt: skip
    wanted = case.panel.house.contact_life_years
    enough = settings.cycle_time * wanted / settings.contact_life
    return rule.judge(
        holds=at_most(wanted, settings.contact_life),
        margin=over(settings.contact_life, wanted),
        text="At {operations} operations a year, one in each cycle of {cycle}, the weakest contact, {weakest}, lasts {life}; for {wanted} "
        "the cycle is at least {enough}.",
        operations=operations, cycle=cycle, weakest=settings.weakest, life=years(settings.contact_life), wanted=years(wanted),
        enough=seconds(enough),
    )  # fmt: skip

"""C5: contacts take the longest cycle allowed, solid state the shortest."""

from specgen.core.say import seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most
from specgen.rules.settled import proportioned
from specgen.sizing.candidate import Unsized

rule = Rule(code="C5", name="Longest for contacts, shortest for solid state", weight="should")


def applies(case: Case) -> bool:
    """Ask it of time-proportioned candidates."""
    return case.candidate.mode == "time_proportioned"


def examine(case: Case) -> Finding:
    """Spare a contact by a long cycle and let a solid-state switch, which wears none, cycle fast; both on the house's series."""
    settings = proportioned(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    series = [float(time) for time in case.panel.house.cycle_time_series]
    wears = settings.contact_life is not None
    allowed = [t for t in series if (at_most(t, settings.most) if wears else at_most(settings.least, t))]
    if not allowed:
        return rule.judge(
            holds=False,
            text="No cycle of the house's series, {first} to {last}, "
            + ("is as short as the {most} that control allows." if wears else "is as long as the {least} that is asked for."),
            first=seconds(series[0]), last=seconds(series[-1]), most=seconds(settings.most), least=seconds(settings.least),
        )  # fmt: skip
    right = max(allowed) if wears else min(allowed)
    same = at_most(settings.cycle_time, right) and at_most(right, settings.cycle_time)
    text = (
        "Contacts take the longest cycle of the house's series within the {most} that control allows: {right}"
        if wears
        else "Solid state takes the shortest cycle of the house's series from the {least} that is asked for: {right}"
    )
    return rule.judge(
        holds=same, text=text + ("." if same else "; {cycle} is set."),
        most=seconds(settings.most), least=seconds(settings.least), right=seconds(right), cycle=seconds(settings.cycle_time),
    )  # fmt: skip

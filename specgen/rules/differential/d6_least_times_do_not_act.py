"""D6: the least times do not act in settled running."""

from specgen.core.say import Said, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import SEARCHED, at_most, least, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="D6", name="Least times do not act", weight="should")


def applies(case: Case) -> bool:
    """Ask it of on-off candidates whose element has a least run or a least rest."""
    times = (number(case, "element.min_run"), number(case, "element.min_rest"))
    return case.candidate.mode == "on_off" and any(time is not None for time in times)


def examine(case: Case) -> Finding:
    """Judge without timers: a timer that acts holds the output against the value and widens the swing."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    sides = (
        ("on", settings.natural.shortest_on, number(case, "element.min_run")),
        ("off", settings.natural.shortest_off, number(case, "element.min_rest")),
    )
    asked = [(name, worst, limit) for name, worst, limit in sides if limit is not None]
    words: dict[str, Said | str] = {}
    parts = []
    for name, worst, limit in asked:
        parts.append(f"{name} for {{{name}}} at the shortest ({{{name}_case}}), of a least {{{name}_limit}}")
        words |= {name: seconds(worst.value), f"{name}_case": worst.text, f"{name}_limit": seconds(limit)}
    return rule.judge(
        holds=all(at_most(limit, worst.value, SEARCHED) for _, worst, limit in asked),
        margin=least(*(over(worst.value, limit) for _, worst, limit in asked)),
        text="Left to itself the output is " + "; ".join(parts) + ".",
        **words,
    )

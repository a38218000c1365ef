"""D3: starts per hour, least run and least rest hold over the whole declared range."""

from specgen.core.say import Said, per_hour, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import SEARCHED, at_most, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="D3", name="Starts, run and rest", weight="must")

FIELDS = ("element.starts_per_hour", "element.min_run", "element.min_rest")


def applies(case: Case) -> bool:
    """Ask it of on-off candidates whose element has any of the three limits."""
    return case.candidate.mode == "on_off" and any(number(case, field) is not None for field in FIELDS)


def examine(case: Case) -> Finding:
    """Count the starts where switching is fastest, near half output, and not at the ends of the range only; least times are enforced."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    allowed, run, rest = (number(case, field) for field in FIELDS)
    worst = settings.enforced.starts_per_hour
    words: dict[str, Said | str] = {"starts": per_hour(worst.value), "case": worst.text}
    times = []
    for name, what, value in (("run", "least run", run), ("rest", "least rest", rest)):
        if value is not None:
            times.append(f"{what} of {{{name}}}")
            words[name] = seconds(value)
    kept = f", with its {' and '.join(times)} enforced" if times else ""
    if allowed is None:
        return rule.judge(holds=True, margin=None, text="It starts up to {starts}" + kept + " ({case}).", **words)
    return rule.judge(
        holds=at_most(worst.value, allowed, SEARCHED),
        margin=over(allowed, worst.value),
        text="It starts up to {starts}" + kept + " ({case}); {allowed} is allowed.",
        allowed=per_hour(allowed),
        **words,
    )

"""M11: two stages take two switch points."""

from specgen.core.say import Said, of_change, of_value, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="M11", name="Two stages, two switch points", weight="must", needs=("element.second_stage_offset",))


def applies(case: Case) -> bool:
    """Ask it of elements with a second stage, switched on-off."""
    return case.traits.staged and case.candidate.mode == "on_off"


def examine(case: Case) -> Finding:
    """Call the second stage further out than the first, and before the value, as it is measured, leaves the tolerance."""
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    if isinstance(case.error, Unsized):
        return rule.unsized(case.error)
    offset = number(case, "element.second_stage_offset") or 0.0
    need = case.loop.need
    sense = -1.0 if case.loop.raises else 1.0
    called = abs(settings.switch_on + sense * offset - float(need.setpoint)) + case.error.root_sum
    allowed = float(need.tolerance.below if case.loop.raises else need.tolerance.above)
    words: dict[str, Said] = {
        "first_on": of_value(settings.switch_on), "first_off": of_value(settings.switch_off),
        "second_on": of_value(settings.switch_on + sense * offset), "second_off": of_value(settings.switch_off + sense * offset),
        "called": of_change(called), "allowed": of_change(allowed),
    }  # fmt: skip
    times = []
    for name, what in (("min_run", "least run"), ("min_rest", "least rest")):
        value = number(case, f"element.{name}")
        if value is not None:
            times.append(f"{what} of {{{name}}}")
            words[name] = seconds(value)
    kept = f" Each stage keeps a {' and a '.join(times)}." if times else ""
    return rule.judge(
        holds=at_most(called, allowed),
        margin=over(allowed, called),
        text="The first stage switches at {first_on} and {first_off}, the second at {second_on} and {second_off}: called {called} from the "
        "setpoint with the measuring error, of {allowed} allowed." + kept,
        **words,
    )

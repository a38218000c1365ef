"""M7: what is started and stopped whole is switched on-off, never time-proportioned."""

from specgen.core.say import Said, per_hour, seconds, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import longest_asked, number
from specgen.sizing.settings import ProportionedSettings

rule = Rule(code="M7", name="What runs whole is switched", weight="must")

LOW = 0.05


def applies(case: Case) -> bool:
    """Ask it of motors direct on line and of burners of one or two stages."""
    return case.traits.runs_whole and not case.traits.starts_limited


def examine(case: Case) -> Finding:
    """Leave starts, least run and least rest to the differential, and a burner's own sequence to its certified control."""
    starts = number(case, "element.starts_per_hour")
    if case.candidate.mode != "on_off":
        return _pulsed(case, starts)
    if starts is None:
        return rule.unanswered("How often it may start is not declared (element.starts_per_hour).", ("element.starts_per_hour",))
    parts, words = ["to starting at most {starts}"], {"starts": per_hour(starts)}
    for name, what in (("min_run", "to a least run of"), ("min_rest", "to a least rest of")):
        value = number(case, f"element.{name}")
        if value is not None:
            parts.append(f"{what} {{{name}}}")
            words[name] = seconds(value)
    own = "; its own sequence belongs to its certified burner control, and the loop only asks for heat" if case.traits.burner else ""
    return rule.judge(holds=True, margin=None, text="It is switched on-off and keeps " + ", ".join(parts) + own + ".", **words)


def _pulsed(case: Case, starts: float | None) -> Finding:
    if case.candidate.mode != "time_proportioned":
        return rule.judge(holds=False, text="It starts and stops whole and follows no such output.")
    settings = case.settings
    cycle = settings.cycle_time if isinstance(settings, ProportionedSettings) else longest_asked(case)
    words: dict[str, Said] = {"cycle": seconds(cycle), "rate": per_hour(3600 / cycle), "pulse": seconds(LOW * cycle), "low": share(LOW)}
    text = "A {cycle} cycle would start it {rate} and run it for {pulse} at {low}"
    if starts is not None:
        text += ", where {starts} is allowed"
        words["starts"] = per_hour(starts)
    margin = None if starts is None or starts * cycle >= 3600 else starts * cycle / 3600  # noqa: PLR2004  seconds in an hour
    return rule.judge(holds=False, margin=margin, text=text + ": it is started and stopped whole.", **words)

"""M12: pump-down switches the liquid line, and defrosts count as starts."""

from specgen.core.say import Said, per_hour
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import field, number
from specgen.rules.margin import SEARCHED, at_most, over
from specgen.rules.settled import on_off
from specgen.sizing.candidate import Unsized

rule = Rule(code="M12", name="Pump-down and defrost", weight="must")

HOURS_A_DAY = 24
PUMP_DOWN = "The loop switches the solenoid of the liquid line, and the low-pressure switch starts and stops the machine."


def applies(case: Case) -> bool:
    """Ask it of machines with pump-down or defrosts, switched on-off."""
    declared = field(case, "element.pump_down") is True or field(case, "element.defrost") is not None
    return case.traits.starts_limited and case.candidate.mode == "on_off" and declared


def examine(case: Case) -> Finding:
    """Add the day's defrosts, spread over its hours, to the starts from control: each has a start of its own."""
    pumped = field(case, "element.pump_down") is True
    per_day = number(case, "element.defrost.per_day")
    if per_day is None:
        return rule.judge(holds=True, text=PUMP_DOWN)
    settings = on_off(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    allowed = number(case, "element.starts_per_hour") or 0.0
    defrosts = per_day / HOURS_A_DAY
    starts = settings.enforced.starts_per_hour.value + defrosts
    words: dict[str, Said] = {
        "running": per_hour(settings.enforced.starts_per_hour.value),
        "defrosts": per_hour(defrosts),
        "starts": per_hour(starts),
        "allowed": per_hour(allowed),
    }
    return rule.judge(
        holds=at_most(starts, allowed, SEARCHED),
        margin=over(allowed, starts),
        text=(PUMP_DOWN + " " if pumped else "")
        + "Control starts it up to {running} and defrosts add {defrosts}: {starts}, of {allowed} allowed.",
        **words,
    )

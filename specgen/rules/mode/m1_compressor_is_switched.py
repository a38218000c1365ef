"""M1: a fixed-speed compressor is switched on-off, never time-proportioned."""

from specgen.core.say import per_hour, seconds, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import longest_asked, number
from specgen.sizing.settings import ProportionedSettings

rule = Rule(
    code="M1",
    name="A fixed-speed compressor is switched",
    weight="must",
    needs=("element.min_run", "element.min_rest", "element.starts_per_hour"),
)

LOW, HIGH = 0.05, 0.95  # output at which a proportioned cycle is looked at


def applies(case: Case) -> bool:
    """Ask it of machines whose starts, least run and least rest are limited."""
    return case.traits.starts_limited


def examine(case: Case) -> Finding:
    """Show the cycle that would keep its least run at 5 % output and its least rest at 95 %: far longer than control allows."""
    run, rest = number(case, "element.min_run") or 0.0, number(case, "element.min_rest") or 0.0
    starts = number(case, "element.starts_per_hour") or 0.0
    interval = 3600 / starts if starts > 0 else 0.0
    settings = case.settings
    cycle = settings.cycle_time if isinstance(settings, ProportionedSettings) else longest_asked(case)
    pulse, least_cycle = LOW * cycle, max(run / LOW, rest / (1 - HIGH), interval)
    needed = "; the cycle would have to be {least_cycle}."
    if pulse < run:
        said = "{pulse} on at {low} of a {cycle} cycle is shorter than the least run of {run}" + needed
    elif pulse < rest:
        said = "{pulse} off at {high} of a {cycle} cycle is shorter than the least rest of {rest}" + needed
    elif cycle < interval:
        said = "One start in each {cycle} cycle is more often than {starts}" + needed
    else:
        said = "Only a cycle of {least_cycle} or more keeps its least run and rest, and for that long every correction would wait."
    switched = case.candidate.mode == "on_off"
    return rule.judge(
        holds=switched,
        margin=None if switched or cycle >= least_cycle else cycle / least_cycle,
        text=said if case.candidate.mode in ("on_off", "time_proportioned") else "A machine of one speed follows no such output. " + said,
        pulse=seconds(pulse), low=share(LOW), high=share(HIGH), cycle=seconds(cycle), run=seconds(run), rest=seconds(rest),
        starts=per_hour(starts), least_cycle=seconds(least_cycle),
    )  # fmt: skip

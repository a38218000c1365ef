"""S2: the time to danger and to spoiling is known."""

from specgen.core.say import Said, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Stuck

rule = Rule(code="S2", name="Time to danger and to spoiling", weight="note")


def applies(case: Case) -> bool:
    """Ask it where a danger or a product limit is declared."""
    limits = case.loop.limits
    return any(limit is not None for limit in (limits.danger_high, limits.danger_low, limits.spoils_high, limits.spoils_low))


def examine(case: Case) -> Finding:
    """Count from the worst peak of normal running, with the element already hot, in the earliest case."""
    if isinstance(case.faults, Unsized):
        return rule.unsized(case.faults)
    parts: list[str] = []
    words: dict[str, Said] = {}
    for state, stuck in (("on", case.faults.on), ("off", case.faults.off)):
        reached = {"danger": (stuck.passes, stuck.time_to_danger), "spoiling": (_spoils(case, stuck), stuck.time_to_spoil)}
        for what, (reaches, time) in reached.items():
            if time is not None:
                parts.append(f"stuck {state} it takes {{{state}_{what}}} to {what}")
                words[f"{state}_{what}"] = seconds(time)
            elif reaches:
                return rule.unanswered(f"Stuck {state} the value goes on to {what}; how soon was not computed.")
    if not parts:
        return rule.judge(holds=True, text="Stuck on or off, the value reaches no declared limit.")
    text = "; ".join(parts)
    return rule.judge(holds=True, margin=None, text=text[0].upper() + text[1:] + ".", **words)


def _spoils(case: Case, stuck: Stuck) -> bool:
    limits, end = case.loop.limits, stuck.settles_at
    if end is None:
        return limits.spoils_high is not None or limits.spoils_low is not None
    past_high = limits.spoils_high is not None and end >= limits.spoils_high
    return past_high or (limits.spoils_low is not None and end <= limits.spoils_low)

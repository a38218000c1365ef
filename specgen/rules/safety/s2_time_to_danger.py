"""S2: the time to danger and to spoiling is known."""

from specgen.core.say import Said, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import Unsized

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
        for what, time in (("danger", stuck.time_to_danger), ("spoiling", stuck.time_to_spoil)):
            if time is not None:
                parts.append(f"stuck {state} it takes {{{state}_{what}}} to {what}")
                words[f"{state}_{what}"] = seconds(time)
    if not parts:
        return rule.judge(holds=True, text="Stuck on or off, the value reaches no declared limit.")
    text = "; ".join(parts)
    return rule.judge(holds=True, margin=None, text=text[0].upper() + text[1:] + ".", **words)

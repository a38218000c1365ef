"""T1: starting values come from a published rule, the cycle's delay included."""

from specgen.core.say import Said, of_change, seconds
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.settled import tuning
from specgen.sizing.candidate import Unsized

rule = Rule(code="T1", name="Starting values", weight="note", cites=("S. Skogestad, J. Process Control 13 (2003) 291-309",))


def applies(case: Case) -> bool:
    """Ask it of proportional candidates."""
    return case.candidate.mode != "on_off"


def examine(case: Case) -> Finding:
    """State where to start, in the ideal form; the plant itself has the last word."""
    values = tuning(case)
    if isinstance(values, Unsized):
        return rule.unsized(values)
    words: dict[str, Said] = {
        "band": of_change(values.proportional_band), "integral": seconds(values.integral_time), "delay": seconds(values.effective_delay)
    }  # fmt: skip
    derivative = ""
    if values.derivative_time > 0:
        derivative, words["derivative"] = ", a derivative time of {derivative}", seconds(values.derivative_time)
    added = values.effective_delay - values.delay_without_cycle
    cycle = ""
    if added > 0:
        cycle, words["added"] = ", {added} of it for the cycle", seconds(added)
    text = "Start with a proportional band of {band}, an integral time of {integral}"
    return rule.judge(holds=True, margin=None, text=text + derivative + ", for a delay of {delay}" + cycle + ".", **words)

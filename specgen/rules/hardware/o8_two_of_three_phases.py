"""O8: a three-phase load switched in two phases has an isolation contactor and a warning."""

from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import Unsized

rule = Rule(code="O8", name="Two of three phases", weight="must")

PHASES = 3


def applies(case: Case) -> bool:
    """Ask it of devices that leave a line of a three-phase load closed."""
    return not isinstance(case.device, Unsized) and case.device.lines == PHASES and 0 < case.device.poles < PHASES


def examine(case: Case) -> Finding:
    """Ask for a contactor that opens every line upstream, and say on the sheet that the load stays live."""
    if isinstance(case.device, Unsized):
        return rule.does_not_apply()
    live = "The load stays live in one line while its output is off"
    if not case.device.isolator:
        return rule.judge(holds=False, text=live + ", and no contactor is listed that could open every line.")
    text = live + "; {isolator} opens every line upstream. Warning at the load: live although off."
    return rule.judge(holds=True, text=text, isolator=case.device.isolator)

"""V2: the lowest controllable flow is below the lowest duty's."""

from specgen.core.say import share
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.declared import number
from specgen.rules.margin import at_most
from specgen.rules.settled import continuous
from specgen.sizing.candidate import Unsized
from specgen.sizing.valve_sizing import RANGEABILITY

rule = Rule(code="V2", name="Lowest flow", weight="should", cites=("IEC 60534-2-4 (rangeability)", "common practice, no source"))


def applies(case: Case) -> bool:
    """Ask it of a valve with an input; of a motor-driven one neither size nor characteristic is declared."""
    return case.traits.valve and case.traits.analogue_input and case.candidate.mode == "analogue"


def examine(case: Case) -> Finding:
    """Compare the flow at the bottom of the trim's range, in its pipes, with the least that is needed.

    Below it the valve opens and shuts in turn. What leaks through a shut seat is far below the bottom of the trim's range (by the
    leakage class of the data sheet) and is not counted.
    """
    settings = continuous(case)
    if isinstance(settings, Unsized):
        return rule.unsized(settings)
    if isinstance(case.box, Unmodelled):
        return rule.unsized(case.box)
    valve = settings.valve
    if valve is None or valve.lowest_flow is None:
        points = valve.open_points if valve is not None else ()
        needs = tuple(path for point in points for path in point.needs if path == "element.characteristic")
        return rule.unanswered("The least flow that the valve controls is not known.", needs)
    duty = max(case.box.duty_low[0], 0.0)
    piped = "" if valve.is_installed else ", the pipes not counted"
    if number(case, "element.rangeability") is None:
        piped += f", at the usual rangeability of {RANGEABILITY:g}"
    text = "The valve controls no less than {lowest} of its full flow" + piped
    if duty == 0:
        text += "; the mildest case needs none, and on the way there the valve opens and shuts in turn."
    else:
        text += "; the lowest duty needs {duty}."
    return rule.judge(holds=at_most(valve.lowest_flow, duty), margin=duty / valve.lowest_flow, text=text, lowest=share(valve.lowest_flow),
                      duty=share(duty))  # fmt: skip

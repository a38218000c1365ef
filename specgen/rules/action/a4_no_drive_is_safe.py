"""A4: no drive is the safe state."""

from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazard import GOES, POSITION_OF, lost_positions

rule = Rule(code="A4", name="No drive is safe", weight="should", needs=("limits.on_sensor_fault",))

SAID = {"full": "full output", "hold": "the last output"}


def examine(case: Case) -> Finding:
    """At 0 % the element acts least, whatever the signal; where the safe state is another, it must be what the element does undriven.

    So the safe state need not be the closed one: a cooling valve whose signal is reversed opens without drive.
    """
    fault = case.loop.limits.on_sensor_fault or "off"
    if fault == "off":
        return rule.judge(holds=True, text="The safe state is no output, which is what 0 percent drives.")
    if not case.traits.valve:
        return rule.judge(holds=False, text="The safe state is {safe}, and without drive the element is off.", safe=SAID[fault])
    positions = lost_positions(case)
    missing = tuple(field for field, position in positions.items() if position is None)
    if missing:
        return rule.unanswered("Where the valve goes without drive is not declared: {fields}.", missing, fields=" and ".join(missing))
    elsewhere = [GOES[position] for position in positions.values() if position is not None and position != POSITION_OF[fault]]
    return rule.judge(
        holds=not elsewhere,
        text="The safe state is {safe}, and without drive the valve {does}.",
        safe=SAID[fault], does=elsewhere[0] if elsewhere else GOES[POSITION_OF[fault]],
    )  # fmt: skip

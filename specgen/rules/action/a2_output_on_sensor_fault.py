"""A2: the output on sensor fault is declared, and a heating element does not stay on without reason and limit."""

from specgen.core.say import of_value
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazard import heating
from specgen.sizing.candidate import Unsized

rule = Rule(code="A2", name="Output on sensor fault", weight="must", needs=("limits.on_sensor_fault",))

SAID = {"off": "goes off", "full": "goes to full", "hold": "stays where it was"}


def examine(case: Case) -> Finding:
    """Let a heating element stay on only with a written reason, and only where staying on is harmless or a limiter ends it."""
    limits = case.loop.limits
    state = SAID[limits.on_sensor_fault or "off"]
    if limits.on_sensor_fault == "off" or not heating(case):
        return rule.judge(holds=True, text="When the measurement is lost the output {state}.", state=state)
    if limits.on_sensor_fault_because is None:
        return rule.judge(
            holds=False,
            text="When the measurement is lost the heat {state}, and no reason is given (limits.on_sensor_fault_because).",
            state=state,
        )
    because = limits.on_sensor_fault_because
    if limits.limiter is not None:
        return rule.judge(
            holds=True,
            text="When the measurement is lost the heat {state}, for the reason given: {because}; the limiter at {set} ends it.",
            state=state, because=because, set=of_value(limits.limiter.set),
        )  # fmt: skip
    if limits.danger_high is None:
        return rule.unanswered(
            "When the measurement is lost the heat {state}; without limits.danger_high nothing says whether that is harmless.",
            ("limits.danger_high",), state=state,
        )  # fmt: skip
    if isinstance(case.faults, Unsized):
        return rule.unsized(case.faults)
    passes = case.faults.on.passes
    return rule.judge(
        holds=not passes,
        text="When the measurement is lost the heat {state}; staying on passes a danger (danger_high is {danger}), no limiter is declared."
        if passes
        else "When the measurement is lost the heat {state}, for the reason given: {because}; staying on stays short of {danger}.",
        state=state, because=because, danger=of_value(limits.danger_high),
    )  # fmt: skip

"""M8: loads that must not be switched whole take a power controller."""

from specgen.rules.base import Case, Finding, Rule

rule = Rule(code="M8", name="Loads that must not be switched whole", weight="must")


def applies(case: Case) -> bool:
    """Ask it of loads whose inrush or ageing resistance forbids whole pulses."""
    return case.traits.not_burst_fired


def examine(case: Case) -> Finding:
    """Keep the inrush within what load and device stand, by phase angle, soft start or a current limit."""
    throttled = case.candidate.mode == "analogue" and case.candidate.device == "power_controller"
    return rule.judge(
        holds=throttled,
        text="The load is throttled by a power controller with phase angle, soft start or current limit."
        if throttled
        else "Switched whole, the load takes its inrush at every pulse; it needs phase angle, soft start or a current limit.",
    )

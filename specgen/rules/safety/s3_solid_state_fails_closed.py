"""S3: a solid-state output is taken to fail closed."""

from specgen.core.say import Said, of_value
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.hazard import heating
from specgen.sizing.candidate import Unsized

rule = Rule(code="S3", name="Solid state fails closed", weight="must")


def applies(case: Case) -> bool:
    """Ask it of candidates whose output is switched or throttled by semiconductors."""
    return case.candidate.device in ("ssr", "power_controller")


def examine(case: Case) -> Finding:
    """Hold where the failed-closed state was followed to its end: nothing independent is waived because this device 'will open'.

    A sensor out of its medium, or a reading that is frozen on the far side of the setpoint, drives the output the same way.
    """
    danger = case.loop.limits.danger_high if case.loop.raises else case.loop.limits.danger_low
    if isinstance(case.faults, Unsized):
        return rule.unsized(case.faults)
    if heating(case) and case.loop.limits.danger_high is None:
        return rule.unanswered(
            "The device fails closed as a rule; without limits.danger_high nothing says whether that is harmless.", ("limits.danger_high",)
        )
    stuck, words = case.faults.on, dict[str, Said]()
    goes = "runs on without settling"
    if stuck.settles_at is not None:
        goes, words["end"] = "settles at {end}", of_value(stuck.settles_at)
    against = ""
    if danger is not None:
        against = f", {'past' if stuck.passes else 'short of'} the danger at {{danger}}"
        words["danger"] = of_value(danger)
    also = "A sensor out of its medium or a frozen reading can drive it there too."
    return rule.judge(holds=True, margin=None, text=f"The device fails closed as a rule: then the value {goes}{against}. {also}", **words)

"""S4: after loss and return of supply nothing starts that can hurt."""

from specgen.rules.base import Case, Finding, Rule

rule = Rule(code="S4", name="Return of supply", weight="must", cites=("IEC 60204-1, 7.5 (from memory)",))

SAID = {"resume": "resumes by itself", "off": "stays off until somebody starts it"}


def examine(case: Case) -> Finding:
    """Count the loop's own declaration before the house's; without either, only what cannot hurt may be taken to resume."""
    own, house = case.loop.limits.after_power_return, case.panel.house.after_power_return
    if own is not None:
        return rule.judge(holds=True, text="After the return of supply the loop {does}, as declared.", does=SAID[own])
    if house is not None:
        return rule.judge(holds=True, text="After the return of supply the loop {does}, by the house's rule.", does=SAID[house])
    consequence = case.loop.limits.consequence
    if consequence in ("injury", "fire"):
        return rule.unanswered(
            "What passing a danger leads to is {consequence}, and what the loop does after the return of supply is not declared.",
            ("limits.after_power_return",), consequence=consequence,
        )  # fmt: skip
    return rule.judge(holds=True, text="After the return of supply the loop is taken to resume; no injury or fire is declared to follow.")

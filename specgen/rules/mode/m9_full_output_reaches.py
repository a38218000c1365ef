"""M9: full output reaches every setpoint in the worst case."""

from specgen.core.say import Said, of_change, share, watts
from specgen.process.box import Unmodelled
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import over

rule = Rule(code="M9", name="Full output reaches", weight="must")


def examine(case: Case) -> Finding:
    """Look at the hardest of setpoint, surroundings, load and supply, and state what is missing there."""
    box = case.box
    if isinstance(box, Unmodelled):
        return rule.unsized(box)
    duty, reach = box.duty_high[0], box.reach
    words: dict[str, Said | str] = {"case": box.text(reach.point), "duty": share(duty), "short": of_change(reach.shortfall)}
    if box.reaches:
        words["case"] = box.text(box.duty_high[1])
        return rule.judge(
            holds=True, margin=over(1.0, duty), text="In the hardest case ({case}) the setpoint takes {duty} of full output.", **words
        )
    # a value that does not settle has no distance that is missing, only a share of the output
    missing = "" if box.form == "rates" else "; full output settles {short} short of the setpoint"
    if reach.missing_power is not None:
        missing += ", and {power} is missing"
        words["power"] = watts(reach.missing_power)
    text = "In the hardest case ({case}) the setpoint would take {duty} of full output" + missing + "."
    return rule.judge(holds=False, margin=over(1.0, duty), text=text, **words)

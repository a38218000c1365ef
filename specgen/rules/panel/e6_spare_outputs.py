"""E6: spare outputs are left."""

from specgen.core.say import share
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import at_most, least, over
from specgen.rules.panel_case import OutputCount, PanelCase

rule = Rule(code="E6", name="Spare outputs", weight="should", scope="panel")


def examine(case: PanelCase) -> Finding:
    """Compare the outputs that are left free, kind by kind, with the house's share of all of that kind."""
    if not any(output.there for output in case.outputs):
        return rule.unanswered("No controller is declared with its outputs.", ("controllers.outputs",))
    wanted = float(case.panel.house.spare_outputs)
    used = [output for output in case.outputs if output.used]
    short = [output for output in used if not at_most(wanted, output.spare)]
    told = ", ".join(f"{output.used} of {output.there} {output.sort}" for output in (short or used)) or "none"
    text = "Used: {told}; " + ("less than {wanted} is left free." if short else "at least {wanted} of each is left free.")
    margin = least(*(_margin(output, wanted) for output in used))
    return rule.judge(holds=not short, margin=margin, text=text, told=told, wanted=share(wanted))


def _margin(output: OutputCount, wanted: float) -> float | None:
    return over(max(output.spare, 0.0), wanted) if wanted > 0 else None

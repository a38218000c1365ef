"""E7: the panel's short-circuit current rating covers the fault current."""

from specgen.core.say import amperes
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.panel_case import PanelCase

FAULT = "supply.prospective_fault_current"
RATING = "short_circuit_rating"
rule = Rule(code="E7", name="Short-circuit current rating", weight="must", scope="panel", cites=("UL 508A supplement SB",))


def applies(case: PanelCase) -> bool:
    """Ask it where the code of North America applies."""
    return case.panel.code_basis == "north_america"


def examine(case: PanelCase) -> Finding:
    """Compare the rating of the assembled panel, or what a component without a marked rating is taken for, with the fault current."""
    fault, rating = case.panel.supply.prospective_fault_current, case.panel.short_circuit_rating
    unmarked = case.wiring.figure("default_rating").value.quantity
    if fault is None:
        return rule.unanswered("The fault current of the supply is not declared.", (FAULT,))
    if rating is None and not at_most(fault, unmarked):
        return rule.unanswered(
            "{fault} is above the {unmarked} that a component without a marked rating is taken for.", (RATING,),
            fault=amperes(fault), unmarked=amperes(unmarked),
        )  # fmt: skip
    stands = unmarked if rating is None else rating
    said = "of components without a marked rating" if rating is None else "declared"
    return rule.judge(
        holds=at_most(fault, stands),
        margin=over(stands, fault),
        text="The fault current of {fault} stands against a short-circuit current rating of {stands}, {said}.",
        fault=amperes(fault), stands=amperes(stands), said=said,
    )  # fmt: skip

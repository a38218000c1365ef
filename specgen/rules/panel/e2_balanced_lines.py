"""E2: line currents are within 15 percent of each other."""

from specgen.core.say import amperes, share
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.panel_case import PanelCase

rule = Rule(code="E2", name="Balanced lines", weight="should", scope="panel")


def applies(case: PanelCase) -> bool:
    """Ask it where several lines carry a load."""
    return case.imbalance is not None


def examine(case: PanelCase) -> Finding:
    """Compare the difference of the largest and the smallest line current with the largest."""
    imbalance = case.imbalance or 0.0
    limit = float(case.wiring.figure("balance").value.quantity)
    high, low = max(case.lines, key=lambda line: case.lines[line]), min(case.lines, key=lambda line: case.lines[line])
    return rule.judge(
        holds=at_most(imbalance, limit),
        margin=over(limit, imbalance),
        text="{high} carries {most}, {low} carries {least}: they differ by {imbalance} of the larger; {limit} is the most.",
        high=high, most=amperes(case.lines[high]), low=low, least=amperes(case.lines[low]), imbalance=share(imbalance), limit=share(limit),
    )  # fmt: skip

"""E4: the control supply carries continuous and inrush load with 20 percent reserve."""

from specgen.core.say import amperes, share
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.rules.panel_case import PanelCase
from specgen.sizing.control_supply import RESERVE

rule = Rule(code="E4", name="Control supply", weight="must", scope="panel")


def applies(case: PanelCase) -> bool:
    """Ask it where the load of the control supply was added up."""
    return case.control is not None


def examine(case: PanelCase) -> Finding:
    """Hold the declared capacity against everything on at once, as when the supply returns, with the reserve."""
    control = case.control
    if control is None:
        return rule.does_not_apply()
    return rule.judge(
        holds=at_most(control.needed, control.capacity),
        margin=over(control.capacity, control.needed),
        text="It carries {continuous} continuously and {inrush} at switch-on; with {reserve} of reserve {needed} are needed, and it "
        "gives {capacity}.",
        continuous=amperes(control.continuous), inrush=amperes(control.inrush), reserve=share(RESERVE), needed=amperes(control.needed),
        capacity=amperes(control.capacity),
    )  # fmt: skip

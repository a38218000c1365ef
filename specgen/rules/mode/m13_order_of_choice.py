"""M13: among equals the first in the order of choice is taken."""

from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import ORDER

rule = Rule(code="M13", name="The order of choice", weight="note")

WORDS = {"ssr": "solid state", "power_controller": "power controller", "relay_pair": "pair of relays"}


def examine(case: Case) -> Finding:  # noqa: ARG001  one candidate alone cannot tell what separates it from the others
    """Leave it to the choice between candidates, which says so where nothing but the order or the larger margin separates them."""
    order = ", ".join(WORDS.get(device, device) for device in ORDER)
    return rule.does_not_apply(f"Among equals the first in the order {order} is taken; no other rule separates two candidates then.")

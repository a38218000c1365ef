"""A5: two loops that act on one body in opposite directions are never on together.

Where the dead band is too narrow for that, an interlock relay of each loop stands in the chain of the other, and the rule holds by it.
Where the setpoints overlap there is no dead band at all: each loop then drives the value away from the other's setpoint, and an interlock
would only choose which of them fails; that is broken.
"""

from specgen.core.say import Said, of_change
from specgen.rules.base import Finding, Rule
from specgen.rules.margin import over
from specgen.rules.pair_case import PairCase

rule = Rule(code="A5", name="Never on together", weight="must", scope="pair")


def examine(case: PairCase) -> Finding:
    """Set the dead band between the nearest setpoints of both ranges against the worst excursions of both together."""
    up, down = case.raising.loop, case.lowering.loop
    words: dict[str, Said | str] = {
        "up": up.tag, "down": down.tag, "body": up.acts_on or "", "band": of_change(case.dead_band), "reach": of_change(case.reach)
    }  # fmt: skip
    start = "{up} raises and {down} lowers the value of {body}: "
    if case.dead_band <= 0:
        words["over"] = of_change(-case.dead_band)
        return rule.judge(
            holds=False, margin=None, text=start + "their setpoints overlap by {over}, so that each drives against the other.", **words
        )
    between = "between their setpoints lie {band}, and their worst excursions towards each other come to {reach}"
    if case.needs_interlock:
        kept = f"{start}{between}; an interlock in the hardware keeps each off while the other is on."
        return rule.judge(holds=True, margin=None, text=kept, **words)
    return rule.judge(holds=True, margin=over(case.dead_band, case.reach), text=f"{start}{between}: they are never on together.", **words)

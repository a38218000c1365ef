"""O4: the leakage of an open device cannot hold in or light the load."""

from specgen.core.say import amperes, share
from specgen.rules.base import Case, Finding, Rule
from specgen.rules.margin import at_most, over
from specgen.sizing.candidate import Unsized

rule = Rule(code="O4", name="Leakage", weight="should")

MOST = 0.05  # of the load's current: nothing is held in or lit by less (common practice, no source)


def applies(case: Case) -> bool:
    """Ask it of solid-state switches; a contact that is open leaks nothing."""
    return not isinstance(case.device, Unsized) and case.device.leakage is not None


def examine(case: Case) -> Finding:
    """Compare the leakage with the load's own current: a small load feels it."""
    device = case.device
    if isinstance(device, Unsized) or device.leakage is None or device.current is None:
        return rule.does_not_apply()
    part = device.leakage / device.current
    return rule.judge(
        holds=at_most(part, MOST),
        margin=over(MOST, part),
        text="Open, {name} leaks {leakage}, {part} of the load's {current}; up to {most} nothing is held in or lit.",
        name=device.name, leakage=amperes(device.leakage), part=share(part), current=amperes(device.current), most=share(MOST),
    )  # fmt: skip

"""O3: solid state is no isolation: an isolating device stands upstream."""

from specgen.rules.base import Case, Finding, Rule
from specgen.sizing.candidate import Unsized

rule = Rule(code="O3", name="Solid state is no isolation", weight="must", cites=("IEC 60947-4-3 (semiconductors do not isolate)",))


def applies(case: Case) -> bool:
    """Ask it of semiconductors in the load's circuit."""
    return case.candidate.device in ("ssr", "power_controller") and not isinstance(case.device, Unsized)


def examine(case: Case) -> Finding:
    """Ask for a device that isolates and can be locked: leakage flows through an open semiconductor, and it fails closed."""
    if case.panel.supply.isolator:
        text = "Off is not dead: leakage reaches the load. The panel's isolator isolates; lock it off and prove dead before any work."
        return rule.judge(holds=True, text=text)
    return rule.judge(holds=False, text="Off is not dead: leakage reaches the load, and the panel has no isolator to lock off.")

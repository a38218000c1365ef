"""The switching device of an independent limiter: a contactor of its own in the power path."""

from specgen.catalogue.load import Catalogue
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.sizing.contactor_choice import contactor_choices
from specgen.sizing.device import DeviceChoice
from specgen.sizing.faults import Faults


def limited(loop: DecidedLoop) -> bool:
    """Tell whether an independent limiter is part of the loop: one is declared, or a stuck output passes a danger (S1)."""
    faults = loop.decision.chosen.case.faults
    return loop.loop.limits.limiter is not None or (isinstance(faults, Faults) and faults.on.passes)


def limiter_switch(loop: DecidedLoop, panel: Panel, catalogue: Catalogue) -> DeviceChoice | None:
    """Return the smallest contactor that carries the loop's load, None where there is no limiter or it opens no load of this panel.

    It opens only when the limiter acts, so that its life is no question and it is on whenever the plant runs.
    """
    if not limited(loop):
        return None
    found = contactor_choices(loop.loop, panel, catalogue)
    return None if isinstance(found, Unsized) else found[0]

"""The switching device of a loop's safety chain: a contactor of its own in the power path."""

from collections.abc import Mapping, Sequence

from specgen.catalogue.load import Catalogue
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.sizing.contactor_choice import contactor_choices
from specgen.sizing.device import DeviceChoice

Switches = Mapping[str, DeviceChoice]
IN_THE_PANEL = ("contactor", "drive_contactor")  # a shut-off valve stands in the field, a burner has its own


def limiter_switches(loops: Sequence[DecidedLoop], panel: Panel, catalogue: Catalogue) -> Switches:
    """Return the switching devices of the loops' safety chains by tag, each as `limiter_switch` finds it."""
    found = ((loop.tag, limiter_switch(loop, panel, catalogue)) for loop in loops)
    return {tag: switch for tag, switch in found if switch is not None}


def limiter_switch(loop: DecidedLoop, panel: Panel, catalogue: Catalogue) -> DeviceChoice | None:
    """Return the smallest contactor that carries the loop's load, None where the chain ends in nothing of this panel.

    It opens only when the chain does, so that its life is no question and it is on whenever the plant runs.
    """
    if loop.safety is None or loop.safety.switch not in IN_THE_PANEL:
        return None
    found = contactor_choices(loop.loop, panel, catalogue)
    return None if isinstance(found, Unsized) else found[0]

"""From a decided loop to its circuits."""

from collections.abc import Mapping, Sequence

from specgen.catalogue.load import Catalogue
from specgen.design.panel.limiter_switch import limiter_switch
from specgen.design.panel.types import PanelDesign, Placed
from specgen.design.types import DecidedLoop
from specgen.design.wiring.burner import burner
from specgen.design.wiring.control import control
from specgen.design.wiring.draft import Draft
from specgen.design.wiring.facts import Facts
from specgen.design.wiring.power import power
from specgen.design.wiring.signals import outputs, sensors
from specgen.design.wiring.travel import travel
from specgen.design.wiring.types import Wiring
from specgen.model.panel import Panel
from specgen.sizing.device import DeviceChoice


def wiring_of(decided: DecidedLoop, panel: Panel, placed: Placed | None, switch: DeviceChoice | None) -> Wiring:
    """Return every circuit of a loop.

    Parameters
    ----------
    decided : DecidedLoop
        The loop, a held or open one too: what is not sized is drawn and marked.
    panel : Panel
        Its supply and control supply.
    placed : Placed or None
        The conductors its load stands on; None where it stands on none of the mains.
    switch : DeviceChoice or None
        The contactor of its safety chain, where one is sized.

    Returns
    -------
    Wiring
        Power first, then control, output and sensors, and the terminals numbered in that order: no other loop renumbers them.
    """
    draft, facts = Draft(decided.tag), Facts(decided, panel, placed, switch)
    power(draft, facts)
    travel(draft, facts)
    control(draft, facts)
    burner(draft, facts)
    outputs(draft, facts)
    sensors(draft, facts)
    return draft.finish()


def wirings_of(loops: Sequence[DecidedLoop], panel: Panel, design: PanelDesign, catalogue: Catalogue) -> Mapping[str, Wiring]:
    """Return the circuits of every loop by its tag; parameters as `wiring_of`, the panel's design telling what stands where."""
    placed = {load.tag: load for load in design.placed}
    return {loop.tag: wiring_of(loop, panel, placed.get(loop.tag), limiter_switch(loop, panel, catalogue)) for loop in loops}

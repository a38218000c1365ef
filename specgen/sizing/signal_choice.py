"""A plain signal to an element with an analogue input."""

from specgen.catalogue.load import Catalogue
from specgen.core.figure import Figure
from specgen.model.element import GasBurner, ModulatingValve, VariableSpeedMachine
from specgen.model.loop import Loop
from specgen.model.panel import Panel
from specgen.model.traits import Traits
from specgen.sizing.burden import analogue_drive
from specgen.sizing.candidate import Unsized, Unsuited
from specgen.sizing.controller import controller_side
from specgen.sizing.device import DeviceChoice


def signal_choices(loop: Loop, panel: Panel, traits: Traits, catalogue: Catalogue) -> tuple[DeviceChoice, ...] | Unsized:
    """Return the controller output that drives an element's analogue input.

    Parameters
    ----------
    loop, panel, traits, catalogue
        The loop with its element's traits, the panel, and what is looked up.

    Returns
    -------
    tuple of DeviceChoice, or Unsized
        One choice; Unsuited for an element without an analogue input, Unsized where no controller gives its signal.

    Notes
    -----
    The burden is shown, not judged: whether the output drives it is asked by a rule (O6).
    """
    element = loop.element
    if not traits.analogue_input or not isinstance(element, (ModulatingValve, VariableSpeedMachine, GasBurner)):
        return Unsuited("this element takes no signal")
    if element.signal is None:
        return Unsized("the element's signal is not declared", ("element.signal",))
    side = controller_side(panel, catalogue, "analogue", signal=element.signal)
    if isinstance(side, Unsized):
        return side
    figures: tuple[Figure, ...] = ()
    if element.burden is not None and side.burden is not None and element.signal.endswith("mA"):
        total = float(element.burden) * element.count
        given = {"n": (float(element.count), "number"), "R_in": (float(element.burden), "resistance"), "R_out": (side.burden, "resistance")}
        source = "the devices' data; the units' inputs in series"
        used = total / side.burden
        figures = (Figure("s", "share of the output's highest burden that is used", "n R_in/R_out", used, "fraction", source, given),)
    resistance = None if element.burden is None else float(element.burden)
    drives, undriven = analogue_drive(element.signal, resistance, element.count, side, "element.burden")
    choice = DeviceChoice(
        name=f"{element.signal} signal",
        category="",
        controller_output="analogue",
        chain=(),
        poles=0,
        figures=figures,
        assumptions=side.assumptions,
        drives=drives,
        undriven=undriven,
    )
    return (choice,)

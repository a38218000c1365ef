"""What the control supply feeds: coils and inputs of every loop, its controllers, valves and safety chains."""

from collections.abc import Iterator, Sequence

from specgen.catalogue.enclosure import enclosure_tables
from specgen.design.panel.limiter_switch import Switches
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Assumption
from specgen.sizing.control_supply import ControlLoad, Taken, control_load
from specgen.sizing.device import DeviceChoice

REPLACE = "typical; to be replaced by the data sheet before construction"


def control_supply_load(loops: Sequence[DecidedLoop], switches: Switches, panel: Panel) -> ControlLoad:
    """Return what the control supply carries.

    Parameters
    ----------
    loops : sequence of DecidedLoop
        Every loop, held and open ones too.
    switches : mapping of str to DeviceChoice
        Switching devices of the safety chains, by tag.
    panel : Panel
        Its control supply.

    Returns
    -------
    ControlLoad
        Continuous and at switch-on, with the list.
    """
    return control_load(panel.control_supply, tuple(taken(loops, switches, panel)))


def taken(loops: Sequence[DecidedLoop], switches: Switches, panel: Panel) -> Iterator[Taken]:
    """Yield every taker of the control supply; parameters as `control_supply_load`."""
    tables, voltage = enclosure_tables(), float(panel.control_supply.voltage)
    controller = float(tables.figure("controller_power").value.quantity) / voltage
    valve = float(tables.figure("valve_drive").value.quantity) / voltage
    for loop in sorted(loops, key=lambda loop: loop.tag):
        device = loop.decision.chosen.case.device
        if isinstance(device, DeviceChoice):
            yield from (Taken(drawn.what, drawn.hold, drawn.inrush, loop.tag) for drawn in device.drawn)
            yield Taken("controller, its share", controller, controller, loop.tag)
        if _driven(loop):
            drives = loop.loop.element.count * valve
            yield Taken("drive of the valve", drives, drives, loop.tag)
        switch = switches.get(loop.tag)
        if switch is not None:
            coils = (drawn for drawn in switch.drawn if drawn.inside)
            yield from (Taken(f"{drawn.what}, of the safety chain", drawn.hold, drawn.inrush, loop.tag) for drawn in coils)


def _driven(loop: DecidedLoop) -> bool:
    """Tell whether the element is a valve that follows a signal, and so has a drive of its own to feed."""
    return loop.traits.valve and loop.traits.analogue_input


def supply_assumptions(loops: Sequence[DecidedLoop]) -> Iterator[Assumption]:
    """Yield what the control supply's load takes for granted."""
    tables = enclosure_tables()
    names = ["controller_power"] if loops else []
    if any(_driven(loop) for loop in loops):
        names.append("valve_drive")
    for name in names:
        known = tables.figure(name)
        yield Assumption("load of the control supply", known.value.value, f"{known.value.what}: {REPLACE}")

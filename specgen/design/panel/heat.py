"""Heat in the panel: what every loop, the panel's own parts and its wiring leave in it at once."""

from collections.abc import Iterator, Sequence

from specgen.catalogue.enclosure import EnclosureTables, enclosure_tables
from specgen.catalogue.load import Catalogue
from specgen.design.panel.limiter_switch import Switches
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Assumption, Unsized
from specgen.sizing.control_supply import ControlLoad
from specgen.sizing.device import DeviceChoice
from specgen.sizing.enclosure import Interior, Loss, Source, interior_of
from specgen.sizing.feeder import Feeder

REPLACE = "typical; to be replaced by the data sheet before construction"
SQUARE_MM = 1e-6


def interior(loops: Sequence[DecidedLoop], switches: Switches, control: ControlLoad, panel: Panel, catalogue: Catalogue) -> Interior:
    """Return the enclosure's heat balance.

    Parameters
    ----------
    loops : sequence of DecidedLoop
        Every loop, held and open ones too.
    switches : mapping of str to DeviceChoice
        Switching devices of the safety chains, by tag.
    control : ControlLoad
        What the control supply delivers.
    panel, catalogue
        The enclosure, the coincidence, and what is looked up.

    Returns
    -------
    Interior
        Loops count at full output times the declared coincidence; what is on whenever the plant runs counts in full.

    Notes
    -----
    A cold plant starts with every loop at full output for longer than the enclosure takes to warm up, so that the loops' mean
    duty is no relief; the coincidence is the designer's own word on how many are on at once.
    """
    return interior_of(panel.enclosure, tuple(losses(loops, switches, control, panel, catalogue)), enclosure_tables())


def losses(
    loops: Sequence[DecidedLoop], switches: Switches, control: ControlLoad, panel: Panel, catalogue: Catalogue
) -> Iterator[Loss]:
    """Yield every source of heat [W] at the duty that counts; parameters as `interior`."""
    tables, share = enclosure_tables(), float(panel.panel.coincidence)
    for loop in sorted(loops, key=lambda loop: loop.tag):
        for what, watts, source in _at_full_output(loop, tables, catalogue):
            yield Loss(what, share * watts, loop.tag, source)
        switch = switches.get(loop.tag)
        if switch is not None:
            yield Loss(f"{switch.name}, switching device of the safety chain", switch.loss or 0.0, loop.tag, "safety")
        if isinstance(loop.decision.chosen.case.device, DeviceChoice):
            yield Loss("controller, its share", float(tables.figure("controller_power").value.quantity), loop.tag, "controller")
    delivered = control.continuous * float(panel.control_supply.voltage)
    yield Loss("control supply", float(tables.figure("control_supply_loss").value.quantity) * delivered, source="supply")
    yield Loss("other heat, declared", float(panel.enclosure.other_heat))


def _at_full_output(loop: DecidedLoop, tables: EnclosureTables, catalogue: Catalogue) -> Iterator[tuple[str, float, Source]]:
    case = loop.decision.chosen.case
    if isinstance(case.device, DeviceChoice) and case.device.loss is not None:
        yield case.device.name, case.device.loss, "device"
    drive = drive_loss(loop, tables)
    if drive:
        yield "variable-speed drive", drive, "drive"
    if isinstance(case.feeder, Feeder) and case.feeder.load.connection.way != "control":
        yield "wiring inside", _wiring(case.feeder, tables, catalogue), "wiring"
        yield "protection", _protection(case.feeder, tables), "protection"


def drive_loss(loop: DecidedLoop, tables: EnclosureTables) -> float:
    """Return what a variable-speed drive that the panel feeds loses in it [W]; 0 where there is none."""
    element = loop.loop.element
    fed = loop.traits.analogue_input and not isinstance(loop.decision.chosen.case.feeder, Unsized)
    power = getattr(element, "power", None)
    if not fed or power is None or getattr(element, "voltage", None) is None:
        return 0.0
    return float(tables.figure("drive_loss").value.quantity) * element.count * float(power.high)


def _wiring(feeder: Feeder, tables: EnclosureTables, catalogue: Catalogue) -> float:
    r"""Joule heat of the conductors inside [W]: :math:`n I^2 \rho l/S` of every circuit."""
    resistance = float(catalogue.wiring.figure("resistance").value.quantity)  # of 1 m of 1 mm2, warm
    length = float(tables.figure("inside_length").value.quantity)
    lines = max(2, feeder.load.connection.lines)  # out and back where one line is live
    return sum(lines * branch.current**2 * resistance * length / (branch.internal.size / SQUARE_MM) for branch in feeder.branches)


def _protection(feeder: Feeder, tables: EnclosureTables) -> float:
    drop = float(tables.figure("protection_drop").value.quantity)
    return sum(feeder.load.connection.lines * branch.current * drop for branch in feeder.branches)


def heat_assumptions(loops: Sequence[DecidedLoop], panel: Panel) -> Iterator[Assumption]:
    """Yield what the heat balance takes for granted."""
    tables = enclosure_tables()
    wall = tables.wall_of(panel.enclosure.surface)
    surface = panel.enclosure.surface.replace("_", " ")
    yield Assumption("enclosure.surface", f"{float(wall.value.k):g} W/(m² K)", f"heat transfer of {surface} in still air: {wall.row.cited}")
    for name in ("controller_power", "control_supply_loss", "protection_drop", "inside_length"):
        known = tables.figure(name)
        yield Assumption("heat in the panel", known.value.value, f"{known.value.what}: {REPLACE}")
    if any(drive_loss(loop, tables) for loop in loops):
        known = tables.figure("drive_loss")
        yield Assumption("heat in the panel", known.value.value, f"{known.value.what}, the drive standing in this panel: {REPLACE}")
    for name, why in (("other_heat", "not written"), ("altitude", "not written"), ("mounting", "not written")):
        if name not in panel.enclosure.model_fields_set:
            value = getattr(panel.enclosure, name)
            yield Assumption(f"enclosure.{name}", getattr(value, "text", str(value)), why)

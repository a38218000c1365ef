"""The page of protection: the coordinated list of every protective device, and what is open about it."""

from collections.abc import Sequence

from specgen.design.panel.confirmed import from_memory_rows_used
from specgen.design.panel.types import PanelDesign, ProtectionRow
from specgen.design.types import DecidedLoop
from specgen.model.panel import Panel
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import Feeder, NotFed, Survival
from specgen.view.cells import NO_NUMBER, number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.panel_page import panel_page, ruling, unread_page
from specgen.view.panel_rules import panel_writer
from specgen.view.shapes import Cell, Column, Item, List, Note, PageView, Row, Sentence, Shape, Span, Table
from specgen.view.sheet_feeder import KINDS
from specgen.view.words import capital, counted, listed, with_stop
from specgen.view.writer import Writer

KICKER = "Every protective device with what it protects: load current, rated current, and what the conductors behind it carry"
_READING = (
    Note("Ib", "current of the load at the supply's worse end."),
    Note("In", "rated current; of a motor starter the top of its setting range."),
    Note("Iz", "what the weakest conductor behind it carries, corrected for warmth and grouping. Each row has to rise from left to right."),
)


def protection_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    panel, declared = dossier.design.panel_design, dossier.design.panel
    if panel is None or declared is None:
        return unread_page(dossier, place, "Protection")
    writer = panel_writer(dossier)
    told = "From the incomer down, each device with what it carries, what it is rated, and what it protects."
    remark = Sentence(says(told), quiet=True, notes=_READING)
    fault = declared.supply.prospective_fault_current
    parts: list[tuple[str, str, Sequence[Shape]]] = [
        ("list", "Coordinated list", (remark, protection_table(dossier, place))),
        ("rules", "What the rules find", ruling(dossier, place, panel, ("E1", "E7", "E8"))),
        ("fault", "In a fault", _fault(dossier, place, writer, None if fault is None else float(fault))),
        ("open", "Open points", _open(dossier, place, panel)),
        ("from-memory", "Values to hold against their source", _from_memory(dossier)),
    ]
    return panel_page(dossier, place, "Protection", KICKER, parts, Sentence(says(_lead(writer, panel, declared)), lead=True))


def _lead(writer: Writer, panel: PanelDesign, declared: Panel) -> str:
    rating = panel.incoming.rating
    behind = counted(len(panel.protection), "protected circuit")
    incomer = "an incomer that is not sized" if isinstance(rating, Unsized) else f"an incomer of {writer.say(rating, 'current')}"
    fault = declared.supply.prospective_fault_current
    if fault is None:
        return f"{capital(behind)} behind {incomer}; the fault current at the supply's terminals is not declared."
    return f"{capital(behind)} behind {incomer}, for a fault current of {writer.say(float(fault), 'current')} at the supply's terminals."


def protection_table(dossier: Dossier, place: Place) -> Table:
    """Build the coordinated list, the incomer first."""
    panel = dossier.design.panel_design
    columns = (
        Column("Device", export="designation"),
        Column("Protects", export="loop"),
        Column("Kind", export="kind"),
        Column("Ib", "A", number=True, export="load current Ib [A]"),
        Column("In", "A", number=True, export="rated current In [A]"),
        Column("Iz", "A", number=True, export="conductor capacity Iz [A]"),
        Column("Set to", "A", number=True, export="setting [A]"),
        Column("On", export="conductors"),
    )
    if panel is None:
        return Table("", columns, ())
    writer = panel_writer(dossier)
    behind = capacities(panel)
    services = {loop.tag: loop.loop.service for loop in dossier.design.loops}
    rows = [_row(writer, place, row, behind[row.designation], services.get(row.loop, "")) for row in panel.protection]
    return Table("", columns, (_incomer(writer, panel), *rows), wide=True)


def _incomer(writer: Writer, panel: PanelDesign) -> Row:
    rating = panel.incoming.rating
    reference = next((part.designation for part in panel.parts if part.what == "incoming protection"), "")
    fed = len(panel.placed)
    made = "declared" if panel.incoming.declared else "chosen"
    rated = Cell("not listed", number=True, export="") if isinstance(rating, Unsized) else number(writer.bare(rating, 4), rating)
    return Row(
        (
            word(reference),
            word(f"the panel: {counted(fed, 'loop')} and the control supply"),
            word(f"incoming protection, {made}"),
            number(writer.bare(panel.incoming.carries), panel.incoming.carries),
            rated,
            NO_NUMBER,
            NO_NUMBER,
            word("-".join(panel.demand.currents)),
        ),
        chosen=True,
    )


def _row(writer: Writer, place: Place, row: ProtectionRow, capacity: float, service: str) -> Row:
    curve = f" {row.curve}" if row.curve else ""
    setting = NO_NUMBER if row.setting is None else number(writer.bare(row.setting), row.setting)
    return Row(
        (
            word(row.designation, place.sheet(row.loop, "hardware")),
            word(row.loop, aside=service),
            word(f"{KINDS[row.kind]}{curve}", aside=_range(writer, row)),
            number(writer.bare(row.design_current), row.design_current),
            number(writer.bare(row.rating, 4), row.rating),
            number(writer.bare(capacity), capacity),
            setting,
            word(row.phases),
        )
    )


def _range(writer: Writer, row: ProtectionRow) -> str:
    if row.setting_range is None:
        return ""
    low, high = row.setting_range
    return f"{writer.bare(low)} to {writer.say(high, 'current')}"


def capacities(panel: PanelDesign) -> dict[str, float]:
    """Return what the weakest conductor behind each protective device carries [A]; a cable follows the wiring that leads to it."""
    found: dict[str, float] = {}
    device = ""
    for row in panel.conductors:
        device = row.start if row.designation is None else device
        found[device] = min(row.capacity, found.get(device, row.capacity))
    return found


def _fault(dossier: Dossier, place: Place, writer: Writer, fault: float | None) -> tuple[Shape, ...]:
    """Show what each device sees in a fault against what it stands."""
    known = [
        (loop, feeder.survival)
        for loop in sorted(dossier.design.loops, key=lambda loop: loop.tag)
        if isinstance(feeder := loop.decision.chosen.case.feeder, Feeder) and feeder.survival is not None
    ]
    if fault is None:
        first = "The fault current is not declared: the breaking capacity of each device cannot be chosen yet."
    else:
        first = f"Each device is ordered to break {writer.say(fault, 'current')}, or stands behind one that does."
    columns = (Column("Loop"), Column("What is looked at"), Column("Sees", number=True), Column("Stands", number=True), Column("Outcome"))
    rows = tuple(_survival(writer, place, loop, survival) for loop, survival in known)
    blocks: list[Shape] = [Sentence(says(first))]
    if rows:
        blocks.append(Table("Switching devices behind their protection", columns, rows, wide=True))
    return tuple(blocks)


def _survival(writer: Writer, place: Place, loop: DecidedLoop, survival: Survival) -> Row:
    solid = survival.dimension == "i2t"
    stands = Cell("not known", number=True) if survival.withstands is None else _said(writer, survival.withstands, survival.dimension)
    outcome = {True: "survives", False: "does not survive", None: "open"}[survival.survives]
    what = "let-through of the fuse against the device's" if solid else "rating of the protection against the contact's"
    sees = _said(writer, survival.sees, survival.dimension)
    return Row((word(loop.tag, place.sheet(loop.tag, "hardware")), word(what), sees, stands, word(outcome)))


def _said(writer: Writer, value: float, dimension: str) -> Cell:
    return number(writer.say(value, dimension), value)


def _open(dossier: Dossier, place: Place, panel: PanelDesign) -> tuple[Shape, ...]:
    """Name what is open for protection and wiring, of the panel and of each loop; loops with the same point share a row."""
    shared: dict[tuple[str, str], list[str]] = {}
    for loop in sorted(dossier.design.loops, key=lambda loop: loop.tag):
        feeder = loop.decision.chosen.case.feeder
        for point in open_points_of(feeder):
            shared.setdefault((point.because, ", ".join(point.needs)), []).append(loop.tag)
    items = [Item(says(capital(with_stop(missing.how))), missing.field, aside=" ".join(missing.settles)) for missing in panel.open_points]
    for (because, needs), tags in shared.items():
        spans = [Span(f"{capital(because)}: ")]
        for index, tag in enumerate(tags):
            spans += [Span(", " if index else ""), Span(tag, place.sheet(tag, "hardware"))]
        items.append(Item((*spans, Span(".")), aside=needs))
    return (List(tuple(items), empty="Nothing is open for protection and wiring."),)


def open_points_of(feeder: Feeder | Unsized) -> tuple[Unsized, ...]:
    """Return what is open for a loop's protection and wiring: its own points, or that it could not be sized at all."""
    if isinstance(feeder, Feeder):
        return feeder.open_points
    return () if isinstance(feeder, NotFed) else (feeder,)


def _from_memory(dossier: Dossier) -> tuple[Shape, ...]:
    """Name the rows of the tables that somebody has to hold against their source before the panel is built."""
    rows = from_memory_rows_used(dossier.design)
    if not rows:
        return (Sentence(says("Every value used was held against its source.")),)
    groups: dict[str, list[str]] = {}
    for row in rows:
        group, _, last = row.id.rpartition("/")
        groups.setdefault(group or row.id, []).append(last)
    sources = {row.id.rpartition("/")[0] or row.id: row.cited for row in rows}
    text = (
        f"{counted(len(rows), 'row')} of the tables used here stand from memory. Before an issue for construction each is held against its "
        "source and written into panel.yml under confirmed, as a group or one by one."
    )
    columns = (Column("Group"), Column("Rows used"), Column("Source"))
    made = tuple(Row((word(group), word(listed(names)), word(sources[group]))) for group, names in groups.items())
    return Sentence(says(text)), Table("", columns, made, wide=True)

"""The schedule of conductors: every run from where to where, its size, and what it carries."""

from specgen.design.panel.types import ConductorRow
from specgen.view.cells import DASH, NO_NUMBER, number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.panel_page import panel_page, unread_page
from specgen.view.panel_rules import panel_writer
from specgen.view.shapes import Cell, Column, Note, PageView, Row, Sentence, Table
from specgen.view.words import counted
from specgen.view.writer import Writer

KICKER = "Every run of conductors: from, to, size, how it is laid, what it carries and drops"
MM2 = 1e6  # mm2 of a m2
# IEC 60204-1 annex D
METHODS = {
    "B1": "single conductors in conduit or duct",
    "B2": "a cable in conduit or duct",
    "C": "a cable on a wall or tray without holes",
    "E": "a cable in free air or on an open tray",
    "awg": "conductors in a raceway",
}


def conductors_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    panel = dossier.design.panel_design
    if panel is None:
        return unread_page(dossier, place, "Conductors")
    used = dict.fromkeys(row.method for row in panel.conductors)
    notes = [Note(_method(method), f"{METHODS[method]}.") for method in sorted(used)]
    notes.append(Note("Ib, In, Iz", "load current, rated current of the protection, and what the conductor carries, corrected."))
    cables = sum(1 for row in panel.conductors if row.designation)
    text = f"{counted(len(panel.conductors), 'run')}, {counted(cables, 'cable')} to the field among them; the drop is that of the cable."
    remark = Sentence(says(text), quiet=True, notes=tuple(notes))
    parts = (("conductors", "Conductors", (remark, conductors_table(dossier, place))),)
    return panel_page(dossier, place, "Conductors", KICKER, parts)


def conductors_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of conductors."""
    columns = (
        Column("Loop", export="loop"),
        Column("From", export="from"),
        Column("To", export="to"),
        Column("Cable", export="cable"),
        Column("Size", export="size"),
        Column("Earth", export="earth"),
        Column("Method", export="method"),
        Column("Length", number=True, export="length [m]"),
        Column("Ib", "A", number=True, export="load current Ib [A]"),
        Column("In", "A", number=True, export="rated current In [A]"),
        Column("Iz", "A", number=True, export="capacity Iz [A]"),
        Column("Drop", "%", number=True, export="drop [%]"),
        Column("On", export="conductors"),
    )
    panel = dossier.design.panel_design
    writer = panel_writer(dossier)
    rows = []
    before = ""
    for row in panel.conductors if panel else ():
        rows.append(_row(writer, place, row, linked=row.loop != before))
        before = row.loop
    return Table("", columns, tuple(rows), wide=True, whole=True, empty="No loop is fed from this panel.")


def _row(writer: Writer, place: Place, row: ConductorRow, *, linked: bool) -> Row:
    return Row(
        (
            word(row.loop, place.sheet(row.loop, "hardware") if linked else ""),
            word(row.start),
            word(row.end),
            word(row.designation) if row.designation else Cell("inside", export=""),
            word(size_of(writer, row.size, row.gauge)),
            word(size_of(writer, row.earth, row.gauge)),
            word(_method(row.method)),
            NO_NUMBER if row.length is None else number(writer.say(row.length, "length"), row.length),
            number(writer.bare(row.current), row.current),
            number(writer.bare(row.protection, 4), row.protection),
            number(writer.bare(row.capacity), row.capacity),
            NO_NUMBER if row.drop is None else number(writer.bare(100 * row.drop), 100 * row.drop),
            word(row.phases) if row.phases else DASH,
        )
    )


def size_of(writer: Writer, area: float, gauge: str | None) -> str:
    """Write a conductor's size [m2], or its gauge where it is sold by one."""
    return gauge or f"{writer.bare(area * MM2)}\u202fmm²"


def _method(method: str) -> str:
    return "raceway" if method == "awg" else method

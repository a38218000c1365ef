"""The schedule of parts: what to order, and where each part stands."""

from dataclasses import dataclass, field

from specgen.design.panel.types import PartRow
from specgen.view.cells import NO_NUMBER, number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.panel_page import panel_page, unread_page
from specgen.view.panel_rules import panel_writer
from specgen.view.shapes import Cell, Column, Note, PageView, Row, Sentence, Table
from specgen.view.words import capital, counted

KICKER = "What to order, and where each part stands"
SHARED = "Shared by the panel"
_NOTES = (Note("Makers", "none is named: a part is described by what it has to be, and the maker's data sheet is held against it."),)
# IEC 81346-2
LETTERS = {
    "B": "sensors", "E": "heaters and burners", "F": "protection and limiters", "K": "relays and controllers",
    "M": "motors and actuators", "P": "lamps and horns", "Q": "contactors, solid-state switches, power controllers", "R": "suppressors",
    "S": "hand switches", "T": "supplies", "W": "cables", "X": "terminals",
}  # fmt: skip


@dataclass(slots=True)
class _Sort:
    """Equal parts: how many, and which."""

    quantity: int = 0
    names: list[str] = field(default_factory=list)


def parts_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    panel = dossier.design.panel_design
    if panel is None:
        return unread_page(dossier, place, "Parts")
    text = f"{counted(len(panel.parts), 'designation')}; equal parts stand together, the largest rating first within a kind."
    parts = (
        ("order", "To order", (Sentence(says(text), quiet=True, notes=_NOTES), order_table(dossier))),
        ("designations", "By designation", (_by_loop(dossier),)),
    )
    return panel_page(dossier, place, "Parts", KICKER, parts)


def order_table(dossier: Dossier) -> Table:
    """Build the table of equal parts with how many there are of each."""
    sorts: dict[tuple[str, str, float | None], _Sort] = {}
    panel = dossier.design.panel_design
    for part in panel.parts if panel else ():
        sort = sorts.setdefault((letter_of(part), part.what, part.rating), _Sort())
        sort.quantity += part.quantity
        sort.names.append(part.designation)
    writer = panel_writer(dossier)
    columns = (Column("Quantity", number=True), Column("What"), Column("Rating", "A", number=True), Column("Stands as"))
    rows = []
    letter = ""
    for (own, what, rating), sort in sorted(sorts.items(), key=lambda pair: (pair[0][0], pair[0][1], -(pair[0][2] or 0.0))):
        if own != letter:
            letter = own
            rows.append(Row(heading=capital(LETTERS.get(letter, letter))))
        rows.append(
            Row(
                (
                    Cell(str(sort.quantity), number=True),
                    word(capital(what)),
                    NO_NUMBER if rating is None else number(writer.bare(rating), rating),
                    word(", ".join(sort.names)),
                )
            )
        )
    return Table("", columns, tuple(rows), wide=True, empty="There is no part.")


def letter_of(part: PartRow) -> str:
    """Return the letter of a part's product aspect.

    Examples
    --------
    >>> letter_of(PartRow("=TIC101-Q1", "contactor", 25.0, 1, ("TIC-101",)))
    'Q'
    """
    return part.designation.rpartition("-")[2][:1]


def _by_loop(dossier: Dossier) -> Table:
    panel = dossier.design.panel_design
    writer = panel_writer(dossier)
    services = {loop.tag: loop.loop.service for loop in dossier.design.loops}
    columns = (Column("Designation"), Column("What"), Column("Rating", "A", number=True))
    rows: list[Row] = []
    before = ""
    for part in panel.parts if panel else ():
        whose = part.loops[0] if len(part.loops) == 1 and part.designation.startswith(f"={part.loops[0].replace('-', '')}-") else ""
        heading = f"{whose}, {services.get(whose, '')}" if whose else SHARED
        if heading != before:
            before = heading
            rows.append(Row(heading=heading))
        rating = NO_NUMBER if part.rating is None else number(writer.bare(part.rating), part.rating)
        several = f"{part.quantity} of them" if part.quantity > 1 else ""
        rows.append(Row((word(part.designation), word(capital(part.what), aside=several), rating)))
    return Table("", columns, tuple(rows), wide=True, empty="There is no part.")


def parts_table(dossier: Dossier) -> Table:
    """Build the table of parts, one row a designation, for files."""
    columns = (
        Column("Designation", export="designation"),
        Column("What", export="what"),
        Column("Rating", "A", number=True, export="rating [A]"),
        Column("Quantity", number=True, export="quantity"),
        Column("Loops", export="loops"),
    )
    panel = dossier.design.panel_design
    rows = tuple(
        Row(
            (
                word(part.designation),
                word(part.what),
                NO_NUMBER if part.rating is None else number("", part.rating),
                number(str(part.quantity), part.quantity),
                word(" ".join(part.loops)),
            )
        )
        for part in (panel.parts if panel else ())
    )
    return Table("", columns, rows)

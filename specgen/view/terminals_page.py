"""The schedule of terminals: what is connected to each, inside the panel and outside."""

from specgen.design.wiring.types import Terminal, Wiring
from specgen.view.cells import DASH, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.schematic.drawing import identifier
from specgen.view.shapes import Cell, Column, Note, PageView, Row, Section, Sentence, Table
from specgen.view.words import counted

CIRCUITS = {
    "power": "power", "switching": "power", "control": "control", "demand": "demand for heat", "chain": "safety chain",
    "valves": "burner", "alarm": "alarm", "output": "output", "sensor": "sensor", "limiter": "sensor of the limiter",
}  # fmt: skip
_NOTES = (
    Note("Numbers", "count within a loop: power first, then control, output and sensors. No other loop renumbers them."),
    Note("Potential", "what it carries and which contact it lies behind."),
)


def terminals_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    count = sum(len(wiring.terminals) for wiring in dossier.design.wirings.values())
    text = f"{counted(count, 'terminal')} of {counted(len(dossier.design.wirings), 'loop')}, each with what is connected on its two sides."
    blocks = (Sentence(says(text), quiet=True, notes=_NOTES), terminals_table(dossier, place))
    section = Section("1", "terminals", "Terminals", blocks)
    return frame(dossier, place, "Terminals", (section,), kicker="What is connected to every terminal, inside the panel and outside")


def terminals_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of every terminal, by tag and number."""
    columns = (
        Column("Terminal", export="terminal"),
        Column("Loop", export="loop"),
        Column("Circuit", export="circuit"),
        Column("Potential", export="potential"),
        Column("Inside", export="inside"),
        Column("Outside", export="outside"),
    )
    wirings = dossier.design.wirings
    rows = tuple(_row(place, tag, terminal) for tag in sorted(wirings) for terminal in wirings[tag].terminals)
    return Table("", columns, rows, wide=True, empty="No loop could be wired.")


def _row(place: Place, tag: str, terminal: Terminal) -> Row:
    cells = (
        word(terminal.designation, place.sheet(tag, identifier(terminal.designation))),
        word(tag),
        word(CIRCUITS[terminal.circuit]),
        word(terminal.potential),
        word(terminal.inside),
        word(terminal.outside) if terminal.outside else DASH,
    )
    return Row(cells)


def loop_terminals(wiring: Wiring) -> Table:
    """Build the table of one loop's terminals; its own designations stand without the loop's name."""
    own = wiring.terminals[0].designation.partition("-")[0] if wiring.terminals else ""
    columns = (Column("Terminal"), Column("Circuit"), Column("Potential"), Column("Inside"), Column("Outside"))
    rows = tuple(
        Row(
            (
                Cell(_short(terminal.designation, own)),
                word(CIRCUITS[terminal.circuit]),
                word(terminal.potential),
                word(_short(terminal.inside, own)),
                word(_short(terminal.outside, own)) if terminal.outside else DASH,
            )
        )
        for terminal in wiring.terminals
    )
    return Table("Terminals", columns, rows, wide=True, empty="The loop needs no terminals.")


def _short(text: str, own: str) -> str:
    """Leave the loop's name out.

    Examples
    --------
    >>> _short("=TIC101-Q1:2, =PNL3-T1:+", "=TIC101")
    '-Q1:2, =PNL3-T1:+'
    """
    return text.replace(f"{own}-", "-")

"""The register of how firm decisions are: inputs of the whole panel, the nearest to a change first."""

from math import isfinite

from specgen.design.firmness import nearest_first
from specgen.design.types import DecidedLoop, Firm
from specgen.view.cells import says, word
from specgen.view.dossier import Dossier
from specgen.view.firmness_drawing import MOST, declared, firmness_drawing
from specgen.view.frame import Place
from specgen.view.panel_page import panel_page
from specgen.view.shapes import Cell, Column, Item, List, PageView, Row, Sentence, Shape, Span, Table
from specgen.view.words import counted
from specgen.view.writer import Writer, plain

KICKER = "Inputs of the whole panel in the order of how near each is to changing a decision"
NOT_ASKED = "How firm the decisions are was not worked out when this dossier was built."


def firmness_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    every = nearest_first(dossier.design.loops)
    if not every:
        return panel_page(dossier, place, "How firm", KICKER, (), Sentence(says(NOT_ASKED), lead=True))
    moving = [(loop, firm) for loop, firm in every if isfinite(firm.nearness)]
    still = [(loop, firm) for loop, firm in every if not isfinite(firm.nearness)]
    drawn = [(f"{loop.tag} {firm.words}", dossier.writers[loop.tag], firm) for loop, firm in moving]
    drawing = firmness_drawing(drawn, f"The {min(MOST, len(moving))} inputs nearest to a change.")
    nearest: list[Shape] = [drawing] if drawing is not None else []
    parts = (
        ("nearest", "Nearest to a change", (*nearest, _table(dossier, place, moving))),
        ("unmoved", "Without effect", _still(place, still)),
    )
    return panel_page(dossier, place, "How firm", KICKER, parts, _lead(dossier, place, every, moving))


def _lead(dossier: Dossier, place: Place, every: tuple[tuple[DecidedLoop, Firm], ...], moving: list[tuple[DecidedLoop, Firm]]) -> Sentence:
    counts = f"{counted(len(moving), 'input')} of {len(every)} would change a decision within a factor of ten"
    if not moving:
        return Sentence(says(f"None of {counted(len(every), 'input')} would change a decision within a factor of ten."), lead=True)
    loop, firm = moving[0]
    writer = dossier.writers[loop.tag]
    side = (firm.below, firm.below_to) if _nearer_below(firm) else (firm.above, firm.above_to)
    at = writer.say(side[0], firm.dimension) if side[0] is not None else ""
    spans = (
        Span(f"{counts}; nearest is the {firm.words} of "),
        Span(loop.tag, place.sheet(loop.tag, "firmness")),
        Span(f", declared as {declared(writer, firm)}; at {at}: {side[1]}."),
    )
    return Sentence(spans, lead=True)


def _nearer_below(firm: Firm) -> bool:
    """Tell whether the change on the lower side is the nearer one."""
    if firm.below is None or firm.above is None:
        return firm.above is None
    if firm.dimension != "value" and firm.declared * firm.below > 0:
        return abs(firm.declared / firm.below) <= abs(firm.above / firm.declared)
    return firm.declared - firm.below <= firm.above - firm.declared


def _table(dossier: Dossier, place: Place, moving: list[tuple[DecidedLoop, Firm]]) -> Table:
    columns = (
        Column("Loop"),
        Column("Input"),
        Column("Declared"),
        Column("Below", number=True),
        Column("becomes"),
        Column("Above", number=True),
        Column("becomes"),
    )
    rows = tuple(_row(dossier.writers[loop.tag], place, loop, firm) for loop, firm in moving)
    return Table("", columns, rows, wide=True, empty="No input within reach changes a decision.")


def _row(writer: Writer, place: Place, loop: DecidedLoop, firm: Firm) -> Row:
    below, above = (_end(writer, firm, value) for value in (firm.below, firm.above))
    cells = (
        word(loop.tag, place.sheet(loop.tag, "firmness")),
        word(firm.words),
        word(declared(writer, firm)),
        below,
        word(firm.below_to or "\u2013"),
        above,
        word(firm.above_to or "\u2013"),
    )
    return Row(cells)


def _end(writer: Writer, firm: Firm, value: float | None) -> Cell:
    return Cell("\u2013" if value is None else writer.say(value, firm.dimension), number=True)


def _still(place: Place, still: list[tuple[DecidedLoop, Firm]]) -> tuple[Shape, ...]:
    if not still:
        return ()
    by_loop: dict[str, list[str]] = {}
    for loop, firm in still:
        by_loop.setdefault(loop.tag, []).append(firm.words)
    items = tuple(Item(says(", ".join(names)), tag, place.sheet(tag, "firmness")) for tag, names in by_loop.items())
    text = "Within a factor of ten, or within its distance from the setpoint, none of these changes mode, output or verdict."
    return Sentence(says(text)), List(items, quiet=True)


def firmness_table(dossier: Dossier) -> Table:
    """Build the table of every input for files; figures in base units, a loop's own quantity in its own unit."""
    columns = (
        Column("Loop", export="loop"),
        Column("Input", export="input"),
        Column("As written", export="as written"),
        Column("Declared", number=True, export="declared"),
        Column("Below", number=True, export="below"),
        Column("Becomes", export="below to"),
        Column("Above", number=True, export="above"),
        Column("Becomes", export="above to"),
        Column("Dimension", export="dimension"),
        Column("Nearness", number=True, export="nearness [1]"),
    )
    rows = tuple(
        Row(
            (
                word(loop.tag), word(firm.input), word(firm.text), _plain(firm.declared), _plain(firm.below), word(firm.below_to),
                _plain(firm.above), word(firm.above_to), word(firm.dimension), _plain(firm.nearness),
            )
        )
        for loop, firm in nearest_first(dossier.design.loops)
    )  # fmt: skip
    return Table("", columns, rows)


def _plain(value: float | None) -> Cell:
    return Cell("", number=True, export="" if value is None or not isfinite(value) else plain(value))

"""Section How firm of a sheet: which uncertain input would change the decision, and how far off it may be."""

from math import isfinite

from specgen.design.types import DecidedLoop, Firm
from specgen.view.cells import DASH, says, word
from specgen.view.firmness_drawing import declared, firmness_drawing
from specgen.view.shapes import Cell, Column, Row, Section, Sentence, Shape, Table
from specgen.view.writer import Writer

_COLUMNS = (
    Column("Input"),
    Column("Declared"),
    Column("Below", number=True),
    Column("becomes"),
    Column("Above", number=True),
    Column("becomes"),
)


def firmness_section(writer: Writer, decided: DecidedLoop, number: str) -> Section:
    """Build the section, the input nearest to a change first."""
    ordered = sorted(decided.firmness, key=lambda firm: firm.nearness)
    moving = [firm for firm in ordered if isfinite(firm.nearness)]
    table = Table(
        "", _COLUMNS, tuple(_row(writer, firm) for firm in moving), wide=True, empty="No input within reach changes the decision."
    )
    still = [firm.words for firm in ordered if not isfinite(firm.nearness)]
    drawing = firmness_drawing([(firm.words, writer, firm) for firm in moving], "The way to the nearer change of each input.")
    blocks: list[Shape] = [drawing, table] if drawing is not None else [table]
    if still:
        text = f"Within a factor of ten no other figure of these changes mode, output or verdict: {', '.join(still)}."
        blocks.append(Sentence(says(text), quiet=True))
    return Section(number, "firmness", "How firm", tuple(blocks))


def _row(writer: Writer, firm: Firm) -> Row:
    below, above = _end(writer, firm, firm.below), _end(writer, firm, firm.above)
    to_below = word(firm.below_to) if firm.below_to else DASH
    to_above = word(firm.above_to) if firm.above_to else DASH
    return Row((word(firm.words), word(declared(writer, firm)), below, to_below, above, to_above))


def _end(writer: Writer, firm: Firm, value: float | None) -> Cell:
    return Cell("\u2013" if value is None else writer.say(value, firm.dimension), number=True)

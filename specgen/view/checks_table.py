"""Site checks as a table with room for a reading and initials."""

from collections.abc import Sequence

from specgen.core.say import Said
from specgen.design.check import GROUPS, Check, Group
from specgen.view.cells import word
from specgen.view.shapes import Cell, Column, Row, Table
from specgen.view.words import capital, with_stop
from specgen.view.writer import Writer

COLUMNS = (
    Column("What to do", export="what"),
    Column("Expected", export="expected"),
    Column("May differ by", export="tolerance"),
    Column("Reading", export="reading"),
    Column("Initials", export="initials"),
)


def group_table(writer: Writer, checks: Sequence[Check], group: Group, *, meanings: bool = True) -> Table | None:
    """Build one group's table, None where it has no check."""
    rows = check_rows(writer, [check for check in checks if check.group == group], meanings=meanings)
    return Table(GROUPS[group], COLUMNS, rows, wide=True) if rows else None


def check_rows(writer: Writer, checks: Sequence[Check], *, meanings: bool = True) -> tuple[Row, ...]:
    """Build the rows; each can be linked to by the check's id, which its reading is kept under."""
    return tuple(
        Row(
            (
                word(capital(writer.sentence(check.what, check.words)), aside=_meaning(writer, check) if meanings else ""),
                Cell(expected(writer, check)),
                Cell(tolerance(writer, check)),
                Cell("", export="", entry="reading"),
                Cell("", export="", entry="initials"),
            ),
            anchor=check.id,
        )
        for check in checks
    )


def expected(writer: Writer, check: Check) -> str:
    """Write what is expected: a number with its unit, a range, or words."""
    if not isinstance(check.expected, Said):
        return f"{check.expected} {check.bound}".strip()
    first = _number(writer, check.expected)
    if check.to is not None:
        return f"{first} to {_number(writer, check.to)}"
    return f"{check.bound} {first}" if check.bound == "about" else f"{first} {check.bound}".strip()


def tolerance(writer: Writer, check: Check) -> str:
    """Write how far the reading may differ."""
    if check.tolerance is not None:
        return f"±{_number(writer, check.tolerance)}"
    return "" if check.bound != "about" else "note it"


def _number(writer: Writer, said: Said) -> str:
    return writer.value(said.value) if said.dimension == "value" else writer.say(said.value, said.dimension)


def _meaning(writer: Writer, check: Check) -> str:
    return with_stop(writer.sentence(check.meaning, check.words)) if check.meaning else ""

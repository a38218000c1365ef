"""Short ways to make spans, cells and rows."""

from specgen.view.shapes import Cell, Mark, Span
from specgen.view.writer import plain

DASH = Cell("\u2013", export="")
NO_NUMBER = Cell("\u2013", number=True, export="")


def says(text: str) -> tuple[Span, ...]:
    """Make plain running text."""
    return (Span(text),)


def word(text: str, href: str = "", aside: str = "") -> Cell:
    """Make a cell of words."""
    return Cell(text, href=href, aside=aside)


def number(text: str, value: float, aside: str = "") -> Cell:
    """Make a cell of a number; ``value`` is what a file for machines holds, in the unit of the column's head."""
    return Cell(text, number=True, aside=aside, export=plain(value))


def verdict_mark(verdict: str) -> Mark:
    """Make the mark of a verdict."""
    return Mark(verdict, verdict)


def verdict_cell(verdict: str) -> Cell:
    """Make a cell that holds a verdict alone."""
    return Cell("", mark=verdict_mark(verdict), export=verdict)

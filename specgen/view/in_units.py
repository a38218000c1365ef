"""Ready texts on the pages in the units that the panel asks its pages to show.

Numbers are written by the writers in those units. Sentences that arrive ready made (worst cases, assumptions, what parts are, what the
designer wrote) hold units of their own: they are turned over here, once, where a page is put together. What the designer said in
words, and the inputs that are quoted as written, stay as they are.
"""

import re
from collections.abc import Callable, Iterator
from dataclasses import fields, is_dataclass, replace
from typing import TypeVar

from specgen.core.retell import retold
from specgen.design.types import Design
from specgen.view.shapes import Row, Table
from specgen.view.writer import system_of

T = TypeVar("T")
Retell = Callable[[str], str]
# the fields of shapes that hold text for a reader
_TOLD = frozenset(
    {"text", "aside", "head", "caption", "title", "empty", "heading", "filled", "result", "case", "name", "link"}
)  # fmt: skip
_AMERICAN = re.compile(rb"[0-9] *(?:degF|psi|inHg|inH2O|ftH2O|gal|ft3?|inch|inches|in|lb|hp|Btu|BTU)\b")


def retelling(design: Design) -> Retell | None:
    """Return what turns a ready text over, None where every unit in the sources is already one of the pages'.

    SI pages need it only where something is written in feet, pounds or Fahrenheit.
    """
    system = system_of(design.panel)
    if system == "si" and not any(_AMERICAN.search(source.content) for source in design.sources):
        return None
    own = sorted({text for text in _own_words(design) if retold(text, system) != text}, key=len, reverse=True)

    def tell(text: str) -> str:
        kept = [words for words in own if words in text]
        if not kept:
            return retold(text, system)
        parts = re.split("(" + "|".join(re.escape(words) for words in kept) + ")", text)
        return "".join(part if part in kept else retold(part, system) for part in parts)

    return tell


def _own_words(design: Design) -> Iterator[str]:
    """Yield what the designer says in words of their own, and what parts are called in their own list."""
    if design.panel is not None:
        yield design.panel.panel.title
        yield from (controller.name for controller in design.panel.controllers)
        yield from (issue.purpose for issue in design.panel.panel.history)
    for decided in design.loops:
        loop = decided.loop
        yield from (loop.service, loop.area, *loop.notes)
        yield from (text for text in (loop.acts_on, loop.limits.on_sensor_fault_because) if text)
        if loop.choose is not None and loop.choose.because:
            yield loop.choose.because
        if loop.plant is not None and loop.plant.balance is not None:
            yield from (body.what for body in loop.plant.balance.bodies or ())


def in_units(part: T, tell: Retell | None) -> T:
    """Return a shape, or a tuple of shapes, with its ready texts turned over; as it is where nothing turns them."""
    return part if tell is None else _told(part, tell)


def _told(part: T, tell: Retell) -> T:
    if isinstance(part, tuple):
        return tuple(_told(one, tell) for one in part)  # type: ignore[return-value]  # a tuple of the same
    if not is_dataclass(part) or isinstance(part, type):
        return part
    changed: dict[str, object] = {}
    for field in fields(part):
        value = getattr(part, field.name)
        if isinstance(value, str):
            if field.name in _TOLD and value:
                changed[field.name] = tell(value)
        elif isinstance(part, Table) and field.name == "rows":
            quoted = {index for index, column in enumerate(part.columns) if column.quoted}
            changed["rows"] = tuple(_row(row, quoted, tell) for row in part.rows)
        elif isinstance(value, tuple) or is_dataclass(value):
            changed[field.name] = _told(value, tell)
    return replace(part, **changed)  # type: ignore[type-var,unused-ignore]  # a dataclass, as was asked above


def _row(row: Row, quoted: set[int], tell: Retell) -> Row:
    """Turn the cells of a row over, but those that quote a file."""
    cells = tuple(cell if index in quoted else _told(cell, tell) for index, cell in enumerate(row.cells))
    return replace(row, cells=cells, heading=tell(row.heading))

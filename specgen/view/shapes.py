"""The six shapes every page is built of: sentence, table, figure line, drawing, notice, list.

A shape holds only text, numbers ready to print, flags and tuples of these. What a template cannot do (compare, add,
round, sort, word) was done before. ``shape`` names the template that draws it.
"""

from dataclasses import dataclass
from typing import ClassVar


@dataclass(frozen=True, slots=True)
class Span:
    """A piece of running text: plain, strong, or a link."""

    text: str
    href: str = ""
    strong: bool = False


@dataclass(frozen=True, slots=True)
class Note:
    """A side note beside the block it belongs to: a strong word, its text, and where it leads."""

    head: str
    text: str
    href: str = ""
    link: str = ""


@dataclass(frozen=True, slots=True)
class Sentence:
    """Running text; ``lead`` is the page's one sentence, ``quiet`` a remark in small type."""

    shape: ClassVar[str] = "sentence"
    wide: ClassVar[bool] = False
    spans: tuple[Span, ...]
    lead: bool = False
    quiet: bool = False
    notes: tuple[Note, ...] = ()


@dataclass(frozen=True, slots=True)
class Column:
    """A column's head with its unit; numbers are set to the right. ``export`` is its head in a CSV file.

    A ``quoted`` column shows what a file says, in the units it was written in.
    """

    head: str
    unit: str = ""
    number: bool = False
    export: str = ""
    quoted: bool = False


@dataclass(frozen=True, slots=True)
class Mark:
    """A verdict as word and shape; ``kind`` is one of held, open, deviates, meets."""

    kind: str
    word: str


@dataclass(frozen=True, slots=True)
class Cell:
    """One cell: its text, where it leads, a quieter second text, a verdict, or several runs of text.

    ``export`` is what stands in a CSV file: a plain number where the column holds numbers, else None for the text.
    ``entry`` names what is written into the cell on site: ``reading`` or ``initials``.
    """

    text: str
    href: str = ""
    aside: str = ""
    number: bool = False
    mark: Mark | None = None
    spans: tuple[Span, ...] = ()
    export: str | None = None
    entry: str = ""

    @property
    def plain(self) -> str:
        """Return what stands in a CSV file."""
        return self.text if self.export is None else self.export


@dataclass(frozen=True, slots=True)
class Row:
    """A row; ``chosen`` is set apart, ``anchor`` can be linked to. A ``heading`` stands alone across the rows below it."""

    cells: tuple[Cell, ...] = ()
    heading: str = ""
    chosen: bool = False
    anchor: str = ""


@dataclass(frozen=True, slots=True)
class Table:
    """A table; ``wide`` ones run across the column of side notes. ``empty`` says so where there is no row.

    ``whole`` keeps each cell on one line: designations have hyphens, at which a line may break.
    """

    shape: ClassVar[str] = "table"
    caption: str
    columns: tuple[Column, ...]
    rows: tuple[Row, ...]
    wide: bool = False
    empty: str = ""
    notes: tuple[Note, ...] = ()
    whole: bool = False

    @property
    def across(self) -> str:
        """Return the number of columns, for a heading that stands across them."""
        return str(len(self.columns))


@dataclass(frozen=True, slots=True)
class FigureLine:
    """A line of the Basis: what, formula, numbers put in, result, source, the case that gave it."""

    shape: ClassVar[str] = "figure_line"
    wide: ClassVar[bool] = True
    number: str
    anchor: str
    name: str
    symbol: str
    formula: str
    filled: str
    result: str
    source: str
    case: str = ""
    notes: tuple[Note, ...] = ()


@dataclass(frozen=True, slots=True)
class Box:
    """A rectangle of a drawing, in the drawing's own units."""

    kind: str
    x: str
    y: str
    width: str
    height: str


@dataclass(frozen=True, slots=True)
class Path:
    """A line of a drawing; ``d`` is the SVG path."""

    kind: str
    d: str


@dataclass(frozen=True, slots=True)
class Label:
    """A text of a drawing."""

    kind: str
    x: str
    y: str
    text: str


@dataclass(frozen=True, slots=True)
class Point:
    """A marked point of a drawing."""

    x: str
    y: str


@dataclass(frozen=True, slots=True)
class Group:
    """What of a drawing belongs to one element: its designation, and that made an identifier of the page."""

    anchor: str
    designation: str
    paths: tuple[Path, ...]
    labels: tuple[Label, ...]
    potential: str = ""


@dataclass(frozen=True, slots=True)
class Drawing:
    """A drawing with its title for those who do not see it, and its caption for those who do.

    ``data`` is what is drawn as JSON, for a page that answers to a pointer; empty where there is nothing to answer.
    """

    shape: ClassVar[str] = "drawing"
    wide: ClassVar[bool] = False
    anchor: str
    title: str
    caption: str
    width: str
    height: str
    boxes: tuple[Box, ...] = ()
    paths: tuple[Path, ...] = ()
    points: tuple[Point, ...] = ()
    labels: tuple[Label, ...] = ()
    notes: tuple[Note, ...] = ()
    groups: tuple[Group, ...] = ()
    kind: str = "plot"
    data: str = ""


@dataclass(frozen=True, slots=True)
class Item:
    """An item of a list: a short label that may lead somewhere, then the text."""

    spans: tuple[Span, ...]
    label: str = ""
    href: str = ""
    mark: Mark | None = None
    aside: str = ""


@dataclass(frozen=True, slots=True)
class List:
    """A list of grounds, links or remarks; ``numbered`` where the order is an argument, ``quiet`` in small type."""

    shape: ClassVar[str] = "list"
    wide: ClassVar[bool] = False
    items: tuple[Item, ...]
    numbered: bool = False
    quiet: bool = False
    caption: str = ""
    empty: str = ""
    notes: tuple[Note, ...] = ()


@dataclass(frozen=True, slots=True)
class Notice:
    """Something that must not be missed: ``kind`` is one of problem, held, open, hazard."""

    shape: ClassVar[str] = "notice"
    wide: ClassVar[bool] = False
    kind: str
    head: str
    spans: tuple[Span, ...]
    items: tuple[Item, ...] = ()
    notes: tuple[Note, ...] = ()


Shape = Sentence | Table | FigureLine | Drawing | List | Notice


@dataclass(frozen=True, slots=True)
class Section:
    """A numbered section of a page."""

    number: str
    anchor: str
    title: str
    blocks: tuple[Shape, ...]

    @property
    def opening(self) -> tuple[Shape, ...]:
        """Return the first block, which paper keeps with the heading."""
        return self.blocks[:1]

    @property
    def rest(self) -> tuple[Shape, ...]:
        """Return the blocks after the first."""
        return self.blocks[1:]


@dataclass(frozen=True, slots=True)
class Link:
    """A link of the navigation; ``here`` marks the page that is shown."""

    text: str
    href: str
    here: bool = False


@dataclass(frozen=True, slots=True)
class TitleField:
    """One field of the title block; an empty text is left blank for signing."""

    label: str
    text: str


@dataclass(frozen=True, slots=True)
class Standing:
    """The one notice that every page carries while something is broken, held or open."""

    kind: str
    items: tuple[Item, ...]


@dataclass(frozen=True, slots=True)
class PageView:
    """A whole page, ready to be drawn.

    ``path`` is its file below the site, ``root`` leads from it back to the site's folder. ``marginal`` stands in
    the running head; ``fields`` are those of the title block. ``prose`` is ready HTML of the user's own page; ``heading``
    is empty where that brings its own. ``panel``, ``revision`` and ``tag`` are what notes written on the page are kept
    under; ``scripts`` are the small modules it works with, and nothing of it needs them to be read.
    """

    path: str
    root: str
    site_title: str
    title: str
    heading: str
    kicker: str
    mark: Mark | None
    marginal: str
    lead: Sentence | None
    standing: Standing | None
    notices: tuple[Notice, ...]
    sections: tuple[Section, ...]
    navigation: tuple[Link, ...]
    siblings: tuple[Link, ...]
    sibling_label: str
    before: Link | None
    after: Link | None
    fields: tuple[TitleField, ...]
    prose: str = ""
    panel: str = ""
    revision: str = ""
    tag: str = ""
    scripts: tuple[str, ...] = ()

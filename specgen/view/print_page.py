"""The page that holds the whole dossier for paper: its contents list here, every page after it in order.

A browser lays out and prints some hundred sheets at a time in reasonable time and memory. Above ``MOST_SHEETS`` loops the page
leaves the sheets out and says so; ``specgen build --pdf`` then prints them in batches of that many.
"""

from collections.abc import Sequence

from specgen.design.types import DecidedLoop
from specgen.view.cells import says, verdict_mark
from specgen.view.dossier import Dossier
from specgen.view.frame import PAGE_ROWS, PRINT, Place, frame
from specgen.view.shapes import Item, List, Notice, PageView, Section, Sentence, Shape, Span
from specgen.view.words import counted

MOST_SHEETS = 100


def print_page(dossier: Dossier, place: Place) -> PageView:
    """Build the head of the page: title, what stands open, contents list."""
    loops = dossier.design.loops if sheets_are_printed(dossier) else ()
    notices = () if sheets_are_printed(dossier) else (_left_out(dossier),)
    blocks: list[Shape] = [_pages()]
    if loops:
        blocks.append(_sheets(loops))
    if dossier.own_pages:
        links: list[Span] = [Span("Pages of the user's own are printed each from its own page: ")]
        for index, own in enumerate(dossier.own_pages):
            links += [Span(", "), Span(own.title, place.to(own.path))] if index else [Span(own.title, place.to(own.path))]
        blocks.append(Sentence((*links, Span(".")), quiet=True))
    section = Section("", "contents", "Contents", tuple(blocks))
    return frame(
        dossier, place, "Whole dossier", (section,), heading=dossier.title, kicker="The whole dossier in order, for paper and PDF",
        notices=notices, sheet="Whole dossier",
    )  # fmt: skip


def batch_page(dossier: Dossier, loops: Sequence[DecidedLoop]) -> PageView:
    """Build the head of a batch of sheets that is printed by itself."""
    section = Section("", "contents", "Contents", (_sheets(loops),))
    title = f"Sheets {loops[0].tag} to {loops[-1].tag}" if len(loops) > 1 else f"Sheet {loops[0].tag}"
    return frame(dossier, Place(PRINT), title, (section,), kicker=dossier.title, sheet=title)


def sheets_are_printed(dossier: Dossier) -> bool:
    """Tell whether the sheets stand on the page, or are too many for it."""
    return len(dossier.design.loops) <= MOST_SHEETS


def printed_paths(dossier: Dossier) -> tuple[str, ...]:
    """Return the pages that stand on it, in order."""
    sheets = dossier.design.loops if sheets_are_printed(dossier) else ()
    return (*(row.path for row in PAGE_ROWS if row.path != PRINT), *(f"loops/{loop.tag}.html" for loop in sheets))


def printed_anchor(path: str) -> str:
    """Return the anchor under which a page stands.

    Examples
    --------
    >>> printed_anchor("loops/TIC-101.html")
    'loops/TIC-101'
    """
    return path.removesuffix(".html")


def _pages() -> List:
    rows = [row for row in PAGE_ROWS if row.path != PRINT]
    return List(tuple(Item((Span(row.title, f"#{printed_anchor(row.path)}"), Span(f", {row.finds}"))) for row in rows), quiet=True)


def _sheets(loops: Sequence[DecidedLoop]) -> List:
    items = tuple(
        Item((Span(loop.tag, f"#loops/{loop.tag}"), Span(f" {loop.loop.service}")), mark=verdict_mark(loop.verdict)) for loop in loops
    )
    return List(items, quiet=True, caption="Sheets")


def _left_out(dossier: Dossier) -> Notice:
    text = (
        f"{counted(len(dossier.design.loops), 'sheet')} would be more than a browser can print as one page. "
        "Print a sheet from its own page, or all of them with specgen build --pdf."
    )
    return Notice("open", "The loops' sheets are not on this page.", says(text))

"""The page that holds the whole dossier for paper: its contents list here, every page after it in order.

A browser lays out and prints a thousand sheets of paper in half a minute, twice as many in several times that, and fails at some
number beyond. Above ``MOST_SHEETS`` loops the page leaves the loops' sheets out and says so; ``specgen build --pdf`` then prints
every page in batches of a size that is no trouble.
"""

from collections.abc import Sequence
from dataclasses import replace

from specgen.design.types import DecidedLoop
from specgen.view.cells import says, verdict_mark
from specgen.view.dossier import Dossier
from specgen.view.frame import PAGE_ROWS, PRINT, Place, frame
from specgen.view.shapes import Item, List, Notice, PageView, Section, Sentence, Shape, Span, Table
from specgen.view.site_checks_page import site_checks_page
from specgen.view.words import counted, listed

MOST_SHEETS = 50
SITE_CHECKS = "site-checks.html"


def print_page(dossier: Dossier, place: Place) -> PageView:
    """Build the head of the page: title, what stands open, contents list."""
    loops = dossier.design.loops if sheets_are_printed(dossier) else ()
    notices = () if sheets_are_printed(dossier) else (_left_out(dossier),)
    blocks: list[Shape] = [_pages()]
    if loops:
        blocks.append(_sheets(loops))
    if dossier.own_pages:
        # no links: on paper they would lead to where the page was printed from
        blocks.append(Sentence(says(f"Printed each from its own page: {listed([own.title for own in dossier.own_pages])}."), quiet=True))
    section = Section("", "contents", "Contents", tuple(blocks))
    return frame(
        dossier, place, "Whole dossier", (section,), heading=dossier.title, kicker="The whole dossier in order, for paper and PDF",
        notices=notices, sheet="Whole dossier",
    )  # fmt: skip


def batch_page(dossier: Dossier, views: Sequence[PageView]) -> PageView:
    """Build the head of a batch of pages that is printed by itself."""
    items = tuple(Item((Span(view.title, f"#{printed_anchor(view.path)}"), Span(f" {view.kicker}")), mark=view.mark) for view in views)
    section = Section("", "contents", "Contents", (List(items, quiet=True),))
    title = f"{views[0].title} to {views[-1].title}" if len(views) > 1 else views[0].title
    return frame(dossier, Place(PRINT), title, (section,), kicker=dossier.title, sheet=title)


def panels_own_checks(dossier: Dossier) -> PageView:
    """Build the page of site checks with what no sheet has: those of the panel itself."""
    view = site_checks_page(replace(dossier, design=replace(dossier.design, loops=())), Place(SITE_CHECKS))
    filled = tuple(section for section in view.sections if any(isinstance(block, Table) and block.rows for block in section.blocks))
    return replace(view, lead=Sentence(says("The panel's own checks; those of each loop stand on its sheet."), quiet=True), sections=filled)


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

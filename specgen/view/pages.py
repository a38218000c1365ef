"""Every page of the dossier: the fixed ones, one sheet a loop, and the user's own."""

from collections.abc import Callable, Iterator, Mapping

from specgen.design.types import Design
from specgen.view.cautions_page import cautions_page
from specgen.view.conductors_page import conductors_page
from specgen.view.dossier import Dossier
from specgen.view.firmness_page import firmness_page
from specgen.view.frame import PAGE_ROWS, Place, frame
from specgen.view.guide import guide_page
from specgen.view.heat_page import heat_page
from specgen.view.instruments_page import instruments_page
from specgen.view.load_page import load_page
from specgen.view.overview import overview_page
from specgen.view.parts_page import parts_page
from specgen.view.print_page import print_page
from specgen.view.protection_page import protection_page
from specgen.view.registers import assumptions_page, deviations_page, loops_page, open_points_page
from specgen.view.rule_book import rule_book_page
from specgen.view.schedules import outputs_page
from specgen.view.shapes import PageView
from specgen.view.sheet import sheet_page
from specgen.view.site_checks_page import site_checks_page
from specgen.view.terminals_page import terminals_page

# a page is one row in PAGE_ROWS and its builder here
BUILDERS: Mapping[str, Callable[[Dossier, Place], PageView]] = {
    "index.html": overview_page,
    "loops.html": loops_page,
    "open-points.html": open_points_page,
    "assumptions.html": assumptions_page,
    "deviations.html": deviations_page,
    "outputs.html": outputs_page,
    "firmness.html": firmness_page,
    "parts.html": parts_page,
    "conductors.html": conductors_page,
    "terminals.html": terminals_page,
    "instruments.html": instruments_page,
    "load.html": load_page,
    "heat.html": heat_page,
    "protection.html": protection_page,
    "rule-book.html": rule_book_page,
    "site-checks.html": site_checks_page,
    "cautions.html": cautions_page,
    "guide.html": guide_page,
    "print.html": print_page,
}


def page_paths(design: Design) -> tuple[str, ...]:
    """Return the file of every page that a design gives."""
    return (*(row.path for row in PAGE_ROWS), *(f"loops/{loop.tag}.html" for loop in design.loops))


def page_views(dossier: Dossier) -> Iterator[PageView]:
    """Build every page of a dossier but the user's own."""
    for row in PAGE_ROWS:
        yield BUILDERS[row.path](dossier, Place(row.path))
    loops = dossier.design.loops
    for index, loop in enumerate(loops):
        # neighbours within the area; the loops stand in the order of areas
        before = loops[index - 1] if index and loops[index - 1].loop.area == loop.loop.area else None
        after = loops[index + 1] if index + 1 < len(loops) and loops[index + 1].loop.area == loop.loop.area else None
        yield sheet_page(dossier, Place(f"loops/{loop.tag}.html"), loop, before, after)


def own_page_view(dossier: Dossier, path: str, title: str, html: str) -> PageView:
    """Set a page of the user's own, ready HTML, among the others."""
    return frame(dossier, Place(path), title, (), prose=html, heading="" if "<h1" in html else title)

"""What the pages of the panel have in common: numbered sections, the rules that belong to a page, and its calculation."""

from collections.abc import Sequence

from specgen.core.figure import Figure
from specgen.design.panel.types import PanelDesign
from specgen.rules.base import Finding
from specgen.view.basis_index import basis_index
from specgen.view.cells import says
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.grounds import grounds, in_order, sources
from specgen.view.panel_rules import RULE_PAGES, holding, panel_writer
from specgen.view.shapes import List, PageView, Section, Sentence, Shape
from specgen.view.sheet_basis import figure_lines

UNREAD = "panel.yml could not be read: nothing of the panel is worked out."
HOW_TO_READ = "The calculation in its order: formula, result, numbers put in; source beside it."
Parts = Sequence[tuple[str, str, Sequence[Shape]]]


def sections_of(parts: Parts) -> tuple[Section, ...]:
    """Make numbered sections of anchor, title and blocks each; one without blocks is left out."""
    kept = [part for part in parts if part[2]]
    return tuple(Section(str(number), anchor, title, tuple(blocks)) for number, (anchor, title, blocks) in enumerate(kept, 1))


def panel_page(dossier: Dossier, place: Place, title: str, kicker: str, parts: Parts, lead: Sentence | None = None) -> PageView:
    """Build a page of the panel; what of its rules holds the panel stands first."""
    panel = dossier.design.panel_design
    own = tuple(rule for rule, path in RULE_PAGES.items() if path == place.path)
    notices = holding(dossier, place, panel, own) if panel is not None else ()
    return frame(dossier, place, title, sections_of(parts), kicker=kicker, lead=lead, notices=notices)


def unread_page(dossier: Dossier, place: Place, title: str) -> PageView:
    """Build a page of a panel that could not be read."""
    return frame(dossier, place, title, (), lead=Sentence(says(UNREAD), lead=True))


def ruling(dossier: Dossier, place: Place, panel: PanelDesign, codes: Sequence[str], basis: Sequence[Figure] = ()) -> tuple[Shape, ...]:
    """List what the named rules of the panel found; nothing where none of them bore. ``basis`` are the page's own lines."""
    bore = in_order(found(panel, codes))
    if not bore:
        return ()
    items = grounds(dossier, place, panel_writer(dossier), bore, basis_index(basis))
    return (List(items, numbered=True, notes=sources(bore)),)


def found(panel: PanelDesign, codes: Sequence[str]) -> list[Finding]:
    """Return the findings of some rules of the panel."""
    return [finding for finding in panel.findings if finding.rule in codes]


def calculation(dossier: Dossier, basis: Sequence[Figure]) -> tuple[Shape, ...]:
    """Write the lines of a page's calculation."""
    return (Sentence(says(HOW_TO_READ), quiet=True), *figure_lines(panel_writer(dossier), tuple(basis)))

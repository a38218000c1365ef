"""What the rules of the panel as a whole found, and the page that each of them belongs to."""

from collections.abc import Collection, Mapping

from specgen.design.panel.types import PanelDesign
from specgen.view.basis_index import basis_index
from specgen.view.cells import says
from specgen.view.dossier import Dossier
from specgen.view.frame import PAGE_ROWS, Place
from specgen.view.grounds import finding_text, grounds, in_order, sources
from specgen.view.shapes import Item, List, Notice, Shape, Span
from specgen.view.words import capital, with_stop
from specgen.view.writer import Writer, panel_phrasing

STEP = 0.1
# where a reader finds what a rule of the panel looked at
RULE_PAGES: Mapping[str, str] = {
    "E1": "protection.html", "E2": "load.html", "E3": "load.html", "E4": "heat.html", "E5": "heat.html", "E6": "outputs.html",
    "E7": "protection.html", "E8": "protection.html",
}  # fmt: skip


def panel_writer(dossier: Dossier) -> Writer:
    """Return what writes the panel's numbers, in the units the panel asks its pages to show."""
    return Writer(panel_phrasing(dossier.design.panel), STEP)


def panel_blocks(dossier: Dossier, place: Place, panel: PanelDesign) -> tuple[Shape, ...]:
    """Build what the panel's rules found, each with a link to the page it belongs to."""
    bore = in_order(panel.findings)
    # the panel's calculation stands on the pages it belongs to
    items = grounds(dossier, place, panel_writer(dossier), bore, basis_index(()))
    titles = {row.path: row.title for row in PAGE_ROWS}
    linked = tuple(_linked(place, item, titles) for item in items)
    return (*holding(dossier, place, panel), List(linked, numbered=True, empty="No rule of the panel bore.", notes=sources(bore)))


def holding(dossier: Dossier, place: Place, panel: PanelDesign, codes: Collection[str] = tuple(RULE_PAGES)) -> tuple[Notice, ...]:
    """Say which must-rules, of those named, hold the panel or leave it open, each in its own sentence; nothing where none does."""
    writer = panel_writer(dossier)
    found: list[Notice] = []
    for outcome, kind, head in (("broken", "held", "The panel is held:"), ("unanswered", "open", "The panel is open:")):
        reasons = [f for f in panel.findings if f.outcome == outcome and f.weight == "must" and f.rule in codes]
        items = tuple(Item(says(finding_text(writer, f)), f.rule, place.rule(dossier, f.rule)) for f in reasons)
        if items:
            found.append(Notice(kind, head, (), items))
    return tuple(found)


def _linked(place: Place, item: Item, titles: Mapping[str, str]) -> Item:
    path = RULE_PAGES.get(item.label, "")
    if path not in titles:
        return item
    return Item((*item.spans, Span(" "), Span(titles[path], place.to(path)), Span(".")), item.label, item.href, item.mark, item.aside)


def remarks(dossier: Dossier, panel: PanelDesign) -> tuple[Item, ...]:
    """Write what is remarked about the panel."""
    writer = panel_writer(dossier)
    return tuple(Item(says(capital(with_stop(writer.sentence(remark.text, remark.words))))) for remark in panel.remarks)

"""What the rules of the panel as a whole found."""

from specgen.design.panel.types import PanelDesign
from specgen.view.basis_index import basis_index
from specgen.view.cells import says
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.grounds import grounds, in_order, sources
from specgen.view.shapes import Item, List, Shape
from specgen.view.words import capital, with_stop
from specgen.view.writer import Writer

STEP = 0.1


def panel_writer(panel: PanelDesign) -> Writer:
    """Return what writes the panel's numbers."""
    return Writer(panel.phrasing, STEP)


def panel_blocks(dossier: Dossier, place: Place, panel: PanelDesign) -> tuple[Shape, ...]:
    """Build what the panel's rules found, and what is remarked about it."""
    writer = panel_writer(panel)
    bore = in_order(panel.findings)
    # the panel's Basis has no page of its own yet, so that no line of it can be linked
    items = grounds(dossier, place, writer, bore, basis_index(()))
    blocks: list[Shape] = [List(items, numbered=True, empty="No rule of the panel bore.", notes=sources(bore))]
    if panel.remarks:
        remarks = tuple(Item(says(capital(with_stop(writer.sentence(remark.text, remark.words))))) for remark in panel.remarks)
        blocks.append(List(remarks, quiet=True, caption="Remarks"))
    return tuple(blocks)

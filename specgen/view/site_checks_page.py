"""The page of site checks: the panel's own, then every loop's, in the order of the work."""

from specgen.core.quantity import Unit
from specgen.core.say import Phrasing
from specgen.design.check import GROUPS
from specgen.design.site_checks import panel_checks, site_checks
from specgen.view.cells import says
from specgen.view.checks_table import COLUMNS, check_rows
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.shapes import PageView, Row, Section, Sentence, Shape, Span, Table
from specgen.view.writer import Writer

# the panel's own checks hold volts and ohms only, which are the same in every unit system
_WRITER = Writer(Phrasing(Unit("degC"), Unit("K")), 0.1)


def site_checks_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page: a section a group of checks, in it the panel, then loop by loop."""
    panel, loops = dossier.design.panel, dossier.design.loops
    kicker = "What to measure and watch on site, in order; what a deviation means stands on each loop's sheet"
    if panel is None:
        empty = Section("1", "site-checks", "Site checks", (Sentence(says("panel.yml could not be read."), quiet=True),))
        return frame(dossier, place, "Site checks", (empty,), kicker=kicker)
    own = panel_checks(panel)
    by_loop = {loop.tag: site_checks(loop, panel) for loop in loops}
    sections: list[Section] = []
    for number, (group, title) in enumerate(GROUPS.items(), 1):
        rows: list[Row] = []
        mine = [check for check in own if check.group == group]
        if mine:
            rows += [Row(heading=f"Panel {panel.panel.reference}"), *check_rows(_WRITER, mine)]
        for loop in loops:
            checks = [check for check in by_loop[loop.tag] if check.group == group]
            if checks:
                rows += [Row(heading=f"{loop.tag} {loop.loop.service}"), *check_rows(dossier.writers[loop.tag], checks, meanings=False)]
        blocks: tuple[Shape, ...] = (Table("", COLUMNS, tuple(rows), wide=True, empty="No loop could be decided."),)
        sections.append(Section(str(number), group.replace("_", "-"), title, blocks))
    sheets = [Span("Sheets: ")]
    for index, loop in enumerate(loops):
        sheets += (
            [Span(", "), Span(loop.tag, place.sheet(loop.tag, "site-checks"))]
            if index
            else [Span(loop.tag, place.sheet(loop.tag, "site-checks"))]
        )
    lead = Sentence((*sheets, Span(".")), quiet=True) if loops else None
    return frame(dossier, place, "Site checks", tuple(sections), kicker=kicker, lead=lead)

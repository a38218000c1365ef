"""What every page has around its sections: running head, navigation, the one notice, title block."""

from dataclasses import dataclass

from specgen.view.cells import verdict_mark
from specgen.view.dossier import Dossier, MissingLoop
from specgen.view.in_units import in_units
from specgen.view.shapes import Item, Link, Mark, Notice, PageView, Section, Sentence, Span, Standing, TitleField
from specgen.view.words import counted, listed

MOST_NAMED = 6
PRINT = "print.html"
SCRIPTS = ("dossier.js", "tables.js", "search.js", "notes.js", "reading.js")


@dataclass(frozen=True, slots=True)
class PageRow:
    """A page of the dossier: its file, title, group, what a reader finds there and who looks for it.

    ``header`` is its word in the running head, empty where the group's first page stands for it.
    """

    path: str
    title: str
    group: str
    finds: str
    reader: str
    header: str = ""


PAGE_ROWS = (
    PageRow("index.html", "Overview", "", "what was decided and what is open", "", "Overview"),
    PageRow("loops.html", "Loops", "Registers", "every loop with its decision and figures", "reviewer", "Loops"),
    PageRow("open-points.html", "Open points", "Registers", "missing inputs and how to get them", "reviewer", "Open points"),
    PageRow("assumptions.html", "Assumptions", "Registers", "what was taken for granted", "reviewer"),
    PageRow("deviations.html", "Deviations", "Registers", "rules that are broken or overridden", "reviewer"),
    PageRow("firmness.html", "How firm", "Registers", "which inputs are near to changing a decision", "reviewer"),
    PageRow("outputs.html", "Outputs", "Schedules", "controller outputs and what they drive", "panel builder", "Schedules"),
    PageRow("parts.html", "Parts", "Schedules", "what to order, and where each part stands", "panel builder"),
    PageRow("conductors.html", "Conductors", "Schedules", "every run with size, method, capacity and drop", "panel builder"),
    PageRow("terminals.html", "Terminals", "Schedules", "what is connected to each terminal", "installer"),
    PageRow("instruments.html", "Instruments", "Schedules", "sensors and switches with range, class and signal", "purchaser"),
    PageRow("load.html", "Load", "Panel", "line and neutral currents, and the incomer", "reviewer", "Panel"),
    PageRow("heat.html", "Heat", "Panel", "what warms the panel, and the control supply", "reviewer"),
    PageRow("protection.html", "Protection", "Panel", "the coordinated list of every protective device", "panel builder"),
    PageRow("rule-book.html", "Rule book", "Panel", "every rule, its source, and where it bore", "reviewer", "Rule book"),
    PageRow("site-checks.html", "Site checks", "Panel", "what to measure and watch on site, in order", "installer", "Site checks"),
    PageRow("cautions.html", "Cautions", "Panel", "what can hurt someone, and who decides", "installer"),
    PageRow("guide.html", "Guide", "Panel", "how to use this dossier, and what its signs mean", "installer"),
    PageRow(PRINT, "Print", "Panel", "the whole dossier on one page, for paper and PDF", "reviewer"),
)


@dataclass(frozen=True, slots=True)
class Place:
    """Where a page stands: links from it to others start with ``root``."""

    path: str

    @property
    def root(self) -> str:
        """Return what leads back to the site's folder."""
        return "../" * self.path.count("/")

    def to(self, path: str, anchor: str = "") -> str:
        """Return a link to another page, or to a place on it."""
        return f"{self.root}{path}#{anchor}" if anchor else f"{self.root}{path}"

    def sheet(self, tag: str, anchor: str = "") -> str:
        """Return a link to a loop's sheet."""
        return self.to(f"loops/{tag}.html", anchor)

    def rule(self, dossier: Dossier, code: str) -> str:
        """Return a link to a rule, empty where the rule book has no such place."""
        return self.to("rule-book.html", code) if code in dossier.rule_codes else ""


def frame(
    dossier: Dossier,
    place: Place,
    title: str,
    sections: tuple[Section, ...],
    *,
    kicker: str = "",
    mark: Mark | None = None,
    lead: Sentence | None = None,
    notices: tuple[Notice, ...] = (),
    before: Link | None = None,
    after: Link | None = None,
    sheet: str = "",
    prose: str = "",
    heading: str | None = None,
) -> PageView:
    """Put a page's sections into the dossier."""
    panel = dossier.design.panel
    group = next((row.group for row in PAGE_ROWS if row.path == place.path), "")
    tell = dossier.retell
    siblings = [row for row in PAGE_ROWS if group and row.group == group]
    return PageView(
        path=place.path,
        root=place.root,
        site_title=dossier.title,
        title=title,
        heading=title if heading is None else heading,
        kicker=tell(kicker) if tell is not None else kicker,
        mark=mark,
        marginal=f"{panel.panel.reference}\u2002{dossier.title}" if panel else dossier.title,
        lead=in_units(lead, tell),
        standing=standing_notice(dossier, place),
        notices=in_units(notices, tell),
        sections=in_units(sections, tell),
        navigation=tuple(_link(place, row, row.header) for row in PAGE_ROWS if row.header),
        siblings=tuple(_link(place, row, row.title) for row in siblings) if len(siblings) > 1 else (),
        sibling_label=group,
        before=before,
        after=after,
        fields=_title_block(dossier, sheet or title),
        prose=prose,
        panel=panel.panel.reference if panel else "",
        revision=panel.panel.revision if panel else "",
        tag=sheet if place.path.startswith("loops/") else "",
        scripts=SCRIPTS,
    )


def _link(place: Place, row: PageRow, text: str) -> Link:
    return Link(text, place.to(row.path), here=row.path == place.path)


def standing_notice(dossier: Dossier, place: Place) -> Standing | None:
    """Return the one notice that every page carries while something is broken, held or open."""
    errors = dossier.errors
    items: list[Item] = []
    if errors:
        where = counted(errors, "problem") + " in the input"
        lost = f"; {_missing(dossier.missing)}" if dossier.missing else ""
        items.append(Item((Span(where, place.to("index.html", "problems")), Span(lost))))
    panel = dossier.design.panel_design
    if panel is not None and panel.verdict in ("held", "open"):
        items.append(Item((Span("the panel", place.to("index.html", "panel")),), mark=verdict_mark(panel.verdict)))
    items += [_tags_item(verdict, tags, place) for verdict, tags in (("held", dossier.held), ("open", dossier.unsettled)) if tags]
    if not items:
        return None
    held = bool(dossier.held) or (panel is not None and panel.verdict == "held")
    return Standing("problem" if errors else "held" if held else "open", tuple(items))


def _missing(loops: tuple[MissingLoop, ...]) -> str:
    named = [loop.tag or f"a loop at {loop.file}:{loop.line}" for loop in loops[:MOST_NAMED]]
    if len(loops) > MOST_NAMED:
        named.append(f"{len(loops) - MOST_NAMED} more")
    return f"missing from every page until it is right: {listed(named)}"


def _tags_item(verdict: str, tags: tuple[str, ...], place: Place) -> Item:
    spans: list[Span] = []
    if len(tags) > MOST_NAMED:
        spans.append(Span(f"{len(tags)} loops", place.to("loops.html")))
    else:
        for index, tag in enumerate(tags):
            if index:
                spans.append(Span(", "))
            spans.append(Span(tag, place.sheet(tag)))
    return Item(tuple(spans), mark=verdict_mark(verdict))


def _title_block(dossier: Dossier, sheet: str) -> tuple[TitleField, ...]:
    head = dossier.design.panel.panel if dossier.design.panel else None
    return (
        TitleField("Title", dossier.title),
        TitleField("Panel", head.reference if head else ""),
        TitleField("Sheet", sheet),
        TitleField("Revision, date", f"{head.revision}, {head.date.isoformat()}" if head else ""),
        TitleField("Purpose", str(head.status) if head else ""),
        TitleField("Drawn", ""),
        TitleField("Checked", ""),
        TitleField("Approved", ""),
    )

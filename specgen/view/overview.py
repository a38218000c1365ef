"""The overview: the verdict of every loop, what is open, and where each reader goes."""

from specgen import __version__
from specgen.design.types import VERDICTS, DecidedLoop
from specgen.view.cells import says, verdict_cell, verdict_mark, word
from specgen.view.dossier import Dossier, not_examined
from specgen.view.frame import PAGE_ROWS, Place, frame
from specgen.view.panel_rules import panel_blocks
from specgen.view.registers import open_points_table
from specgen.view.shapes import Column, Item, List, PageView, Row, Section, Sentence, Shape, Span, Table
from specgen.view.sheet_title import decision_words
from specgen.view.words import VERDICT_SAYS, VERDICT_VERBS, capital, counted, listed

_READERS = (
    ("reviewer", "To challenge the decisions"),
    ("panel builder", "To order and to build"),
    ("installer", "To install and to commission"),
)
DIGEST = 12  # characters of a digest that a page shows


def overview_page(dossier: Dossier, place: Place) -> PageView:
    """Build the overview."""
    design = dossier.design
    parts: list[tuple[str, str, tuple[Shape, ...]]] = [("verdict", "Verdict", _verdicts(dossier, place))]
    if design.panel_design is not None:
        parts.append(("panel", "Panel", panel_blocks(dossier, place, design.panel_design)))
    if design.problems:
        parts.append(("problems", "Problems in the input", _problems(dossier, place)))
    parts.append(("where-to-go", "Where to go", _where_to_go(dossier, place)))
    if dossier.own_pages:
        links = tuple(Item((Span(own.title, place.to(own.path)),)) for own in dossier.own_pages)
        parts.append(("own-pages", "Further pages", (List(links),)))
    parts.append(("revision", "Revision", _revision(dossier)))
    sections = tuple(Section(str(number), anchor, title, blocks) for number, (anchor, title, blocks) in enumerate(parts, 1))
    head = design.panel.panel if design.panel else None
    kicker = "panel.yml could not be read"
    if head:
        kicker = f"Panel {head.reference}, revision {head.revision}, {head.status}, {head.date.isoformat()}"
    mark = verdict_mark(design.verdict) if design.loops else None
    return frame(dossier, place, dossier.title, sections, kicker=kicker, mark=mark, lead=_lead(dossier), sheet="Overview")


def _lead(dossier: Dossier) -> Sentence:
    loops = dossier.design.loops
    if not loops:
        return Sentence(says("No loop could be decided: see the problems below."), lead=True)
    parts = [counted(count, *VERDICT_VERBS[verdict]) for verdict in reversed(VERDICTS) if (count := dossier.count(verdict))]
    areas = len({loop.loop.area for loop in loops})
    counts = f"{counted(len(loops), 'control loop')} in {counted(areas, 'area')}"
    return Sentence(says(f"{capital(counts)}: {listed(parts)}."), lead=True)


def _verdicts(dossier: Dossier, place: Place) -> tuple[Shape, ...]:
    loops = dossier.design.loops
    met = [verdict for verdict in VERDICTS if dossier.count(verdict)]
    meaning = "; ".join(f"{verdict}: {VERDICT_SAYS[verdict]}" for verdict in met)
    columns = (Column("Loop"), Column("Service"), Column("Verdict"), Column("Decision"))
    rows: list[Row] = []
    area = ""
    for loop in loops:
        if loop.loop.area != area:
            area = loop.loop.area
            rows.append(Row(heading=area))
        rows.append(_row(dossier, place, loop))
    return Table("", columns, tuple(rows), wide=True, empty="There is no loop to show."), Sentence(says(f"{capital(meaning)}."), quiet=True)


def _row(dossier: Dossier, place: Place, loop: DecidedLoop) -> Row:
    cells = (
        word(loop.tag, place.sheet(loop.tag)),
        word(loop.loop.service),
        verdict_cell(loop.verdict),
        word(decision_words(loop, dossier.writers[loop.tag])),
    )
    return Row(cells)


def _problems(dossier: Dossier, place: Place) -> tuple[Shape, ...]:
    published = {source.name for source in dossier.design.sources}
    columns = (Column("Place"), Column("Code"), Column("What is wrong"), Column("Hint"))
    rows = []
    for problem in dossier.design.problems:
        span = problem.span
        href = place.to(f"data/source/{span.file}") if span.file in published else ""
        at = word(f"{span.file}:{span.line}:{span.column}", href)
        rows.append(Row((at, word(problem.code), word(problem.text), word(problem.hint))))
    missing = [loop.tag or f"the one at {loop.file}:{loop.line}" for loop in dossier.missing]
    blocks: list[Shape] = []
    if missing:
        blocks.append(Sentence((Span("Missing from this dossier", strong=True), Span(f" until the input is right: {listed(missing)}."))))
    blocks.append(Table("", columns, tuple(rows), wide=True))
    return tuple(blocks)


def _where_to_go(dossier: Dossier, place: Place) -> tuple[Shape, ...]:
    blocks: list[Shape] = []
    for reader, caption in _READERS:
        rows = [row for row in PAGE_ROWS if row.reader == reader]
        items = tuple(Item(says(row.finds), row.title, place.to(row.path), aside=_count(dossier, row.path)) for row in rows)
        blocks.append(List(items, caption=caption))
    loops = Item(says("to each loop's sheet: settings to enter, what to expect, what happens if it fails"), "Loops", place.to("loops.html"))
    blocks.append(List((loops,), caption="To set and to commission"))
    data = (
        Item(says("the whole design for programs"), "record.json", place.to("data/record.json")),
        *(Item(says(what), f"{name}.csv", place.to(f"data/{name}.csv")) for name, what in _FILES),
    )
    return (*blocks, List(data, caption="To carry on with in other programs"))


_FILES = (
    ("loops", "the register of loops"),
    ("outputs", "the schedule of outputs"),
    ("open-points", "the open points"),
    ("assumptions", "the assumptions, one row a loop"),
    ("firmness", "how far each input may be off"),
    ("parts", "the schedule of parts"),
    ("protection", "the coordinated list of protection"),
    ("conductors", "the schedule of conductors"),
    ("load", "what each loop draws from each conductor"),
    ("heat", "losses by loop"),
    ("control-supply", "what the control supply feeds"),
)


def _count(dossier: Dossier, path: str) -> str:
    found = [finding for part in (*dossier.design.loops, dossier.design.panel_design) if part is not None for finding in part.findings]
    counts = {
        "open-points.html": len(open_points_table(dossier, Place("index.html")).rows),
        "deviations.html": sum(1 for finding in found if finding.outcome in ("broken", "overridden")),
    }
    return str(counts[path] or "none") if path in counts else ""


def _revision(dossier: Dossier) -> tuple[Shape, ...]:
    design = dossier.design
    blocks: list[Shape] = []
    if design.panel and design.panel.panel.history:
        columns = (Column("Revision"), Column("Date"), Column("Purpose"))
        rows = tuple(Row((word(issue.revision), word(issue.date.isoformat()), word(issue.purpose))) for issue in design.panel.panel.history)
        blocks.append(Table("", columns, rows))
    left = not_examined(dossier)
    made = f"Made with specgen {__version__}, rules {design.rules_digest[:DIGEST]}, tables {design.catalogue_digest[:DIGEST]}."
    blocks.append(Sentence(says(made), quiet=True))
    if left:
        codes = ", ".join(rule.code for rule in left)
        text = f"This version does not examine {counted(len(left), 'rule')} of the book: {codes}. What is not examined is not cleared."
        blocks.append(Sentence(says(text), quiet=True))
    return tuple(blocks)

"""The page of cautions: every hazard of the panel with its loops, who decides, and where the words come from."""

from specgen.design.cautions import cautions_by_hazard
from specgen.view.cells import says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.shapes import Cell, Column, Item, List, PageView, Row, Section, Sentence, Shape, Span, Table
from specgen.view.sheet_cautions import caution_notice

MOST_NAMED = 8
_LIMITS = (
    "This dossier computes and lists; it clears nothing. That a hazard is not named here does not mean that it is not there.",
    "Limiters, alarms and interlocks are placed and set by the figures of the loop files.",
    "How reliable they have to be a risk assessment settles: no performance level and no integrity level is claimed anywhere here.",
    "Standards are starting points for whoever decides; most were recalled, with the edition below, and not held against the text.",
    "What applies on site the local code decides; work is for the licensed person that each caution names.",
)


def cautions_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    found = cautions_by_hazard(dossier.design.loops)
    every = len(dossier.design.loops)
    hazards: list[Shape] = []
    for caution, tags in found:
        spans: list[Span] = [Span("At ")]
        if len(tags) == every and every > 1:
            spans.append(Span(f"all {every} loops", place.to("loops.html")))
        else:
            for index, tag in enumerate(tags):
                spans += [Span(", "), Span(tag, place.sheet(tag, "cautions"))] if index else [Span(tag, place.sheet(tag, "cautions"))]
        hazards += [caution_notice(caution), Sentence((*spans, Span(".")), quiet=True)]
    if not hazards:
        hazards.append(Sentence(says("No loop could be decided."), quiet=True))
    columns = (Column("Caution"), Column("Source"), Column("Standing"))
    rows = tuple(Row((word(caution.caution.head), word(caution.cited), Cell(caution.standing))) for caution, _ in found)
    sources = Table("", columns, rows, empty="No caution is named.")
    sections = (
        Section("1", "limits", "What this dossier does not do", (List(tuple(Item(says(text)) for text in _LIMITS)),)),
        Section("2", "hazards", "Hazards", tuple(hazards)),
        Section("3", "sources", "Sources", (sources,)),
    )
    return frame(dossier, place, "Cautions", sections, kicker="What can hurt someone, and what local code or a licensed person decides")

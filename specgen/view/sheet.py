"""A loop's sheet: title, decision, settings, expectations, hardware, connections, failures, cautions, site checks, basis."""

from specgen.design.types import DecidedLoop
from specgen.view.basis_index import basis_index
from specgen.view.cells import says, verdict_mark
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.shapes import Item, Link, Note, Notice, PageView, Section, Sentence, Shape, Span
from specgen.view.sheet_basis import basis_section
from specgen.view.sheet_cautions import cautions_section
from specgen.view.sheet_checks import checks_section
from specgen.view.sheet_connections import connections_section
from specgen.view.sheet_decision import decision_section
from specgen.view.sheet_expect import expect_section
from specgen.view.sheet_faults import faults_section
from specgen.view.sheet_firmness import firmness_section
from specgen.view.sheet_hardware import hardware_section
from specgen.view.sheet_settings import settings_section
from specgen.view.sheet_title import kicker, title_sentence
from specgen.view.words import capital, listed, with_stop


def sheet_page(dossier: Dossier, place: Place, decided: DecidedLoop, before: DecidedLoop | None, after: DecidedLoop | None) -> PageView:
    """Build a loop's sheet."""
    writer = dossier.writers[decided.tag]
    index = basis_index(decided.basis)
    sections = [
        decision_section(dossier, place, decided, index, "1"),
        settings_section(dossier, place, decided, "2"),
        expect_section(writer, decided, index, "3"),
        hardware_section(writer, decided, "4"),
        connections_section(dossier, place, decided, "5"),
        faults_section(writer, decided, "6"),
        cautions_section(dossier, place, decided, "7"),
        checks_section(writer, decided, dossier.design.panel, "8"),
    ]
    if decided.firmness:
        sections.append(firmness_section(writer, decided, str(len(sections) + 1)))
    if decided.loop.notes:
        sections.append(Section(str(len(sections) + 1), "notes", "Notes", tuple(_notes(decided))))
    sections.append(basis_section(dossier, place, decided, str(len(sections) + 1)))
    span = decided.read
    lead_notes: tuple[Note, ...] = (Note("Source", f"{span.file}, line {span.line}", place.to(f"data/source/{span.file}"), "as read"),)
    if decided.verdict == "deviates":
        lead_notes = (_deviates(decided), *lead_notes)
    return frame(
        dossier,
        place,
        decided.tag,
        tuple(sections),
        kicker=kicker(decided, writer),
        mark=verdict_mark(decided.verdict),
        lead=Sentence((Span(title_sentence(decided, writer)),), lead=True, notes=lead_notes),
        notices=_missing(dossier, place, decided),
        before=_neighbour(place, before),
        after=_neighbour(place, after),
        sheet=decided.tag,
    )


def _deviates(decided: DecidedLoop) -> Note:
    """Say beside the verdict what it deviates from, and the reason that was given."""
    parts = []
    for outcome in ("broken", "overridden"):
        rules = [f.rule for f in decided.findings if f.weight == "should" and f.outcome == outcome]
        if rules:
            parts.append(f"{listed(rules)} {outcome}")
    choose = decided.loop.choose
    reason = f" Reason given: {with_stop(choose.because)}" if choose is not None and choose.because else ""
    return Note("Deviates", f"{'; '.join(parts)}.{reason}")


def _neighbour(place: Place, loop: DecidedLoop | None) -> Link | None:
    return None if loop is None else Link(f"{loop.tag} {loop.loop.service}", place.sheet(loop.tag))


def _notes(decided: DecidedLoop) -> list[Shape]:
    return [Sentence(says(with_stop(capital(note)))) for note in decided.loop.notes]


def _missing(dossier: Dossier, place: Place, decided: DecidedLoop) -> tuple[Notice, ...]:
    """Name each input that is missing, what it would settle, and how to get it."""
    if not decided.missing:
        return ()
    items = []
    for missing in decided.missing:
        spans: list[Span] = []
        for index, code in enumerate(missing.settles):
            spans += [Span(", " if index else "settles "), Span(code, place.rule(dossier, code))]
        items.append(Item((*spans, Span(f"; {missing.how}" if spans else missing.how)), missing.field))
    return (Notice("open", "Missing for this loop:", (), tuple(items)),)

"""Section Decision of a sheet: the grounds with their rules, and the alternatives with what ended each."""

from dataclasses import replace

from specgen.design.types import DecidedLoop, Examined
from specgen.rules.base import Finding
from specgen.view.basis_index import BasisIndex
from specgen.view.cells import NO_NUMBER, number
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.grounds import grounds, in_order, sources
from specgen.view.shapes import Cell, Column, List, Row, Section, Sentence, Shape, Span, Table
from specgen.view.summary import Summary, summary_of_examined
from specgen.view.words import DONE, MODES, THROUGH, capital, listed, with_stop
from specgen.view.writer import Writer

_DECIDING = "MDCV"  # families whose rules are the argument for mode and setting


def decision_section(dossier: Dossier, place: Place, decided: DecidedLoop, index: BasisIndex, number_: str) -> Section:
    """Build the section."""
    return Section(
        number_,
        "decision",
        "Decision",
        (_chosen(decided), *_grounds(dossier, place, decided, index), _alternatives(dossier, place, decided)),
    )


def _chosen(decided: DecidedLoop) -> Sentence:
    candidate = decided.decision.chosen.case.candidate
    chosen = f"{DONE[candidate.mode]} {THROUGH[candidate.device]}"
    choose = decided.loop.choose
    if decided.decision.by_designer:
        reason = f" Reason given: {with_stop(choose.because)}" if choose is not None and choose.because else ""
        return Sentence((Span(chosen, strong=True), Span(f": the designer's own choice, held against every rule.{reason}")))
    return Sentence((Span(chosen, strong=True), Span(f". {capital(with_stop(decided.decision.because))}")))


def _grounds(dossier: Dossier, place: Place, decided: DecidedLoop, index: BasisIndex) -> tuple[Shape, ...]:
    """List what decided the loop, then what it was held against besides."""
    writer = dossier.writers[decided.tag]
    ended = {code for rejected in decided.decision.rejected for code in rejected.ruled_out_by}
    deciding: list[Finding] = []
    others: list[Finding] = []
    for finding in in_order(decided.findings):
        decides = finding.outcome != "holds" or finding.rule in ended or (finding.rule[0] in _DECIDING and finding.weight != "note")
        (deciding if decides else others).append(finding)
    items = grounds(dossier, place, writer, deciding, index)
    first = List(items, numbered=True, empty="No rule bore on this loop.", notes=sources(deciding))
    if not others:
        return (first,)
    rest = grounds(dossier, place, writer, others, index)
    return first, List(rest, numbered=True, quiet=True, caption="Also kept", notes=sources(others))


def _alternatives(dossier: Dossier, place: Place, decided: DecidedLoop) -> Table:
    writer = dossier.writers[decided.tag]
    columns = (
        Column("Mode"),
        Column("Through"),
        Column("Stays within", writer.change_unit, number=True),
        Column("Operations an hour", number=True),
        Column("Contact life", "years", number=True),
        Column("Ended by"),
    )
    rows = [_row(writer, decided.decision.chosen, Cell("chosen"), chosen=True)]
    for rejected in decided.decision.rejected:
        first = rejected.ruled_out_by[0]
        others = f" Also {listed(rejected.ruled_out_by[1:])}." if len(rejected.ruled_out_by) > 1 else ""
        ended = Cell(first, href=place.rule(dossier, first), aside=with_stop(rejected.text) + others)
        _add(rows, _row(writer, rejected.examined, ended))
    return Table("Alternatives considered", columns, tuple(rows), wide=True)


def _add(rows: list[Row], row: Row) -> None:
    """Add a row, or its device to one that differs in nothing else and has no figures to compare."""
    for index, before in enumerate(rows):
        if not before.chosen and (before.cells[0], *before.cells[2:]) == (row.cells[0], *row.cells[2:]) and row.cells[2] == NO_NUMBER:
            devices = replace(before.cells[1], text=f"{before.cells[1].text}, {row.cells[1].text}")
            rows[index] = replace(before, cells=(before.cells[0], devices, *before.cells[2:]))
            return
    rows.append(row)


def _row(writer: Writer, examined: Examined, ended: Cell, *, chosen: bool = False) -> Row:
    short: Summary = summary_of_examined(examined)
    excursion, rate, life = short.excursion, short.operations_per_hour, short.contact_life
    return Row(
        (
            Cell(MODES[short.mode]),
            Cell(short.device, aside=short.entered_with(writer)),
            NO_NUMBER if excursion is None else number(writer.excursion_number(excursion, short.allowed), writer.shown_change(excursion)),
            NO_NUMBER if rate is None else number(writer.bare(rate), rate),
            NO_NUMBER if life is None else number(writer.years_number(life), life),
            ended,
        ),
        chosen=chosen,
    )

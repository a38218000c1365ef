"""Section Decision of a sheet: the grounds with their rules, and the alternatives with what ended each."""

from dataclasses import replace

from specgen.design.types import DecidedLoop, Examined
from specgen.rules.base import Finding
from specgen.rules.engine import place_of
from specgen.view.basis_index import BasisIndex
from specgen.view.cells import NO_NUMBER, number
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.registers import finding_text
from specgen.view.shapes import Cell, Column, Item, List, Mark, Note, Row, Section, Sentence, Shape, Span, Table
from specgen.view.summary import Summary, summary_of_examined
from specgen.view.words import DONE, MODES, OUTCOMES, THROUGH, capital, listed, with_stop
from specgen.view.writer import Writer

# what a reviewer must see first: what is broken, then what is not answered, then what was overridden
_OUTCOME_ORDER = {"broken": 0, "unanswered": 1, "overridden": 2, "holds": 3}
_WEIGHT_ORDER = {"must": 0, "should": 1, "note": 2}
_ARGUMENT = "MDCVTISOAE"
_DECIDING = "MDCV"
_MARKS = {
    ("broken", "must"): "held", ("broken", "should"): "deviates", ("broken", "note"): "deviates",
    ("unanswered", "must"): "open", ("unanswered", "should"): "open", ("unanswered", "note"): "open",
    ("overridden", "should"): "deviates", ("overridden", "note"): "deviates",
}  # fmt: skip


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
    bore = [finding for finding in decided.findings if finding.outcome != "does_not_apply"]
    bore.sort(key=lambda f: (_OUTCOME_ORDER[f.outcome], _WEIGHT_ORDER[f.weight] if f.outcome != "holds" else 0, _argument(f.rule)))
    ended = {code for rejected in decided.decision.rejected for code in rejected.ruled_out_by}
    deciding = [f for f in bore if f.outcome != "holds" or f.rule in ended or (f.rule[0] in _DECIDING and f.weight != "note")]
    others = [f for f in bore if f not in deciding]
    grounds = tuple(_ground(dossier, place, writer, finding, index) for finding in deciding)
    rest = tuple(_ground(dossier, place, writer, finding, index) for finding in others)
    first = List(grounds, numbered=True, empty="No rule bore on this loop.", notes=_sources(deciding))
    if not rest:
        return (first,)
    return first, List(rest, numbered=True, quiet=True, caption="Also kept", notes=_sources(others))


def _argument(code: str) -> tuple[int, int]:
    """Order rules as an argument goes: mode, then setting, then what the rest says."""
    return _ARGUMENT.index(code[0]), place_of(code)[1]


def _ground(dossier: Dossier, place: Place, writer: Writer, finding: Finding, index: BasisIndex) -> Item:
    kind = _MARKS.get((finding.outcome, finding.weight))
    mark = Mark(kind, f"{OUTCOMES[finding.outcome]}, {finding.weight}") if kind else None
    spans = [Span(capital(finding_text(writer, finding)))]
    for line in index.of_finding(finding):
        spans += [Span(" "), Span(f"Basis\u00a0{line}" if len(spans) == 1 else str(line), f"#basis-{line}")]
    return Item(tuple(spans), finding.rule, place.rule(dossier, finding.rule), mark)


def _sources(findings: list[Finding]) -> tuple[Note, ...]:
    """Name each source once with the rules that rest on it."""
    by_source: dict[str, list[str]] = {}
    for finding in sorted(findings, key=lambda f: place_of(f.rule)):
        for cite in finding.cites:
            by_source.setdefault(cite, []).append(finding.rule)
    return tuple(Note(" ".join(rules), source) for source, rules in by_source.items())


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

"""The rule book: every rule with its sentence, weight and source, and the loops it bore on."""

from specgen.rules.engine import LoadedRule
from specgen.view.cells import says, word
from specgen.view.dossier import Dossier, not_examined
from specgen.view.frame import Place, frame
from specgen.view.registers import PANEL
from specgen.view.shapes import Cell, Column, PageView, Row, Section, Sentence, Span, Table
from specgen.view.words import FAMILIES, OUTCOMES, capital, counted, with_stop

_TOLD = ("broken", "unanswered", "overridden")
MOST_NAMED = 6
_COLUMNS = (Column("Rule"), Column("What it asks, and why"), Column("Source"), Column("Where it bore"))


def rule_book_page(dossier: Dossier, place: Place) -> PageView:
    """Build the rule book."""
    bore = _bore(dossier)
    sections: list[Section] = []
    for family, title in FAMILIES.items():
        own = [loaded for loaded in dossier.rules if loaded.rule.code[0] == family]
        if own:
            rows = tuple(_row(loaded, bore.get(loaded.rule.code, {}), place) for loaded in own)
            number = str(len(sections) + 1)
            sections.append(Section(number, f"family-{family}", title, (Table("", _COLUMNS, rows, wide=True),)))
    left_out = not_examined(dossier)
    remark = Sentence(says("What is not examined is not cleared."), quiet=True)
    rows = tuple(Row((word(rule.code), word(rule.weight), word(with_stop(capital(rule.sentence)))), anchor=rule.code) for rule in left_out)
    left = Table("", (Column("Rule"), Column("Weight"), Column("What it will ask")), rows, empty="Every rule of the book is examined.")
    sections.append(Section(str(len(sections) + 1), "not-examined", "Not examined in this version", (remark, left)))
    kicker = "A must-rule that is broken holds the loop; a should-rule may be overridden with a reason; a note is said"
    return frame(dossier, place, "Rule book", tuple(sections), kicker=kicker)


def _row(loaded: LoadedRule, bore: dict[str, list[str]], place: Place) -> Row:
    rule = loaded.rule
    why = " ".join(loaded.explanation.split())
    return Row(
        (
            word(f"{rule.code} {rule.weight}", aside=rule.name),
            Cell(with_stop(capital(loaded.sentence)), aside=why),
            word("; ".join(rule.cites)),
            Cell("", spans=_where(bore, place)),
        ),
        anchor=rule.code,
    )


def _bore(dossier: Dossier) -> dict[str, dict[str, list[str]]]:
    """Collect for each rule and outcome the loops it bore on."""
    found: dict[str, dict[str, list[str]]] = {}
    for loop in dossier.design.loops:
        for finding in loop.findings:
            if finding.outcome != "does_not_apply":
                found.setdefault(finding.rule, {}).setdefault(finding.outcome, []).append(loop.tag)
    panel = dossier.design.panel_design
    for finding in panel.findings if panel else ():
        if finding.outcome != "does_not_apply":
            found.setdefault(finding.rule, {}).setdefault(finding.outcome, []).append(PANEL)
    return found


def _where(bore: dict[str, list[str]], place: Place) -> tuple[Span, ...]:
    """Name the loops where a rule did not simply hold, and count the others."""
    spans: list[Span] = []
    for outcome in (*_TOLD, "holds"):
        tags = bore.get(outcome, [])
        if not tags:
            continue
        if spans:
            spans.append(Span("; "))
        if outcome == "holds" and len(tags) > MOST_NAMED:
            spans.append(Span(f"holds in {counted(len(tags), 'loop')}"))
            continue
        spans.append(Span(f"{OUTCOMES[outcome]}: "))
        for index, tag in enumerate(tags):
            whose = Span(PANEL, place.to("index.html", "panel")) if tag == PANEL else Span(tag, place.sheet(tag))
            spans += [Span(", "), whose] if index else [whose]
    return tuple(spans) or (Span("nowhere here"),)

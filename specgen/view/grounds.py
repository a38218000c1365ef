"""Findings as a numbered argument: each with its rule, its sentence, and the lines of the Basis its numbers come from."""

from collections.abc import Sequence

from specgen.rules.base import Finding
from specgen.rules.engine import place_of
from specgen.view.basis_index import BasisIndex
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.shapes import Item, Mark, Note, Span
from specgen.view.words import OUTCOMES, capital, with_stop
from specgen.view.writer import Writer

# what a reviewer must see first: what is broken, then what is not answered, then what was overridden
_OUTCOME_ORDER = {"broken": 0, "unanswered": 1, "overridden": 2, "holds": 3}
_WEIGHT_ORDER = {"must": 0, "should": 1, "note": 2}
# as an argument goes: mode, then setting, then what the rest says
_ARGUMENT = "MDCVTISOAE"
_MARKS = {
    ("broken", "must"): "held", ("broken", "should"): "deviates", ("broken", "note"): "deviates",
    ("unanswered", "must"): "open", ("unanswered", "should"): "open", ("unanswered", "note"): "open",
    ("overridden", "should"): "deviates", ("overridden", "note"): "deviates",
}  # fmt: skip


def in_order(findings: Sequence[Finding]) -> list[Finding]:
    """Return what bore, in the order of the argument."""
    bore = [finding for finding in findings if finding.outcome != "does_not_apply"]
    return sorted(bore, key=_order)


def _order(finding: Finding) -> tuple[int, int, int, int]:
    weight = _WEIGHT_ORDER[finding.weight] if finding.outcome != "holds" else 0
    return _OUTCOME_ORDER[finding.outcome], weight, _ARGUMENT.index(finding.rule[0]), place_of(finding.rule)[1]


def grounds(dossier: Dossier, place: Place, writer: Writer, findings: Sequence[Finding], index: BasisIndex) -> tuple[Item, ...]:
    """Write findings as items; rules that one missing input leaves unanswered share an item."""
    items: list[Item] = []
    shared: dict[tuple[str, str, str], int] = {}
    for finding in findings:
        text = finding_text(writer, finding)
        key = (finding.outcome, finding.weight, text)
        if finding.outcome == "unanswered" and key in shared:
            before = items[shared[key]]
            link = Span(finding.rule, place.rule(dossier, finding.rule))
            more = (Span(", "), link) if len(before.spans) > 1 else (Span(" So for "), link)
            items[shared[key]] = Item((*before.spans, *more), before.label, before.href, before.mark)
            continue
        shared[key] = len(items)
        items.append(_ground(dossier, place, finding, text, index))
    return tuple(items)


def _ground(dossier: Dossier, place: Place, finding: Finding, text: str, index: BasisIndex) -> Item:
    kind = _MARKS.get((finding.outcome, finding.weight))
    mark = Mark(kind, f"{OUTCOMES[finding.outcome]}, {finding.weight}") if kind else None
    spans = [Span(capital(text))]
    if finding.outcome != "unanswered":
        for line in index.of_finding(finding):
            spans += [Span(" "), Span(f"Basis\u00a0{line}" if len(spans) == 1 else str(line), f"#b{line}")]
    return Item(tuple(spans), finding.rule, place.rule(dossier, finding.rule), mark)


def finding_text(writer: Writer, finding: Finding) -> str:
    """Write a finding's sentence with this loop's numbers."""
    return with_stop(writer.sentence(finding.text, finding.words))


def sources(findings: Sequence[Finding]) -> tuple[Note, ...]:
    """Name each source once with the rules that rest on it."""
    by_source: dict[str, list[str]] = {}
    for finding in sorted(findings, key=lambda f: place_of(f.rule)):
        for cite in finding.cites:
            by_source.setdefault(cite, []).append(finding.rule)
    return tuple(Note(" ".join(rules), source) for source, rules in by_source.items())

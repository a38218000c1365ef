"""A loop in a terminal: one line for the table of verdicts, and its whole reasoning."""

from specgen.design.types import DecidedLoop
from specgen.view.grounds import finding_text
from specgen.view.sheet_title import title_sentence
from specgen.view.words import DEVICES, MODES, OUTCOMES, capital, with_stop
from specgen.view.writer import writer_for

_FIRST = {"broken": 0, "unanswered": 1, "overridden": 2, "holds": 3}


def one_line(decided: DecidedLoop) -> str:
    """Return the decision in one sentence."""
    return title_sentence(decided, writer_for(decided))


def reasoning(decided: DecidedLoop) -> str:
    """Return every ground and every alternative of a loop, as text."""
    writer = writer_for(decided)
    loop, read = decided.loop, decided.read
    lines = [f"{loop.tag}  {loop.service}  [{decided.verdict}]  {read.file}:{read.line}", "", title_sentence(decided, writer), ""]
    lines += ["Chosen: " + with_stop(capital(decided.decision.because)), "", "Grounds"]
    bore = sorted((f for f in decided.findings if f.outcome != "does_not_apply"), key=lambda f: _FIRST[f.outcome])
    lines += [f"  {f.rule:<4} {f.weight:<6} {OUTCOMES[f.outcome]:<10}  {capital(finding_text(writer, f))}" for f in bore]
    lines += ["", "Alternatives"]
    for rejected in decided.decision.rejected:
        candidate = rejected.examined.case.candidate
        name = f"{MODES[candidate.mode]}, {DEVICES[candidate.device]}"
        lines.append(f"  {name:<36} {' '.join(rejected.ruled_out_by)}: {with_stop(rejected.text)}")
    if decided.missing:
        lines += ["", "Missing"]
        lines += [f"  {m.field}: {m.how}" + (f" (settles {', '.join(m.settles)})" if m.settles else "") for m in decided.missing]
    if decided.assumptions:
        lines += ["", "Assumed"]
        lines += [f"  {a.field} = {a.value}: {a.why}" for a in decided.assumptions]
    return "\n".join(lines)

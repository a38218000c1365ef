"""Section Basis of a sheet: assumptions, inputs with the line each came from, and the calculation line by line."""

from math import isfinite

from pydantic import BaseModel

from specgen.core.diagnostic import Path, Span
from specgen.core.figure import Figure
from specgen.design.types import DecidedLoop
from specgen.model.loop import Loop
from specgen.view.cells import says, word
from specgen.view.dossier import Dossier, not_examined
from specgen.view.frame import Place
from specgen.view.shapes import Column, FigureLine, Row, Section, Sentence, Shape, Table
from specgen.view.shapes import Span as Run
from specgen.view.words import FAMILIES
from specgen.view.writer import Writer

_HOW_TO_READ = "The calculation in its order: formula, result, numbers put in; source and worst case beside it."
LONG = 32  # characters from which a repeated source or case is referred to
_NOT_INPUTS = frozenset({"tag", "service", "same_as"})
_ALIASES = {("sensor", "class"): "class_", ("sensor", "range"): "measured_range"}


def basis_section(dossier: Dossier, place: Place, decided: DecidedLoop, number: str) -> Section:
    """Build the section."""
    blocks: list[Shape] = [_assumptions(decided), _inputs(place, decided)]
    blocks.append(Sentence(says(_HOW_TO_READ), quiet=True))
    blocks += figure_lines(dossier.writers[decided.tag], decided.basis)
    blocks.append(_left_out(dossier, place))
    return Section(number, "basis", "Basis", tuple(blocks))


def _assumptions(decided: DecidedLoop) -> Table:
    columns = (Column("Stands for"), Column("Taken as"), Column("Because"))
    rows = tuple(Row((word(a.field), word(a.value), word(a.why))) for a in decided.assumptions)
    return Table("Assumptions", columns, rows, wide=True, empty="Nothing was taken for granted.")


def _inputs(place: Place, decided: DecidedLoop) -> Table:
    """List what the loop file says, as it says it, one row a line of a section."""
    columns = (Column("Input"), Column("As written", quoted=True), Column("File and line"))
    grouped: dict[tuple[Path, str, int], list[tuple[Path, str]]] = {}
    for path, text, span in inputs_of(decided):
        grouped.setdefault((path[:-1], span.file, span.line), []).append((path, text))
    rows: list[Row] = []
    linked: set[str] = set()
    for (section, file, line), fields in grouped.items():
        if len(fields) == 1:
            name, text = _dotted(fields[0][0]), fields[0][1]
        else:
            name, text = _dotted(section), ", ".join(f"{path[-1]} {text}" if isinstance(path[-1], str) else text for path, text in fields)
        aside = "same_as" if fields[0][0] in decided.read.inherited else ""
        # one link a file is enough: none can lead to a line
        href = "" if file in linked else place.to(f"data/source/{file}")
        linked.add(file)
        rows.append(Row((word(name), word(text), word(f"{file}:{line}", href, aside))))
    return Table("Inputs", columns, tuple(rows), wide=True, empty="Nothing was read.")


def inputs_of(decided: DecidedLoop) -> list[tuple[Path, str, Span]]:
    """Return every written field of a loop with its text and place, in the order of the file, what is inherited last."""
    loop, read = decided.loop, decided.read
    found: list[tuple[Path, str, Span]] = []
    sections = {path[:-1] for path in read.spans}
    for path in read.spans:
        if path in sections or not path or path[0] in _NOT_INPUTS:
            continue
        text = written(loop, path)
        if text is not None:
            found.append((path, text, read.spans[path]))
    found.sort(key=lambda row: (row[2].file != read.file, row[2]))
    return found


def written(loop: Loop, path: Path) -> str | None:
    """Return a field's text as it was written; None for what is no single value."""
    here: object = loop
    for depth, step in enumerate(path):
        if isinstance(step, int):
            here = here[step] if isinstance(here, tuple) and step < len(here) else None
        else:
            here = getattr(here, _ALIASES.get((str(path[0]), step), step) if depth == 1 else step, None)
        if here is None:
            return None
    return _text_of(here)


def _text_of(here: object) -> str | None:
    """Return what a value was written as; the commonest kinds first, since whether it is a model is slow to ask."""
    if isinstance(here, str):
        return here
    text = getattr(here, "text", None)
    if isinstance(text, str):
        return text
    if isinstance(here, bool):
        return "yes" if here else "no"
    if isinstance(here, tuple):
        return ", ".join(map(str, here)) if here else "[]"
    if isinstance(here, BaseModel):
        # a short form: `tolerance: 1.5 K` stands for both sides
        first = next((value for value in dict(here).values() if value is not None), None)
        return None if first is None else _text_of(first)
    return str(here)


def _dotted(path: Path) -> str:
    text = ""
    for step in path:
        text += f"[{step + 1}]" if isinstance(step, int) else f".{step}" if text else step
    return text


def figure_lines(writer: Writer, basis: tuple[Figure, ...]) -> list[Shape]:
    """Write every figure as a numbered line; source and case that repeat the line before refer to where they stand in full."""
    lines: list[Shape] = []
    sources: dict[str, int] = {}
    cases: dict[str, int] = {}
    for index, figure in enumerate(basis, 1):
        filled = ", ".join(f"{symbol} = {_number(writer, value, dimension)}" for symbol, (value, dimension) in figure.with_.items())
        lines.append(
            FigureLine(
                number=str(index),
                anchor=f"b{index}",
                name=figure.name,
                symbol=figure.symbol,
                formula="" if figure.formula == figure.symbol else figure.formula,
                filled=filled,
                result=_number(writer, figure.value, figure.dimension),
                source=_once(sources, figure.source, index, "source"),
                case=_once(cases, figure.case, index, "case"),
            )
        )
    return lines


def _once(known: dict[str, int], text: str, index: int, what: str) -> str:
    """Return a text where it stands first, and later, if it is long, where that was."""
    first = known.setdefault(text, index)
    return text if first == index or len(text) < LONG else f"{what} as in {first}"


def _number(writer: Writer, value: float, dimension: str) -> str:
    """Write a number with one digit more than the tables have, so that a reader can follow the sum."""
    if dimension == "value" and isfinite(value):
        return writer.one_digit_more(value)
    return writer.say(value, dimension, 4)


def _left_out(dossier: Dossier, place: Place) -> Sentence:
    """Name the rules that were not asked, so that no silence reads as clearance."""
    left = [rule.code for rule in not_examined(dossier)]
    if not left:
        return Sentence(says("Every rule of the book was asked."), quiet=True)
    parts = []
    for family, title in FAMILIES.items():
        codes = [code for code in left if code[0] == family]
        if codes:
            parts.append(f"{title.lower()} {' '.join(codes)}")
    spans = (
        Run("Not examined:", strong=True),
        Run(f" {'; '.join(parts)}. What is not examined is not cleared: "),
        Run("what each will ask", place.to("rule-book.html", "not-examined")),
        Run("."),
    )
    return Sentence(spans, quiet=True)

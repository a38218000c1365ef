"""What every page is built from: the design, the rule book, the user's own pages, and what is missing."""

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from specgen.core.diagnostic import Diagnostic
from specgen.design.types import Design
from specgen.rules.engine import LoadedRule, all_rules
from specgen.rules.planned import Planned
from specgen.rules.planned import not_examined as planned_but
from specgen.source.text import cut
from specgen.view.in_units import Retell, retelling
from specgen.view.writer import Writer, system_of, writer_for

_TAG_LINE = re.compile(r"^tag:[ \t]*(['\"]?)([A-Za-z0-9-]{1,40})\1[ \t]*(#.*)?$", re.MULTILINE)
_NOT_LOOPS = ("panel.yml", "devices.yml")


@dataclass(frozen=True, slots=True)
class OwnPage:
    """A page of the user's own: its title and its file below the site."""

    title: str
    path: str


@dataclass(frozen=True, slots=True)
class MissingLoop:
    """A loop document that could not be decided: its tag, or empty where even that could not be read, and its place."""

    tag: str
    file: str
    line: int


@dataclass(frozen=True, slots=True)
class Dossier:
    """A design with what its pages need besides.

    ``held`` and ``unsettled`` are the tags of the loops that every page must name, ``errors`` the number of problems in the input,
    ``rule_codes`` the rules that are examined. ``retell`` turns ready texts over into the units of the pages, where that is needed.
    """

    design: Design
    rules: tuple[LoadedRule, ...]
    own_pages: tuple[OwnPage, ...]
    missing: tuple[MissingLoop, ...]
    writers: Mapping[str, Writer]
    held: tuple[str, ...]
    unsettled: tuple[str, ...]
    errors: int
    rule_codes: frozenset[str]
    retell: Retell | None = None

    @property
    def title(self) -> str:
        """Return the dossier's title."""
        return self.design.panel.panel.title if self.design.panel else "Design dossier"

    def count(self, verdict: str) -> int:
        """Count the loops of one verdict."""
        return sum(1 for loop in self.design.loops if loop.verdict == verdict)


def dossier_of(design: Design, own_pages: Sequence[OwnPage] = ()) -> Dossier:
    """Gather what the pages are built from."""
    system = system_of(design.panel)
    writers = {loop.tag: writer_for(loop, system) for loop in design.loops}
    return Dossier(
        design=design,
        rules=all_rules(),
        own_pages=tuple(own_pages),
        missing=missing_loops(design),
        writers=writers,
        held=tuple(loop.tag for loop in design.loops if loop.verdict == "held"),
        unsettled=tuple(loop.tag for loop in design.loops if loop.verdict == "open"),
        errors=sum(1 for problem in design.problems if problem.severity == "error"),
        rule_codes=frozenset(loaded.rule.code for loaded in all_rules()),
        retell=retelling(design),
    )


def missing_loops(design: Design) -> tuple[MissingLoop, ...]:
    """Return the loop documents that hold a problem and are not among the decided loops.

    The tag is looked up in the document's own text, since a document with a problem has no model.
    """
    decided = {loop.tag.lower() for loop in design.loops}
    texts = {source.name: source.content.decode("utf-8", "replace").replace("\r\n", "\n") for source in design.sources}
    found: dict[tuple[str, int], MissingLoop] = {}
    for problem in design.problems:
        text = texts.get(problem.span.file)
        if text is None or problem.severity != "error" or problem.span.file.endswith(_NOT_LOOPS):
            continue
        tag, line = _document_at(text, problem)
        if tag.lower() not in decided:
            found.setdefault((problem.span.file, line), MissingLoop(tag, problem.span.file, line))
    return tuple(sorted(found.values(), key=lambda loop: (loop.tag.lower(), loop.file, loop.line)))


def _document_at(text: str, problem: Diagnostic) -> tuple[str, int]:
    """Return the tag of the document around a problem and the line it starts on."""
    pieces, _ = cut(text, problem.span.file)
    around = [piece for piece in pieces if piece.first_line < problem.span.line]
    if not around:
        return "", 1
    match = _TAG_LINE.search(around[-1].text)
    return (match[2] if match else ""), around[-1].first_line + 1


def not_examined(dossier: Dossier) -> tuple[Planned, ...]:
    """Return the rules of the book that this version does not ask."""
    return planned_but(dossier.rule_codes)

"""From YAML's events to plain data, step by step and never by recursion: what a file nests cannot exhaust anything."""

import re
from collections.abc import Callable, Mapping
from dataclasses import replace
from typing import Any, NoReturn

import yaml
from yaml.events import (
    AliasEvent,
    DocumentEndEvent,
    DocumentStartEvent,
    Event,
    MappingEndEvent,
    MappingStartEvent,
    ScalarEvent,
    SequenceEndEvent,
    SequenceStartEvent,
)

from specgen.core.codes import shown
from specgen.core.diagnostic import Diagnostic, Path, Severity, Span
from specgen.source.document import Data, Document, Place, Spans
from specgen.source.parser import parser_for
from specgen.source.text import CONTROL, DEEPEST, Piece
from specgen.source.wording import plain_words

MOST_EXPANDED = 10_000
_NUMBER_SIGN = re.compile(r"(?<=\S)\s+#(?=[0-9])")
_NOTHING = frozenset({"", "~", "null", "Null", "NULL"})


class _StopError(Exception):
    """The document cannot be read further; the reason is among the problems."""


class _Open:
    """A section or a list whose end has not come yet; ``path`` is None where its content is dropped."""

    __slots__ = ("drop", "items", "key", "key_place", "path", "section", "start")

    def __init__(self, start: MappingStartEvent | SequenceStartEvent, path: Path | None) -> None:
        self.start = start
        self.path = path
        self.section: dict[str, Data] | None = {} if isinstance(start, MappingStartEvent) else None
        self.items: list[Data] = []
        self.key: str | None = None
        self.key_place: Place = (1, 1, 1)
        self.drop = False


class _Composer:
    """Builds the documents of one piece of text."""

    def __init__(self, piece: Piece, file: str) -> None:
        self.file = file
        self.first_line = piece.first_line + 1
        self.lines = piece.text.split("\n")
        self.problems: list[Diagnostic] = []
        self.documents: list[Document] = []
        # where a plain value ends and ` #2` follows: the text `Pump #2` is cut there by YAML without a word
        self.numbered = _numbered(self.lines) if " #" in piece.text else frozenset()

    def run(self, index: int) -> None:
        """Read all events; a problem that ends a document leaves the documents before it."""
        self.index = index
        try:
            get_event = parser_for("\n".join(self.lines)).get_event
            while (event := get_event()) is not None:
                handler = _HANDLERS.get(type(event))
                if handler is not None:
                    handler(self, event)
        except yaml.YAMLError as error:
            self.problems.append(plain_words(error, self.lines, self.file, self.first_line))
            if self.documents:
                self.documents[-1] = replace(self.documents[-1], sound=False)
        except _StopError:
            pass

    def begin(self, _event: DocumentStartEvent) -> None:
        self.anchors: dict[str, Data | None] = {}
        self.budget = MOST_EXPANDED
        self.places: dict[Path, Place] = {}
        self.key_places: dict[Path, Place] = {}
        self.root: Data | None = None
        self.stack: list[_Open | None] = []
        self.open: _Open | None = None
        self.before = len(self.problems)

    def finish(self, _event: DocumentEndEvent) -> None:
        if self.root is None:
            return
        spans, key_spans = Spans(self.file, self.places), Spans(self.file, self.key_places)
        sound = all(problem.severity == "warning" for problem in self.problems[self.before :])
        line = self.places[()][0]
        self.documents.append(Document(self.file, self.index + len(self.documents), line, self.root, spans, key_spans, sound))

    def scalar(self, event: ScalarEvent) -> None:
        place = self.place(event)
        value: str = event.value
        if event.tag is not None:
            self.tagged(event)
        if event.style == '"' and CONTROL.search(value):
            self.problem(place, "Y104", "an escape stands for a control character", "delete it")
        if self.numbered and (place[0] - self.first_line, place[1] + place[2]) in self.numbered and not event.style:
            self.problem(place, "Y122", "what follows # is taken for a comment", 'put the text in quotes: "... #2"', "warning")
        opened = self.open
        if opened is not None and opened.section is not None and opened.key is None:
            self.begin_entry(opened, opened.section, value, place)
        else:
            if value in _NOTHING:
                if opened is None:
                    return
                self.without_value(opened, place)
                value = ""
            self.put(value, place)
        if event.anchor is not None:
            self.anchors[event.anchor] = value

    def start(self, event: MappingStartEvent | SequenceStartEvent) -> None:
        place = self.place(event)
        opened = self.open
        path: Path | None = ()
        if event.tag is not None:
            self.tagged(event)
        if len(self.stack) == DEEPEST:
            self.stop(place, "Y109", f"this is nested deeper than {DEEPEST} levels", "no field of a loop file needs that")
        if opened is not None and opened.section is not None:
            if opened.key is None:
                self.stop(place, "Y113", "a key is text, not a list or a section", 'put text that starts with { or [ in quotes: "..."')
            path = None if opened.drop or opened.path is None else (*opened.path, opened.key)
        elif opened is not None:
            path = None if opened.path is None else (*opened.path, len(opened.items))
        if event.anchor is not None:
            self.anchors[event.anchor] = None
        self.stack.append(opened)
        self.open = _Open(event, path)

    def end(self, event: MappingEndEvent | SequenceEndEvent) -> None:
        closed = self.open
        if closed is None:
            return
        self.open = self.stack.pop()
        value: Data = closed.items if closed.section is None else closed.section
        if closed.start.anchor is not None:
            self.anchors[closed.start.anchor] = value
        self.put(value, self.place(closed.start, event))

    def alias(self, event: AliasEvent) -> None:
        place = self.place(event)
        name = shown(event.anchor or "")
        opened = self.open
        if opened is not None and opened.section is not None and opened.key is None:
            self.stop(place, "Y113", "a key is text, not an alias", 'put text that starts with * in quotes: "*..."')
        if event.anchor not in self.anchors:
            self.problem(place, "Y116", f"the alias {name} refers to nothing before it", 'put text that starts with * in quotes: "*..."')
            self.put("", place)
            return
        value = self.anchors[event.anchor]
        if value is None:
            self.stop(place, "Y110", f"the alias {name} stands inside what it refers to", "write the value out")
        self.put(self.copied(value, len(self.stack), place), place)

    def copied(self, value: Data, depth: int, place: Place) -> Data:
        """Copy what an alias refers to, as far as the document's budget goes; depth bounds the recursion."""
        self.budget -= 1
        if self.budget < 0:
            self.stop(place, "Y110", f"the aliases expand to more than {MOST_EXPANDED} values", "write the values out")
        if isinstance(value, str):
            return value
        if depth == DEEPEST:
            self.stop(place, "Y109", f"with this alias, sections are nested deeper than {DEEPEST} levels", "write the values out")
        if isinstance(value, dict):
            return {key: self.copied(inner, depth + 1, place) for key, inner in value.items()}
        return [self.copied(inner, depth + 1, place) for inner in value]

    def begin_entry(self, opened: _Open, section: dict[str, Data], key: str, place: Place) -> None:
        opened.key = key
        opened.key_place = place
        path = None if opened.path is None else (*opened.path, key)
        if key == "<<":
            self.problem(place, "Y112", "a merge key is not read", "a loop takes over another's fields with `same_as: TAG`")
        elif not key:
            self.problem(place, "Y113", "a value stands here without its key", "write `key: value`")
        elif key in section:
            first = self.key_places.get(path) if path is not None else None
            told = f"{shown(key)} is written twice" + (f"; first in line {first[0]}" if first else "")
            self.problem(place, "Y108", told, "delete one of the two")
        else:
            if path is not None:
                self.key_places[path] = place
            return
        opened.drop = True

    def put(self, value: Data, place: Place) -> None:
        """Put a finished value where it belongs."""
        opened = self.open
        if opened is None:
            self.root = value
            self.places[()] = place
        elif opened.section is None:
            if opened.path is not None:
                self.places[(*opened.path, len(opened.items))] = place
            opened.items.append(value)
        elif opened.key is not None:
            if not opened.drop:
                opened.section[opened.key] = value
                if opened.path is not None:
                    self.places[(*opened.path, opened.key)] = place
            opened.key, opened.drop = None, False

    def place(self, event: Event, last: Event | None = None) -> Place:
        start, end = event.start_mark, (last or event).end_mark
        if start is None or end is None:  # PyYAML's types allow it; its parsers never do it
            return self.first_line, 1, 1
        row, column = start.line, start.column
        if end.line == row:
            length = end.column - column
        else:
            length = len(self.lines[row].rstrip()) - column
            if isinstance(event, ScalarEvent) and not event.style:
                self.joined(row + 1, end.line)
        return self.first_line + row, column + 1, max(length, 1)

    def joined(self, first: int, last: int) -> None:
        """Refuse text that runs on over a line which was meant as a list item."""
        for row in range(first, min(last + 1, len(self.lines))):
            line = self.lines[row]
            if line.lstrip().startswith("- "):
                column = len(line) - len(line.lstrip()) + 1
                told = "this list item is joined to the text above it"
                self.problem((self.first_line + row, column, 1), "Y121", told, "start it in the same column as the items above")

    def without_value(self, opened: _Open, place: Place) -> None:
        if opened.section is None:
            self.problem(place, "Y114", "a list item has no value", "write a value, or delete the item")
        else:
            # left out, so that the same mistake is not told again by the field
            opened.drop = True
            comma = (opened.key or "")[:1].isdigit()
            hint = "after a decimal comma a new key starts: write the number with a point" if comma else "write a value, or delete the line"
            self.problem(opened.key_place, "Y114", f"{shown(opened.key or '')} has no value", hint)

    def tagged(self, event: ScalarEvent | MappingStartEvent | SequenceStartEvent) -> None:
        tag = str(event.tag).replace("tag:yaml.org,2002:", "!!")
        self.problem(self.place(event), "Y111", f"the tag {shown(tag)} is refused", 'put text that starts with ! in quotes: "!..."')

    def problem(self, place: Place, code: str, text: str, hint: str, severity: Severity = "error") -> None:
        self.problems.append(Diagnostic(Span(self.file, *place), code, text, hint, severity))

    def stop(self, place: Place, code: str, text: str, hint: str) -> NoReturn:
        self.problem(place, code, text, hint)
        raise _StopError


_HANDLERS: Mapping[type[Event], Callable[[_Composer, Any], None]] = {
    ScalarEvent: _Composer.scalar,
    MappingStartEvent: _Composer.start,
    SequenceStartEvent: _Composer.start,
    MappingEndEvent: _Composer.end,
    SequenceEndEvent: _Composer.end,
    AliasEvent: _Composer.alias,
    DocumentStartEvent: _Composer.begin,
    DocumentEndEvent: _Composer.finish,
}


def _numbered(lines: list[str]) -> frozenset[tuple[int, int]]:
    """Return the row (from 0) and the column (from 1) behind each text that ` #2` follows."""
    return frozenset((row, found.start() + 1) for row, line in enumerate(lines) for found in _NUMBER_SIGN.finditer(line))


def compose(piece: Piece, file: str, index: int) -> tuple[list[Document], list[Diagnostic]]:
    r"""Read the documents of one piece of text, with the problems found on the way.

    Parameters
    ----------
    piece : Piece
        The text from one `---` line to the next.
    file : str
        The file's name for documents and problems.
    index : int
        The number of the piece's first document in its file.

    Examples
    --------
    >>> documents, problems = compose(Piece("tag: TIC-1\nneed: {setpoint: 65 degC}\n", 0), "a.yml", 0)
    >>> documents[0].data, documents[0].spans["need", "setpoint"].column
    ({'tag': 'TIC-1', 'need': {'setpoint': '65 degC'}}, 18)
    """
    composer = _Composer(piece, file)
    composer.run(index)
    return composer.documents, composer.problems

"""A document: plain nested text values, and where in the file each of them stands."""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from specgen.core.diagnostic import Path, Span

Data = dict[str, "Data"] | list["Data"] | str
Place = tuple[int, int, int]
"""Line and column, counted from 1, and length on that line."""


class Spans(Mapping[Path, Span]):
    """The place of every path of one document; a `Span` is made when it is asked for."""

    __slots__ = ("_file", "_places")

    def __init__(self, file: str, places: dict[Path, Place]) -> None:
        self._file = file
        self._places = places

    def __getitem__(self, path: Path) -> Span:
        """Return the place of ``path``."""
        return Span(self._file, *self._places[path])

    def __iter__(self) -> Iterator[Path]:
        return iter(self._places)

    def __len__(self) -> int:
        return len(self._places)

    def __repr__(self) -> str:
        return f"Spans({self._file!r}, {len(self._places)} places)"


@dataclass(frozen=True, slots=True)
class Document:
    """One YAML document.

    ``file`` is its path from the project's folder, with forward slashes; ``index`` counts the documents of the
    file from 0, broken ones included; ``line`` is where its content starts. ``data`` holds nothing but nested
    dictionaries, lists and text. ``spans`` places each value, ``key_spans`` each key of a section. ``sound`` is
    false where reading it found a problem, so that nothing is decided on it.
    """

    file: str
    index: int
    line: int
    data: Data | None
    spans: Mapping[Path, Span]
    key_spans: Mapping[Path, Span]
    sound: bool = True


def span_of(document: Document, path: Path) -> Span:
    """Return the place of the value at ``path``, or of the nearest section around it that is written.

    Of a section or list that a whole value is missing from, the key is the better place to point at.

    Examples
    --------
    >>> spans = Spans("a.yml", {(): (1, 1, 4), ("need",): (2, 3, 9)})
    >>> keys = Spans("a.yml", {("need",): (1, 1, 4)})
    >>> document = Document("a.yml", 0, 1, {"need": {}}, spans, keys)
    >>> span_of(document, ("need",)).line, span_of(document, ("need", "tolerance", 0))
    (2, Span(file='a.yml', line=1, column=1, length=4))
    """
    if path in document.spans:
        return document.spans[path]
    for end in range(len(path) - 1, 0, -1):
        near = path[:end]
        if near in document.key_spans:
            return document.key_spans[near]
        if near in document.spans:
            return document.spans[near]
    return document.spans.get((), Span(document.file, document.line, 1))

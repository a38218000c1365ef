"""From bytes to text that is safe to parse, and from text to the documents between its `---` lines."""

import re
from dataclasses import dataclass
from itertools import pairwise

from specgen.core.diagnostic import Diagnostic, Span

LARGEST_FILE = 1024 * 1024  # bytes
DEEPEST = 32  # levels of sections and lists

# C0 and C1 controls but tab and line feed; the line and paragraph separators that editors do not count as lines;
# marks that turn the reading direction, so that text reads differently from what it says; a byte order mark
# inside; half characters.
CONTROL = re.compile("[\x00-\x08\x0b-\x1f\x7f-\x9f\u2028\u2029\u202a-\u202e\u2066-\u2069\ufeff\ufffe\uffff\ud800-\udfff]")
_DASHES = re.compile(r"^---(?=[ \t\n]|\Z)", re.MULTILINE)
_DIRECTIVE = re.compile(r"^%", re.MULTILINE)
_NAMES = {"\ufeff": "a byte order mark", "\u2028": "a line separator", "\u2029": "a paragraph separator", "\x00": "a zero byte"}


@dataclass(frozen=True, slots=True)
class Piece:
    """The text of one document with the number of its first line, counted from 0."""

    text: str
    first_line: int


def decode(raw: bytes, file: str) -> tuple[str, list[Diagnostic]]:
    r"""Return the text of a file, or the reason why it has none.

    Examples
    --------
    >>> decode(b"tag: TIC-1\r\n", "a.yml")
    ('tag: TIC-1\n', [])
    >>> decode(b"area: Tr\xf6ckner", "a.yml")[1][0].line()
    "a.yml:1:9: error Y103: the byte F6 is not UTF-8; in Latin-1 it is 'ö'"
    """
    if len(raw) > LARGEST_FILE:
        text = f"the file is larger than {LARGEST_FILE // 1024} KiB"
        return "", [Diagnostic(Span(file, 1, 1), "Y102", text, "write the loops in several files")]
    if raw[:2] in (b"\xff\xfe", b"\xfe\xff"):
        return "", [Diagnostic(Span(file, 1, 1), "Y103", "the file is UTF-16, not UTF-8", "save it as UTF-8")]
    try:
        text = raw.decode("utf-8")
    except UnicodeDecodeError as error:
        before = _one_line_end(raw[: error.start].decode("utf-8"))
        byte = raw[error.start : error.start + 1]
        letter = byte.decode("latin-1")
        told = f"the byte {byte.hex().upper()} is not UTF-8" + (f"; in Latin-1 it is '{letter}'" if letter.isprintable() else "")
        return "", [Diagnostic(_place(before, len(before), file), "Y103", told, "save the file as UTF-8")]
    return _one_line_end(text), []


def _one_line_end(text: str) -> str:
    text = text.removeprefix("\ufeff")
    return text.replace("\r\n", "\n").replace("\r", "\n") if "\r" in text else text


def _place(text: str, index: int, file: str) -> Span:
    start = text.rfind("\n", 0, index) + 1
    return Span(file, text.count("\n", 0, index) + 1, index - start + 1)


def control_characters(text: str, file: str) -> list[Diagnostic]:
    """Report the first control character; a text that has one is not parsed."""
    found = CONTROL.search(text)
    if found is None:
        return []
    name = _NAMES.get(found[0], "a control character")
    return [Diagnostic(_place(text, found.start(), file), "Y104", f"{name} (U+{ord(found[0]):04X}) stands here", "delete it")]


def cut(text: str, file: str) -> tuple[list[Piece], list[Diagnostic]]:
    r"""Cut a text at its `---` lines, each piece keeping its own, so that a broken document loses itself alone.

    Examples
    --------
    >>> [piece.first_line for piece in cut("a: 1\n---\nb: 2\n", "a.yml")[0]]
    [0, 1]
    """
    problems: list[Diagnostic] = []
    if _DIRECTIVE.search(text):
        text, problems = _without_directives(text, file)
    starts = [0, *(found.start() for found in _DASHES.finditer(text)), len(text)]
    pieces: list[Piece] = []
    line = 0
    for start, end in pairwise(starts):
        piece = text[start:end]
        if piece.removeprefix("---").strip():
            pieces.append(Piece(piece, line))
        line += piece.count("\n")
    return pieces, problems


def _without_directives(text: str, file: str) -> tuple[str, list[Diagnostic]]:
    """Blank out the `%` lines that stand where a document may start, and report each."""
    lines = text.split("\n")
    problems: list[Diagnostic] = []
    head = True
    for number, line in enumerate(lines):
        if head and line.startswith("%"):
            problems.append(Diagnostic(Span(file, number + 1, 1, len(line)), "Y117", "a `%` directive is not read", "delete the line"))
            lines[number] = ""
        elif line.startswith("..."):
            head = True
        elif line.strip() and not line.lstrip().startswith("#"):
            head = False
    return "\n".join(lines), problems

"""From the bytes of a recording to its header and rows: encoding, comments, separator and quotes."""

import re
from dataclasses import dataclass, field

from specgen.core.diagnostic import Diagnostic, Span

LARGEST_RECORDING = 10 * 1024 * 1024  # bytes
MOST_ROWS = 1_000_000
MOST_COLUMNS = 200
MOST_REPORTED = 10  # of one kind

RECORDING_CODES = {
    "R101": "A recording cannot be read: not there, empty, larger than 10 MiB or longer than 1,000,000 rows.",
    "R102": "A recording is no text, or its encoding is none that is known.",
    "R103": "A recording has no header line that names its columns.",
    "R104": "A recording has one column only, or its separator is not tab, semicolon or comma.",
    "R105": "Two columns have the same name.",
    "R106": "A row has more or fewer cells than the header.",
    "R107": "A quotation mark is not closed on its line.",
    "R108": "A cell is no number.",
    "R109": "A number can be read in two ways: digits in groups, or decimal points and commas in one file.",
    "R110": "A column that was asked for is not there.",
    "R111": "A column has no unit, or one that does not suit it.",
    "R112": "Which column is the time, the output or the value cannot be told.",
    "R113": "Time stands still or goes back.",
    "R114": "A date and time is not written as ISO 8601 asks, or some have an offset from UTC and others none.",
}

_COMMENT = ("#", "//")
_SEPARATORS = ("\t", ";", ",")
_NAMES = {"\t": "tab", ";": "semicolon", ",": "comma"}


@dataclass(slots=True)
class Problems:
    """Problems of one recording as they are found; of each kind the first ten are kept and the rest counted."""

    file: str
    found: list[Diagnostic] = field(default_factory=list)
    counts: dict[str, int] = field(default_factory=dict)

    def add(self, code: str, text: str, hint: str = "", at: tuple[int, int, int] = (1, 1, 1)) -> None:
        """Note one problem at (line, column, length)."""
        self.counts[code] = self.counts.get(code, 0) + 1
        if self.counts[code] <= MOST_REPORTED:
            self.found.append(Diagnostic(Span(self.file, *at), code, text, hint))

    def all(self) -> tuple[Diagnostic, ...]:
        """Return what was found, in the order of the file, and how many more of a kind there are."""
        more = [
            Diagnostic(Span(self.file, 1, 1), code, f"{count - MOST_REPORTED} more problems of this kind are not listed")
            for code, count in self.counts.items()
            if count > MOST_REPORTED
        ]
        return (*sorted(self.found), *more)


@dataclass(frozen=True, slots=True)
class Lines:
    """The lines of a recording that count, each with its number in the file, and what separates their cells."""

    header: tuple[str, ...]
    header_line: tuple[int, str]
    rows: tuple[tuple[int, str], ...]
    separator: str

    def cells(self, line: str) -> list[str]:
        """Cut a line into its cells, without blanks around them and quotation marks."""
        if '"' not in line:
            return [cell.strip() for cell in line.split(self.separator)]
        return [_unquoted(cell) for cell in _cut(line, self.separator)]

    def place(self, row: tuple[int, str], index: int) -> tuple[int, int, int]:
        """Return line, column and length of one cell of a row."""
        number, line = row
        cells = _cut(line, self.separator)
        if index >= len(cells):
            return number, max(len(line), 1), 1
        start = sum(len(cell) + 1 for cell in cells[:index])
        blank = len(cells[index]) - len(cells[index].lstrip())
        return number, start + blank + 1, max(len(cells[index].strip()), 1)


def decoded(raw: bytes, problems: Problems, notes: list[str]) -> str:
    """Return the text of a recording, empty where it has none; what was assumed about its encoding goes to ``notes``.

    Examples
    --------
    >>> notes = []
    >>> decoded("t_s;pv_°C".encode("latin-1"), Problems("a.csv"), notes), notes
    ('t_s;pv_°C', ['the file is not UTF-8; it is read as Latin-1 (Windows-1252)'])
    """
    if not raw.strip():
        problems.add("R101", "the recording is empty")
        return ""
    if len(raw) > LARGEST_RECORDING:
        problems.add(
            "R101", f"the recording is larger than {LARGEST_RECORDING // 1024**2} MiB", "cut it to the test, or record at longer intervals"
        )
        return ""
    if raw[:2] == b"PK":
        problems.add("R102", "this is a spreadsheet or zip file, not text", "save the sheet as CSV")
        return ""
    wide = _wide(raw)
    try:
        if wide:
            notes.append("the file is read as UTF-16")
            text = raw.decode(wide)
        else:
            text = _narrow(raw, notes)
    except UnicodeDecodeError:
        problems.add("R102", "the text cannot be decoded", "save the file as UTF-8")
        return ""
    text = text.removeprefix("\ufeff")
    if not text.strip():
        problems.add("R101", "the recording is empty")
        return ""
    if "\x00" in text:
        line = text.count("\n", 0, text.index("\x00")) + 1
        problems.add("R102", "a zero byte stands in the text", "save the file as UTF-8 text", (line, 1, 1))
        return ""
    return text.replace("\r\n", "\n").replace("\r", "\n")


def _wide(raw: bytes) -> str:
    """Return the name of a two-byte encoding, by its mark or by the zero bytes beside its letters."""
    if raw[:2] in (b"\xff\xfe", b"\xfe\xff"):
        return "utf-16"
    even, odd = raw[0:200:2].count(0), raw[1:200:2].count(0)
    many = min(len(raw), 200) // 2 * 0.8
    return "utf-16-le" if odd > many else "utf-16-be" if even > many else ""


def _narrow(raw: bytes, notes: list[str]) -> str:
    try:
        return raw.decode("utf-8-sig")
    except UnicodeDecodeError:
        notes.append("the file is not UTF-8; it is read as Latin-1 (Windows-1252)")
        return raw.decode("cp1252")


def cut_lines(text: str, problems: Problems, notes: list[str]) -> Lines | None:
    r"""Find header and rows; None where there is no table.

    Examples
    --------
    >>> cut_lines("# bench 4\nt_s;pv_degC\n0;20,5\n", Problems("a.csv"), []).rows
    ((3, '0;20,5'),)
    """
    kept = [(number, line) for number, line in enumerate(text.split("\n"), 1) if line.strip() and not line.lstrip().startswith(_COMMENT)]
    said = re.fullmatch(r"sep=(.)", kept[0][1].strip("\ufeff ")) if kept else None
    if said:
        del kept[0]
    if len(kept) < 2:  # noqa: PLR2004 - a header and a row
        problems.add("R101", "the recording has no rows")
        return None
    if len(kept) - 1 > MOST_ROWS:
        problems.add("R101", f"the recording has more than {MOST_ROWS} rows", "cut it to the test, or record at longer intervals")
        return None
    number, first = kept[0]
    separator = said[1] if said else next((mark for mark in _SEPARATORS if len(_cut(first, mark)) > 1), "")
    if separator not in _SEPARATORS or len(_cut(first, separator)) == 1:
        problems.add("R104", "the header has one column", "separate the columns with tab, semicolon or comma", (number, 1, len(first)))
        return None
    lines = Lines(tuple(_unquoted(cell) for cell in _cut(first, separator)), kept[0], tuple(kept[1:]), separator)
    if not _header_is_sound(lines, problems):
        return None
    notes.append(f"columns are separated by {_NAMES[separator]}")
    return lines


def _header_is_sound(lines: Lines, problems: Problems) -> bool:
    number, line = lines.header_line
    if line.count('"') % 2:
        problems.add("R107", "a quotation mark is not closed", at=(number, line.index('"') + 1, 1))
        return False
    if len(lines.header) > MOST_COLUMNS:
        problems.add("R103", f"the header has {len(lines.header)} columns; {MOST_COLUMNS} are the most", at=(number, 1, len(line)))
        return False
    if all(re.fullmatch(r"[-+0-9.,:eETZ ]*", name) for name in lines.header):
        hint = "begin with a line such as t_s,out_percent,pv_degC"
        problems.add("R103", "the first line has numbers where names of columns are expected", hint, (number, 1, len(line)))
        return False
    named = [name.casefold() for name in lines.header]
    for index, name in enumerate(named):
        if name and name in named[:index]:
            problems.add(
                "R105",
                f"the column '{lines.header[index]}' stands twice",
                "give each column its own name",
                lines.place(lines.header_line, index),
            )
    return "R105" not in problems.counts


def _cut(line: str, separator: str) -> list[str]:
    """Cut at separators that stand outside quotation marks; the marks stay."""
    if '"' not in line:
        return line.split(separator)
    cells, inside = [""], False
    for letter in line:
        if letter == '"':
            inside = not inside
        if letter == separator and not inside:
            cells.append("")
        else:
            cells[-1] += letter
    return cells


def _unquoted(cell: str) -> str:
    text = cell.strip()
    if len(text) > 1 and text[0] == text[-1] == '"':
        text = text[1:-1].replace('""', '"')
    return text.strip()

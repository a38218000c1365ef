"""The YAML parser's complaints in a panel designer's words."""

import re

import yaml

from specgen.core.codes import shown
from specgen.core.diagnostic import Diagnostic, Span
from specgen.source.text import DEEPEST

_QUOTE = 'text with `: `, ` #` or a leading sign goes in quotes: "..."'
_INDENT = "lines of one section start in the same column; " + _QUOTE

# What libyaml or PyYAML say -> what it means and what helps. The first that is found counts.
_TABLE = (
    ("Y109", r"nesting depth", f"this is nested deeper than {DEEPEST} levels", "no field of a loop file needs that"),
    ("Y106", r"unexpected end of stream|quoted scalar.*document (indicator|separator)", "a quote is not closed", "put the second quote"),
    ("Y106", r"unknown escape|escape sequence|hexadecimal", "a backslash stands in double quotes", "use single quotes, or write it twice"),
    ("Y106", r"flow mapping.*expected ',' or '}'", "a `{` is not closed, or a comma is missing", "write {key: value, key: value}"),
    ("Y106", r"flow sequence.*expected ',' or '\]'", "a `[` is not closed, or a comma is missing", "write [item, item]"),
    ("Y111", r"tag handle|scanning a tag|tag URI|parsing a tag", "a tag (`!`) is refused", 'put text that starts with ! in quotes: "!..."'),
    ("Y106", r"scanning an (anchor|alias)", "`&` and `*` have a meaning of their own here", 'put the text in quotes: "..."'),
    ("Y106", r"duplicate anchor", "an anchor is written twice", "give it another name"),
    ("Y106", r"block scalar", "the text block after `|` or `>` is not well formed", "start the text on the next line, indented by blanks"),
    ("Y106", r"mapping values are not allowed", "a second `: ` stands on the line, or the line is indented too far", _QUOTE),
    ("Y106", r"could not find expected ':'", "a line without `: ` stands among `key: value` lines", "write `key: value`; " + _QUOTE),
    ("Y106", r"sequence entries are not allowed", "a list item cannot start here", "start each item on a line of its own"),
    ("Y106", r"cannot start any token", "LETTER cannot start a value here", 'put the text in quotes: "..."'),
    ("Y106", r"expected (the )?node content", "a value or a closing bracket is missing here", "write {key: value} or [item, item]"),
    ("Y106", r"expected '-' indicator|block collection.*expected <block end>", "a list item is out of column", _INDENT),
    ("Y106", r"expected key|expected <block end>|block mapping", "this line does not fit those above it", _INDENT),
    ("Y106", r"document start|document end", "text stands after the end of the document", "put a line with --- between two documents"),
    ("Y107", r"tab", "a tab stands where a blank is expected", "use blanks"),
)  # fmt: skip
_READ = tuple((re.compile(pattern, re.IGNORECASE | re.DOTALL), code, text, hint) for code, pattern, text, hint in _TABLE)
# Of these the beginning is the place to look at, not where the parser gave up.
_BEGINS = re.compile(r"is not closed|a line without")
_TAB = re.compile(r"[ ]*\t")


def plain_words(error: yaml.YAMLError, lines: list[str], file: str, first_line: int) -> Diagnostic:
    """Turn a parser's error into a problem of the file.

    Parameters
    ----------
    error : yaml.YAMLError
        What the parser raised.
    lines : list of str
        The text that was parsed.
    file : str
        The file's name.
    first_line : int
        Number of the text's first line in the file, counted from 1.
    """
    if not isinstance(error, yaml.MarkedYAMLError):
        return Diagnostic(Span(file, first_line, 1), "Y106", "the text cannot be read as YAML", "delete unusual characters")
    said = f"{error.context or ''} {error.problem or ''}"
    mark = error.problem_mark or error.context_mark
    row, column = (mark.line, mark.column) if mark is not None else (0, 0)
    # at the end of the text the place that is meant lies before it
    row = min(row, len(lines) - 1)
    line = lines[row]
    if _TAB.match(line):
        place = Span(file, first_line + row, line.index("\t") + 1)
        return Diagnostic(place, "Y107", "a tab indents this line", "indent with blanks; most editors can turn tabs into blanks")
    found = next(((code, text, hint) for pattern, code, text, hint in _READ if pattern.search(said)), None)
    code, text, hint = found or ("Y106", f"this is no readable YAML ({said.strip()})", _INDENT)
    if _BEGINS.search(text) and error.context_mark is not None:
        row, column = error.context_mark.line, error.context_mark.column
    letter = shown(line[column : column + 1]) if column < len(line) else "this"
    return Diagnostic(Span(file, first_line + row, column + 1), code, text.replace("LETTER", letter), hint)

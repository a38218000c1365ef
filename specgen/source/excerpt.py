"""The source line a problem stands in, with carets under the place."""

from unicodedata import combining, east_asian_width

from specgen.core.diagnostic import Span

_WIDEST = 100


def excerpt(span: Span, text: str, hint: str = "") -> str:
    r"""Return two lines: the line of ``span`` in the file's ``text``, and carets under the place, with a hint behind them.

    A long line is cut around the place; tabs and control characters are shown as one blank or `?` each, and wide
    letters count double, so that the carets stand where the eye expects them. Empty where the text has no such line.

    Examples
    --------
    >>> print(excerpt(Span("a.yml", 2, 14, 5), "need:\n  tolerance: 1,5 K\n", "write 1.5 K"))
      tolerance: 1,5 K
                 ^^^^^ write 1.5 K
    """
    lines = text.removeprefix("\ufeff").replace("\r\n", "\n").replace("\r", "\n").split("\n")
    if not 1 <= span.line <= len(lines):
        return ""
    line = lines[span.line - 1].rstrip()
    start = min(max(span.column - 1, 0), len(line))
    end = max(min(start + span.length, len(line)), start + 1)
    first = 0
    if len(line) > _WIDEST:
        first = max(0, min(start - _WIDEST // 3, len(line) - _WIDEST))
    last = min(len(line), first + _WIDEST)
    ahead, behind = ("..." if first else ""), ("..." if last < len(line) else "")
    shown = "".join(_printable(letter) for letter in line[first:last])
    before = _width(ahead + line[first:start])
    carets = "^" * max(1, _width(line[start : min(end, last)]))
    return f"{ahead}{shown}{behind}\n{' ' * before}{carets} {hint}".rstrip()


def _printable(letter: str) -> str:
    if letter == "\t":
        return " "
    return letter if letter.isprintable() else "?"


def _width(text: str) -> int:
    """Count the columns of a terminal."""
    return sum(0 if combining(letter) else 2 if east_asian_width(letter) in "WF" else 1 for letter in text)

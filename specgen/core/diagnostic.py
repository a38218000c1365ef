"""Problems as values: a place, a code, a sentence and a hint."""

from dataclasses import dataclass
from typing import Literal

Severity = Literal["error", "warning"]
Path = tuple[str | int, ...]


@dataclass(frozen=True, slots=True, order=True)
class Span:
    """A place in a source file; line and column count from 1, ``length`` in characters on that line."""

    file: str
    line: int
    column: int
    length: int = 1


@dataclass(frozen=True, slots=True, order=True)
class Diagnostic:
    """One problem of the input, gathered with all others and printed at the end."""

    span: Span
    code: str
    text: str
    hint: str = ""
    severity: Severity = "error"

    def line(self) -> str:
        """Return the one-line form ``file:line:col: severity CODE: text``."""
        return f"{self.span.file}:{self.span.line}:{self.span.column}: {self.severity} {self.code}: {self.text}"

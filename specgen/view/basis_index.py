"""Which line of the Basis a number comes from, so that a figure leads to its calculation."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from specgen.core.figure import Figure
from specgen.core.say import Said
from specgen.rules.base import Finding

_ROUND = 4  # a number that four digits write whole may have been declared, and any line may hold it by chance


@dataclass(frozen=True, slots=True)
class BasisIndex:
    """The lines of one sheet's Basis by dimension and number."""

    lines: Mapping[tuple[str, float], int]

    def line(self, value: float, dimension: str) -> int | None:
        """Return the line that computed a number, where there is one."""
        return self.lines.get((dimension, value))

    def href(self, value: float, dimension: str) -> str:
        """Return a link to the line that computed a number, empty where there is none."""
        line = self.line(value, dimension)
        return f"#b{line}" if line else ""

    def of_finding(self, finding: Finding) -> tuple[int, ...]:
        """Return the lines that a finding's numbers come from, in their order."""
        said = (word for word in finding.words.values() if isinstance(word, Said))
        return tuple(sorted({line for word in said if (line := self.line(word.value, word.dimension)) is not None}))


def basis_index(basis: Iterable[Figure]) -> BasisIndex:
    """Index the lines of a Basis.

    A number is known again by being the very same one, in the same dimension; numbers that four digits write whole are
    left out, since a declared 60 s would lead to whatever else is 60 s.

    Examples
    --------
    >>> index = basis_index([Figure("P", "period", "", 169.571, "time", ""), Figure("T", "cycle", "", 60.0, "time", "")])
    >>> index.href(169.571, "time"), index.href(60.0, "time"), index.href(169.571, "change")
    ('#b1', '', '')
    """
    lines: dict[tuple[str, float], int] = {}
    for number, figure in enumerate(basis, 1):
        if float(f"{figure.value:.{_ROUND}g}") != figure.value:
            lines.setdefault((figure.dimension, figure.value), number)
    return BasisIndex(lines)

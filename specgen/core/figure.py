"""A figure: one line of the Basis, from which every number shown anywhere comes."""

from collections.abc import Mapping
from dataclasses import dataclass, field


@dataclass(frozen=True, slots=True)
class Figure:
    """One computed number with its formula, what was put in, its source and the case that gave it.

    ``value`` is in the base units of ``specgen.core.quantity`` (SI, temperatures in degC); ``dimension`` is
    a dimension's name there (``"value"``, ``"difference"``: in the loop's own quantity). ``with_`` maps each
    symbol put in to its value and dimension. ``case`` names the worst case in words, empty where there is none.
    """

    symbol: str
    name: str
    formula: str
    value: float
    dimension: str
    source: str
    with_: Mapping[str, tuple[float, str]] = field(default_factory=dict)
    case: str = ""

"""Cautions as the table has them: a hazard, what it does, and who decides."""

from functools import cache
from typing import Literal

from specgen.catalogue.table import Row, table
from specgen.model.fields import Model, Text

Basis = Literal["any", "iec", "north_america"]


class Caution(Model):
    """One caution: it begins with the hazard and ends with who decides."""

    hazard: Text
    basis: Basis
    head: Text
    text: Text
    decides: Text

    @property
    def whole(self) -> str:
        """Return the caution in the order in which it is read."""
        return f"{self.head}. {self.text} {self.decides}"


@cache
def cautions() -> tuple[tuple[Caution, Row], ...]:
    """Return every caution with its row, in the order of the table.

    Raises
    ------
    CatalogueError
        The table is broken.

    Examples
    --------
    >>> caution, row = cautions()[0]
    >>> caution.hazard, caution.head, row.edition
    ('mains', 'Electric shock and arcing', '2016')
    """
    return tuple((row.typed(Caution), row) for row in table("cautions"))


def caution_for(hazard: str, basis: str) -> tuple[Caution, Row] | None:
    """Return the caution of a hazard under a code basis, None where the table has none.

    Examples
    --------
    >>> caution_for("gas", "north_america")[0].basis, caution_for("oil", "iec")[0].basis, caution_for("envy", "iec")
    ('north_america', 'any', None)
    """
    return next((found for found in cautions() if found[0].hazard == hazard and found[0].basis in ("any", basis)), None)

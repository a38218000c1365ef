"""The cautions of a loop and of a whole panel, with where each comes from."""

from collections.abc import Sequence
from dataclasses import dataclass

from specgen.catalogue.cautions import Caution, caution_for
from specgen.catalogue.table import CatalogueError
from specgen.design.types import DecidedLoop
from specgen.rules.hazards import HAZARDS, hazards_of


@dataclass(frozen=True, slots=True)
class LoopCaution:
    """One caution with its row: ``id`` and ``cited``; ``standing`` tells how far the row can be trusted."""

    caution: Caution
    id: str
    cited: str
    standing: str


def cautions_of(decided: DecidedLoop) -> tuple[LoopCaution, ...]:
    """Return the cautions of a loop, what acts at once first.

    Raises
    ------
    CatalogueError
        A hazard has no caution under the panel's code basis: a mistake in specgen itself.
    """
    case = decided.decision.chosen.case
    found = []
    for hazard in hazards_of(case):
        known = caution_for(hazard, case.panel.code_basis)
        if known is None:
            raise CatalogueError(f"there is no caution for {hazard} under {case.panel.code_basis}")
        caution, row = known
        found.append(LoopCaution(caution, row.id, row.cited, row.standing))
    return tuple(found)


def cautions_by_hazard(loops: Sequence[DecidedLoop]) -> tuple[tuple[LoopCaution, tuple[str, ...]], ...]:
    """Return every caution that bears on a panel with the tags of its loops, in the order of the hazards."""
    tags: dict[str, list[str]] = {}
    known: dict[str, LoopCaution] = {}
    for loop in loops:
        for caution in cautions_of(loop):
            known[caution.caution.hazard] = caution
            tags.setdefault(caution.caution.hazard, []).append(loop.tag)
    return tuple((known[hazard], tuple(tags[hazard])) for hazard in HAZARDS if hazard in known)

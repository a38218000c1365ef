"""Section Cautions of a sheet: each begins with the hazard and ends with who decides."""

from specgen.design.cautions import LoopCaution, cautions_of
from specgen.design.types import DecidedLoop
from specgen.view.cells import says
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.shapes import Note, Notice, Section, Sentence, Shape


def cautions_section(dossier: Dossier, place: Place, decided: DecidedLoop, number: str) -> Section:
    """Build the section."""
    found = cautions_of(decided)
    text = "What can hurt someone at this loop, as far as the loop file tells. What is not named here is not cleared."
    links = (Note("All", "the panel's cautions with their sources", place.to("cautions.html"), "cautions"),)
    blocks: list[Shape] = [Sentence(says(text), quiet=True, notes=links if dossier.design.loops else ())]
    blocks += [caution_notice(caution) for caution in found]
    return Section(number, "cautions", "Cautions", tuple(blocks))


def caution_notice(found: LoopCaution) -> Notice:
    """Build one caution."""
    caution = found.caution
    return Notice("hazard", f"{caution.head}.", says(f"{caution.text} {caution.decides}"))

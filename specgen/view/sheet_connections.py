"""Section Connections of a sheet: the schematic, the terminals it has, and what the wiring leaves open."""

from specgen.design.types import DecidedLoop
from specgen.design.wiring.types import Wiring
from specgen.view.cells import says
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.schematic.drawing import schematic
from specgen.view.shapes import Item, List, Note, Section, Sentence, Shape
from specgen.view.terminals_page import loop_terminals
from specgen.view.words import with_stop


def connections_section(dossier: Dossier, place: Place, decided: DecidedLoop, number: str) -> Section:
    """Build the section."""
    wiring = dossier.design.wirings.get(decided.tag)
    if wiring is None:
        return Section(number, "connections", "Connections", (Sentence(says("No circuit could be drawn.")),))
    own = f"={decided.tag.replace('-', '')}"
    text = (
        f"Designations stand within {own} and begin with its name wherever more than this loop is meant. O and I count the outputs and "
        "inputs that the loop takes of its controller -A1: the controller's own numbers are those of its data sheet."
    )
    lead = Sentence(says(text), quiet=True, notes=_notes(place, wiring))
    blocks: tuple[Shape, ...] = (lead, schematic(wiring, dossier.writers[decided.tag]), loop_terminals(wiring), *_open(wiring))
    return Section(number, "connections", "Connections", blocks)


def _notes(place: Place, wiring: Wiring) -> tuple[Note, ...]:
    notes = [
        Note("Symbols", "IEC 60617, designations IEC 81346: drawn without supply and cold, everything at rest."),
        Note("Terminals", "of every loop:", place.to("terminals.html"), "schedule"),
    ]
    drawn = {step.symbol for circuit in wiring.circuits for path in circuit.paths for step in path.steps}
    if drawn & {"semiconductor", "power_controller"}:
        text = "the solid-state device never isolates: lock off upstream of it before working on the load (O3)."
        notes.insert(0, Note("No isolation", text))
    return tuple(notes)


def _open(wiring: Wiring) -> tuple[Shape, ...]:
    if not wiring.open_points:
        return ()
    return (List(tuple(Item(says(with_stop(point))) for point in wiring.open_points), quiet=True, caption="Open in the wiring"),)

"""What feeds the element: protection, wiring inside and cable, and whether the device survives a fault."""

from specgen.sizing.candidate import Unsized
from specgen.sizing.conductor import Conductor
from specgen.sizing.feeder import Branch, Feeder, NotFed, Survival
from specgen.sizing.protection import Protection
from specgen.view.cells import says, word
from specgen.view.shapes import Column, Item, List, Row, Sentence, Shape, Table
from specgen.view.words import capital, counted, with_stop
from specgen.view.writer import Writer

KINDS = {
    "circuit_breaker": "circuit breaker",
    "fuse": "fuse",
    "motor_starter": "motor starter",
    "semiconductor_fuse": "semiconductor fuse",
}
MM2 = 1e6  # mm2 of a m2


def feeder_blocks(writer: Writer, feeder: Feeder | Unsized) -> tuple[Shape, ...]:
    """Build the blocks of protection and wiring; none where nothing is fed from this panel."""
    if isinstance(feeder, NotFed):
        return (Sentence(says(capital(with_stop(feeder.because))), quiet=True),) if feeder.because else ()
    if isinstance(feeder, Unsized):
        return (Sentence(says(f"Protection and wiring are not sized: {with_stop(feeder.because)}"), quiet=True),)
    many = len(feeder.branches) > 1
    rows: list[Row] = []
    for index, branch in enumerate(feeder.branches, 1):
        if many:
            rows.append(Row(heading=f"Circuit {index}, {counted(branch.units, 'unit')}"))
        rows += _branch(writer, branch)
    if feeder.survival is not None:
        rows.append(_survival(writer, feeder.survival))
    table = Table("Protection and wiring", (Column("What"), Column("Chosen"), Column("Carries or lets through")), tuple(rows))
    if not feeder.open_points:
        return (table,)
    items = tuple(Item(says(capital(with_stop(point.because))), aside=", ".join(point.needs)) for point in feeder.open_points)
    return table, List(items, caption="Open for protection and wiring")


def _branch(writer: Writer, branch: Branch) -> list[Row]:
    rows = [_protection(writer, branch.protection), _conductor(writer, "wiring inside", branch.internal)]
    if branch.cable is not None:
        rows.append(_conductor(writer, "cable to the field", branch.cable))
    return rows


def _protection(writer: Writer, protection: Protection) -> Row:
    curve = f" {protection.curve}" if protection.curve else ""
    kind = f"{KINDS[protection.kind]}{curve}\u00a0{writer.say(protection.rating, 'current')}"
    if protection.setting is not None:
        kind += f", set to {writer.say(protection.setting, 'current')}"
    asked = f"for {writer.say(protection.sized_for, 'current')}"
    if protection.let_through is not None:
        asked += f"; lets {writer.say(protection.let_through, 'i2t')} through"
    return Row((word("protection"), word(kind), word(asked)))


def _conductor(writer: Writer, name: str, conductor: Conductor) -> Row:
    size = conductor.gauge or f"{writer.bare(conductor.size * MM2)}\u202fmm²"
    laid = conductor.installed
    carries = f"{writer.say(conductor.capacity, 'current')}, method {laid.method} at {writer.say(laid.ambient, 'temperature')}"
    if laid.circuits > 1:
        carries += f", {laid.circuits} circuits together"
    if conductor.drop is not None:
        carries += f"; drops {writer.say(conductor.drop, 'fraction')}"
    return Row((word(name), word(size), word(carries)))


def _survival(writer: Writer, survival: Survival) -> Row:
    sees = writer.say(survival.sees, survival.dimension)
    if survival.withstands is None:
        return Row(
            (word("device in a fault"), word("not known"), word(f"lets {sees} through; the device's data do not say what it stands"))
        )
    stands = writer.say(survival.withstands, survival.dimension)
    return Row(
        (word("device in a fault"), word("survives" if survival.survives else "does not survive"), word(f"sees {sees}, stands {stands}"))
    )

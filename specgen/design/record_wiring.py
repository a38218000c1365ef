"""The schedules of terminals and instruments in the record."""

from typing import Any

from specgen.design.instruments import InstrumentRow, instrument_rows
from specgen.design.rounding import in_unit, rounded
from specgen.design.types import DecidedLoop, Design
from specgen.design.wiring.types import Terminal

Row = dict[str, Any]


def wiring_schedules(design: Design) -> Row:
    """Return the schedules of terminals, by tag and number, and of instruments."""
    loops = {loop.tag: loop for loop in design.loops}
    return {
        "terminals": [_terminal(tag, terminal) for tag in sorted(design.wirings) for terminal in design.wirings[tag].terminals],
        "instruments": [_instrument(row, loops[row.loop]) for row in instrument_rows(design.loops)],
    }


def _terminal(tag: str, terminal: Terminal) -> Row:
    return {
        "terminal": terminal.designation, "loop": tag, "potential": terminal.potential, "inside": terminal.inside,
        "outside": terminal.outside, "circuit": terminal.circuit,
    }  # fmt: skip


def _instrument(row: InstrumentRow, decided: DecidedLoop) -> Row:
    unit, change = decided.loop.unit, decided.loop.difference_unit
    made: Row = {"loop": row.loop, "designation": row.designation, "sensor": row.sensor, "serves": row.serves}
    if row.range is not None:
        made["range"] = [in_unit(row.range.low, unit), in_unit(row.range.high, unit)]
    if row.accuracy_class:
        made["class"] = row.accuracy_class
    if row.error is not None:
        made["error"] = rounded(row.error * change.scale)
    if row.signal:
        made["signal"] = row.signal
    if row.set is not None:
        made["set"] = in_unit(row.set, unit)
    return made

"""The schedule of instruments: every sensor and switch of a loop, what it serves, and how exactly it measures."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Literal

from specgen.core.quantity import Range
from specgen.design.designation import designation
from specgen.design.types import DecidedLoop
from specgen.model.sensor import Sensor, Transmitter
from specgen.sizing.candidate import Unsized

Serves = Literal["loop", "limiter", "alarm", "interlock"]


@dataclass(frozen=True, slots=True)
class InstrumentRow:
    """One sensor or switch.

    ``range`` [the loop's base unit] of a transmitter; ``error`` [change] is that of the whole measurement at its worst setpoint;
    ``set`` [value] is where a limiter or an alarm acts. What does not apply is None or empty.
    """

    loop: str
    designation: str
    sensor: str
    serves: Serves
    range: Range | None = None
    accuracy_class: str = ""
    error: float | None = None
    signal: str = ""
    set: float | None = None


def instrument_rows(loops: Sequence[DecidedLoop]) -> tuple[InstrumentRow, ...]:
    """Return every instrument, by tag; of a loop its own sensor first."""
    return tuple(row for loop in sorted(loops, key=lambda loop: loop.tag) for row in _of(loop))


def _of(loop: DecidedLoop) -> Iterator[InstrumentRow]:
    sensor, error = loop.loop.sensor, loop.decision.chosen.case.error
    yield InstrumentRow(
        loop.tag, designation(loop.tag, "B1"), sensor.kind, "loop", sensor.range, str(getattr(sensor, "class_", "")),
        None if isinstance(error, Unsized) else error.root_sum, signal_of(sensor),
    )  # fmt: skip
    safety = loop.safety
    if safety is None:
        return
    if safety.limiter is not None:
        kind = safety.limiter.sensor.replace(" ", "_")
        yield InstrumentRow(loop.tag, designation(loop.tag, "B2"), kind, "limiter", set=safety.limiter.set)
    if safety.alarm is not None:
        kind = safety.alarm.sensor.replace(" ", "_")
        yield InstrumentRow(loop.tag, designation(loop.tag, "B3"), kind, "alarm", set=safety.alarm.set)
    for link in safety.chain:
        if link.kind in ("proof", "cut_out"):
            yield InstrumentRow(loop.tag, link.designation, link.what.partition(":")[0], "interlock", signal="contact")


def signal_of(sensor: Sensor) -> str:
    """Say what a sensor gives.

    Examples
    --------
    >>> from specgen.model.sensor import ResistanceSensor
    >>> signal_of(ResistanceSensor(kind="pt100", wires=4))
    'resistance, 4 wires'
    """
    if isinstance(sensor, Transmitter):
        return sensor.signal or ""
    wires = getattr(sensor, "wires", None)
    return "thermoelectric voltage" if wires is None else f"resistance, {wires} wires"

"""Section If it fails of a sheet: where the value goes, how fast, and what the output does."""

from specgen.design.fault_walk import FaultOutcome, fault_walk
from specgen.design.types import DecidedLoop
from specgen.sizing.candidate import Unsized
from specgen.sizing.faults import Stuck
from specgen.view.cells import DASH, NO_NUMBER, number, says, word
from specgen.view.shapes import Cell, Column, Row, Section, Sentence, Shape, Span, Table
from specgen.view.sheet_plots import stuck_plot
from specgen.view.sheet_safety import safety_blocks
from specgen.view.words import SENSOR_FAULT
from specgen.view.writer import Writer

ABSOLUTE_ZERO = -273.15  # degC


def faults_section(writer: Writer, decided: DecidedLoop, number_: str) -> Section:
    """Build the section."""
    faults = decided.decision.chosen.case.faults
    blocks: list[Shape] = []
    if isinstance(faults, Unsized):
        blocks.append(Sentence(says(f"Where a stuck output would carry the value is not computed: {faults.because}."), quiet=True))
    else:
        columns = (
            Column("Output"),
            Column("Settles at", writer.value_unit, number=True),
            Column("Danger"),
            Column("To danger", number=True),
            Column("To spoiling", number=True),
            Column("Worst case"),
        )
        rows = (_stuck(writer, "stuck on", faults.on), _stuck(writer, "stuck off", faults.off))
        blocks.append(Table("Output stuck", columns, rows, wide=True))
        blocks.append(Sentence(says("Times count from the worst peak of normal running, the element hot."), quiet=True))
        blocks += stuck_plot(writer, decided)
    blocks += [_walked(writer, outcome) for outcome in fault_walk(decided)]
    if decided.safety is not None:
        blocks += safety_blocks(writer, decided.safety)
    blocks.append(_declared(writer, decided))
    return Section(number_, "faults", "If it fails", tuple(blocks))


def _walked(writer: Writer, outcome: FaultOutcome) -> Sentence:
    return Sentence((Span(f"{outcome.title}. ", strong=True), Span(writer.sentence(outcome.text, outcome.words))))


def _stuck(writer: Writer, name: str, stuck: Stuck) -> Row:
    return Row(
        (
            word(name),
            _settles(writer, stuck.settles_at),
            word(_danger(stuck)),
            NO_NUMBER if stuck.time_to_danger is None else number(writer.time(stuck.time_to_danger), stuck.time_to_danger),
            NO_NUMBER if stuck.time_to_spoil is None else number(writer.time(stuck.time_to_spoil), stuck.time_to_spoil),
            word(stuck.case) if stuck.case else DASH,
        )
    )


def _settles(writer: Writer, value: float | None) -> Cell:
    if value is None:
        return Cell("does not settle", number=True, export="")
    if writer.phrasing.value.symbol in ("degC", "degF") and value < ABSOLUTE_ZERO:
        # a load that is declared constant draws heat out of a body that has none left: the model ends before
        return Cell("beyond what is real", number=True, export="")
    return number(writer.far_value(value), writer.shown_value(value))


def _danger(stuck: Stuck) -> str:
    sides = [word for word, passed in (("high", stuck.passes_high), ("low", stuck.passes_low)) if passed]
    if sides:
        return f"passes danger {' and '.join(sides)}"
    if stuck.passes_high is None and stuck.passes_low is None:
        return "no danger declared on this side"
    return "stays short of danger"


def _declared(writer: Writer, decided: DecidedLoop) -> Table:
    limits = decided.loop.limits
    rows = [
        ("danger, high", limits.danger_high, "what must never be passed"),
        ("danger, low", limits.danger_low, "what must never be passed"),
        ("product spoils above", limits.spoils_high, ""),
        ("product spoils below", limits.spoils_low, ""),
    ]
    made = [
        Row((word(name), number(writer.value(value), writer.shown_value(value)), word(remark)))
        for name, value, remark in rows
        if value is not None
    ]
    if limits.consequence:
        made.append(Row((word("what passing danger means"), Cell(limits.consequence, number=True), word(""))))
    fault = SENSOR_FAULT.get(limits.on_sensor_fault or "", "not declared")
    made.append(Row((word("output when the sensor fails"), Cell(fault, number=True), word(limits.on_sensor_fault_because or ""))))
    back = {"resume": "resumes", "off": "stays off"}.get(limits.after_power_return or "", "as the house or the assumptions say")
    made.append(Row((word("after loss and return of supply"), Cell(back, number=True), word(""))))
    return Table("Declared", (Column("What"), Column("Value", number=True), Column("Remark")), tuple(made))

"""What stands beside a loop and not in it: the independent limiter, the independent alarm, loops that must not be on together."""

from specgen.design.safety import SafetyDesign
from specgen.sizing.limiter import SWITCHES, AlarmDesign, LimiterDesign, Window
from specgen.view.cells import number, says, word
from specgen.view.shapes import Cell, Column, Row, Sentence, Shape, Table
from specgen.view.words import listed
from specgen.view.writer import Writer

_NO_ROOM = "normal running reaches the latest value at which it could act"
_CHAIN = (Column("Contact"), Column("What it is"), Column("Stops"), Column("Asked for by"))
_COLUMNS = (Column("What"), Column("Value", number=True), Column("Remark"))


def safety_blocks(writer: Writer, safety: SafetyDesign) -> tuple[Shape, ...]:
    """Build the blocks; none where nothing stands beside the loop."""
    rows: list[Row] = []
    if safety.limiter is not None:
        rows += _limiter(writer, safety.limiter)
    if safety.alarm is not None:
        rows += _alarm(writer, safety.alarm)
    blocks: list[Shape] = [Table("Independent of the loop", _COLUMNS, tuple(rows))] if rows else []
    if safety.chain:
        chain = tuple(
            Row((word(i.designation), word(i.what, aside=i.returns), word(", ".join(i.acts_on)), word(i.because))) for i in safety.chain
        )
        blocks.append(Table("Chain in the order of its wiring", _CHAIN, chain, wide=True))
    if safety.pairs:
        blocks.append(Sentence(says(f"Never on together with {listed(safety.pairs)}.")))
    return tuple(blocks)


def _limiter(writer: Writer, limiter: LimiterDesign) -> list[Row]:
    made = "as declared" if limiter.declared else "computed"
    if limiter.set is None:
        rows = [
            Row((word("limiter"), Cell("no room", number=True), word("normal running reaches the latest value at which one could act")))
        ]
    else:
        rows = [_value(writer, "limiter set at", limiter.set, f"{made}; {_window(writer, limiter.window)}")]
    rows.append(Row((word("limiter opens"), word(""), word(f"{SWITCHES[limiter.switch]}; {limiter.resets} reset, a sensor of its own"))))
    if limiter.acts_at is not None:
        lag = f"through its sensor's lag of {writer.time(limiter.sensor_lag)}"
        rows.append(_value(writer, "true value when it acts", limiter.acts_at, lag))
    if limiter.peaks_at is not None:
        after = "past the danger: dead time and stored heat carry it there" if limiter.coasts_past else "dead time and stored heat run out"
        rows.append(_value(writer, "true value at its farthest after that", limiter.peaks_at, after))
    return rows


def _alarm(writer: Writer, alarm: AlarmDesign) -> list[Row]:
    made = "the loop file's, independent of the controller" if alarm.declared else "computed"
    name = f"alarm, {alarm.side}, set at"
    if alarm.set is None:
        return [Row((word(name), _no_room(), word(_NO_ROOM)))]
    rows = [_value(writer, name, alarm.set, f"{made}; {_window(writer, alarm.window)}")]
    if alarm.acts_at is not None:
        rows.append(
            _value(writer, "true value when it comes", alarm.acts_at, f"through its sensor's lag of {writer.time(alarm.sensor_lag)}")
        )
    return rows


def _no_room() -> Cell:
    return Cell("no room", number=True)


def _window(writer: Writer, window: Window | None) -> str:
    if window is None:
        return "no danger is passed"
    return f"normal running ends at {writer.value(window.running)}, the latest value is {writer.value(window.latest)}"


def _value(writer: Writer, name: str, value: float, remark: str) -> Row:
    return Row((word(name), number(writer.value(value), writer.shown_value(value)), word(remark)))

"""The schedule of instruments: every sensor and switch, its range, class, error and signal."""

from specgen.design.instruments import InstrumentRow, instrument_rows
from specgen.view.cells import DASH, NO_NUMBER, number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place, frame
from specgen.view.shapes import Column, Note, PageView, Row, Section, Sentence, Table
from specgen.view.words import counted
from specgen.view.writer import Writer

_NOTES = (
    Note("Error", "of the whole measurement at its worst setpoint: sensor, leads and input, as the root of the sum of squares."),
    Note("Limiter, alarm", "have sensors of their own, so that no fault of the loop's blinds them."),
)


def instruments_page(dossier: Dossier, place: Place) -> PageView:
    """Build the page."""
    table = instruments_table(dossier, place)
    text = f"{counted(len(table.rows), 'instrument')}: the loops' sensors, those of limiters and alarms, and what the interlocks prove."
    section = Section("1", "instruments", "Instruments", (Sentence(says(text), quiet=True, notes=_NOTES), table))
    return frame(dossier, place, "Instruments", (section,), kicker="Every sensor and switch with its range, class, error and signal")


def instruments_table(dossier: Dossier, place: Place) -> Table:
    """Build the table of every instrument."""
    columns = (
        Column("Instrument", export="instrument"),
        Column("Loop", export="loop"),
        Column("Sensor", export="sensor"),
        Column("Serves", export="serves"),
        Column("From", number=True, export="range from"),
        Column("To", number=True, export="range to"),
        Column("Unit", export="unit"),
        Column("Class", export="class"),
        Column("Error", number=True, export="error"),
        Column("Acts at", number=True, export="acts at"),
        Column("Signal", export="signal"),
    )
    rows = tuple(_row(dossier.writers[row.loop], place, row) for row in instrument_rows(dossier.design.loops))
    return Table("", columns, rows, wide=True, empty="No loop could be decided.")


def sensor_words(kind: str) -> str:
    """Write a sensor's kind.

    Examples
    --------
    >>> sensor_words("pt100"), sensor_words("thermocouple_K"), sensor_words("airflow switch")
    ('Pt100', 'thermocouple K', 'airflow switch')
    """
    return kind.replace("pt1", "Pt1").replace("_", " ").replace("ntc", "thermistor")


def _row(writer: Writer, place: Place, row: InstrumentRow) -> Row:
    low = high = NO_NUMBER
    if row.range is not None:
        low = number(writer.bare(writer.shown_value(row.range.low), 4), writer.shown_value(row.range.low))
        high = number(writer.bare(writer.shown_value(row.range.high), 4), writer.shown_value(row.range.high))
    return Row(
        (
            word(row.designation),
            word(row.loop, place.sheet(row.loop, "connections")),
            word(sensor_words(row.sensor)),
            word(row.serves),
            low,
            high,
            word(writer.value_unit) if row.range is not None or row.error is not None or row.set is not None else DASH,
            word(row.accuracy_class) if row.accuracy_class else DASH,
            NO_NUMBER if row.error is None else number(writer.bare(writer.shown_change(row.error)), writer.shown_change(row.error)),
            NO_NUMBER if row.set is None else number(writer.value_number(row.set), writer.shown_value(row.set)),
            word(row.signal) if row.signal else DASH,
        )
    )

"""Section Settings to enter of a sheet: what is typed into the controller, and the range in which it keeps the rules."""

from collections.abc import Sequence
from math import isfinite

from specgen.design.types import DecidedLoop
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import Bound, ContinuousSettings, OnOffSettings, ProportionedSettings, Settings, ThreePointSettings, Tuning
from specgen.view.cells import number, says, word
from specgen.view.dossier import Dossier
from specgen.view.frame import Place
from specgen.view.shapes import Cell, Column, Note, Row, Section, Sentence, Shape, Table
from specgen.view.words import MODES, SENSOR_FAULT
from specgen.view.writer import Writer

_COUNTING = Note(
    "Differential", "Some controllers count it to one side of the setpoint: check that both switch points come out as written."
)
_LATCHED = Note("Cycle", "Its delay is in the starting values: enter both together.")
_FORM = Note("Form", "The values are of the ideal form Kc(1 + 1/(Ti s) + Td s); a controller of the series form takes other numbers.")


def settings_section(dossier: Dossier, place: Place, decided: DecidedLoop, number_: str) -> Section:
    """Build the section."""
    writer = dossier.writers[decided.tag]
    settings = decided.decision.chosen.case.settings
    rows = [*_common(writer, decided)]
    notes: tuple[Note, ...] = ()
    blocks: list[Shape] = []
    if isinstance(settings, Unsized):
        blocks.append(Sentence(says(f"Nothing can be entered yet: {settings.because}.")))
    else:
        made, notes = _own(dossier, place, writer, settings)
        rows += made
    rows += _on_faults(writer, decided)
    columns = (Column("Setting"), Column("Value", number=True), Column("Keeps the rules"))
    blocks.append(Table("", columns, tuple(rows), notes=notes))
    return Section(number_, "settings", "Settings to enter", tuple(blocks))


def _row(name: str, value: str, within: str = "", aside: str = "", href: str = "") -> Row:
    return Row((word(name), Cell(value, number=True), Cell(within, href=href, aside=aside)))


def _common(writer: Writer, decided: DecidedLoop) -> list[Row]:
    need = decided.loop.need
    mode = decided.decision.chosen.case.candidate.mode
    action = "reverse" if decided.loop.raises else "direct"
    sense = "more output raises the value" if decided.loop.raises else "more output lowers the value"
    setpoint = _row("setpoint", writer.value(float(need.setpoint)), writer.values(need.setpoints) if need.range is not None else "")
    return [_row("mode", MODES[mode]), _row("action", action, aside=sense), setpoint]


def _own(dossier: Dossier, place: Place, writer: Writer, settings: Settings) -> tuple[list[Row], tuple[Note, ...]]:
    if isinstance(settings, OnOffSettings):
        return _on_off(dossier, place, writer, settings), (_COUNTING,)
    if isinstance(settings, ProportionedSettings):
        rows = [
            _row(
                "cycle time", writer.time(settings.cycle_time), _between(writer, settings.least, settings.most),
                _who(settings.least_bounds, settings.most_bounds, settings.least, settings.most),
            ),
            *_tuning(writer, settings.tuning),
            _row("output limits", "0 to 100\u202f%"),
            _row("shortest pulse", writer.time(settings.least_pulse), aside="shorter ones are carried over to the next cycle"),
        ]  # fmt: skip
        return rows, (_LATCHED, _FORM)
    if isinstance(settings, ContinuousSettings):
        tuned = _tuning(writer, settings.tuning)
        return [_row("output signal", settings.signal), *tuned, _row("output limits", "0 to 100\u202f%")], (_FORM,)
    return _three_point(writer, settings), (_FORM,)


def _on_off(dossier: Dossier, place: Place, writer: Writer, settings: OnOffSettings) -> list[Row]:
    most = (settings.most_bound,) if settings.most_bound is not None else ()
    who = _who(settings.least_bounds, most, settings.least, settings.most)
    first = most[0].rule if most else ""
    rows = [
        _row(
            "differential, whole (d)", writer.setting(settings.differential), writer.bounds(settings.least, settings.most), who,
            place.rule(dossier, first) if first else "",
        ),
        _row("differential, half (d/2)", writer.setting(settings.differential / 2)),
        _row("placement", "centred" if settings.placement == "centred" else f"{settings.placement} the setpoint"),
        _row("output on at", writer.fine_value(settings.switch_on, settings.differential / 2)),
        _row("output off at", writer.fine_value(settings.switch_off, settings.differential / 2)),
    ]  # fmt: skip
    for name, least in (("least time on", settings.enforced.min_run), ("least time off", settings.enforced.min_rest)):
        if least > 0:
            rows.append(_row(name, writer.time(least), aside="the machine's own"))
    return rows


def _three_point(writer: Writer, settings: ThreePointSettings) -> list[Row]:
    return [
        _row("neutral zone, whole", writer.setting(settings.neutral_zone)),
        _row("travel of the shortest pulse", writer.say(settings.travel_step, "fraction")),
        *_tuning(writer, settings.tuning),
    ]


def _tuning(writer: Writer, tuning: Tuning) -> list[Row]:
    starting = "starting value"
    return [
        _row("proportional band", writer.fine_change(tuning.proportional_band), aside=f"{starting}; wider is calmer and slower"),
        _row("integral time", writer.time(tuning.integral_time) if isfinite(tuning.integral_time) else "none", aside=starting),
        _row("derivative time", writer.time(tuning.derivative_time) if tuning.derivative_time > 0 else "none", aside=starting),
    ]


def _between(writer: Writer, least: float, most: float) -> str:
    """Write a range of times."""
    if most < least:
        return f"needs {writer.time(least)}, may be {writer.time(most)} at most"
    if not isfinite(most):
        return f"{writer.time(least)} or more" if least > 0 else ""
    return f"{writer.time(least)} to {writer.time(most)}" if least > 0 else f"up to {writer.time(most)}"


def _who(least: Sequence[Bound], most: Sequence[Bound], at_least: float, at_most: float) -> str:
    """Name the rules that bind on both sides."""
    low = max(least, key=lambda bound: bound.limit, default=None)
    high = min(most, key=lambda bound: bound.limit, default=None)
    parts = []
    if low is not None and at_least > 0:
        parts.append(f"least by {low.rule}, {low.words}")
    if high is not None and isfinite(at_most):
        parts.append(f"most by {high.rule}, {high.words}")
    return "; ".join(parts)


def _on_faults(writer: Writer, decided: DecidedLoop) -> list[Row]:
    limits, alarms = decided.loop.limits, decided.loop.alarms
    rows = [_row("output on sensor fault", SENSOR_FAULT.get(limits.on_sensor_fault or "", "not declared"))]
    for name, alarm in (("alarm, high", alarms.high), ("alarm, low", alarms.low)):
        if alarm is not None:
            rows.append(Row((word(name), number(writer.value(alarm), writer.shown_value(alarm)), word(""))))
    if limits.after_power_return is not None:
        rows.append(_row("after return of supply", {"resume": "resume", "off": "stay off"}[limits.after_power_return]))
    return rows

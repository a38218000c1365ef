"""Section What to expect of a sheet: the predicted figures with their worst cases, and two settled cycles drawn."""

from math import isfinite

from specgen.design.types import DecidedLoop
from specgen.process.box import Box
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, ThreePointSettings, Tuning
from specgen.view.cells import says, word
from specgen.view.cycle_drawing import CyclePlot, cycle_drawing
from specgen.view.cycle_plot import on_off_plot, ripple_plot
from specgen.view.shapes import Cell, Column, Row, Section, Sentence, Shape, Table
from specgen.view.summary import Summary, summary_of
from specgen.view.words import listed
from specgen.view.writer import Writer

_COLUMNS = (Column("Figure"), Column("Predicted", number=True), Column("Allowed", number=True), Column("Worst case"))


def expect_section(writer: Writer, decided: DecidedLoop, number_: str) -> Section:
    """Build the section."""
    settings = decided.decision.chosen.case.settings
    short = summary_of(decided)
    blocks: list[Shape] = []
    if isinstance(settings, Unsized):
        blocks.append(Sentence(says(f"Nothing can be predicted: {settings.because}.")))
    else:
        rows = [*_held(writer, decided, short)]
        if isinstance(settings, OnOffSettings):
            rows += _on_off(writer, settings)
        elif isinstance(settings, ProportionedSettings):
            rows += [*_proportioned(writer, decided, settings), *_tuned(writer, decided, settings.tuning)]
        else:
            rows += [*_duty(writer, settings), *_tuned(writer, decided, settings.tuning)]
        rows += _life(writer, decided, short)
        blocks.append(Table("", _COLUMNS, tuple(rows), wide=True))
        blocks += _drawing(writer, decided)
    return Section(number_, "expect", "What to expect", tuple(blocks))


def _row(name: str, predicted: Cell | str, allowed: str = "", case: str = "") -> Row:
    cell = Cell(predicted, number=True) if isinstance(predicted, str) else predicted
    return Row((word(name), cell, Cell(allowed, number=True), word(case)))


def _held(writer: Writer, decided: DecidedLoop, short: Summary) -> list[Row]:
    if short.above is None or short.below is None:
        return []
    included = f"{listed(short.includes)} included"
    above, below = writer.excursion(short.above, short.allowed_above), writer.excursion(short.below, short.allowed_below)
    rows = [
        _row("above the setpoint, at most", above, writer.setting(short.allowed_above), included),
        _row("below the setpoint, at most", below, writer.setting(short.allowed_below), included),
    ]
    error = decided.decision.chosen.case.error
    if not isinstance(error, Unsized):
        rows.append(
            _row("of that the measuring error", writer.fine_change(error.root_sum), "", f"plain sum {writer.fine_change(error.sum)}")
        )
    return rows


def _on_off(writer: Writer, settings: OnOffSettings) -> list[Row]:
    enforced, natural = settings.enforced, settings.natural
    starts, on, off = enforced.starts_per_hour, natural.shortest_on, natural.shortest_off
    return [
        _row("swing, peak to trough", writer.excursion(enforced.swing.value), "", enforced.swing.text),
        _row("starts an hour, at most", writer.bare(starts.value), "", starts.text),
        _row("shortest time from start to start", writer.time(enforced.period), "", starts.text),
        _row("shortest time on", writer.time(on.value), _least(writer, enforced.min_run), on.text),
        _row("shortest time off", writer.time(off.value), _least(writer, enforced.min_rest), off.text),
    ]


def _least(writer: Writer, least: float) -> str:
    return f"{writer.time(least)} or more" if least > 0 else ""


def _proportioned(writer: Writer, decided: DecidedLoop, settings: ProportionedSettings) -> list[Row]:
    ripple = settings.ripple
    house = decided.decision.chosen.case.panel.house
    tolerance = decided.loop.need.tolerance
    above, below = float(tolerance.above) * house.swing_share, float(tolerance.below) * house.swing_share
    return [
        _row("ripple of the switching, above", writer.fine_change(ripple.above.value), writer.fine_change(above), ripple.above.text),
        _row("ripple of the switching, below", writer.fine_change(ripple.below.value), writer.fine_change(below), ripple.below.text),
        _row("output, lowest to highest", _shares(writer, settings.lowest_duty, settings.highest_duty)),
        _row("shortest pulse on", writer.time(settings.shortest_on), _least(writer, settings.least_pulse)),
        _row("shortest pause", writer.time(settings.shortest_off), _least(writer, settings.least_pulse)),
    ]


def _duty(writer: Writer, settings: ContinuousSettings | ThreePointSettings) -> list[Row]:
    return [_row("output, lowest to highest", _shares(writer, settings.duty_low, settings.duty_high))]


def _shares(writer: Writer, low: float, high: float) -> str:
    return f"{writer.say(low, 'fraction')} to {writer.say(high, 'fraction')}"


def _tuned(writer: Writer, decided: DecidedLoop, tuning: Tuning) -> list[Row]:
    need = decided.loop.need
    overshoot = need.overshoot if need.overshoot is not None else need.tolerance.above
    rows = [
        _row("gain margin", writer.bare(tuning.gain_margin), "2 or more"),
        _row("phase margin", writer.say(tuning.phase_margin, "degrees")),
        _row("peak sensitivity", writer.bare(tuning.peak_sensitivity), "2 at most"),
    ]
    if tuning.load_deviation is not None:
        rows.append(_row("deviation after the sudden load", writer.excursion(tuning.load_deviation)))
    if tuning.overshoot is not None:
        rows.append(_row("overshoot at start-up", writer.excursion(tuning.overshoot), writer.setting(float(overshoot))))
    if tuning.time_to_band is not None and isfinite(tuning.time_to_band):
        rows.append(_row("from the coldest rest into the band", writer.time(tuning.time_to_band)))
    return rows


def _life(writer: Writer, decided: DecidedLoop, short: Summary) -> list[Row]:
    if short.operations_per_year is None:
        return []
    rows = [_row("operations a year", writer.bare(short.operations_per_year))]
    if short.contact_life is not None:
        asked = decided.decision.chosen.case.panel.house.contact_life_years
        rows.append(_row("contacts last", writer.years(short.contact_life), f"{writer.years(asked)} or more", f"weakest: {short.weakest}"))
    return rows


def _drawing(writer: Writer, decided: DecidedLoop) -> tuple[Shape, ...]:
    case = decided.decision.chosen.case
    plot: CyclePlot | None = None
    if isinstance(case.box, Box) and isinstance(case.settings, OnOffSettings):
        plot = on_off_plot(writer, decided, case.box, case.settings)
    elif isinstance(case.box, Box) and isinstance(case.settings, ProportionedSettings):
        plot = ripple_plot(writer, decided, case.box, case.settings)
    return () if plot is None else (cycle_drawing(plot),)

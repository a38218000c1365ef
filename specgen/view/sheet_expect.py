"""Section What to expect of a sheet: the predicted figures with their worst cases, and two settled cycles drawn."""

from math import isfinite
from typing import NamedTuple

from specgen.design.types import DecidedLoop
from specgen.process.box import Box
from specgen.sizing.candidate import Unsized
from specgen.sizing.settings import ContinuousSettings, OnOffSettings, ProportionedSettings, Settings, ThreePointSettings, Tuning
from specgen.view.basis_index import BasisIndex
from specgen.view.cells import says, word
from specgen.view.cycle_drawing import CyclePlot, cycle_drawing
from specgen.view.cycle_plot import on_off_plot, ripple_plot
from specgen.view.shapes import Cell, Column, Row, Section, Sentence, Shape, Table
from specgen.view.sheet_plots import expected_plots
from specgen.view.summary import Summary, summary_of
from specgen.view.words import listed
from specgen.view.writer import Writer

_COLUMNS = (Column("Figure"), Column("Predicted", number=True), Column("Allowed", number=True), Column("Worst case"))


class Line(NamedTuple):
    """One predicted figure: its words, the number they were written from, and what is allowed."""

    name: str
    text: str
    allowed: str = ""
    case: str = ""
    value: float | None = None
    dimension: str = "change"


def expect_section(writer: Writer, decided: DecidedLoop, index: BasisIndex, number_: str) -> Section:
    """Build the section."""
    settings = decided.decision.chosen.case.settings
    blocks: list[Shape] = []
    if isinstance(settings, Unsized):
        blocks.append(Sentence(says(f"Nothing can be predicted: {settings.because}.")))
    else:
        rows = tuple(_row(line, index) for line in _lines(writer, decided, settings))
        blocks.append(Table("", _COLUMNS, rows, wide=True))
        blocks += _drawing(writer, decided)
        blocks += expected_plots(writer, decided)
    return Section(number_, "expect", "What to expect", tuple(blocks))


def _lines(writer: Writer, decided: DecidedLoop, settings: Settings) -> list[Line]:
    short = summary_of(decided)
    lines = _held(writer, decided, short)
    if isinstance(settings, OnOffSettings):
        lines += _on_off(writer, settings)
    elif isinstance(settings, ProportionedSettings):
        lines += [*_proportioned(writer, decided, settings), *_tuned(writer, decided, settings.tuning)]
    else:
        duties = Line("output, lowest to highest", _shares(writer, settings.duty_low, settings.duty_high))
        lines += [duties, *_travel(writer, settings), *_tuned(writer, decided, settings.tuning)]
    return lines + _life(writer, decided, short)


def _row(line: Line, index: BasisIndex) -> Row:
    href = index.href(line.value, line.dimension) if line.value is not None else ""
    return Row((word(line.name), Cell(line.text, href=href, number=True), Cell(line.allowed, number=True), word(line.case)))


def _held(writer: Writer, decided: DecidedLoop, short: Summary) -> list[Line]:
    if short.above is None or short.below is None:
        return []
    included = f"{listed(short.includes)} included"
    above, below = writer.excursion(short.above, short.allowed_above), writer.excursion(short.below, short.allowed_below)
    lines = [
        Line("above the setpoint, at most", above, writer.setting(short.allowed_above), included),
        Line("below the setpoint, at most", below, writer.setting(short.allowed_below), included),
    ]
    error = decided.decision.chosen.case.error
    if not isinstance(error, Unsized):
        plain_sum = f"plain sum {writer.fine_change(error.sum)}"
        lines.append(Line("of that the measuring error", writer.fine_change(error.root_sum), "", plain_sum, error.root_sum))
    return lines


def _on_off(writer: Writer, settings: OnOffSettings) -> list[Line]:
    enforced, natural = settings.enforced, settings.natural
    swing, starts, on, off = enforced.swing, enforced.starts_per_hour, natural.shortest_on, natural.shortest_off
    run, rest = _least(writer, enforced.min_run), _least(writer, enforced.min_rest)
    return [
        Line("swing, peak to trough", writer.excursion(swing.value), "", swing.text, swing.value),
        Line("starts an hour, at most", writer.bare(starts.value), "", starts.text, starts.value, "per_hour"),
        Line("shortest time from start to start", writer.time(enforced.period), "", starts.text, enforced.period, "time"),
        Line("shortest time on", writer.time(on.value), run, on.text, on.value, "time"),
        Line("shortest time off", writer.time(off.value), rest, off.text, off.value, "time"),
    ]


def _least(writer: Writer, least: float) -> str:
    return f"{writer.time(least)} or more" if least > 0 else ""


def _proportioned(writer: Writer, decided: DecidedLoop, settings: ProportionedSettings) -> list[Line]:
    up, down = settings.ripple.above, settings.ripple.below
    house = decided.decision.chosen.case.panel.house
    tolerance = decided.loop.need.tolerance
    above, below = float(tolerance.above) * house.swing_share, float(tolerance.below) * house.swing_share
    least = _least(writer, settings.least_pulse)
    return [
        Line("ripple of the switching, above", writer.fine_change(up.value), writer.fine_change(above), up.text, up.value),
        Line("ripple of the switching, below", writer.fine_change(down.value), writer.fine_change(below), down.text, down.value),
        Line("shares of full output it is held to", _shares(writer, settings.lowest_duty, settings.highest_duty)),
        Line("shortest pulse on", writer.time(settings.shortest_on), least, "", settings.shortest_on, "time"),
        Line("shortest pause", writer.time(settings.shortest_off), least, "", settings.shortest_off, "time"),
    ]


def _travel(writer: Writer, settings: ContinuousSettings | ThreePointSettings) -> list[Line]:
    """Say how a valve is used: its opening, or what its motor works."""
    if isinstance(settings, ThreePointSettings):
        pulses, share = settings.pulses_per_hour, settings.motor_share
        lines = [] if pulses is None else [Line("pulses an hour", writer.bare(pulses), "", "", pulses, "per_hour")]
        return (
            lines if share is None else [*lines, Line("motor runs, of the time", writer.say(share, "fraction"), "", "", share, "fraction")]
        )
    valve = settings.valve
    if valve is None:
        return []
    installed = "pipes included" if valve.is_installed else "valve alone"
    shares = (
        ("opening at the lowest output", valve.opening_low, "10 to 90\u202f%", installed),
        ("opening at the highest output", valve.opening_high, "10 to 90\u202f%", installed),
        ("lowest flow that can be controlled", valve.lowest_flow, "", ""),
    )
    lines = [
        Line(name, writer.say(share, "fraction"), able, how, share, "fraction") for name, share, able, how in shares if share is not None
    ]
    if valve.authority is not None:
        lines.append(Line("authority of the valve", writer.bare(valve.authority), "", "", valve.authority, "number"))
    return lines


def _shares(writer: Writer, low: float, high: float) -> str:
    return f"{writer.say(low, 'fraction')} to {writer.say(high, 'fraction')}"


def _tuned(writer: Writer, decided: DecidedLoop, tuning: Tuning) -> list[Line]:
    need = decided.loop.need
    allowed = writer.setting(float(need.overshoot if need.overshoot is not None else need.tolerance.above))
    gain, phase, peak = tuning.gain_margin, tuning.phase_margin, tuning.peak_sensitivity
    lines = [
        Line("gain margin", writer.bare(gain), "2 or more", "", gain, "number"),
        Line("phase margin", writer.say(phase, "degrees"), "", "", phase, "degrees"),
        Line("peak sensitivity", writer.bare(peak), "2 at most", "", peak, "number"),
    ]
    deviation, overshoot, settles = tuning.load_deviation, tuning.overshoot, tuning.time_to_band
    if deviation is not None:
        lines.append(Line("deviation after the sudden load", writer.excursion(deviation), "", "", deviation))
    if overshoot is not None:
        lines.append(Line("overshoot at start-up", writer.excursion(overshoot), allowed, "", overshoot))
    if settles is not None and isfinite(settles):
        lines.append(Line("from the coldest rest into the band", writer.time(settles), "", "", settles, "time"))
    return lines


def _life(writer: Writer, decided: DecidedLoop, short: Summary) -> list[Line]:
    yearly, life = short.operations_per_year, short.contact_life
    if yearly is None:
        return []
    lines = [Line("operations a year", writer.bare(yearly), "", "", yearly, "per_year")]
    if life is not None:
        asked = f"{writer.years(decided.decision.chosen.case.panel.house.contact_life_years)} or more"
        lines.append(Line("contacts last", writer.years(life), asked, f"weakest: {short.weakest}", life, "years"))
    return lines


def _drawing(writer: Writer, decided: DecidedLoop) -> tuple[Shape, ...]:
    case = decided.decision.chosen.case
    plot: CyclePlot | None = None
    if isinstance(case.box, Box) and isinstance(case.settings, OnOffSettings):
        plot = on_off_plot(writer, decided, case.box, case.settings)
    elif isinstance(case.box, Box) and isinstance(case.settings, ProportionedSettings):
        plot = ripple_plot(writer, decided, case.box, case.settings)
    return () if plot is None else (cycle_drawing(plot),)

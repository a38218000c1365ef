"""What the drawing of two settled cycles shows, taken from the worst case of a prediction."""

from specgen.design.types import DecidedLoop
from specgen.process.box import Box
from specgen.process.limit_cycle import Cycle, NoCycle
from specgen.process.on_off import switch_points
from specgen.process.worst_case import Worst
from specgen.sizing.settings import OnOffSettings, ProportionedSettings
from specgen.view.cycle_drawing import CyclePlot
from specgen.view.settled_curve import CYCLES, Curve, settled_curve
from specgen.view.shapes import Note
from specgen.view.writer import Writer


def on_off_plot(writer: Writer, decided: DecidedLoop, box: Box, settings: OnOffSettings) -> CyclePlot | None:
    """Return two cycles of the case whose excursion takes the larger share of the tolerance; None where nothing switches."""
    prediction = settings.enforced
    tolerance = decided.loop.need.tolerance
    above_is_worse = prediction.above.value / tolerance.above >= prediction.below.value / tolerance.below
    worst = prediction.above if above_is_worse else prediction.below
    high, low = switch_points(settings.differential, settings.placement, box.sign)
    plant = worst.plant
    try:
        cycle = plant.limit_cycle(high, low, prediction.min_run, prediction.min_rest)
    except NoCycle:
        return None
    curve = settled_curve(plant, cycle.t_on, cycle.t_off, cycle.peak)
    reading = settled_curve(plant, cycle.t_on, cycle.t_off, cycle.measured_peak, measured=True) if plant.sensor_lag > 0 else None
    setpoint = box.setpoint.at(worst.point.load)
    lines = tuple(
        (writer.shown_value(setpoint + offset), f"{word} at {writer.fine_value(setpoint + offset, settings.differential / 2)}")
        for offset, word in ((prediction.switch_off, "off"), (prediction.switch_on, "on"))
    )
    hidden = ", dotted what the controller reads" if reading else ""
    notes = (Note("Reading it", _overshoots(writer, cycle, plant.theta + plant.lag, plant.sensor_lag)),)
    return _plot(writer, decided, box, worst, curve, reading, cycle.t_on, above=above_is_worse, lines=lines, hidden=hidden, notes=notes)


def _overshoots(writer: Writer, cycle: Cycle, late: float, sensor_lag: float) -> str:
    text = f"The value passes the switch points because the element's effect arrives {writer.time(late)} late." if late > 0 else ""
    if sensor_lag > 0:
        hidden = writer.fine_change(cycle.swing - cycle.measured_swing)
        text += f" The sensor follows {writer.time(sensor_lag)} behind and hides {hidden} of the swing."
    return text.strip() or "Without delay the value turns at the switch points."


def ripple_plot(writer: Writer, decided: DecidedLoop, box: Box, settings: ProportionedSettings) -> CyclePlot | None:
    """Return two cycles of the worst ripple around the setpoint; None where nothing pulses."""
    ripple = settings.ripple
    above_is_worse = ripple.above.value >= ripple.below.value
    worst = ripple.above if above_is_worse else ripple.below
    plant = worst.plant
    pulses = plant.ripple(settings.cycle_time)
    if pulses.t_on <= 0 or pulses.t_off <= 0:
        return None
    curve = settled_curve(plant, pulses.t_on, pulses.t_off, pulses.above)
    return _plot(writer, decided, box, worst, curve, None, pulses.t_on, above=above_is_worse, lines=(), hidden="", notes=())


def _plot(
    writer: Writer,
    decided: DecidedLoop,
    box: Box,
    worst: Worst,
    curve: Curve,
    reading: Curve | None,
    t_on: float,
    *,
    above: bool,
    lines: tuple[tuple[float, str], ...],
    hidden: str,
    notes: tuple[Note, ...],
) -> CyclePlot:
    tolerance = decided.loop.need.tolerance
    setpoint = box.setpoint.at(worst.point.load)
    values = _real(writer, box, worst, curve)
    # in the second cycle, where a reader has seen the first
    second = range(len(values) // CYCLES, len(values))
    marked = max(second, key=values.__getitem__) if above else min(second, key=values.__getitem__)
    period = curve.times[-1] / CYCLES
    extreme = writer.near(setpoint + (worst.value if above else -worst.value), worst.value)
    word = "highest" if above else "lowest"
    low, high = (writer.near(edge, worst.value) for edge in _ends(box, worst, curve))
    return CyclePlot(
        times=curve.times,
        values=values,
        measured=_real(writer, box, worst, reading) if reading else (),
        upper=writer.shown_value(setpoint + float(tolerance.above)),
        lower=writer.shown_value(setpoint - float(tolerance.below)),
        lines=lines,
        pulses=tuple((period * index, period * index + t_on) for index in range(CYCLES)),
        worst=(curve.times[marked], values[marked], f"{word} {extreme}"),
        title=f"Two settled cycles in the worst case: the value runs between {low} and {high}; "
        f"the output is on for {writer.time(t_on)} of {writer.time(period)}.",
        caption=f"Settled running in the worst case, the true value{hidden}: {worst.text}.",
        value_axis=f"{decided.loop.need.quantity if decided.loop.need.quantity != 'other' else 'value'}, {writer.value_unit}",
        notes=notes,
    )


def _real(writer: Writer, box: Box, worst: Worst, curve: Curve) -> tuple[float, ...]:
    """Turn distances in the sense of more output into values on the pages' scale."""
    return tuple(writer.shown_value(box.value_at(worst.point, distance)) for distance in curve.values)


def _ends(box: Box, worst: Worst, curve: Curve) -> tuple[float, float]:
    ends = [box.value_at(worst.point, end) for end in (min(curve.values), max(curve.values))]
    return min(ends), max(ends)

"""The drawing of a start from rest: the whole way, and the arrival in the band enlarged, with the output below it."""

from dataclasses import dataclass

from specgen.core.say import MINUS
from specgen.design.start_ups import Start, StartUps
from specgen.view.axes import Scale, place
from specgen.view.panels import LEFT, RIGHT, WIDTH, Panels, Spot, TimeUnit, inside, time_unit
from specgen.view.reading import Readable, reading_data
from specgen.view.shapes import Box, Drawing, Label, Note, Path
from specgen.view.writer import Writer

TOP, HIGH = 24.0, 112.0  # of the whole way
AT, TALL = 190.0, 118.0  # of the arrival
STRIP, THICK = 322.0, 26.0  # of the output
BELOW = 2.6  # bands below the setpoint from which the arrival is drawn
LATER = 1.12
SWING = 1.1
ROOM = 0.16  # above what is reached, for words


@dataclass(frozen=True, slots=True)
class _Frame:
    writer: Writer
    up: int

    def spot(self, x: Scale, y: Scale, time: float, distance: float) -> Spot:
        return x(time), y(self.shown(distance))

    def shown(self, distance: float) -> float:
        """Return a distance in the sense of more output on the value's own scale, in the pages' unit."""
        return self.writer.shown_change(self.up * distance)


def start_up_drawing(writer: Writer, starts: StartUps, up: int) -> Drawing:
    """Draw a start; ``up`` is +1 where more output raises the value, -1 where it lowers it."""
    frame, panels = _Frame(writer, up), Panels()
    lively, slow = starts.lively, starts.slow
    readable = [_whole(panels, frame, starts), _arrival(panels, frame, starts)]
    notes = [Note("Reading it", _reading(writer, starts))]
    return Drawing(
        anchor="start-up",
        title=_title(writer, starts),
        caption=_caption(lively, slow),
        width=str(WIDTH),
        height=place(STRIP + THICK + 24),
        boxes=tuple(panels.boxes),
        paths=tuple(panels.paths),
        points=tuple(panels.points),
        labels=tuple(panels.labels),
        notes=tuple(notes),
        data=reading_data(readable),
    )


def _readable(frame: _Frame, x: Scale, y: Scale, unit: TimeUnit, curves: tuple[tuple[str, str], ...]) -> Readable:
    return Readable(x.over(unit.size), unit.word, y, frame.writer.change_unit, curves)


def _whole(panels: Panels, frame: _Frame, starts: StartUps) -> Readable:
    writer, lively, slow = frame.writer, starts.lively, starts.slow
    late = slow or lively
    end = max(LATER * (late.in_band or late.course.times[-1]), min(lively.course.times[-1], LATER * _settles(lively)))
    courses = [start.course for start in (lively, slow) if start is not None]
    values = [frame.shown(value) for course in courses for value in course.values]
    low, high = min(*values, -frame.shown(0.0)), max(*values, 0.0)
    # room for words on the far side of the setpoint
    rooms = [0.06 * (high - low), 0.24 * (high - low)]
    below, above = rooms if frame.up > 0 else reversed(rooms)
    x, y = Scale(0.0, end, LEFT, RIGHT), Scale(low - below, high + above, TOP + HIGH, TOP)
    edges = [frame.shown(edge) for edge in (starts.band.above, -starts.band.below)]
    panels.boxes.append(_band(y, edges))
    panels.value_axis(y, f"whole start: distance from the setpoint, {writer.change_unit}", 4)
    panels.time_axis(x, time_unit(end), TOP + HIGH)
    window = ((LEFT, TOP), (RIGHT, TOP + HIGH))
    if slow is not None:
        _course(panels, frame, x, y, slow, "thin", window)
    _course(panels, frame, x, y, lively, "value", window)
    plus, less = (writer.setting(edge) for edge in (starts.band.above, starts.band.below)[:: frame.up])
    panels.right([(y(0.0), f"setpoint ±{plus}" if plus == less else f"setpoint +{plus} {MINUS}{less}", "soft")], TOP, TOP + HIGH)
    if late.in_band is not None:
        where = frame.spot(x, y, late.in_band, _at(late, late.in_band))
        panels.mark(*where, f"{'slowest case: ' if slow else ''}in the band after {writer.time(late.in_band)}", upwards=frame.up > 0)
    slowest = (("thin", "slowest case"),) if slow is not None else ()
    return _readable(frame, x, y, time_unit(end), (("value", "liveliest case" if slow else "from the setpoint"), *slowest))


def _settles(start: Start) -> float:
    """Return when a start is seen to hold: its entry, its highest value, or its end."""
    return max(start.in_band or 0.0, start.highest_at) or start.course.times[-1]


def _course(panels: Panels, frame: _Frame, x: Scale, y: Scale, start: Start, kind: str, window: tuple[Spot, Spot]) -> None:
    spots = [frame.spot(x, y, time, value) for time, value in zip(start.course.times, start.course.values, strict=True)]
    for piece in inside(spots, *window):
        panels.curve(kind, piece)


def _arrival(panels: Panels, frame: _Frame, starts: StartUps) -> Readable:
    writer, lively, band = frame.writer, starts.lively, starts.band
    highest = lively.highest or 0.0
    low = -BELOW * band.below
    begins = _first(lively, max(low, lively.course.values[0]))
    if lively.highest is None:
        # cycles that leave the band are drawn whole
        low = min(low, SWING * min((value for time, value in _pairs(lively) if time >= (lively.in_band or 0.0)), default=0.0))
    last = lively.course.times[-1]
    settled = max(lively.in_band or 0.0, lively.highest_at if highest > 0 else 0.0, begins)
    end = last if lively.highest is None else min(last, begins + max(2.2 * (settled - begins), 0.06 * settled))
    reached = max(band.above, highest, *(value for time, value in _pairs(lively) if begins <= time <= end))
    top = reached + ROOM * (reached - low)
    x = Scale(begins, end, LEFT, RIGHT)
    ends = sorted((frame.shown(low), frame.shown(top)))
    y = Scale(ends[0], ends[1], AT + TALL, AT)
    panels.boxes.append(_band(y, [frame.shown(edge) for edge in (band.above, -band.below)]))
    panels.value_axis(y, f"arrival enlarged: distance from the setpoint, {writer.change_unit}", 5)
    upper, lower = y(frame.shown(band.above if frame.up > 0 else -band.below)), y(frame.shown(-band.below if frame.up > 0 else band.above))
    for at in (upper, lower):
        panels.across("limit", at)
    panels.across("axis", y(0.0))
    _course(panels, frame, x, y, lively, "value", ((LEFT, AT), (RIGHT, AT + TALL)))
    panels.right([(upper, "upper tolerance", "soft"), (lower, "lower tolerance", "soft"), (y(0.0), "setpoint", "soft")], AT, AT + TALL)
    unit = time_unit(end)
    if _shows(writer, highest) and lively.highest_at <= end:
        words = "highest" if frame.up > 0 else "lowest"
        panels.mark(*frame.spot(x, y, lively.highest_at, highest), f"{words} {writer.excursion(highest)} beyond", upwards=frame.up > 0)
    if lively.in_band is not None and begins <= lively.in_band <= end and (starts.slow is not None or lively.highest is None):
        where = frame.spot(x, y, lively.in_band, _at(lively, lively.in_band))
        panels.mark(*where, f"in the band after {writer.time(lively.in_band)}", upwards=frame.up < 0)
    _output(panels, x, lively, unit)
    return _readable(frame, x, y, unit, (("value", "from the setpoint"),))


def _output(panels: Panels, x: Scale, start: Start, unit: TimeUnit) -> None:
    """Draw the output as a share of full, below the arrival."""
    y = Scale(0.0, 1.0, STRIP + THICK, STRIP)
    levels = start.course.outputs
    corners: list[Spot] = []
    for index, (time, level) in enumerate(levels):
        until = levels[index + 1][0] if index + 1 < len(levels) else x.high
        if until < x.low or time > x.high:
            continue
        corners += [(x(max(time, x.low)), y(level)), (x(min(until, x.high)), y(level))]
    if corners:
        panels.curve("thin", corners)
    panels.paths.append(Path("axis", f"M{place(LEFT)} {place(STRIP)}V{place(STRIP + THICK)}M{place(LEFT - 4)} {place(STRIP)}h4"))
    panels.labels += [
        Label("tick-end", place(LEFT - 7), place(STRIP + 4), "100"),
        Label("tick-end", place(LEFT - 7), place(STRIP + THICK + 2), "0"),
        Label("soft", place(RIGHT + 7), place(STRIP + 10), "output, %"),
    ]
    panels.time_axis(x, unit, STRIP + THICK)


def _band(y: Scale, edges: list[float]) -> Box:
    top, bottom = y(max(edges)), y(min(edges))
    return Box("band", place(LEFT), place(top), place(RIGHT - LEFT), place(max(bottom - top, 0.8)))


def _pairs(start: Start) -> list[tuple[float, float]]:
    return list(zip(start.course.times, start.course.values, strict=True))


def _first(start: Start, distance: float) -> float:
    """Return when a start first comes within a distance of the setpoint."""
    return next((time for time, value in _pairs(start) if value >= distance), start.course.times[0])


def _at(start: Start, time: float) -> float:
    """Return a start's value at a time, between the points it was computed at."""
    times, values = start.course.times, start.course.values
    for index in range(1, len(times)):
        if times[index] >= time:
            before, after = times[index - 1], times[index]
            share = 0.0 if after == before else (time - before) / (after - before)
            return values[index - 1] + share * (values[index] - values[index - 1])
    return values[-1]


def _shows(writer: Writer, change: float) -> bool:
    """Tell whether a difference is more than nothing in the digits that are written."""
    return writer.shown_change(change) >= writer.step / 2


def _title(writer: Writer, starts: StartUps) -> str:
    late = starts.slow or starts.lively
    text = "Start from rest"
    if starts.lively.highest is not None:
        over = writer.excursion(starts.lively.highest) if _shows(writer, starts.lively.highest) else "nothing"
        text += f": at most {over} beyond the setpoint"
    if late.in_band is not None:
        text += f"{',' if starts.lively.highest is not None else ':'} the slowest case is in the band after {writer.time(late.in_band)}"
    return f"{text}."


def _caption(lively: Start, slow: Start | None) -> str:
    counted = ", every body counted" if lively.every_body else ""
    most = ", the case that overshoots most" if lively.highest else ""
    text = f"Start from rest, the true value{most}: {lively.case}{counted}."
    if slow is not None:
        text += f" Thin: the slowest case{', every body counted, at full output' if slow.every_body else ''}: {slow.case}."
        text += "" if slow.in_band is not None else " It does not come into the band."
    return text


def _reading(writer: Writer, starts: StartUps) -> str:
    lively = starts.lively
    if lively.highest is None:
        return "Full output carries the value into the band, then the loop cycles."
    full = next((time for time, level in lively.course.outputs if level < 1), lively.course.times[-1])
    text = f"Full output for {writer.time(full)}, then the tuned loop with its limits and its cycle."
    if lively.ripple > 0:
        text += f" Short cycles are drawn by their mean; the mark adds their ripple of {writer.fine_change(lively.ripple)}."
    return text

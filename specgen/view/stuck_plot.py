"""The drawing of an output stuck on: the course to the danger, and where the limiter stops it."""

from specgen.design.stuck_on import Course, StuckOn
from specgen.view.axes import Scale, place
from specgen.view.panels import LEFT, RIGHT, WIDTH, Panels, inside, time_unit
from specgen.view.reading import Readable, reading_data
from specgen.view.shapes import Drawing, Note
from specgen.view.writer import Writer

TOP, BOTTOM = 24.0, 196.0
ROOM = 0.17  # beyond what is marked, for words


def stuck_drawing(writer: Writer, stuck: StuckOn, quantity: str) -> Drawing:
    """Draw the course; values on their own scale."""
    panels, stopped, up = Panels(), stuck.stopped, stuck.outward
    end = max([stuck.course.times[-1], *((stopped.after.times[-1],) if stopped else ())])
    if stuck.danger_time is not None:
        end = max(1.2 * stuck.danger_time, 1.1 * stopped.peak_time if stopped else 0.0)
    marked = [stuck.start, *((stopped.set, stopped.acts_at, stopped.peaks_at) if stopped else ())]
    if stuck.danger is not None:
        marked.append(stuck.danger)
    if stuck.danger_time is None:
        marked.append(stuck.course.values[-1] if stuck.settles is None else stuck.settles)
    shown = [writer.shown_value(value) for value in marked]
    room = ROOM * (max(shown) - min(shown))
    x, y = Scale(0.0, end, LEFT, RIGHT), Scale(min(shown) - room, max(shown) + room, BOTTOM, TOP)

    def draw(kind: str, course: Course) -> None:
        spots = [(x(time), y(writer.shown_value(value))) for time, value in zip(course.times, course.values, strict=True)]
        for piece in inside(spots, (LEFT, TOP), (RIGHT, BOTTOM)):
            panels.curve(kind, piece)

    panels.value_axis(y, f"{quantity}, {writer.value_unit}")
    panels.time_axis(x, time_unit(end), BOTTOM)
    beside = []
    if stuck.danger is not None:
        at = y(writer.shown_value(stuck.danger))
        panels.across("limit", at)
        beside.append((at, f"danger {writer.value(stuck.danger)}", "plain"))
    if stopped is not None:
        at = y(writer.shown_value(stopped.set))
        panels.across("switch", at)
        beside.append((at, f"limiter {writer.value(stopped.set)}", "plain"))
    if stuck.danger_time is None and stuck.settles is not None:
        at = y(writer.shown_value(stuck.settles))
        panels.across("mark", at)
        beside.append((at, f"settles at {writer.value(stuck.settles)}", "plain"))
    panels.right(beside, TOP, BOTTOM)
    draw("rest" if stopped else "value", stuck.course)
    if stopped is not None:
        draw("value", stopped.before)
        draw("value", stopped.after)
        text = f"acts at {_apart(writer, stopped.acts_at, stopped.set)}"
        panels.mark(x(stopped.acts_time), y(writer.shown_value(stopped.acts_at)), text, upwards=up > 0)
        if stopped.peaks_at != stopped.acts_at:
            text = f"{'highest' if up > 0 else 'lowest'} {_apart(writer, stopped.peaks_at, stopped.acts_at)}"
            panels.mark(x(stopped.peak_time), y(writer.shown_value(stopped.peaks_at)), text, upwards=up < 0)
    panels.mark(x(0.0), y(writer.shown_value(stuck.start)), f"end of normal running {writer.value(stuck.start)}", upwards=up < 0)
    if stuck.danger_time is not None and stuck.danger is not None:
        panels.mark(x(stuck.danger_time), y(writer.shown_value(stuck.danger)), f"after {writer.time(stuck.danger_time)}", upwards=up > 0)
    curves = (("value", "true value"), *((("rest", "without the limiter"),) if stopped else ()))
    return Drawing(
        anchor="stuck-on",
        title=_title(writer, stuck),
        caption=_caption(stuck),
        width=str(WIDTH),
        height=place(BOTTOM + 24),
        boxes=tuple(panels.boxes),
        paths=tuple(panels.paths),
        points=tuple(panels.points),
        labels=tuple(panels.labels),
        notes=(Note("Reading it", _reading(writer, stuck)),),
        data=reading_data([Readable(x.over(time_unit(end).size), time_unit(end).word, y, writer.value_unit, curves)]),
    )


def _apart(writer: Writer, value: float, other: float) -> str:
    """Write a value, with a digit more where it would else read like another one beside it."""
    text = writer.value(value)
    return writer.one_digit_more(value) if text == writer.value(other) and value != other else text


def _title(writer: Writer, stuck: StuckOn) -> str:
    text = f"Output stuck on: from {writer.value(stuck.start)}"
    if stuck.danger_time is not None and stuck.danger is not None:
        text += f" the value passes the danger of {writer.value(stuck.danger)} after {writer.time(stuck.danger_time)} if nothing stops it"
    elif stuck.settles is not None:
        text += f" the value settles at {writer.value(stuck.settles)}"
    if stuck.stopped is not None:
        stopped = stuck.stopped
        acts, turns = _apart(writer, stopped.acts_at, stopped.set), _apart(writer, stopped.peaks_at, stopped.acts_at)
        text += f"; the limiter, set at {writer.value(stopped.set)}, acts at {acts} after {writer.time(stopped.acts_time)}"
        text += f" and the value turns at {turns}"
    return f"{text}."


def _caption(stuck: StuckOn) -> str:
    text = f"Output stuck on from the worst end of normal running, element hot: {stuck.course.case}."
    if stuck.stopped is not None and stuck.stopped.before.case != stuck.course.case:
        text += f" The limiter in its own worst case: {stuck.stopped.before.case}."
    return text


def _reading(writer: Writer, stuck: StuckOn) -> str:
    stopped = stuck.stopped
    if stopped is None:
        return "Nothing independent stops it here." if stuck.danger_time is not None else "It stays short of the danger by itself."
    apart = abs(stopped.acts_at - stopped.set)
    text = f"Dashed: if nothing stops it. The limiter's own sensor lets the value pass its set value by {writer.fine_change(apart)}"
    return f"{text}; what is under way then carries it on by {writer.fine_change(abs(stopped.peaks_at - stopped.acts_at))}."

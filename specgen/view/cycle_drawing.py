"""The drawing of two settled cycles: value and output against time, with tolerance, switch points and worst peak."""

from collections.abc import Sequence
from dataclasses import dataclass
from math import floor, log10

from specgen.core.say import MINUS
from specgen.view.axes import Scale, ticks
from specgen.view.axes import place as _n
from specgen.view.reading import Readable, reading_data
from specgen.view.shapes import Box, Drawing, Label, Note, Path, Point

WIDTH, HEIGHT = 640, 262
LEFT, RIGHT, TOP, BOTTOM = 48.0, 506.0, 22.0, 186.0
BAR_TOP, BAR_BOTTOM = 208.0, 217.0
LEAST_APART = 14.0  # between labels that stand one below the other
_TIMES = ((172800.0, 86400.0, "days"), (10800.0, 3600.0, "h"), (1200.0, 60.0, "min"), (0.0, 1.0, "s"))


@dataclass(frozen=True, slots=True)
class CyclePlot:
    """What is drawn, in the unit of the pages; times in s.

    ``lines`` are the switch points with their words; ``pulses`` the times the output is on; ``worst`` the marked
    point and its words.
    """

    times: tuple[float, ...]
    values: tuple[float, ...]
    measured: tuple[float, ...]
    upper: float
    lower: float
    lines: tuple[tuple[float, str], ...]
    pulses: tuple[tuple[float, float], ...]
    worst: tuple[float, float, str]
    title: str
    caption: str
    value_axis: str
    notes: tuple[Note, ...] = ()


def cycle_drawing(plot: CyclePlot) -> Drawing:
    """Place every line and word of the drawing."""
    y = Scale(*_span(plot), BOTTOM, TOP)
    end = plot.times[-1]
    x = Scale(0.0, end, LEFT, RIGHT)
    unit_size, unit = next((size, name) for least, size, name in _TIMES if end >= least)
    boxes = [Box("band", _n(LEFT), _n(y(plot.upper)), _n(RIGHT - LEFT), _n(y(plot.lower) - y(plot.upper)))]
    boxes += [Box("on", _n(x(a)), _n(BAR_TOP), _n(max(x(b) - x(a), 0.6)), _n(BAR_BOTTOM - BAR_TOP)) for a, b in plot.pulses]
    paths = [
        Path("limit", "".join(f"M{_n(LEFT)} {_n(y(v))}H{_n(RIGHT)}" for v in (plot.upper, plot.lower))),
        Path("axis", f"M{_n(LEFT)} {_n(TOP - 8)}V{_n(BOTTOM + 8)}M{_n(LEFT)} {_n(BAR_BOTTOM)}H{_n(RIGHT)}"),
    ]
    if plot.lines:
        paths.append(Path("switch", "".join(f"M{_n(LEFT)} {_n(y(v))}H{_n(RIGHT)}" for v, _ in plot.lines)))
    if plot.measured:
        paths.append(Path("measured", _line(x, y, plot.times, plot.measured)))
    paths.append(Path("value", _line(x, y, plot.times, plot.values)))
    labels = _value_ticks(y, paths) + _time_ticks(x, end / unit_size, unit_size, unit, paths)
    right = [(y(plot.upper), "upper tolerance", "soft"), (y(plot.lower), "lower tolerance", "soft")]
    right += [(y(value), text, "plain") for value, text in plot.lines]
    labels += [Label(kind, _n(RIGHT + 7), _n(at + 4), text) for at, text, kind in _apart(right)]
    labels += [
        Label("plain", _n(LEFT - 40), "10", plot.value_axis),
        Label("end", _n(LEFT - 6), _n(BAR_BOTTOM), "output"),
    ]
    worst_x, worst_y = x(plot.worst[0]), y(plot.worst[1])
    above = plot.worst[1] >= (plot.upper + plot.lower) / 2
    labels.append(Label("plain", _n(worst_x + 7), _n(worst_y - 7 if above else worst_y + 16), plot.worst[2]))
    return Drawing(
        anchor="cycles",
        title=plot.title,
        caption=plot.caption,
        width=str(WIDTH),
        height=str(HEIGHT),
        boxes=tuple(boxes),
        paths=tuple(paths),
        points=(Point(_n(worst_x), _n(worst_y)),),
        labels=tuple(labels),
        notes=plot.notes,
        data=reading_data([_readable(plot, x.over(unit_size), unit, y)]),
    )


def _readable(plot: CyclePlot, x: Scale, unit: str, y: Scale) -> Readable:
    curves = (("value", "true value"), *((("measured", "controller reads"),) if plot.measured else ()))
    return Readable(x, unit, y, plot.value_axis.rpartition(", ")[2], curves)


def _span(plot: CyclePlot) -> tuple[float, float]:
    every = [plot.upper, plot.lower, *plot.values, *plot.measured, *(value for value, _ in plot.lines)]
    low, high = min(every), max(every)
    room = 0.06 * (high - low) or 1.0
    return low - room, high + room


def _line(x: Scale, y: Scale, times: Sequence[float], values: Sequence[float]) -> str:
    return "M" + "L".join(f"{_n(x(t))} {_n(y(v))}" for t, v in zip(times, values, strict=True))


def _value_ticks(y: Scale, paths: list[Path]) -> list[Label]:
    at = ticks(y.low, y.high)
    places = max(0, -floor(log10(at[1] - at[0]) + 1e-9)) if len(at) > 1 else 0
    places = max(places, 1) if len(at) > 1 and (at[1] - at[0]) * 10**places % 1 > 1e-6 else places  # noqa: PLR2004  a step of 2.5
    paths.append(Path("axis", "".join(f"M{_n(LEFT - 4)} {_n(y(value))}h4" for value in at)))
    return [Label("tick-end", _n(LEFT - 7), _n(y(value) + 4), f"{value:.{places}f}".replace("-", MINUS)) for value in at]


def _time_ticks(x: Scale, end: float, size: float, unit: str, paths: list[Path]) -> list[Label]:
    at = ticks(0.0, end)
    paths.append(Path("axis", "".join(f"M{_n(x(value * size))} {_n(BAR_BOTTOM)}v4" for value in at)))
    labels = [Label("tick", _n(x(value * size)), _n(BAR_BOTTOM + 18), f"{value:g}") for value in at]
    return [*labels, Label("soft", _n(RIGHT + 7), _n(BAR_BOTTOM + 18), f"time, {unit}")]


def _apart(labels: list[tuple[float, str, str]]) -> list[tuple[float, str, str]]:
    """Move labels that would overlap apart, as little as needed, in the order they stand."""
    ordered = sorted(labels)
    places = [at for at, _, _ in ordered]
    for _ in range(len(places) * 4):
        for index in range(len(places) - 1):
            overlap = LEAST_APART - (places[index + 1] - places[index])
            if overlap > 0:
                places[index] -= overlap / 2
                places[index + 1] += overlap / 2
    return [(place, text, kind) for place, (_, text, kind) in zip(places, ordered, strict=True)]

"""Bars with their values written: the load of conductors, a waterfall of heat, what a supply carries."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

from specgen.view.axes import Scale, place, tick_text, ticks
from specgen.view.shapes import Box, Drawing, Label, Note, Path

WIDTH = 640
LEFT, RIGHT = 150.0, 560.0
ROW, THICK = 25.0, 15.0
LINE = 15.0  # between words that stand one above the other
NOTHING = 1e-9  # an axis shorter than this shows nothing
LETTER = 6.9  # a letter of the drawings' sans, on the wide side


@dataclass(frozen=True, slots=True)
class Part:
    """A part of a bar with its name, which is written where it fits."""

    size: float
    name: str


@dataclass(frozen=True, slots=True)
class Bar:
    """One bar from ``start`` to ``end`` with its name and its written value.

    ``kind`` is ``bar`` (dark), ``part`` (light) or ``due`` (outline alone). ``parts`` divide it, in their order.
    """

    name: str
    start: float
    end: float
    value: str
    kind: str = "bar"
    parts: tuple[Part, ...] = ()


@dataclass(frozen=True, slots=True)
class Limit:
    """A line across the bars and its words."""

    at: float
    text: str


@dataclass(frozen=True, slots=True)
class BarChart:
    """What is drawn; numbers in the unit of ``axis``. ``stairs`` joins each bar's end to the next one's start.

    ``ticks`` are places of the axis with their words, round numbers where none are given; bars lie between ``left`` and ``right``.
    """

    anchor: str
    title: str
    caption: str
    axis: str
    bars: tuple[Bar, ...]
    limits: tuple[Limit, ...] = ()
    stairs: bool = False
    notes: tuple[Note, ...] = ()
    ticks: tuple[tuple[float, str], ...] = ()
    left: float = LEFT
    right: float = RIGHT


def bar_drawing(chart: BarChart) -> Drawing:
    """Place every bar and word of the drawing."""
    ends = [end for bar in chart.bars for end in (bar.start, bar.end)] + [limit.at for limit in chart.limits]
    ends += [at for at, _ in chart.ticks]
    low, high = min(0.0, *ends), max(0.0, *ends)
    x = Scale(low, high if high - low > NOTHING else low + 1.0, chart.left, chart.right)
    top = 8.0 + LINE * len(chart.limits)
    bottom = top + ROW * len(chart.bars)
    boxes: list[Box] = []
    gaps: list[str] = []
    labels: list[Label] = []
    for index, bar in enumerate(chart.bars):
        at = top + ROW * index + (ROW - THICK) / 2
        boxes.append(_box(bar, x, at))
        labels += [Label("end", place(chart.left - 8), place(at + 12), bar.name), _value(bar, x, at)]
        _divide(bar, x, at, gaps, labels)
    paths = [Path("axis", f"M{place(x(0.0))} {place(top)}V{place(bottom)}"), *_axis(chart, x, bottom, labels)]
    if gaps:
        paths.append(Path("gap", "".join(gaps)))
    if chart.stairs:
        paths.append(Path("stair", _stairs(chart.bars, x, top)))
    for index, limit in enumerate(chart.limits):
        at = 12.0 + LINE * index
        paths.append(Path("switch", f"M{place(x(limit.at))} {place(at + 4)}V{place(bottom)}"))
        labels.append(_beside(x(limit.at), at, limit.text))
    height = bottom + 24
    return Drawing(
        anchor=chart.anchor,
        title=chart.title,
        caption=chart.caption,
        width=str(WIDTH),
        height=place(height),
        boxes=tuple(boxes),
        paths=tuple(paths),
        labels=tuple(labels),
        notes=chart.notes,
    )


def _box(bar: Bar, x: Scale, at: float) -> Box:
    left, right = sorted((x(bar.start), x(bar.end)))
    return Box(bar.kind, place(left), place(at), place(max(right - left, 0.8)), place(THICK))


def _value(bar: Bar, x: Scale, at: float) -> Label:
    """Write the value behind the bar, before it where there is no room behind."""
    behind = max(x(bar.start), x(bar.end)) + 6
    if behind + LETTER * len(bar.value) <= WIDTH:
        return Label("said", place(behind), place(at + 12), bar.value)
    return Label("end", place(min(x(bar.start), x(bar.end)) - 6), place(at + 12), bar.value)


def _divide(bar: Bar, x: Scale, at: float, gaps: list[str], labels: list[Label]) -> None:
    reached = bar.start
    for part in bar.parts:
        left, right = x(reached), x(reached + part.size)
        reached += part.size
        if right - left >= LETTER * len(part.name) + 6:
            labels.append(Label("inside", place((left + right) / 2), place(at + 11.5), part.name))
        if right < x(bar.end) - 1:
            gaps.append(f"M{place(right)} {place(at)}v{place(THICK)}")


def _stairs(bars: Sequence[Bar], x: Scale, top: float) -> str:
    steps = []
    for index, (bar, _) in enumerate(pairwise(bars)):
        at = top + ROW * index + (ROW + THICK) / 2
        steps.append(f"M{place(x(bar.end))} {place(at)}v{place(ROW - THICK)}")
    return "".join(steps)


def _axis(chart: BarChart, x: Scale, bottom: float, labels: list[Label]) -> list[Path]:
    at = chart.ticks or tuple((value, tick_text(value)) for value in ticks(x.low, x.high))
    labels += [Label("tick", place(x(value)), place(bottom + 17), text) for value, text in at]
    labels.append(Label("soft", place(chart.right + 18), place(bottom + 17), chart.axis))
    marks = "".join(f"M{place(x(value))} {place(bottom)}v4" for value, _ in at)
    return [Path("axis", f"M{place(chart.left)} {place(bottom)}H{place(chart.right)}{marks}")]


def _beside(at: float, y: float, text: str) -> Label:
    """Write a limit's words before its line, where no line of a larger limit crosses them; behind it where there is no room."""
    if at - LETTER * len(text) >= 0:
        return Label("end", place(at), place(y), text)
    return Label("plain", place(at), place(y), text)

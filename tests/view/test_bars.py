"""Bars: in their place, divided as told, nothing beyond the drawing, small."""

from itertools import pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.view.bars import LETTER, RIGHT, ROW, WIDTH, Bar, BarChart, Limit, Part, bar_drawing

CHART = BarChart(
    anchor="bars",
    title="Three bars.",
    caption="As they are.",
    axis="current, A",
    bars=(
        Bar("L1", 0.0, 100.0, "100 A", parts=(Part(60.0, "TIC-1"), Part(38.0, "TIC-2"), Part(2.0, "others"))),
        Bar("L2", 100.0, 50.0, "−50 A", "part"),
        Bar("N", 50.0, 50.0, "0 A", "due"),
    ),
    limits=(Limit(200.0, "incomer 200 A"),),
    stairs=True,
    left=40.0,
)


def test_a_bar_is_as_long_as_its_number():
    """200 A span the axis from 40 to 560: 100 A are 260 long, 50 A from 100 A back end at 170."""
    boxes = bar_drawing(CHART).boxes
    assert [(box.kind, box.x, box.width) for box in boxes] == [("bar", "40", "260"), ("part", "170", "130"), ("due", "170", "0.8")]
    assert [float(b.y) - float(a.y) for a, b in pairwise(boxes)] == [ROW, ROW]


def test_parts_divide_a_bar_and_are_named_where_there_is_room():
    drawing = bar_drawing(CHART)
    named = [(label.text, label.x) for label in drawing.labels if label.kind == "inside"]
    assert named == [("TIC-1", "118"), ("TIC-2", "245.4")]
    gap = next(path.d for path in drawing.paths if path.kind == "gap")
    assert [piece.partition(" ")[0] for piece in gap.split("M")[1:]] == ["196", "294.8"]


def test_stairs_lead_from_each_end_to_the_next_start():
    stairs = next(path.d for path in bar_drawing(CHART).paths if path.kind == "stair")
    assert [piece.partition(" ")[0] for piece in stairs.split("M")[1:]] == ["300", "170"]


def test_every_value_is_written_and_every_limit_named():
    texts = [label.text for label in bar_drawing(CHART).labels]
    assert {"100 A", "−50 A", "0 A", "L1", "L2", "N", "incomer 200 A", "current, A"} <= set(texts)


@given(
    ends=st.lists(st.floats(-1e5, 1e5, allow_nan=False), min_size=1, max_size=12),
    limit=st.floats(0, 1e5),
)
def test_nothing_stands_outside_the_drawing(ends, limit):
    bars = tuple(Bar(f"bar {index}", 0.0, end, f"{end:.0f} W") for index, end in enumerate(ends))
    drawing = bar_drawing(BarChart("a", "t", "c", "heat, W", bars, (Limit(limit, "a limit of some length"),)))
    for box in drawing.boxes:
        assert float(box.x) >= 0
        assert float(box.x) + float(box.width) <= RIGHT + 1
        assert float(box.y) + float(box.height) <= float(drawing.height)
    for label in drawing.labels:
        wide = LETTER * len(label.text)
        left = float(label.x) - {"end": wide, "tick": wide / 2}.get(label.kind, 0.0)
        assert left > -LETTER * 3
        if label.kind != "soft":
            assert left + wide <= WIDTH + LETTER, label


def test_bars_of_nothing_can_be_drawn():
    drawing = bar_drawing(BarChart("a", "t", "c", "current, A", (Bar("N", 0.0, 0.0, "0 A"),)))
    assert float(drawing.boxes[0].width) == pytest.approx(0.8)

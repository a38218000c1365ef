"""The drawing: everything in its place, nothing over anything else, small."""

import re
from dataclasses import replace
from itertools import pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.view.axes import ticks
from specgen.view.cycle_drawing import BOTTOM, LEFT, RIGHT, TOP, CyclePlot, cycle_drawing
from specgen.view.shapes import Drawing

PLOT = CyclePlot(
    times=(0.0, 50.0, 100.0),
    values=(64.0, 66.5, 64.0),
    measured=(),
    upper=67.0,
    lower=63.0,
    lines=((66.0, "off at 66.0 °C"), (64.0, "on at 64.0 °C")),
    pulses=((0.0, 20.0), (50.0, 70.0)),
    worst=(50.0, 66.5, "highest 66.5 °C"),
    title="title",
    caption="caption",
    value_axis="temperature, °C",
)


def test_the_scale_runs_upwards_and_keeps_its_proportions():
    """63 to 67 with 6 % room each side: 62.76 at the bottom (186), 67.24 at the top (22); 66.5 is at 186 - 3.74/4.48 x 164."""
    drawing = cycle_drawing(PLOT)
    point = drawing.points[0]
    assert float(point.y) == pytest.approx(BOTTOM - (66.5 - 62.76) / 4.48 * (BOTTOM - TOP), abs=0.06)
    assert float(point.x) == pytest.approx((LEFT + RIGHT) / 2, abs=0.06)


def test_the_output_bar_has_the_length_of_the_pulse():
    bars = [box for box in cycle_drawing(PLOT).boxes if box.kind == "on"]
    assert [float(bar.width) for bar in bars] == pytest.approx([0.2 * (RIGHT - LEFT)] * 2, abs=0.06)
    assert float(bars[1].x) == pytest.approx((LEFT + RIGHT) / 2, abs=0.06)


def test_axes_are_named_with_their_units():
    texts = [label.text for label in cycle_drawing(PLOT).labels]
    assert "temperature, °C" in texts
    assert "time, s" in texts
    assert "output" in texts


@pytest.mark.parametrize(("end", "unit"), [(100.0, "s"), (3600.0, "min"), (40000.0, "h"), (400000.0, "days")])
def test_the_time_axis_takes_a_readable_unit(end, unit):
    drawing = cycle_drawing(replace(PLOT, times=(0.0, end / 2, end), worst=(end / 2, 66.5, "highest"), pulses=()))
    assert f"time, {unit}" in [label.text for label in drawing.labels]


@given(points=st.tuples(st.floats(63.01, 66.99), st.floats(63.01, 66.99)))
def test_labels_on_the_right_never_overlap(points):
    drawing = cycle_drawing(replace(PLOT, lines=tuple((at, f"at {at}") for at in points)))
    right = sorted(float(label.y) for label in drawing.labels if float(label.x) > RIGHT and "time" not in label.text)
    assert all(b - a > 13 for a, b in pairwise(right))  # 12.5 px type


@given(low=st.floats(-1e5, 1e5), span=st.floats(1e-3, 1e5))
def test_ticks_are_round_inside_and_few(low, span):
    found = ticks(low, low + span)
    assert 2 <= len(found) <= 7
    assert all(low - 1e-6 * span <= at <= low + span * (1 + 1e-6) for at in found)


def test_every_coordinate_is_a_plain_number():
    drawing = cycle_drawing(PLOT)
    for path in drawing.paths:
        assert re.fullmatch(r"(?:[MLHVhv]?-?[0-9.]+ ?)+", path.d), path.d


def test_drawings_of_the_project_are_small(pages):
    blocks = [block for page in pages.values() for section in page.sections for block in section.blocks]
    drawings = [block for block in blocks if isinstance(block, Drawing)]
    assert drawings
    assert all(sum(len(path.d) for path in drawing.paths) < 8_000 for drawing in drawings)

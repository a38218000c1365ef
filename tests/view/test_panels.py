"""Panels of a drawing: curves cut and thinned without moving, labels that keep clear of each other."""

from itertools import combinations, pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from specgen.view.panels import LINE, NEAR, RIGHT, Panels, apart, inside, overlap, rectangle, thinned, tick_texts, time_unit
from specgen.view.shapes import Label

HEIGHTS = st.lists(st.floats(0, 200), min_size=3, max_size=120)


def height_at(line, x):
    for a, b in pairwise(line):
        if a[0] <= x <= b[0]:
            return a[1] if b[0] == a[0] else a[1] + (x - a[0]) / (b[0] - a[0]) * (b[1] - a[1])
    raise AssertionError(x)


@given(heights=HEIGHTS)
def test_a_thinned_curve_stays_where_it_was(heights):
    spots = [(float(x), y) for x, y in enumerate(heights)]
    line = thinned(spots)
    assert line[0] == spots[0]
    assert line[-1] == spots[-1]
    assert all(abs(height_at(line, x) - y) <= 2 * NEAR + 1e-9 for x, y in spots)


@given(heights=HEIGHTS, low=st.floats(10, 90), high=st.floats(110, 190))
def test_a_cut_curve_lies_in_its_window_and_on_the_curve(heights, low, high):
    spots = [(float(x), y) for x, y in enumerate(heights)]
    for piece in inside(spots, (0.5, low), (len(heights) - 1.5, high)):
        for x, y in piece:
            assert 0.5 - 1e-9 <= x <= len(heights) - 1.5 + 1e-9
            assert low - 1e-6 <= y <= high + 1e-6
            assert y == pytest.approx(height_at(spots, x), abs=1e-5)


def test_a_straight_line_needs_two_points_and_a_step_four():
    assert thinned([(float(x), 2.0 * x) for x in range(50)]) == [(0.0, 0.0), (49.0, 98.0)]
    assert thinned([(0, 0), (10, 0), (10, 50), (20, 50)]) == [(0, 0), (10, 0), (10, 50), (20, 50)]


@given(at=st.lists(st.floats(30, 150), min_size=1, max_size=4))
def test_labels_beside_their_lines_keep_apart(at):
    found = apart([(y, f"label {index}", "soft") for index, y in enumerate(at)], 20, 180)
    assert all(b[0] - a[0] >= LINE - 0.1 for a, b in pairwise(found))


@given(spots=st.lists(st.tuples(st.floats(60, 480), st.floats(40, 160)), min_size=1, max_size=3))
def test_marks_are_written_clear_of_each_other(spots):
    panels = Panels()
    for index, (x, y) in enumerate(spots):
        panels.mark(x, y, f"mark {index}")
    assert not any(overlap(rectangle(a), rectangle(b)) for a, b in combinations(panels.labels, 2))
    assert all(rectangle(label)[2] <= RIGHT for label in panels.labels)


def test_a_rectangle_follows_the_anchor():
    assert rectangle(Label("end", "100", "50", "ab"))[2] == 100
    assert rectangle(Label("plain", "100", "50", "ab"))[0] == 100
    left, _, right, _ = rectangle(Label("tick", "100", "50", "ab"))
    assert left + right == 200


def test_the_numbers_of_an_axis_share_their_decimals():
    assert tick_texts((0.0, 0.25, 0.5)) == ["0.00", "0.25", "0.50"]
    assert tick_texts((0.0, 2.5, 5.0)) == ["0.0", "2.5", "5.0"]
    assert tick_texts((-20.0, 0.0, 20.0)) == ["\u221220", "0", "20"]
    assert [time_unit(end).word for end in (10, 1500, 20000, 200000)] == ["s", "min", "h", "days"]

"""The plots of a sheet read back: marked points at their figures, axes with units, nothing over anything else, small, said in words."""

import importlib.util
import json
import re
from itertools import combinations, pairwise
from pathlib import Path

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.design.start_ups import start_ups
from specgen.design.stuck_on import stuck_on
from specgen.design.trade_off import trade_off
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.render.environment import environment
from specgen.sizing.candidate import Unsized
from specgen.source.read import read_text
from specgen.view.panels import overlap, rectangle
from specgen.view.shapes import Drawing, Sentence, Table
from specgen.view.sheet_plots import expected_plots, stuck_plot
from specgen.view.summary import summary_of
from specgen.view.writer import writer_for

_spec = importlib.util.spec_from_file_location("make_loops", Path(__file__).parents[1] / "benchmarks" / "make_loops.py")
make_loops = importlib.util.module_from_spec(_spec)
_spec.loader.exec_module(make_loops)

PANEL = read_model(Panel, read_text(make_loops.PANEL, "loops/panel.yml")[0][0].data)[0]
MOST = 15_000  # bytes of a drawing


@pytest.fixture(scope="module")
def sheets():
    """Return two loops of each kind with the blocks of their plots."""
    made = []
    for number in range(2 * len(make_loops.MAKERS)):
        read = read_loops(read_text(make_loops.loop_text(number, 3), "loops/a.yml")[0]).loops[0]
        loop, _ = decide(read, PANEL, load_catalogue(None))
        writer = writer_for(loop)
        made.append((loop, writer, (*expected_plots(writer, loop), *stuck_plot(writer, loop))))
    return made


def drawings(sheets, anchor=None):
    return [
        (loop, writer, block) for loop, writer, blocks in sheets for block in blocks
        if isinstance(block, Drawing) and anchor in (None, block.anchor)
    ]  # fmt: skip


def scale_of(drawing, side):
    """Read a panel's upright scale back from its numbers: the first panel for ``0``."""
    panels, last = [], None
    for label in drawing.labels:
        if label.kind == "tick-end":
            at = float(label.y) - 4
            if last is None or abs(float(label.y) - last) > 90 or (panels and at > panels[-1][-1][1] + 0.1):
                panels.append([])
            panels[-1].append((float(label.text.replace("\u2212", "-")), at))
            last = float(label.y)
    return panels[side]


def value_at(ticks, y):
    (v0, y0), (v1, y1) = ticks[0], ticks[-1]
    return v0 + (y - y0) / (y1 - y0) * (v1 - v0)


def unit_of_a_place(ticks):
    (v0, y0), (v1, y1) = ticks[0], ticks[-1]
    return abs((v1 - v0) / (y1 - y0))


def test_every_kind_is_drawn_or_says_why(sheets):
    for loop, _, blocks in sheets:
        said = " ".join("".join(span.text for span in block.spans) for block in blocks if isinstance(block, Sentence))
        drawn = {block.anchor for block in blocks if isinstance(block, Drawing)}
        for anchor, words in (("start-up", "No start-up"), ("trade-off", "No trade-off"), ("stuck-on", "No course")):
            assert (anchor in drawn) != (words in said), (loop.tag, anchor)
    assert {drawing.anchor for _, _, drawing in drawings(sheets)} == {"start-up", "trade-off", "stuck-on"}


def test_drawings_are_small(sheets):
    template = environment().get_template("shapes/drawing.html").module.draw
    for loop, _, drawing in drawings(sheets):
        assert len(str(template(drawing)).encode()) < MOST, (loop.tag, drawing.anchor)


def test_no_label_stands_on_another_or_off_the_drawing(sheets):
    for loop, _, drawing in drawings(sheets):
        for a, b in combinations(drawing.labels, 2):
            assert not overlap(rectangle(a), rectangle(b)), (loop.tag, drawing.anchor, a, b)
        for label in drawing.labels:
            left, top, right, bottom = rectangle(label)
            assert left >= 0, (loop.tag, label)
            assert top >= 0, (loop.tag, label)
            assert right <= float(drawing.width) + 8, (loop.tag, label)
            assert bottom <= float(drawing.height), (loop.tag, label)


def test_curves_run_to_the_right_and_stay_in_the_drawing(sheets):
    for loop, _, drawing in drawings(sheets):
        for path in drawing.paths:
            numbers = [float(number) for number in re.findall(r"-?[0-9.]+", path.d)]
            assert "nan" not in path.d
            assert "inf" not in path.d
            if path.kind in ("value", "thin", "rest"):
                xs = numbers[::2]
                assert all(a <= b for a, b in pairwise(xs)), (loop.tag, drawing.anchor)
                assert all(0 <= y <= float(drawing.height) for y in numbers[1::2])


def test_axes_are_named_with_their_units(sheets):
    for _, writer, drawing in drawings(sheets):
        texts = [label.text for label in drawing.labels]
        if drawing.anchor == "trade-off":
            assert any(text in (f"differential, {writer.change_unit}", "cycle time, s") for text in texts)
            assert any(text.endswith(f"included, {writer.change_unit}") for text in texts)
        else:
            assert any(re.fullmatch("time, (s|min|h|days)", text) for text in texts)
            unit = writer.change_unit if drawing.anchor == "start-up" else writer.value_unit
            assert any(text.endswith(f", {unit}") for text in texts)


def test_the_choice_is_marked_at_its_figures(sheets):
    for loop, writer, drawing in drawings(sheets, "trade-off"):
        ticks = scale_of(drawing, 0)
        wanted = writer.shown_change(summary_of(loop).excursion)
        assert value_at(ticks, float(drawing.points[0].y)) == pytest.approx(wanted, abs=unit_of_a_place(ticks) * 0.15), loop.tag


def test_the_entry_into_the_band_is_marked_on_its_edge(sheets):
    seen = 0
    for loop, writer, drawing in drawings(sheets, "start-up"):
        starts = start_ups(loop.decision.chosen.case)
        late = starts.slow or starts.lively
        if late.in_band is None or not late.every_body:
            continue
        seen += 1
        ticks = scale_of(drawing, 0)
        edge = -writer.shown_change(starts.band.below) * loop.box.sign
        assert value_at(ticks, float(drawing.points[0].y)) == pytest.approx(edge, abs=unit_of_a_place(ticks) * 0.15), loop.tag
    assert seen > 3


def test_the_limiter_acts_and_the_danger_is_passed_where_the_sheet_says(sheets):
    for loop, writer, drawing in drawings(sheets, "stuck-on"):
        stuck, ticks = stuck_on(loop), scale_of(drawing, 0)
        wanted = [stuck.start]
        if stuck.stopped is not None:
            wanted += [stuck.stopped.acts_at, stuck.stopped.peaks_at]
        if stuck.danger_time is not None:
            wanted.append(stuck.danger)
        marked = [value_at(ticks, float(point.y)) for point in drawing.points]
        for value in wanted:
            near = min(abs(one - writer.shown_value(value)) for one in marked)
            assert near <= unit_of_a_place(ticks) * 0.15, (loop.tag, value)


def test_the_data_of_the_slider_are_the_points_of_the_table(sheets):
    for loop, _, drawing in drawings(sheets, "trade-off"):
        data = json.loads(drawing.data)
        blocks = next(blocks for other, _, blocks in sheets if other is loop)
        table = next(block for block in blocks if isinstance(block, Table))
        trade = trade_off(loop.decision.chosen.case)
        assert len(data["points"]) == len(table.rows) == len(trade.points)
        assert [row.chosen for row in table.rows].index(True) == data["chosen"]
        for point, row, computed in zip(data["points"], table.rows, trade.points, strict=True):
            assert point["at"] == pytest.approx(computed.at, rel=1e-8)
            assert point["said"][data["setting"]] == row.cells[0].text
            assert point["said"]["excursion"] == row.cells[1].text
            over = computed.above > trade.allowed_above and computed.below > trade.allowed_below
            assert point["said"]["margin"].startswith("\u2212") or not over
        xs = [point["x"] for point in data["points"]]
        assert all(a < b for a, b in pairwise(xs))
        chosen = data["points"][data["chosen"]]
        assert chosen["x"] == pytest.approx(float(drawing.points[0].x), abs=0.11)
        assert chosen["y"][0] == pytest.approx(float(drawing.points[0].y), abs=0.11)


def test_titles_say_the_figures_to_those_who_do_not_see(sheets):
    for loop, writer, drawing in drawings(sheets):
        if drawing.anchor == "start-up":
            starts = start_ups(loop.decision.chosen.case)
            late = starts.slow or starts.lively
            assert late.in_band is None or writer.time(late.in_band) in drawing.title
        elif drawing.anchor == "trade-off":
            assert "chosen" in drawing.title
        else:
            assert writer.value(stuck_on(loop).start) in drawing.title


def test_a_page_carries_the_data_escaped(sheets):
    template = environment().get_template("shapes/drawing.html").module.draw
    drawing = next(drawing for _, _, drawing in drawings(sheets, "trade-off"))
    found = re.search(r' data-plot="([^"]*)"', str(template(drawing)))
    assert "<" not in found[1]
    assert json.loads(found[1].replace("&#34;", '"'))["points"]
    assert not isinstance(trade_off(drawings(sheets, "trade-off")[0][0].decision.chosen.case), Unsized)

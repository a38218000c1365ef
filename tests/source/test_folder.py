"""A folder of loop files, with everything that may lie in one."""

import os
import sys

import pytest

from specgen.core.diagnostic import Span
from specgen.source import excerpt, read_folder


def write(folder, **files):
    folder.mkdir(exist_ok=True)
    for name, text in files.items():
        (folder / name.replace("_yml", ".yml")).write_bytes(text if isinstance(text, bytes) else text.encode())
    return folder


def found(sources):
    return [(problem.code, problem.span.file, problem.span.line) for problem in sources.problems]


def test_a_folder(tmp_path):
    folder = write(
        tmp_path / "loops", panel_yml="panel: {reference: P}", devices_yml="ssrs: [{name: s}]", b_yml="tag: B\n---\ntag: C", a_yml="tag: A"
    )
    write(folder / "data", tic_yml="x")
    write(folder / "reviews", review_yml=":::")
    write(folder / "issued")
    (folder / "notes.md").write_text("# notes")
    (folder / ".hidden.yml").write_text("{")
    sources = read_folder(folder, "loops")
    assert found(sources) == []
    assert sources.panel.data == {"panel": {"reference": "P"}}
    assert sources.devices.data == {"ssrs": [{"name": "s"}]}
    assert [(loop.file, loop.index, loop.data["tag"]) for loop in sources.loops] == [
        ("loops/a.yml", 0, "A"),
        ("loops/b.yml", 0, "B"),
        ("loops/b.yml", 1, "C"),
    ]
    assert [label for label, _ in sources.files] == ["loops/a.yml", "loops/b.yml", "loops/devices.yml", "loops/panel.yml"]
    assert dict(sources.files)["loops/a.yml"] == b"tag: A"


def test_the_problems_of_all_files_come_in_one_run(tmp_path):
    folder = write(
        tmp_path / "loops", panel_yml="a: 1\na: 2", a_yml="tag: A", b_yml=b"\xff", c_yml="", d_yml="tag: {", e_yml="t:\n---\nt: 1"
    )
    sources = read_folder(folder, "loops")
    assert found(sources) == [
        ("Y103", "loops/b.yml", 1),
        ("Y105", "loops/c.yml", 1),
        ("Y106", "loops/d.yml", 1),
        ("Y114", "loops/e.yml", 1),
        ("Y108", "loops/panel.yml", 2),
    ]
    assert [loop.data for loop in sources.loops] == [{"tag": "A"}, {}, {"t": "1"}]


def test_without_a_label_files_stand_at_the_top(tmp_path):
    sources = read_folder(write(tmp_path, panel_yml="a: 1", x_yml="tag: A"), "")
    assert [label for label, _ in sources.files] == ["panel.yml", "x.yml"]


def test_no_folder_and_no_panel(tmp_path):
    assert found(read_folder(tmp_path / "none", "loops")) == [("Y101", "loops", 1)]
    assert found(read_folder(write(tmp_path / "some", a_yml="tag: A"), "loops")) == [("Y118", "loops/panel.yml", 1)]
    (tmp_path / "file").write_text("")
    assert found(read_folder(tmp_path / "file", "loops")) == [("Y101", "loops", 1)]


def test_a_broken_panel_is_not_also_missing(tmp_path):
    assert found(read_folder(write(tmp_path, panel_yml="{"), "loops")) == [("Y106", "loops/panel.yml", 1)]


def test_one_panel(tmp_path):
    sources = read_folder(write(tmp_path, panel_yml="a: 1\n---\nb: 1", devices_yml="c: 1\n---\nd: 1"), "loops")
    assert found(sources) == [("Y119", "loops/devices.yml", 3), ("Y119", "loops/panel.yml", 3)]
    assert sources.panel.data == {"a": "1"}


def test_files_that_would_be_passed_over(tmp_path):
    folder = write(tmp_path / "loops", panel_yml="a: 1", Devices_yml="b: 1")
    (folder / "dryer.yaml").write_text("tag: A")
    (folder / "OVEN.YML").write_text("tag: B")
    write(folder / "area 2", more_yml="tag: C")
    write(folder / "empty")
    sources = read_folder(folder, "loops")
    assert found(sources) == [(("Y120"), f"loops/{name}", 1) for name in ("Devices.yml", "OVEN.YML", "area 2", "dryer.yaml")]
    assert sources.loops == ()


def test_a_folder_named_like_a_file(tmp_path):
    folder = write(tmp_path / "loops", panel_yml="a: 1")
    (folder / "x.yml").mkdir()
    assert found(read_folder(folder, "loops")) == [("Y101", "loops/x.yml", 1)]


@pytest.mark.skipif(sys.platform == "win32", reason="needs links and pipes")
def test_links_in_circles_and_pipes(tmp_path):
    folder = write(tmp_path / "loops", panel_yml="a: 1")
    (folder / "a.yml").symlink_to(folder / "b.yml")
    (folder / "b.yml").symlink_to(folder / "a.yml")
    (folder / "c.yml").symlink_to(folder / "nowhere.yml")
    os.mkfifo(folder / "d.yml")
    (folder / "circle").symlink_to(folder)
    sources = read_folder(folder, "loops")
    assert found(sources) == [
        *[("Y101", f"loops/{name}.yml", 1) for name in "abc"],
        ("Y120", "loops/circle", 1),
        ("Y101", "loops/d.yml", 1),
    ]


@pytest.mark.skipif(sys.platform != "linux", reason="other systems refuse such names")
def test_a_name_that_cannot_be_printed(tmp_path):
    folder = write(tmp_path / "loops", panel_yml="a: 1")
    (folder / "x\ny\udcff.yml").write_text("tag: A")
    assert [loop.file for loop in read_folder(folder, "loops").loops] == ["loops/x?y?.yml"]


class TestExcerpt:
    def place(self, column, length=1, line=1):
        return Span("a.yml", line, column, length)

    def test_as_in_a_report(self):
        text = "need:\r\n  tolerance: 1,5 K\r\n"
        assert excerpt(self.place(14, 5, 2), text, "write 1.5 K") == "  tolerance: 1,5 K\n             ^^^^^ write 1.5 K"

    def test_without_hint(self):
        assert excerpt(self.place(1, 3), "tag: A") == "tag: A\n^^^"

    def test_wide_letters_count_double(self):
        assert excerpt(self.place(4), "\u65e5: x") == "\u65e5: x\n    ^"

    def test_tabs_and_control_characters_are_one_column(self):
        assert excerpt(self.place(3), "\t\x01x") == " ?x\n  ^"

    def test_a_long_line_is_cut_around_the_place(self):
        top, carets = excerpt(self.place(5001, 3), "a" * 5000 + "BCD" + "e" * 5000).split("\n")
        assert top.startswith("...a")
        assert top.endswith("e...")
        assert len(top) == 106
        assert top[carets.index("^") : carets.index("^") + 3] == "BCD"
        assert carets.count("^") == 3

    def test_a_place_outside_the_text(self):
        assert excerpt(self.place(1, line=3), "a\nb") == ""
        assert excerpt(self.place(9, 9), "ab") == "ab\n  ^"

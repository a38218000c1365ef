"""The search index: every loop, rule, section and designation is in it, in files that a page can load one by one."""

import json

from specgen.render import search_index
from specgen.render.search_index import CALL, search_files, sections_of
from specgen.view.dossier import dossier_of
from specgen.view.pages import page_views


def parts_of(files):
    """Read the index as a page does: each file is one call with one value."""
    found = {}
    for number in range(len(files)):
        text = files[f"assets/search-{number}.js"].decode()
        assert text.startswith(f"{CALL}(")
        part = json.loads(text.removeprefix(f"{CALL}(").removesuffix(");\n"))
        if number == 0:
            assert part["files"] == len(files)
        for name, rows in part["rows"].items():
            found.setdefault(name, []).extend(rows)
    return found


def index_of(design):
    dossier = dossier_of(design)
    views = [view for view in page_views(dossier) if view.tag]
    return search_files(dossier, [sections_of(view) for view in views]), views


def test_every_loop_rule_and_designation_is_found(design):
    files, _ = index_of(design)
    found = parts_of(files)
    assert [row[0] for row in found["loops"]] == [loop.tag for loop in design.loops]
    assert [row[1] for row in found["loops"]] == [loop.loop.service for loop in design.loops]
    assert "M1" in [row[0] for row in found["rules"]]
    assert [row[0] for row in found["parts"]] == [part.designation for part in design.panel_design.parts]


def test_a_sheets_sections_are_its_own(design):
    files, views = index_of(design)
    found = parts_of(files)
    for row, view in zip(found["loops"], views, strict=True):
        assert [anchor for anchor, _ in found["sets"][row[5]]] == [section.anchor for section in view.sections]


def test_many_parts_go_into_several_files(design, monkeypatch):
    monkeypatch.setattr(search_index, "PER_FILE", 3)
    files, _ = index_of(design)
    count = len(design.panel_design.parts)
    assert len(files) == 1 + -(-count // 3)
    assert len(parts_of(files)["parts"]) == count


def test_pages_carry_every_file_of_it(site):
    assert (site / "assets" / "search-0.js").is_file()
    assert (site / "assets" / "search-1.js").is_file()

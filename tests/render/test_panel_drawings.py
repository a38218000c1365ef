"""Drawings of the panel's pages: small, named for who does not see them, in classes that the style sheet knows."""

import re

import pytest

ENOUGH = 15_000  # bytes
PAGES = ("load.html", "heat.html")
DRAWN = re.compile(r'<svg class="plot".*?</svg>', re.DOTALL)


@pytest.fixture(scope="module")
def drawings(files):
    return {path: DRAWN.findall(files[path].decode()) for path in PAGES}


def test_each_page_has_its_drawings(drawings):
    assert {path: len(found) for path, found in drawings.items()} == {"load.html": 1, "heat.html": 2}


def test_a_drawing_is_small_and_has_a_title(drawings):
    for found in drawings.values():
        for drawing in found:
            assert len(drawing.encode()) < ENOUGH
            assert re.search(r"<title id=[^>]*>[^<]+\.</title>", drawing)


def test_every_class_of_a_drawing_is_in_the_style_sheet(drawings, files):
    css = files["assets/dossier.css"].decode()
    plain = {"plot", "plain", "end", "tick", "axis"}
    for found in drawings.values():
        for drawing in found:
            for name in set(re.findall(r'class="([^"]+)"', drawing)) - plain:
                assert f".plot .{name} " in css, name


def test_the_pages_of_the_panel_have_their_csv_files(files):
    for name, head in {
        "load": "loop,service,conductors,L1 [A],L2 [A],L3 [A],N [A],kind of current,placed",
        "control-supply": "loop,what,continuous [A],at switch-on [A]",
        "parts": "designation,what,rating [A],quantity,loops",
    }.items():
        assert files[f"data/{name}.csv"].decode().startswith(head + "\r\n")
    for name in ("heat", "protection", "conductors", "firmness"):
        lines = files[f"data/{name}.csv"].decode().split("\r\n")
        assert lines[0].startswith(("loop,", "designation,"))
    assert 'href="data/parts.csv"' in files["index.html"].decode()

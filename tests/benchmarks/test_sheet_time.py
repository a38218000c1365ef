"""What a loop's sheet costs to build, draw and write, against MkDocs making a page of the same length from Markdown."""

import time
from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.render.environment import page
from specgen.view.dossier import dossier_of
from specgen.view.frame import Place
from specgen.view.sheet import sheet_page

pytestmark = pytest.mark.benchmark
DEMO = Path(__file__).parents[2]
ROUNDS = 12
MARKDOWN = "| a | b | c |\n|---|---|---|\n" + "| figure | 1.5 K | a worst case of the declared ranges |\n" * 40


def test_a_sheet(tmp_path):
    """Processor time, so that others on the machine do not count; the demo's sheets, a dozen times each."""
    import markdown  # noqa: PLC0415  what MkDocs converts with

    dossier = dossier_of(load_design(DEMO))
    loops = dossier.design.loops * ROUNDS
    page(sheet_page(dossier, Place("loops/X.html"), loops[0], None, None))
    spent = [0.0, 0.0, 0.0]
    size = 0
    for loop in loops:
        start = time.process_time()
        view = sheet_page(dossier, Place(f"loops/{loop.tag}.html"), loop, None, None)
        viewed = time.process_time()
        content = page(view)
        drawn = time.process_time()
        (tmp_path / "sheet.html").write_bytes(content)
        written = time.process_time()
        size += len(content)
        for index, (a, b) in enumerate(((start, viewed), (viewed, drawn), (drawn, written))):
            spent[index] += b - a
    length = size / len(loops)
    text = MARKDOWN * max(1, round(length / 4000))
    start = time.process_time()
    made = sum(len(markdown.Markdown(extensions=["toc", "tables", "fenced_code"]).convert(text)) for _ in range(10)) / 10
    plain = (time.process_time() - start) / 10 * length / made
    each = [1000 * part / len(loops) for part in spent]
    print(f"\na sheet of {length / 1000:.0f} kB: view {each[0]:.2f} ms, draw {each[1]:.2f} ms, write {each[2]:.2f} ms")
    print(f"Markdown alone for as long a page: {1000 * plain:.1f} ms; ratio {sum(each) / (1000 * plain):.2f}")
    assert sum(each) / 1000 < plain

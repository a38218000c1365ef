"""Every bad input is answered with its place, its code and a hint, and takes nothing down with it."""

from pathlib import Path

import pytest

from specgen.core.quantity import QUANTITY_CODES
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import place, read_model
from specgen.source import excerpt, read_folder
from specgen.source.codes import SOURCE_CODES

HERE = Path(__file__).parent
# nothing can be suggested for a number that no computer holds
WITHOUT_HINT = {"exponent-beyond-computing.yml"}
LEAST_FILES = 44
# read in spite of its problem: the first keeps its tag, and a directive is only passed over
READ = {"tag-twice.yml", "directive.yml"}


def read(folder):
    """Read a folder as the program does; return its loops, its panel and every problem."""
    sources = read_folder(folder, "loops")
    reading = read_loops(sources.loops)
    panel, wrong = (None, []) if sources.panel is None else read_model(Panel, sources.panel.data)
    problems = [*sources.problems, *reading.problems, *(place(sources.panel, problem) for problem in wrong)]
    return reading.loops, panel, sorted(set(problems))


def test_every_problem_has_its_place_and_code(bad, folder):
    _, _, problems = read(folder(bad))
    name = "loops/panel.yml" if bad.is_panel else f"loops/{bad.file}"
    found = [(p.span.file, p.span.line, p.span.column, p.code) for p in problems]
    assert sorted(found) == sorted((name, e.line, e.column, e.code) for e in bad.expected)


def test_the_hint_helps(bad, folder):
    _, _, problems = read(folder(bad))
    expected = {(e.line, e.column, e.code): e.hint_holds for e in bad.expected}
    for problem in problems:
        words = expected[problem.span.line, problem.span.column, problem.code]
        assert words in problem.hint
        assert problem.hint or bad.file in WITHOUT_HINT
        assert problem.line().isprintable()
        assert len(problem.line()) < 300
        assert problem.severity == "error"


def test_the_place_can_be_shown(bad, folder):
    _, _, problems = read(folder(bad))
    if b"\0" in bad.raw[:16]:
        return  # no text that could be shown
    text = bad.raw.decode("utf-8", errors="replace")
    for problem in problems:
        assert "^" in excerpt(problem.span, text, problem.hint)


def test_good_loops_beside_it_are_read(bad, folder):
    loops, panel, _ = read(folder(bad))
    tags = {read.loop.tag for read in loops}
    assert "GOOD-1" in tags
    assert ("GOOD-2" in tags) == (b"tag: GOOD-2" in bad.raw)
    assert (panel is None) == (bad.is_panel and bool(bad.expected))
    if bad.expected and not bad.is_panel:
        assert not tags & {"BAD-2", "BAD-3"}
        assert ("BAD-1" in tags) == (bad.file in READ)


def test_what_is_fine_is_read(bad, folder):
    loops, _, problems = read(folder(bad))
    if not bad.expected:
        assert not problems
        assert "BAD-1" in {read.loop.tag for read in loops}


def test_a_file_over_one_mebibyte(tmp_path):
    (tmp_path / "a.yml").write_bytes(b"# " + b"x" * 1024 * 1024)
    sources = read_folder(tmp_path, "loops")
    found = [p for p in sources.problems if p.span.file == "loops/a.yml"]
    assert [(p.span.line, p.span.column, p.code) for p in found] == [(1, 1, "Y102")]
    assert "several files" in found[0].hint


def test_script_stays_the_text_it_is(folder, bad_inputs):
    bad = next(b for b in bad_inputs if b.file == "fine-script-in-service.yml")
    loops, _, _ = read(folder(bad))
    assert next(r.loop.service for r in loops if r.loop.tag == "BAD-1") == '<script>alert(1)</script> & "bath"'


def test_every_file_is_in_the_table_and_every_code_is_explained(bad_inputs):
    assert {b.file for b in bad_inputs} == {path.name for path in HERE.glob("*.yml")}
    assert len([b for b in bad_inputs if b.expected]) >= LEAST_FILES
    known = set(QUANTITY_CODES) | set(SOURCE_CODES)
    for one in bad_inputs:
        for expected in one.expected:
            assert expected.code in known or expected.code[0] in "FL"


@pytest.mark.parametrize("family", ["Q", "Y", "F", "L"])
def test_every_family_of_codes_is_met(family, bad_inputs):
    assert any(e.code.startswith(family) for b in bad_inputs for e in b.expected)

"""Designs with loops of every kind: the demo, and several hundred made up."""

import runpy
from pathlib import Path

import pytest

from specgen.design.project import design_of, load_design
from specgen.source.folder import Sources
from specgen.source.read import read_text

MANY = runpy.run_path(str(Path(__file__).with_name("many_loops.py")))
ROOT = Path(__file__).parents[3]
COUNTS = {"star": 126, "no logic output, alternating control": 42, "subdivided": 42}


def designed(panel, texts):
    documents, problems = read_text("---\n".join(texts), "loops/many.yml")
    heads, found = read_text(panel, "loops/panel.yml")
    assert not [*problems, *found]
    design = design_of(Sources(panel=heads[0], devices=None, loops=tuple(documents), files=(), problems=()))
    assert not design.problems, [problem.line() for problem in design.problems][:5]
    return design


@pytest.fixture(scope="session")
def make_design():
    return designed


@pytest.fixture(scope="session")
def panels():
    return MANY["PANELS"]


@pytest.fixture(scope="session")
def texts():
    return MANY["loop_texts"]


@pytest.fixture(scope="session")
def designs():
    made = {name: designed(panel, MANY["loop_texts"](name, COUNTS[name]).values()) for name, panel in MANY["PANELS"].items()}
    made["demo"] = load_design(ROOT, remember=False)
    return made


@pytest.fixture(scope="session")
def wired(designs):
    """Return every loop with its wiring and its design."""
    return [(loop, design.wirings[loop.tag], design) for design in designs.values() for loop in design.loops]

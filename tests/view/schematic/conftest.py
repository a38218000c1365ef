"""Schematics of loops of every kind: the demo's, and those of several hundred made up for the wiring's own tests."""

import runpy
from pathlib import Path

import pytest

from specgen.design.project import load_design
from specgen.view.schematic.drawing import schematic
from specgen.view.writer import writer_for

ROOT = Path(__file__).parents[3]
WIRING = ROOT / "tests" / "design" / "wiring"
COUNTS = {"star": 105, "no logic output, alternating control": 63, "subdivided": 42}


@pytest.fixture(scope="session")
def drawn():
    """Return every loop with its wiring and its drawing."""
    many = runpy.run_path(str(WIRING / "many_loops.py"))
    designed = runpy.run_path(str(WIRING / "conftest.py"))["designed"]
    designs = [designed(panel, many["loop_texts"](name, COUNTS[name], 2).values()) for name, panel in many["PANELS"].items()]
    designs.append(load_design(ROOT, remember=False))
    found = [(loop, design.wirings[loop.tag]) for design in designs for loop in design.loops]
    return [(loop, wiring, schematic(wiring, writer_for(loop))) for loop, wiring in found]

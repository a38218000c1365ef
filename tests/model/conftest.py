"""Loops written as text and read as the program reads them."""

import pytest

from specgen.model.loops import read_loops
from specgen.source import read_text

LOOP = """tag: TIC-1
service: Water bath
need:
  quantity: temperature
  direction: raise
  setpoint: 65 degC
  tolerance: 1.5 K
sensor: {kind: pt100}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3}
"""


def read(text, file="loops/drying-hall.yml"):
    """Return what a text reads as, and every problem of the text and of its loops."""
    documents, problems = read_text(text, file)
    reading = read_loops(documents)
    return reading, sorted({*problems, *reading.problems})


@pytest.fixture
def reading():
    """Return the function that reads a text of loops."""
    return read


@pytest.fixture
def one():
    """Return a function that reads one loop, with lines changed or added below its own."""

    def make(more="", **changes):
        text = LOOP
        for old, new in changes.pop("swap", {}).items():
            assert old in text
            text = text.replace(old, new)
        assert not changes
        result, problems = read(text + more)
        assert not problems, problems
        return result.loops[0]

    return make

"""Loops as a designer writes them, read and decided in memory."""

from types import SimpleNamespace

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.design.project import design_of
from specgen.design.record import dump, record_of
from specgen.design.record_loop import loop_record
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source.folder import Sources
from specgen.source.read import read_text

PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
controllers:
  - name: loop controller
    outputs: [{kind: relay, rating: 2 A, count: 8}, {kind: logic, voltage: 12 V, drive: 20 mA, count: 8},
              {kind: analogue, signal: 4-20 mA, burden: 500 ohm, count: 8}]
"""
# a slow tank with a heater: 9 kW on 100 K of change, so that figures can be worked by hand
HEATER = """tag: TIC-1
service: Tank, contents
need: {quantity: temperature, direction: raise, setpoint: 60 degC, tolerance: 2 K, stability: %(stability)s}
plant: {response: {change: 100 K, time_constant: 60 min, dead_time: 60 s, rest_value: 20 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K}
element: {kind: resistive_heater, power: 9 kW, voltage: 400 V, phases: 3, needs: [level]}
limits: {danger_high: 90 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
COMPRESSOR = """tag: TIC-2
service: Cold room
need: {quantity: temperature, direction: lower, setpoint: 5 degC, tolerance: 3 K, stability: relaxed}
plant: {response: {change: 30 K, time_constant: 60 min, dead_time: 40 s, rest_value: 15 degC to 22 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K}
element: {kind: fixed_speed_compressor, current: 5 A, voltage: 400 V, phases: 3, min_run: 180 s, min_rest: 180 s, starts_per_hour: 6}
limits: {on_sensor_fault: off, after_power_return: resume, consequence: product}
"""


def panel_of(text=PANEL):
    documents, problems = read_text(text, "loops/panel.yml")
    made, faults = read_model(Panel, documents[0].data)
    assert not problems, problems
    assert not faults, faults
    return made


def decided(text, panel=PANEL):
    """Read one loop and decide it: the loop or None, and the problems."""
    documents, problems = read_text(text, "loops/loop.yml")
    reading = read_loops(documents)
    assert not problems, problems
    assert not reading.problems, reading.problems
    return decide(reading.loops[0], panel_of(panel), load_catalogue(None))


def record(text, panel=PANEL):
    """Return the record of one loop that has no problem."""
    found, problems = decided(text, panel)
    assert not problems, problems
    return loop_record(found)


def whole(files, panel=PANEL):
    """Decide several files as a project: the design."""
    documents, problems = [], []
    for name, text in files.items():
        read, found = read_text(text, name)
        documents += read
        problems += found
    heads, _ = read_text(panel, "loops/panel.yml")
    stored = tuple((name, text.encode()) for name, text in sorted({**files, "loops/panel.yml": panel}.items()))
    return design_of(Sources(panel=heads[0], devices=None, loops=tuple(documents), files=stored, problems=tuple(problems)))


@pytest.fixture(scope="session")
def make():
    """Give everything a test of the design builds from."""
    return SimpleNamespace(
        decided=decided, record=record, whole=whole, dump=dump, record_of=record_of, panel_of=panel_of, panel=PANEL,
        steady=HEATER % {"stability": "steady"}, relaxed=HEATER % {"stability": "relaxed"}, compressor=COMPRESSOR,
    )  # fmt: skip

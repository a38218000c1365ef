"""A loop's reasoning in a terminal: every ground, every alternative with what ended it, what is missing and assumed."""

import re
from types import SimpleNamespace

import pytest

from specgen.catalogue.load import load_catalogue
from specgen.design.decide import decide
from specgen.model.loops import read_loops
from specgen.model.panel import Panel
from specgen.model.reader import read_model
from specgen.source.read import read_text
from specgen.view.terminal import one_line, reasoning

PANEL = """panel: {reference: PNL-1, title: Test panel, revision: A, status: for review, date: 2026-11-20}
supply: {voltage: 400 V, phases: 3, frequency: 50 Hz, prospective_fault_current: 6 kA}
enclosure: {height: 1800 mm, width: 800 mm, depth: 400 mm, ambient: 5 degC to 35 degC}
"""
LOOP = """tag: TIC-1
service: Tank, contents
need: {quantity: temperature, direction: raise, setpoint: 60 degC, tolerance: 2 K, stability: steady}
plant: {response: {change: 100 K, time_constant: 60 min, dead_time: 60 s, rest_value: 20 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K}
element: {kind: resistive_heater, power: 9 kW, voltage: 400 V, phases: 3, needs: [level]}
limits: {danger_high: 90 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""


@pytest.fixture(scope="module")
def shown():
    heads, _ = read_text(PANEL, "loops/panel.yml")
    panel, _ = read_model(Panel, heads[0].data)
    documents, _ = read_text(LOOP, "loops/heat.yml")
    decided, _ = decide(read_loops(documents).loops[0], panel, load_catalogue(None))
    return SimpleNamespace(decided=decided, text=reasoning(decided), lines=reasoning(decided).splitlines())


def section(shown, name, following):
    return shown.lines[shown.lines.index(name) + 1 : shown.lines.index(following)]


def test_it_begins_with_the_loop(shown):
    assert shown.lines[0] == f"TIC-1  Tank, contents  [{shown.decided.verdict}]  loops/heat.yml:1"
    assert shown.lines[2] == one_line(shown.decided)
    assert shown.text.count("\nChosen: ") == 1


def test_every_ground_that_bore(shown):
    told = [line.split()[0] for line in section(shown, "Grounds", "Alternatives") if line]
    bore = [finding.rule for finding in shown.decided.findings if finding.outcome != "does_not_apply"]
    assert sorted(told) == sorted(bore)


def test_what_is_broken_or_unanswered_comes_first(shown):
    outcomes = [line.split()[2] for line in section(shown, "Grounds", "Alternatives") if line]
    first_that_holds = outcomes.index("holds")
    assert set(outcomes[first_that_holds:]) == {"holds"}


def test_every_alternative_with_its_end(shown):
    lines = [line for line in section(shown, "Alternatives", "Missing") if line]
    assert len(lines) == len(shown.decided.decision.rejected)
    assert all(re.search(r" [A-Z]\d+( [A-Z]\d+)*: \S", line) for line in lines)


def test_missing_and_assumed(shown):
    assert "  sensor.lag: data sheet of the sensor or transmitter (settles I3)" in shown.lines
    for assumption in shown.decided.assumptions:
        assert f"  {assumption.field} = {assumption.value}: {assumption.why}" in shown.lines


def test_no_brace_is_left(shown):
    assert "{" not in shown.text
    assert "None" not in shown.text

"""A broken safety rule holds its loop, a missing input leaves it open, and the finding names the input that would cure it."""

from pathlib import Path

import pytest

from specgen.design.project import design_of
from specgen.source.folder import Sources
from specgen.source.read import read_text

TEXT = (Path(__file__).parents[1] / "panels" / "broken" / "loops" / "panel.yml").read_text(encoding="utf-8")
PANEL, _ = read_text(TEXT, "loops/panel.yml")
HEATER = """tag: TIC-1
service: A heater
need: {quantity: temperature, direction: raise, setpoint: 65 degC, tolerance: 2 K}
plant: {response: {change: 130 K, time_constant: 20 min, dead_time: 25 s, rest_value: 20 degC}}
sensor: {kind: pt100, class: A, step: 0.1 K}
element: {kind: resistive_heater, power: 6 kW, voltage: 400 V, phases: 3, needs: []}
limits: {danger_high: 95 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
COMPRESSOR = """tag: TIC-2
service: A cold room
need: {quantity: temperature, direction: lower, setpoint: 4 degC, tolerance: 2.5 K, stability: relaxed}
plant: {rates: {with_output: 0.5 K/min to 0.8 K/min, without_output: 0.1 K/min to 0.25 K/min, dead_time: 20 s}}
sensor: {kind: pt100, class: B, step: 0.1 K}
element: {kind: fixed_speed_compressor, current: 7.5 A, voltage: 400 V, phases: 3, min_run: 3 min, min_rest: 3 min,
          starts_per_hour: 8, refrigerant_circuit: yes, high_pressure_cutout: yes}
limits: {danger_low: -5 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
VALVE = """tag: TIC-3
service: A hot water coil
need: {quantity: temperature, direction: raise, setpoint: 50 degC, tolerance: 2 K}
plant: {response: {change: 80 K, time_constant: 10 min, dead_time: 15 s, rest_value: 15 degC}}
sensor: {kind: pt100, class: A, step: 0.1 K}
element: {kind: modulating_valve, signal: 4-20 mA, stroke_time: 60 s, burden: 250 ohm, medium: water, on_signal_loss: close,
          on_supply_loss: close}
limits: {danger_high: 70 degC, consequence: injury, on_sensor_fault: off, after_power_return: off}
"""


def one(text):
    documents, problems = read_text(text, "loops/a.yml")
    design = design_of(Sources(PANEL[0], None, tuple(documents), tuple(problems), ()))
    assert not design.problems
    return design.loops[0]


@pytest.mark.parametrize("text", [HEATER, COMPRESSOR, VALVE])
def test_whole_they_are_not_held(text):
    assert one(text).verdict in ("meets", "deviates")


CUTOUT = "high_pressure_cutout: yes"
OPENS = "without supply the valve opens"
CASES = [
    pytest.param(HEATER, "95 degC", "66 degC", "S1", "broken", "66.0", id="no room between running and danger"),
    pytest.param(HEATER, "on_sens", "limiter: {set: 94.9 degC, sensor_lag: 60 s}, on_sens", "S1", "broken", "94.9", id="acts too late"),
    pytest.param(HEATER, "danger_high: 95 degC, ", "", "S1", "unanswered", "limits.danger_high", id="no danger declared"),
    pytest.param(HEATER, ", needs: []", "", "S5", "unanswered", "element.needs", id="needs not declared"),
    pytest.param(COMPRESSOR, CUTOUT, "high_pressure_cutout: no", "S6", "broken", "high-pressure cut-out", id="no cut-out"),
    pytest.param(COMPRESSOR, f", {CUTOUT}", "", "S6", "unanswered", "element.high_pressure_cutout", id="cut-out not declared"),
    pytest.param(VALVE, "on_supply_loss: close", "on_supply_loss: open", "S7", "broken", OPENS, id="opens without supply"),
]


@pytest.mark.parametrize(("text", "old", "new", "code", "outcome", "named"), CASES)
def test_broken_is_held_and_missing_is_open(text, old, new, code, outcome, named):
    loop = one(text.replace(old, new))
    finding = next(f for f in loop.findings if f.rule == code)
    assert finding.outcome == outcome
    assert loop.verdict == {"broken": "held", "unanswered": "open"}[outcome]
    said = loop.phrasing.fill(finding.text, finding.words)
    assert named in said or named in finding.needs


def test_what_happens_on_return_of_supply_is_declared_where_somebody_may_be_hurt():
    """Neither the loop nor the house says it."""
    documents, _ = read_text(HEATER.replace("product", "injury").replace(", after_power_return: resume", ""), "loops/a.yml")
    silent, _ = read_text(TEXT.replace("house: {after_power_return: resume}\n", ""), "loops/panel.yml")
    loop = design_of(Sources(silent[0], None, tuple(documents), (), ())).loops[0]
    finding = next(f for f in loop.findings if f.rule == "S4")
    assert (finding.outcome, finding.needs) == ("unanswered", ("limits.after_power_return",))
    assert loop.verdict == "open"

"""Pairs judged through a whole design: a narrow dead band brings interlocks to both, an overlap holds both."""

import pytest

HEAT = """tag: TIC-1
service: Room, heating
acts_on: %(body)s
need: {quantity: temperature, direction: raise, setpoint: %(up)s, tolerance: 1.5 K, stability: relaxed}
plant: {response: {change: 60 K, time_constant: 60 min, dead_time: 20 s, rest_value: 0 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K}
element: {kind: resistive_heater, power: 3 kW, voltage: 400 V, phases: 3, needs: []}
limits: {danger_high: 80 degC, consequence: product, on_sensor_fault: off, after_power_return: resume}
"""
COOL = """tag: TIC-2
service: Room, cooling
acts_on: Room A
need: {quantity: temperature, direction: lower, setpoint: 20 degC, tolerance: 3 K, stability: relaxed}
plant: {response: {change: 40 K, time_constant: 60 min, dead_time: 40 s, rest_value: 32 degC to 38 degC}}
sensor: {kind: pt100, class: A, wires: 4, step: 0.1 K, noise: 0.1 K}
element: {kind: fixed_speed_compressor, current: 5 A, voltage: 400 V, phases: 3, min_run: 180 s, min_rest: 180 s, starts_per_hour: 6}
limits: {consequence: product, on_sensor_fault: off, after_power_return: resume}
"""


def judged(make, up, body="room  a"):
    design = make.whole({"loops/heat.yml": HEAT % {"up": up, "body": body}, "loops/cool.yml": COOL})
    assert not design.problems, design.problems
    return {loop.tag: loop for loop in design.loops}


def outcome(loop):
    (finding,) = [finding for finding in loop.findings if finding.rule == "A5"]
    assert "{" not in loop.phrasing.fill(finding.text, finding.words)
    return finding.outcome


@pytest.mark.parametrize(
    ("up", "expected", "apart"),
    [("10 degC", "holds", False), ("19.5 degC", "holds", True), ("20 degC", "broken", False), ("25 degC", "broken", False)],
)
def test_both_loops_carry_it(make, up, expected, apart):
    loops = judged(make, up)
    assert {outcome(loop) for loop in loops.values()} == {expected}
    assert all((loop.verdict == "held") is (expected == "broken") for loop in loops.values())
    for tag, other in (("TIC-1", "TIC-2"), ("TIC-2", "TIC-1")):
        safety = loops[tag].safety
        assert safety.pairs == ((other,) if apart else ())
        assert ("K8" in {part.product for part in safety.parts}) is apart


def test_another_body_is_no_pair(make):
    assert {outcome(loop) for loop in judged(make, "25 degC", body="room B").values()} == {"does_not_apply"}

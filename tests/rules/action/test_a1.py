"""A1: the action follows from the direction."""

import pytest


@pytest.mark.parametrize(
    ("element", "need", "outcome", "action"),
    [
        pytest.param("heater", {}, "holds", "reverse acting", id="heat raises"),
        pytest.param("compressor", {}, "holds", "direct acting", id="cold lowers"),
        pytest.param("heater", {"direction": "lower"}, "broken", "drive to one end", id="heat cannot lower a temperature"),
    ],
)
def test_outcome(make, element, need, outcome, action):
    answer = make.ask("A1", make.case(element, "on_off", need=need))
    assert answer.outcome == outcome
    assert action in answer.text


def test_heat_may_lower_a_humidity(make):
    need = {"quantity": "humidity", "direction": "lower", "setpoint": "45 percent", "tolerance": "5 percent"}
    sensor = {"kind": "transmitter", "step": "0.1 percent", "noise": "0.1 percent"}
    case = make.case("heater", "on_off", need=need, sensor=sensor, limits={"danger_high": "90 percent"})
    assert make.ask("A1", case).outcome == "holds"

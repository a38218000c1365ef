"""M2: an analogue input is used."""

import pytest


@pytest.mark.parametrize(
    ("element", "mode", "device", "outcome"),
    [
        pytest.param("valve", "analogue", "signal", "holds", id="signal"),
        pytest.param("valve", "on_off", "relay", "broken", id="switched end to end"),
        pytest.param("valve", "time_proportioned", "ssr", "broken", id="pulsed"),
        pytest.param("inverter", "analogue", "power_controller", "broken", id="its supply throttled"),
        pytest.param("heater", "analogue", "signal", "does_not_apply", id="no input"),
    ],
)
def test_outcome(make, element, mode, device, outcome):
    assert make.ask("M2", make.case(element, mode, device)).outcome == outcome


def test_the_lowest_speed_is_named(make):
    assert "Below 30 percent it stops and starts" in make.ask("M2", make.case("inverter", "analogue", "signal")).text


@pytest.mark.parametrize(
    ("rest", "said"),
    [
        pytest.param("10 degC to 28 degC", "lowest duty of 15 percent is below its lowest speed of 30 percent", id="(10 - 4)/40"),
        pytest.param("16 degC to 28 degC", "lowest duty of 30 percent is not below its lowest speed of 30 percent", id="(16 - 4)/40"),
        pytest.param("2 degC to 28 degC", "lowest duty of 0 percent is below", id="at rest"),
    ],
)
def test_the_lowest_duty_is_set_against_the_lowest_speed(make, rest, said):
    plant = {"response": {"change": "40 K", "time_constant": "60 min", "dead_time": "60 s", "rest_value": rest}}
    assert said in make.ask("M2", make.case("inverter", "analogue", "signal", plant=plant)).text

"""M3: switches do not throttle."""

import pytest


@pytest.mark.parametrize(
    ("element", "mode", "device", "outcome"),
    [
        pytest.param("heater", "on_off", "relay", "holds", id="relay switched"),
        pytest.param("heater", "time_proportioned", "contactor", "holds", id="contactor pulsed"),
        pytest.param("heater", "time_proportioned", "ssr", "holds", id="solid state pulsed"),
        pytest.param("heater", "analogue", "contactor", "broken", id="contactor throttled"),
        pytest.param("heater", "analogue", "ssr", "broken", id="solid state throttled"),
        pytest.param("heater", "analogue", "power_controller", "holds", id="power controller on heat"),
        pytest.param("compressor", "analogue", "power_controller", "broken", id="power controller on a motor"),
        pytest.param("heater", "analogue", "signal", "broken", id="no input for a signal"),
        pytest.param("valve", "analogue", "signal", "holds", id="an input for a signal"),
        pytest.param("heater", "on_off", "power_controller", "broken", id="power controller switched"),
        pytest.param("heater", "on_off", "relay_pair", "broken", id="pair of relays switched"),
        pytest.param("motor_valve", "three_point", "relay_pair", "holds", id="pair of relays three-point"),
        pytest.param("motor_valve", "three_point", "relay", "broken", id="one relay three-point"),
    ],
)
def test_outcome(make, element, mode, device, outcome):
    assert make.ask("M3", make.case(element, mode, device)).outcome == outcome


def test_the_device_is_named(make):
    assert make.ask("M3", make.case("heater", "analogue", "ssr")).text.startswith("A solid-state switch knows on and off")

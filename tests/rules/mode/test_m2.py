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

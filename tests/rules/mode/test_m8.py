"""M8: special loads take a power controller."""

import pytest


@pytest.mark.parametrize(
    ("element", "mode", "device", "outcome"),
    [
        pytest.param("lamp", "analogue", "power_controller", "holds", id="throttled"),
        pytest.param("lamp", "analogue", "signal", "broken", id="bare signal"),
        pytest.param("lamp", "time_proportioned", "ssr", "broken", id="pulsed by solid state"),
        pytest.param("lamp", "on_off", "contactor", "broken", id="switched by a contactor"),
        pytest.param("lamp", "on_off", "relay", "broken", id="switched by a relay"),
        pytest.param("heater", "time_proportioned", "ssr", "does_not_apply", id="plain resistance"),
    ],
)
def test_outcome(make, element, mode, device, outcome):
    assert make.ask("M8", make.case(element, mode, device)).outcome == outcome


@pytest.mark.parametrize("kind", ["silicon_carbide_heater", "molybdenum_disilicide_heater", "transformer_fed_heater"])
def test_every_such_load(make, kind):
    assert make.ask("M8", make.case("lamp", "time_proportioned", "ssr", element={"kind": kind})).outcome == "broken"

"""A4: no drive is the safe state."""

import pytest

FULL, HOLD = {"on_sensor_fault": "full"}, {"on_sensor_fault": "hold"}


@pytest.mark.parametrize(
    ("element", "fields", "limits", "outcome"),
    [
        pytest.param("heater", {}, {}, "holds", id="off"),
        pytest.param("heater", {}, FULL, "broken", id="full, and off without drive"),
        pytest.param("cold_valve", {}, FULL, "holds", id="a cooling valve may open"),
        pytest.param("cold_valve", {"on_supply_loss": "close"}, FULL, "broken", id="but not close without supply"),
        pytest.param("motor_valve", {}, HOLD, "holds", id="a motor stands still"),
        pytest.param("valve", {}, HOLD, "broken", id="closes where it should stay"),
        pytest.param("valve", {"on_supply_loss": None}, HOLD, "unanswered", id="undriven unknown"),
        pytest.param("heater", {}, {"on_sensor_fault": None}, "unanswered", id="safe state unknown"),
    ],
)
def test_outcome(make, element, fields, limits, outcome):
    assert make.ask("A4", make.case(element, "on_off", element=fields, limits=limits)).outcome == outcome

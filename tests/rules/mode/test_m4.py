"""M4: travel is driven three-point."""

import pytest


@pytest.mark.parametrize(
    ("element", "mode", "outcome"),
    [
        pytest.param("motor_valve", "three_point", "holds", id="three-point"),
        pytest.param("motor_valve", "on_off", "broken", id="on-off"),
        pytest.param("motor_valve", "analogue", "broken", id="analogue"),
        pytest.param("heater", "three_point", "broken", id="three-point on what does not travel"),
        pytest.param("heater", "on_off", "does_not_apply", id="neither"),
    ],
)
def test_outcome(make, element, mode, outcome):
    assert make.ask("M4", make.case(element, mode)).outcome == outcome


def test_the_travel_time_is_named(make):
    assert "needs 120 s from end to end" in make.ask("M4", make.case("motor_valve", "three_point")).text

"""A2: the output on sensor fault."""

import pytest

REASON = {"on_sensor_fault_because": "the pipes freeze"}


@pytest.mark.parametrize(
    ("element", "limits", "outcome"),
    [
        pytest.param("heater", {"on_sensor_fault": "off"}, "holds", id="off"),
        pytest.param("heater", {"on_sensor_fault": None}, "unanswered", id="not declared"),
        pytest.param("heater", {"on_sensor_fault": "full"}, "broken", id="full without a reason"),
        pytest.param("heater", {"on_sensor_fault": "hold"}, "broken", id="hold without a reason"),
        pytest.param("valve", {"on_sensor_fault": "full"}, "broken", id="a heating valve is heat too"),
        pytest.param("cold_valve", {"on_sensor_fault": "full"}, "holds", id="cold may stay on"),
        pytest.param("heater", {"on_sensor_fault": "full", **REASON, "limiter": {"set": "88 degC"}}, "holds", id="reason and limiter"),
        pytest.param("heater", {"on_sensor_fault": "full", **REASON, "danger_high": None}, "unanswered", id="reason, danger unknown"),
        pytest.param("heater", {"on_sensor_fault": "full", **REASON}, "unanswered", id="reason, stuck on not computed"),
    ],
)
def test_outcome(make, element, limits, outcome):
    assert make.ask("A2", make.case(element, "on_off", limits=limits)).outcome == outcome


def test_staying_on_short_of_the_danger_needs_no_limiter(make):
    limits = {"on_sensor_fault": "full", **REASON}
    short = make.case("heater", "on_off", limits=limits, faults=make.faults(on=(90.0, False, None)))
    past = make.case("heater", "on_off", limits=limits, faults=make.faults(on=(120.0, True, None)))
    assert make.ask("A2", short).outcome == "holds"
    assert make.ask("A2", past).outcome == "broken"


def test_what_is_missing_is_named(make):
    assert make.ask("A2", make.case("heater", "on_off", limits={"on_sensor_fault": None})).needs == ("limits.on_sensor_fault",)

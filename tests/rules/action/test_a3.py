"""A3: where a valve goes without signal or supply."""

import pytest


@pytest.mark.parametrize(
    ("element", "fields", "limits", "outcome"),
    [
        pytest.param("valve", {}, {}, "holds", id="closes, safe is closed"),
        pytest.param("valve", {"on_signal_loss": None}, {}, "unanswered", id="signal loss not declared"),
        pytest.param("cold_valve", {}, {"on_sensor_fault": "full"}, "holds", id="cold opens, safe is open"),
        pytest.param("motor_valve", {}, {"on_sensor_fault": "hold"}, "holds", id="stays, safe is the last"),
        pytest.param("motor_valve", {}, {}, "unanswered", id="stays, safe is closed, stuck on not computed"),
        pytest.param("motor_valve", {}, {"danger_high": None}, "unanswered", id="stays, danger unknown"),
        pytest.param("solenoid", {}, {}, "holds", id="de-energised is closed"),
        pytest.param("solenoid", {"fails": None}, {}, "unanswered", id="de-energised unknown"),
        pytest.param("heater", {}, {}, "does_not_apply", id="no valve"),
    ],
)
def test_outcome(make, element, fields, limits, outcome):
    assert make.ask("A3", make.case(element, "on_off", element=fields, limits=limits)).outcome == outcome


@pytest.mark.parametrize(
    ("position", "on", "off", "outcome"),
    [
        pytest.param("open", True, False, "broken", id="open passes the danger"),
        pytest.param("open", False, False, "holds", id="open passes nothing"),
        pytest.param("hold", False, True, "broken", id="held shut passes the danger"),
        pytest.param("hold", False, False, "holds", id="held anywhere passes nothing"),
    ],
)
def test_elsewhere_than_safe(make, position, on, off, outcome):
    case = make.case(
        "valve", "analogue", "signal", element={"on_supply_loss": position}, faults=make.faults(on=(99.0, on, None), off=(1.0, None, off))
    )
    assert make.ask("A3", case).outcome == outcome

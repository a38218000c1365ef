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
        pytest.param("open", True, False, "broken", id="open passes the danger, and no frost asks for it"),
        pytest.param("open", False, False, "holds", id="open passes nothing"),
        pytest.param("hold", False, True, "broken", id="held shut passes the danger"),
        pytest.param("hold", False, False, "holds", id="held anywhere passes nothing"),
        pytest.param("hold", True, False, "holds", id="held open passes the danger, and a limiter by another device ends it"),
        pytest.param("hold", True, True, "broken", id="held open a limiter ends, held shut nothing does"),
    ],
)
def test_elsewhere_than_safe(make, position, on, off, outcome):
    case = make.case(
        "valve", "analogue", "signal", element={"on_supply_loss": position}, faults=make.faults(on=(99.0, on, None), off=(1.0, None, off))
    )
    assert make.ask("A3", case).outcome == outcome


def test_a_valve_that_opens_for_frost_has_its_limiter(make):
    faults = make.faults(on=(99.0, True, None), off=(1.0, None, False))
    fields, limits = {"on_supply_loss": "open"}, {"frost_risk": "yes"}
    answer = make.ask("A3", make.case("valve", "analogue", "signal", element=fields, limits=limits, faults=faults))
    assert answer.outcome == "holds"
    assert "ends by another device" in answer.text


def test_a_limiter_needs_room(make):
    """Normal running up to 96 degC leaves none below a danger at 95 degC."""
    faults, settings = make.faults(on=(99.0, True, None), off=(1.0, None, False)), make.on_off(enforced={"above": 31.0})
    asked = make.case("valve", "on_off", element={"on_supply_loss": "hold"}, faults=faults, settings=settings)
    assert make.ask("A3", asked).outcome == "broken"


def test_a_limiter_does_not_give_back_cold(make):
    """Safe is open; without supply it closes, and the value warms past 15 degC."""
    limits = {"on_sensor_fault": "full", "danger_high": "15 degC"}
    asked = make.case(
        "cold_valve", "analogue", "signal", element={"on_supply_loss": "close"}, limits=limits, faults=make.faults(off=(30.0, True, None))
    )
    assert make.ask("A3", asked).outcome == "broken"

"""S7: a heating medium is shut off without power."""

import pytest

PASSES = (120.0, True, None)


@pytest.mark.parametrize(
    ("element", "fields", "limits", "outcome"),
    [
        pytest.param("valve", {}, {}, "holds", id="closes"),
        pytest.param("valve", {"on_supply_loss": "hold"}, {}, "holds", id="stays: a high limit by another device"),
        pytest.param("valve", {"on_supply_loss": "open"}, {}, "broken", id="opens"),
        pytest.param("valve", {"on_supply_loss": "open"}, {"frost_risk": "yes"}, "holds", id="opens for frost"),
        pytest.param("valve", {"on_supply_loss": None}, {}, "unanswered", id="not declared"),
        pytest.param("motor_valve", {}, {}, "holds", id="a motor stays"),
        pytest.param("solenoid", {}, {}, "holds", id="solenoid closes"),
        pytest.param("solenoid", {"fails": "open"}, {}, "broken", id="solenoid opens"),
        pytest.param("valve", {}, {"danger_high": None}, "unanswered", id="danger unknown"),
        pytest.param("heater", {}, {}, "does_not_apply", id="no medium"),
        pytest.param("cold_valve", {}, {}, "does_not_apply", id="cold"),
    ],
)
def test_outcome(make, element, fields, limits, outcome):
    assert make.ask("S7", make.case(element, "on_off", element=fields, limits=limits, faults=make.faults(on=PASSES))).outcome == outcome


def test_short_of_the_danger_it_does_not_apply(make):
    asked = make.case("valve", "analogue", "signal", element={"on_supply_loss": "open"}, faults=make.faults(on=(80.0, False, None)))
    assert make.ask("S7", asked).outcome == "does_not_apply"


def test_a_high_limit_needs_room(make):
    settings = make.on_off(enforced={"above": 31.0})
    asked = make.case("valve", "on_off", element={"on_supply_loss": "hold"}, faults=make.faults(on=PASSES), settings=settings)
    assert make.ask("S7", asked).outcome == "broken"


def test_faults_that_were_not_computed(make):
    assert make.ask("S7", make.case("valve", "analogue", "signal")).outcome == "unanswered"

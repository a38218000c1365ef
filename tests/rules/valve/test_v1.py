"""V1, with openings set by hand."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.valve_sizing import ValveSizing


def valve(low, high, *points, is_installed=True):
    return ValveSizing(low, high, is_installed=is_installed, lowest_flow=0.03, gain_factor=1.0, open_points=points)


NO_KVS = Unsized("the valve's Kvs is not declared", ("element.kvs",))
CASES = [
    pytest.param(valve(0.3, 0.8), "holds", id="inside"),
    pytest.param(valve(0.1, 0.9), "holds", id="on the limits"),
    pytest.param(valve(0.3, 0.95), "broken", id="nothing to spare"),
    pytest.param(valve(0.3, 1.2), "broken", id="too small"),
    pytest.param(valve(0.05, 0.8), "broken", id="on the seat"),
    pytest.param(valve(-0.2, 0.8), "broken", id="below what it controls"),
    pytest.param(valve(None, 0.8), "holds", id="shuts where nothing is needed"),
    pytest.param(valve(0.3, 0.95, NO_KVS, is_installed=False), "unanswered", id="the pipes may take a share"),
    pytest.param(valve(0.05, 0.8, NO_KVS, is_installed=False), "broken", id="lower still in any pipes"),
    pytest.param(valve(None, None, NO_KVS), "unanswered", id="no characteristic"),
    pytest.param(None, "unanswered", id="not computed"),
]


@pytest.mark.parametrize(("used", "outcome"), CASES)
def test_outcome(make, used, outcome):
    answer = make.ask("V1", make.case("valve", "analogue", "signal", settings=make.continuous(valve=used)))
    assert answer.outcome == outcome


def test_it_speaks_with_the_numbers(make):
    answer = make.ask("V1", make.case("valve", "analogue", "signal", settings=make.continuous(valve=valve(0.3, 0.95))))
    assert answer.text == "The valve is 30 percent open at the lowest duty and 95 percent at the highest, of 10 percent to 90 percent."
    assert answer.margin == pytest.approx(0.90 / 0.95)


def test_what_is_missing_is_named(make):
    answer = make.ask("V1", make.case("valve", "analogue", "signal", settings=make.continuous(valve=valve(None, None, NO_KVS))))
    assert answer.needs == ("element.kvs",)
    assert answer.text == "The valve's Kvs is not declared."


def test_a_motor_driven_valve_declares_no_size(make):
    assert make.ask("V1", make.case("motor_valve", "three_point", settings=make.stepped())).outcome == "does_not_apply"


def test_it_is_asked_of_what_throttles_only(make):
    assert make.ask("V1", make.case("heater", "analogue", settings=make.continuous())).outcome == "does_not_apply"
    assert make.ask("V1", make.case("solenoid", "on_off")).outcome == "does_not_apply"

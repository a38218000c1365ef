"""V2, with the lowest flow set by hand; duties from the plant: rest 20 degC, 100 K more at full output."""

import pytest

from specgen.sizing.candidate import Unsized
from specgen.sizing.valve_sizing import ValveSizing


def ask(make, lowest, rest="20 degC", points=(), rangeability="30"):
    used = ValveSizing(0.3, 0.8, is_installed=True, lowest_flow=lowest, gain_factor=1.0, open_points=points)
    element = {"rangeability": rangeability} if rangeability else {}
    plant = {"response": {"change": "100 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": rest}}
    return make.ask("V2", make.case("valve", "analogue", "signal", plant=plant, settings=make.continuous(valve=used), element=element))


def test_a_flow_that_the_trim_controls(make):
    """65 degC over a rest of 20 degC to 55 degC: the lowest duty is (65 - 55)/100 = 10 percent."""
    answer = ask(make, 0.04, "20 degC to 55 degC")
    assert answer.outcome == "holds"
    assert answer.text == "The valve controls no less than 4 percent of its full flow; the lowest duty needs 10 percent."
    assert answer.margin == pytest.approx(2.5)


def test_a_rangeability_that_is_taken_is_said(make):
    assert "at the usual rangeability of 50" in ask(make, 0.04, "20 degC to 55 degC", rangeability=None).text


def test_a_flow_below_it(make):
    answer = ask(make, 0.04, "20 degC to 63 degC")
    assert answer.outcome == "broken"
    assert answer.margin == pytest.approx(0.5)


def test_a_case_that_needs_no_flow(make):
    answer = ask(make, 0.04, "20 degC to 70 degC")
    assert answer.outcome == "broken"
    assert "opens and shuts in turn" in answer.text


def test_without_a_characteristic(make):
    answer = ask(make, None, points=(Unsized("no characteristic", ("element.characteristic",)),))
    assert (answer.outcome, answer.needs) == ("unanswered", ("element.characteristic",))


def test_who_is_asked(make):
    assert make.ask("V2", make.case("motor_valve", "three_point", settings=make.stepped())).outcome == "does_not_apply"
    assert make.ask("V2", make.case("heater", "analogue", settings=make.continuous())).outcome == "does_not_apply"

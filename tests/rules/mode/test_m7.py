"""M7: what runs whole is switched."""

import pytest


@pytest.mark.parametrize(
    ("element", "mode", "fields", "outcome"),
    [
        pytest.param("blower", "on_off", {}, "holds", id="switched"),
        pytest.param("blower", "time_proportioned", {}, "broken", id="proportioned"),
        pytest.param("blower", "analogue", {}, "broken", id="analogue"),
        pytest.param("burner", "on_off", {}, "holds", id="burner switched"),
        pytest.param("burner", "on_off", {"starts_per_hour": None}, "unanswered", id="starts unknown"),
        pytest.param("burner", "time_proportioned", {"starts_per_hour": None}, "broken", id="proportioned, starts unknown"),
        pytest.param("compressor", "on_off", {}, "does_not_apply", id="judged by M1"),
        pytest.param("heater", "on_off", {}, "does_not_apply", id="no machine"),
    ],
)
def test_outcome(make, element, mode, fields, outcome):
    assert make.ask("M7", make.case(element, mode, element=fields)).outcome == outcome


def test_the_declared_limits_are_named(make):
    text = make.ask("M7", make.case("burner", "on_off")).text
    assert "keeps to starting at most 6 an hour, to a least run of 60 s; its own sequence belongs to its certified burner control" in text


def test_the_pulses_of_a_cycle_are_named(make):
    """A 60 s cycle starts it 60 times an hour and is on for 3 s at 5 %; 12 starts are a fifth of 60."""
    answer = make.ask("M7", make.case("blower", "time_proportioned", settings=make.proportioned(cycle_time=60.0)))
    assert "A 60 s cycle would start it 60 an hour and run it for 3 s at 5 percent" in answer.text
    assert answer.margin == pytest.approx(0.2)


def test_the_margin_ends_at_the_limit(make):
    """12 starts an hour are 300 s apart."""
    assert make.ask("M7", make.case("blower", "time_proportioned", settings=make.proportioned(cycle_time=300.0))).margin is None

"""M10: duty at both ends. A response of 100 K from a rest value R holds 65 degC with (65 - R)/100 of rated output."""

import pytest


def case(make, rest, change="100 K"):
    response = {"response": {"change": change, "time_constant": "20 min", "dead_time": "25 s", "rest_value": rest}}
    # a valve's medium does not follow the supply
    return make.case("valve", "analogue", "signal", plant=response)


@pytest.mark.parametrize(
    ("rest", "outcome"),
    [
        pytest.param("10 degC to 40 degC", "holds", id="25 to 55 percent"),
        pytest.param("-25 degC to 60 degC", "holds", id="exactly 5 to 90 percent"),
        pytest.param("10 degC to 61 degC", "broken", id="4 percent"),
        pytest.param("-26 degC to 40 degC", "broken", id="91 percent"),
    ],
)
def test_outcome(make, rest, outcome):
    assert make.ask("M10", case(make, rest)).outcome == outcome


def test_both_ends_are_shown(make):
    text = make.ask("M10", case(make, "10 degC to 40 degC")).text
    assert "between 25 percent" in text
    assert "55 percent" in text
    assert "rests" not in text


def test_where_nothing_is_needed_the_loop_rests(make):
    """70 degC surroundings keep 65 degC without output."""
    text = make.ask("M10", case(make, "10 degC to 70 degC")).text
    assert "between 0 percent" in text
    assert "the loop rests" in text


def test_without_a_plant_it_is_unanswered(make):
    assert make.ask("M10", make.case("heater", "on_off")).outcome == "unanswered"

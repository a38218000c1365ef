"""M1: a fixed-speed compressor is switched."""

import pytest


@pytest.mark.parametrize(
    ("element", "mode", "outcome"),
    [
        pytest.param("compressor", "on_off", "holds", id="switched"),
        pytest.param("compressor", "time_proportioned", "broken", id="proportioned"),
        pytest.param("compressor", "analogue", "broken", id="analogue"),
        pytest.param("compressor", "three_point", "broken", id="three-point"),
        pytest.param("heater", "time_proportioned", "does_not_apply", id="no machine"),
        pytest.param("inverter", "analogue", "does_not_apply", id="variable speed"),
    ],
)
def test_outcome(make, element, mode, outcome):
    assert make.ask("M1", make.case(element, mode)).outcome == outcome


def test_the_two_ends_of_a_200_s_cycle(make):
    """Common practice, no source: 5 % of 200 s is 10 s on, 95 % leaves 10 s off."""
    case = make.case("compressor", "time_proportioned", settings=make.proportioned(cycle_time=200.0))
    text = make.ask("M1", case).text
    # 180 s / 0.05 = 3600 s, longer than 120 s / 0.05 = 2400 s and than 3600 s / 10 starts
    assert text == "10 s on at 5 percent of a 200 s cycle is shorter than the least run of 180 s; the cycle would have to be 60 min."


def test_the_rest_at_the_other_end(make):
    """A cycle of 200 s leaves 10 s off at 95 %."""
    times = {"min_run": "5 s", "min_rest": "120 s"}
    case = make.case("compressor", "time_proportioned", element=times, settings=make.proportioned(cycle_time=200.0))
    assert make.ask("M1", case).text.startswith("10 s off at 95 percent of a 200 s cycle is shorter than the least rest of 120 s")


def test_starts_bind_where_times_do_not(make):
    """Two starts an hour are 1800 s apart; 5 % of 600 s is 30 s."""
    times = {"min_run": "20 s", "min_rest": "20 s", "starts_per_hour": "2"}
    case = make.case("compressor", "time_proportioned", element=times, settings=make.proportioned(cycle_time=600.0))
    answer = make.ask("M1", case)
    assert "more often than 2 an hour; the cycle would have to be 30 min" in answer.text
    assert answer.margin == pytest.approx(600 / 1800)


def test_a_cycle_at_the_limit_is_still_no_way(make):
    """At 3600 s every time is kept, and the mode is wrong all the same."""
    answer = make.ask("M1", make.case("compressor", "time_proportioned", settings=make.proportioned(cycle_time=3600.0)))
    assert answer.outcome == "broken"
    assert "is shorter" not in answer.text
    assert answer.margin is None


def test_without_a_sized_cycle_the_longest_of_the_house_is_shown(make):
    """The house's longest is 300 s: 15 s on."""
    assert "15 s on at 5 percent of a 300 s cycle" in make.ask("M1", make.case("compressor", "on_off")).text

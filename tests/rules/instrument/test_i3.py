"""I3: a fifth of a time constant of 20 to 40 min is 240 s."""

import pytest

PLANT = {"response": {"change": "100 K", "time_constant": "20 min to 40 min", "dead_time": "25 s", "rest_value": "20 degC"}}


@pytest.mark.parametrize(
    ("lag", "outcome", "margin"),
    [("60 s", "holds", 4.0), ("10 s to 239 s", "holds", 240 / 239), pytest.param("240 s", "broken", 1.0, id="a fifth itself"),
     ("300 s", "broken", 0.8)],
)  # fmt: skip
def test_outcome(make, lag, outcome, margin):
    answer = make.ask("I3", make.case("heater", "on_off", plant=PLANT, sensor={"lag": lag}))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_a_balance_has_the_shortest_where_it_loses_most(make):
    """60 kJ/K over 50 to 100 W/K: 600 s at the shortest."""
    plant = {"balance": {"heat_capacity": "60 kJ/K", "loss": "50 W/K to 100 W/K", "surroundings": "10 degC", "dead_time": "25 s"}}
    assert make.ask("I3", make.case("heater", "on_off", plant=plant, sensor={"lag": "60 s"})).margin == pytest.approx(2.0)


def test_a_value_that_does_not_settle(make):
    plant = {"rates": {"with_output": "2 K/min", "without_output": "1 K/min", "dead_time": "25 s"}}
    assert make.ask("I3", make.case("heater", "on_off", plant=plant, sensor={"lag": "60 s"})).outcome == "does_not_apply"


def test_unanswered(make):
    assert make.ask("I3", make.case("heater", "on_off", plant=PLANT)).needs == ("sensor.lag",)
    assert make.ask("I3", make.case("heater", "on_off", sensor={"lag": "60 s"})).needs == ("plant",)

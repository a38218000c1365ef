"""I2: two steps of the measurement inside the tolerance of 1.5 K."""

import pytest


@pytest.mark.parametrize(
    ("step", "outcome", "margin"),
    [("0.1 K", "holds", 7.5), pytest.param("0.75 K", "holds", 1.0, id="at the limit"), ("1 K", "broken", 0.75)],
)
def test_outcome(make, step, outcome, margin):
    answer = make.ask("I2", make.case("heater", "on_off", sensor={"step": step}))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_the_narrower_side_counts(make):
    need = {"tolerance": {"above": "3 K", "below": "0.15 K"}}
    assert make.ask("I2", make.case("heater", "on_off", need=need)).outcome == "broken"


def test_unanswered(make):
    answer = make.ask("I2", make.case("heater", "on_off", sensor={"step": None}))
    assert (answer.outcome, answer.needs) == ("unanswered", ("sensor.step",))

"""T1: starting values."""

import pytest


def test_the_values_are_stated_with_the_cycles_delay(make):
    answer = make.ask("T1", make.case("heater", "time_proportioned", settings=make.proportioned()))
    assert answer.outcome == "holds"
    assert answer.text == "Start with a proportional band of 8 K, an integral time of 240 s, for a delay of 60 s, 15 s of it for the cycle."


def test_a_derivative_time_is_stated_where_there_is_one(make):
    settings = make.continuous(tuning=make.tuning(derivative_time=20.0, delay_without_cycle=60.0))
    text = make.ask("T1", make.case("heater", "analogue", settings=settings)).text
    assert text.endswith("an integral time of 240 s, a derivative time of 20 s, for a delay of 60 s.")


@pytest.mark.parametrize(
    ("mode", "outcome"), [("time_proportioned", "unanswered"), ("analogue", "unanswered"), ("on_off", "does_not_apply")]
)
def test_unanswered_and_not_asked(make, mode, outcome):
    assert make.ask("T1", make.case("heater", mode)).outcome == outcome

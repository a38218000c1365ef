"""T3: what a swing at start-up means."""

import pytest


def test_a_cycle_that_is_too_long_is_known_by_its_period(make):
    """Common practice, no source: a swing at the cycle's own period means that the cycle is too long."""
    answer = make.ask("T3", make.case("heater", "time_proportioned", settings=make.proportioned(cycle_time=20.0)))
    assert answer.outcome == "holds"
    assert answer.text.startswith("A swing with a period of 20 s means that the cycle is too long")


def test_without_a_cycle_only_gain_is_left(make):
    text = make.ask("T3", make.case("heater", "analogue", settings=make.continuous())).text
    assert "cycle" not in text
    assert "too much gain" in text


@pytest.mark.parametrize(("mode", "outcome"), [("time_proportioned", "unanswered"), ("on_off", "does_not_apply")])
def test_unanswered_and_not_asked(make, mode, outcome):
    assert make.ask("T3", make.case("heater", mode)).outcome == outcome

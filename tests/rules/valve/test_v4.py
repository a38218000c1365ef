"""V4, with pulses set by hand."""

import pytest


def ask(make, pulses, allowed="600"):
    settings = make.stepped(pulses_per_hour=pulses, motor_share=0.04)
    element = {"starts_per_hour": allowed} if allowed else {}
    return make.ask("V4", make.case("motor_valve", "three_point", settings=settings, element=element))


CASES = [
    pytest.param(240.0, "600", "holds", id="within"),
    pytest.param(600.0, "600", "holds", id="at the limit"),
    pytest.param(900.0, "600", "broken", id="beyond"),
    pytest.param(240.0, None, "unanswered", id="limit unknown"),
    pytest.param(None, "600", "unanswered", id="not computed"),
]


@pytest.mark.parametrize(("pulses", "allowed", "outcome"), CASES)
def test_outcome(make, pulses, allowed, outcome):
    assert ask(make, pulses, allowed).outcome == outcome


def test_it_says_how_fast_a_sweep_would_be_too_fast(make):
    """240 pulses in an hour: 600 would be reached by a sweep in 3600 x 240/600 = 1440 s = 24 min."""
    answer = ask(make, 240.0)
    assert "up to 240 an hour pulses" not in answer.text
    assert "24 min" in answer.text
    assert "4 percent of the time" in answer.text
    assert answer.margin == pytest.approx(2.5)


def test_it_is_asked_of_three_point_candidates(make):
    assert make.ask("V4", make.case("heater", "analogue", settings=make.continuous())).outcome == "does_not_apply"

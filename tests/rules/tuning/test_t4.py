"""T4: overshoot at start-up; 1.5 K is the tolerance above."""

import pytest


@pytest.mark.parametrize(
    ("overshoot", "need", "outcome", "margin"),
    [
        (0.5, {}, "holds", 3.0),
        pytest.param(1.5, {}, "holds", 1.0, id="at the tolerance"),
        pytest.param(1.6, {}, "broken", 1.5 / 1.6, id="past the tolerance"),
        pytest.param(1.6, {"overshoot": "3 K"}, "holds", 3 / 1.6, id="more is declared"),
        pytest.param(0.0, {}, "holds", None, id="none"),
    ],
)
def test_outcome(make, overshoot, need, outcome, margin):
    settings = make.continuous(tuning=make.tuning(overshoot=overshoot))
    answer = make.ask("T4", make.case("heater", "analogue", settings=settings, need=need))
    assert answer.outcome == outcome
    assert answer.margin == (None if margin is None else pytest.approx(margin))


def test_cold_overshoots_downwards(make):
    """0.4 K below is allowed, not the 2 K above."""
    need = {"tolerance": {"above": "2 K", "below": "0.4 K"}}
    settings = make.continuous(tuning=make.tuning(overshoot=0.5))
    assert make.ask("T4", make.case("cold_valve", "analogue", "signal", settings=settings, need=need)).outcome == "broken"


def test_unanswered_and_not_asked(make):
    unknown = make.case("heater", "analogue", settings=make.continuous(tuning=make.tuning(overshoot=None)))
    assert make.ask("T4", unknown).outcome == "unanswered"
    assert make.ask("T4", make.case("heater", "analogue")).outcome == "unanswered"
    assert make.ask("T4", make.case("heater", "on_off")).outcome == "does_not_apply"

"""T2: peak sensitivity at most 2, gain margin at least 2."""

import pytest


@pytest.mark.parametrize(
    ("sensitivity", "gain", "outcome", "margin"),
    [
        (1.59, 3.14, "holds", 3.14 / 2),
        pytest.param(2.0, 2.0, "holds", 1.0, id="at both limits"),
        pytest.param(2.1, 3.0, "broken", 1 / 1.1, id="too lively"),
        pytest.param(1.5, 1.9, "broken", 1.9 / 2, id="too little gain margin"),
    ],
)
def test_outcome(make, sensitivity, gain, outcome, margin):
    settings = make.continuous(tuning=make.tuning(peak_sensitivity=sensitivity, gain_margin=gain))
    answer = make.ask("T2", make.case("heater", "analogue", settings=settings))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


@pytest.mark.parametrize(
    ("mode", "outcome"), [("time_proportioned", "unanswered"), ("three_point", "unanswered"), ("on_off", "does_not_apply")]
)
def test_unanswered_and_not_asked(make, mode, outcome):
    assert make.ask("T2", make.case("heater", mode)).outcome == outcome

"""D2: twice the noise, 0.2 K here."""

import pytest


@pytest.mark.parametrize(
    ("differential", "outcome", "margin"),
    [(1.0, "holds", 5.0), pytest.param(0.2, "holds", 1.0, id="at the limit"), (0.1, "broken", 0.5)],
)
def test_outcome(make, differential, outcome, margin):
    answer = make.ask("D2", make.case("heater", "on_off", settings=make.on_off(differential=differential)))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_unanswered_and_not_asked(make):
    assert make.ask("D2", make.case("heater", "on_off")).outcome == "unanswered"
    unknown = make.case("heater", "on_off", settings=make.on_off(), sensor={"noise": None})
    assert make.ask("D2", unknown).needs == ("sensor.noise",)
    assert make.ask("D2", make.case("heater", "analogue")).outcome == "does_not_apply"

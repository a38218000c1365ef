"""D1: one step of the measurement, 0.1 K here."""

import pytest


@pytest.mark.parametrize(
    ("differential", "outcome", "margin"),
    [(1.0, "holds", 10.0), pytest.param(0.1, "holds", 1.0, id="at the limit"), (0.05, "broken", 0.5)],
)
def test_outcome(make, differential, outcome, margin):
    answer = make.ask("D1", make.case("heater", "on_off", settings=make.on_off(differential=differential)))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_unanswered_and_not_asked(make):
    assert make.ask("D1", make.case("heater", "on_off")).outcome == "unanswered"
    unknown = make.case("heater", "on_off", settings=make.on_off(), sensor={"step": None})
    assert make.ask("D1", unknown).needs == ("sensor.step",)
    assert make.ask("D1", make.case("heater", "time_proportioned")).outcome == "does_not_apply"

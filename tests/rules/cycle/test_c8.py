"""C8: half of a delay of 45 s is 22.5 s."""

import pytest


@pytest.mark.parametrize(("charged", "outcome"), [(15.0, "holds"), pytest.param(22.5, "holds", id="at the limit"), (23.0, "broken")])
def test_outcome(make, charged, outcome):
    tuning = make.tuning(delay_without_cycle=45.0, effective_delay=45.0 + charged)
    answer = make.ask("C8", make.case("heater", "time_proportioned", settings=make.proportioned(tuning=tuning)))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(22.5 / charged)


def test_with_a_sudden_load_the_deviation_judges(make):
    case = make.case("heater", "time_proportioned", settings=make.proportioned(), need={"sudden_load": "20 percent"})
    assert make.ask("C8", case).outcome == "does_not_apply"


def test_unanswered_and_not_asked(make):
    assert make.ask("C8", make.case("heater", "time_proportioned")).outcome == "unanswered"
    assert make.ask("C8", make.case("heater", "on_off")).outcome == "does_not_apply"

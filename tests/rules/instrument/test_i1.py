"""I1: 33 % of 1.5 K is 0.495 K."""

import pytest


@pytest.mark.parametrize(("error", "outcome"), [(0.3, "holds"), pytest.param(0.495, "holds", id="at the limit"), (0.5, "broken")])
def test_outcome(make, error, outcome):
    answer = make.ask("I1", make.case("heater", "on_off", error=error))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(0.495 / error)


def test_the_narrower_side_and_the_house_count(make):
    """Half of 0.8 K is 0.4 K."""
    need, house = {"tolerance": {"above": "3 K", "below": "0.8 K"}}, {"sensor_share": "50 percent"}
    answer = make.ask("I1", make.case("heater", "on_off", error=0.5, need=need, house=house))
    assert answer.outcome == "broken"
    assert "50 percent of the tolerance is 0.4 K" in answer.text


def test_unanswered(make):
    assert make.ask("I1", make.case("heater", "on_off", error=make.unsized)).outcome == "unanswered"

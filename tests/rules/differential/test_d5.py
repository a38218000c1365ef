"""D5: contact life against the house's, 10 years unless declared."""

import pytest


@pytest.mark.parametrize(
    ("life", "outcome"), [(20.0, "holds"), pytest.param(10.0, "holds", id="at the limit"), (9.9, "broken"), (None, "holds")]
)
def test_outcome(make, life, outcome):
    answer = make.ask("D5", make.case("heater", "on_off", settings=make.on_off(contact_life=life)))
    assert answer.outcome == outcome
    assert answer.margin == (pytest.approx(life / 10) if life else None)


def test_the_house_says_how_long(make):
    case = make.case("heater", "on_off", settings=make.on_off(contact_life=12.0), house={"contact_life": "15 year"})
    answer = make.ask("D5", case)
    assert answer.outcome == "broken"
    assert "the weakest contact, contactor, lasts 12 years; 15 years are asked for" in answer.text


def test_unanswered_and_not_asked(make):
    assert make.ask("D5", make.case("heater", "on_off")).outcome == "unanswered"
    assert make.ask("D5", make.case("heater", "time_proportioned")).outcome == "does_not_apply"

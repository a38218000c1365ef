"""C3: contact life at this cycle time."""

import pytest


@pytest.mark.parametrize(
    ("life", "outcome"), [(12.0, "holds"), pytest.param(10.0, "holds", id="at the limit"), (5.0, "broken"), (None, "holds")]
)
def test_outcome(make, life, outcome):
    answer = make.ask("C3", make.case("heater", "time_proportioned", settings=make.proportioned(contact_life=life)))
    assert answer.outcome == outcome
    assert answer.margin == (pytest.approx(life / 10) if life else None)


def test_the_cycle_that_would_do_is_named(make):
    """Five years at 30 s are ten years at 60 s."""
    case = make.case("heater", "time_proportioned", settings=make.proportioned(contact_life=5.0))
    assert make.ask("C3", case).text.endswith("for 10 years the cycle is at least 60 s.")


def test_unanswered_and_not_asked(make):
    assert make.ask("C3", make.case("heater", "time_proportioned")).outcome == "unanswered"
    assert make.ask("C3", make.case("heater", "on_off")).outcome == "does_not_apply"

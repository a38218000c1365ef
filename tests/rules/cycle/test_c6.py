"""C6: the window between what the contacts need and what control allows."""

import pytest


def window(make, least, most):
    return make.proportioned(
        least_bounds=(make.bound("C4", 5.0, "pulses"), make.bound("C3", least, "contact life")),
        most_bounds=(make.bound("C1", 50.0, "ripple"), make.bound("C8", most, "delay")),
    )


@pytest.mark.parametrize(("least", "most", "outcome"), [(10.0, 40.0, "holds"), (40.0, 40.0, "holds"), (60.0, 40.0, "broken")])
def test_outcome(make, least, most, outcome):
    answer = make.ask("C6", make.case("heater", "time_proportioned", settings=window(make, least, most)))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(most / least)


def test_both_ends_are_named_with_their_rules(make):
    answer = make.ask("C6", make.case("heater", "time_proportioned", settings=window(make, 60.0, 40.0)))
    assert answer.text == "The device asks for a cycle of 60 s or more (C3) and control for 40 s or less (C8): no cycle serves both."


def test_unanswered_and_not_asked(make):
    assert make.ask("C6", make.case("heater", "time_proportioned")).outcome == "unanswered"
    open_ended = make.proportioned(least_bounds=())
    assert make.ask("C6", make.case("heater", "time_proportioned", settings=open_ended)).outcome == "does_not_apply"
    assert make.ask("C6", make.case("heater", "on_off")).outcome == "does_not_apply"

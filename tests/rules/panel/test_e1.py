"""E1: 14.3 A, 16 A, 17.4 A rise in this order."""

from dataclasses import replace

import pytest

from specgen.rules.engine import examine_own
from specgen.sizing.candidate import Unsized
from specgen.sizing.feeder import NotFed


def of_loop(make, feeder):
    case = replace(make.case("heater", "on_off"), feeder=feeder)
    finding = next(finding for finding in examine_own(case) if finding.rule == "E1")
    return make.said(finding, case)


ORDERS = [
    pytest.param(14.3, 16.0, 17.4, "holds", id="in order"),
    pytest.param(16.0, 16.0, 16.0, "holds", id="equal"),
    pytest.param(17.0, 16.0, 17.4, "broken", id="the protection is too small"),
    pytest.param(14.3, 20.0, 17.4, "broken", id="the conductor is too small"),
]


@pytest.mark.parametrize(("current", "rating", "capacity", "outcome"), ORDERS)
def test_outcome(ask_panel, make, fed, current, rating, capacity, outcome):
    feeder = fed(current, rating, capacity)
    assert ask_panel("E1", feeders={"TIC-1": fed(), "TIC-2": feeder}).outcome == outcome
    answer = of_loop(make, feeder)
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(min(rating / current, capacity / rating))


def test_the_sentence(make, fed):
    text = of_loop(make, fed(drop=0.02)).text
    assert text == (
        "14.3 A at the supply's worse end is at most the protection's 16 A, and that is at most the 17.4 A that the conductors carry; "
        "the cable drops 2 percent."
    )
    text = of_loop(make, fed(sized_for=15.0)).text
    assert text.startswith("15 A at the supply's worse end, the continuous factor included, is at most the protection's 16 A")
    assert "A at the supply's worse end is above the protection's 16 A" in of_loop(make, fed(17.0)).text
    text = of_loop(make, fed(8.4, 10.0, 17.4, sized_for=10.5, setting=8.4)).text
    assert text == (
        "The motor's 8.4 A, to which the overload release is set, is at most the top of its range, 10 A; "
        "what the conductors have to carry, 10.5 A, is at most their 17.4 A."
    )


def test_the_continuous_factor_counts(ask_panel, make, fed):
    """14.3 A continuous: 17.9 A is above 16 A."""
    feeder = fed(sized_for=1.25 * 14.3)
    assert of_loop(make, feeder).outcome == "broken"
    assert ask_panel("E1", feeders={"TIC-1": feeder}).outcome == "broken"


def test_a_motor_starter_is_set_inside_its_range(make, fed):
    """8.4 A set on a range to 10 A: the conductor carries 10.5 A, 125 percent, though 10 A is the range's top."""
    assert of_loop(make, fed(8.4, 10.0, 10.5, sized_for=10.5, setting=8.4)).outcome == "holds"
    assert of_loop(make, fed(8.4, 10.0, 10.4, sized_for=10.5, setting=8.4)).outcome == "broken"


def test_what_cannot_be_fed_is_broken_and_what_is_not_known_is_open(ask_panel, make, fed):
    large, unknown = Unsized("no conductor listed carries 900 A"), Unsized("the drive's supply is not declared", ("element.voltage",))
    assert (of_loop(make, large).outcome, of_loop(make, unknown).outcome) == ("broken", "unanswered")
    assert of_loop(make, unknown).needs == ("element.voltage",)
    answer = ask_panel("E1", feeders={"TIC-1": fed(), "TIC-2": large, "TIC-3": unknown})
    assert answer.outcome == "broken"
    assert "TIC-2 (no conductor listed carries 900 A)" in answer.text
    answer = ask_panel("E1", feeders={"TIC-1": fed(), "TIC-3": unknown})
    assert (answer.outcome, answer.needs) == ("unanswered", ("TIC-3: element.voltage",))


def test_nothing_is_fed(ask_panel, make):
    assert of_loop(make, NotFed("a signal")).outcome == "does_not_apply"
    assert ask_panel("E1", feeders={"TIC-1": NotFed("a signal")}).outcome == "does_not_apply"

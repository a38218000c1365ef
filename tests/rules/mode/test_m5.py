"""M5: proportional where on-off leaves the tolerance of 1.5 K; a measuring error of 0.3 K counts in it."""

import pytest


@pytest.mark.parametrize(
    ("above", "below", "outcome"),
    [
        pytest.param(1.0, 0.8, "holds", id="inside"),
        pytest.param(1.2, 0.8, "holds", id="at the limit above: 1.2 + 0.3"),
        pytest.param(0.8, 1.2, "holds", id="at the limit below"),
        pytest.param(1.21, 0.8, "broken", id="past it above"),
        pytest.param(0.8, 1.21, "broken", id="past it below"),
    ],
)
def test_on_off_by_its_excursions(make, above, below, outcome):
    answer = make.ask("M5", make.case("heater", "on_off", settings=make.on_off(enforced={"above": above, "below": below})))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(1.5 / (max(above, below) + 0.3))


@pytest.mark.parametrize(
    ("element", "outcome"),
    [("heater", "unanswered"), ("solenoid", "unanswered"), ("compressor", "does_not_apply"), ("blower", "does_not_apply")],
)
def test_unsized_and_switched_whole(make, element, outcome):
    assert make.ask("M5", make.case(element, "on_off")).outcome == outcome


def test_each_side_has_its_own_tolerance(make):
    need = {"tolerance": {"above": "2 K", "below": "0.5 K"}}
    settings = make.on_off(enforced={"above": 1.7, "below": 0.3})
    assert make.ask("M5", make.case("heater", "on_off", settings=settings, need=need)).outcome == "broken"


def test_a_proportional_candidate_says_why_it_is_one(make):
    on_off = make.on_off(enforced={"above": 4.2, "below": 3.0})
    answer = make.ask("M5", make.case("heater", "time_proportioned", on_off=on_off))
    assert answer.outcome == "holds"
    assert "4.5 K above and 3.3 K below" in answer.text
    assert "beyond the tolerance of 1.5 K above" in answer.text
    assert answer.text.endswith("proportional control is used.")


def test_the_measuring_error_must_be_known(make):
    case = make.case("heater", "on_off", settings=make.on_off(), error=make.unsized)
    assert make.ask("M5", case).outcome == "unanswered"


def test_a_proportional_candidate_holds_without_on_off(make):
    assert make.ask("M5", make.case("heater", "time_proportioned")).outcome == "holds"

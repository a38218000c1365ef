"""D4: excursion and measuring error of 0.3 K inside the tolerance of 1.5 K."""

import pytest


@pytest.mark.parametrize(
    ("above", "below", "outcome"),
    [
        (1.0, 0.8, "holds"),
        pytest.param(1.2, 1.2, "holds", id="at the limit on both sides"),
        pytest.param(1.21, 0.1, "broken", id="above"),
        pytest.param(0.1, 1.21, "broken", id="below"),
    ],
)
def test_outcome(make, above, below, outcome):
    case = make.case("heater", "on_off", settings=make.on_off(enforced={"above": above, "below": below}))
    answer = make.ask("D4", case)
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(1.5 / (max(above, below) + 0.3))


def test_the_swing_with_the_least_times_enforced_counts(make):
    settings = make.on_off(natural={"above": 0.5}, enforced={"above": 2.0})
    assert make.ask("D4", make.case("compressor", "on_off", settings=settings)).outcome == "broken"


def test_the_sentence_carries_both_sides(make):
    need = {"tolerance": {"above": "2 K", "below": "1.2 K"}}
    text = make.ask("D4", make.case("heater", "on_off", settings=make.on_off(), need=need)).text
    assert "1.3 K above and 1.1 K below, measuring error of 0.3 K included; 2 K and 1.2 K are allowed" in text


def test_unanswered_and_not_asked(make):
    assert make.ask("D4", make.case("heater", "on_off")).outcome == "unanswered"
    assert make.ask("D4", make.case("heater", "on_off", settings=make.on_off(), error=make.unsized)).outcome == "unanswered"
    assert make.ask("D4", make.case("heater", "time_proportioned")).outcome == "does_not_apply"

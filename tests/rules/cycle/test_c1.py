"""C1: a quarter of 1.5 K is 0.375 K for the ripple."""

import pytest


@pytest.mark.parametrize(
    ("above", "below", "outcome"),
    [
        (0.2, 0.2, "holds"),
        pytest.param(0.375, 0.375, "holds", id="at the limit"),
        pytest.param(0.38, 0.1, "broken", id="above"),
        pytest.param(0.1, 0.38, "broken", id="below"),
    ],
)
def test_outcome(make, above, below, outcome):
    settings = make.proportioned(ripple={"above": above, "below": below})
    answer = make.ask("C1", make.case("heater", "time_proportioned", settings=settings))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(0.375 / max(above, below))


def test_the_house_and_each_side_count(make):
    """10 % of 1 K and of 4 K."""
    need, house = {"tolerance": {"above": "1 K", "below": "4 K"}}, {"swing_share": "10 percent"}
    case = make.case("heater", "time_proportioned", settings=make.proportioned(), need=need, house=house)
    answer = make.ask("C1", case)
    assert answer.outcome == "broken"
    assert "10 percent of the tolerance is 0.1 K above and 0.4 K below" in answer.text


def test_unanswered_and_not_asked(make):
    assert make.ask("C1", make.case("heater", "time_proportioned")).outcome == "unanswered"
    assert make.ask("C1", make.case("heater", "on_off")).outcome == "does_not_apply"

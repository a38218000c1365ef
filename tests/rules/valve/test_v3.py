"""V3: a pulse of 0.5 % of the travel moves a plant of 40 K by 0.2 K, so 0.4 K of neutral zone are needed; the step is 0.1 K."""

import pytest

PLANT = {"response": {"change": "20 K to 40 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "40 degC"}}


def case(make, zone, step="0.1 K", travel=0.005, plant=PLANT):
    settings = make.stepped(neutral_zone=zone, travel_step=travel)
    return make.case("motor_valve", "three_point", settings=settings, plant=plant, sensor={"step": step})


@pytest.mark.parametrize(
    ("zone", "step", "outcome", "margin"),
    [
        pytest.param(0.5, "0.1 K", "holds", 1.25, id="wide enough"),
        pytest.param(0.4, "0.1 K", "holds", 1.0, id="at the limit"),
        pytest.param(0.3, "0.1 K", "broken", 0.75, id="narrower than two pulses"),
        pytest.param(0.5, "1 K", "broken", 0.5, id="narrower than the measurement's step"),
        pytest.param(1.0, "1 K", "holds", 1.0, id="the step itself"),
    ],
)
def test_outcome(make, zone, step, outcome, margin):
    answer = make.ask("V3", case(make, zone, step))
    assert answer.outcome == outcome
    assert answer.margin == pytest.approx(margin)


def test_a_value_that_does_not_settle_is_unanswered(make):
    plant = {"rates": {"with_output": "2 K/min", "without_output": "1 K/min", "dead_time": "25 s"}}
    assert make.ask("V3", case(make, 0.5, plant=plant)).outcome == "unanswered"


def test_unanswered_and_not_asked(make):
    assert make.ask("V3", make.case("motor_valve", "three_point", plant=PLANT)).outcome == "unanswered"
    assert make.ask("V3", case(make, 0.5, plant=None)).needs == ("plant",)
    assert make.ask("V3", make.case("motor_valve", "three_point", plant=PLANT, sensor={"step": None})).needs == ("sensor.step",)
    assert make.ask("V3", make.case("heater", "three_point")).outcome == "does_not_apply"
    assert make.ask("V3", make.case("motor_valve", "on_off")).outcome == "does_not_apply"

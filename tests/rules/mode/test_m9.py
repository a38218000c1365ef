"""M9: full output reaches every setpoint. Loss 100 W/K, surroundings 10 degC: 65 degC takes 5.5 kW, 9 kW at 90 % supply gives 7.29 kW."""

import pytest

BALANCE = {"heat_capacity": "60 kJ/K", "loss": "100 W/K", "surroundings": "10 degC", "dead_time": "25 s"}


def plant(**changes):
    return {"balance": {**BALANCE, **changes}}


@pytest.mark.parametrize(
    ("changes", "outcome"),
    [
        pytest.param({}, "holds", id="enough"),
        pytest.param({"load": "0 kW to 1.78 kW"}, "holds", id="just enough: 5.5 + 1.78 of 7.29 kW"),
        pytest.param({"load": "0 kW to 1.8 kW"}, "broken", id="too little: 5.5 + 1.8 of 7.29 kW"),
    ],
)
def test_outcome(make, changes, outcome):
    assert make.ask("M9", make.case("heater", "on_off", plant=plant(**changes))).outcome == outcome


def test_the_missing_power_is_stated(make):
    """5.5 kW + 3 kW against 7.29 kW: 1.21 kW short, 12.1 K at 100 W/K; the output would be 8.5/7.29."""
    answer = make.ask("M9", make.case("heater", "on_off", plant=plant(load="0 kW to 3 kW")))
    assert "1.21 kW is missing" in answer.text
    assert "12.1 K short" in answer.text
    assert answer.margin == pytest.approx(7.29 / 8.5)


def test_the_highest_setpoint_counts(make):
    """80 degC takes 7 kW of 7.29 kW; 85 degC takes 7.5 kW."""
    reached = make.case("heater", "on_off", plant=plant(), need={"range": "40 degC to 80 degC"})
    missed = make.case("heater", "on_off", plant=plant(), need={"range": "40 degC to 85 degC"})
    assert make.ask("M9", reached).margin == pytest.approx(7.29 / 7.0)
    assert make.ask("M9", missed).outcome == "broken"


def test_cold_side(make):
    """Response: 20 K below a rest value of 10 to 25 degC reaches 5 degC at the warmest, not 4 degC: duty 21/20."""
    response = {"response": {"change": "20 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "10 degC to 25 degC"}}
    answer = make.ask("M9", make.case("compressor", "on_off", plant=response))
    assert answer.outcome == "broken"
    assert "105 percent" in answer.text
    assert "1 K short" in answer.text
    assert "is missing" not in answer.text


def test_without_a_plant_it_is_unanswered(make):
    answer = make.ask("M9", make.case("heater", "on_off"))
    assert (answer.outcome, answer.needs) == ("unanswered", ("plant",))

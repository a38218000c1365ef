"""M12: pump-down and defrosts; ten starts an hour are allowed."""

import pytest


def case(make, starts, **fields):
    return make.case("compressor", "on_off", settings=make.on_off(enforced={"starts_per_hour": starts}), element=fields)


@pytest.mark.parametrize(
    ("starts", "per_day", "outcome"),
    [
        pytest.param(8.0, "4", "holds", id="8 and a sixth"),
        pytest.param(9.5, "12", "holds", id="9.5 and a half, at the limit"),
        pytest.param(9.8, "12", "broken", id="9.8 and a half"),
        pytest.param(8.5, "48", "broken", id="8.5 and 2"),
    ],
)
def test_defrosts_are_starts(make, starts, per_day, outcome):
    defrost = {"per_day": per_day, "duration": "20 min"}
    assert make.ask("M12", case(make, starts, defrost=defrost)).outcome == outcome


def test_pump_down_says_what_is_switched(make):
    answer = make.ask("M12", case(make, 8.0, pump_down="yes"))
    assert answer.outcome == "holds"
    assert "switches the solenoid of the liquid line" in answer.text


def test_absent_means_no(make):
    assert make.ask("M12", case(make, 8.0)).outcome == "does_not_apply"
    assert make.ask("M12", case(make, 8.0, pump_down="no")).outcome == "does_not_apply"


def test_unsized(make):
    asked = make.case("compressor", "on_off", element={"defrost": {"per_day": "4", "duration": "20 min"}})
    assert make.ask("M12", asked).outcome == "unanswered"

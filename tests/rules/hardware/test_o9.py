"""O9: operating frequency."""

import pytest


@pytest.mark.parametrize(
    ("starts", "outcome"),
    [(8.0, "holds"), pytest.param(300.0, "holds", id="at the limit"), pytest.param(301.0, "broken", id="too fast")],
)
def test_on_off(make, device, starts, outcome):
    case = make.case("heater", "on_off", settings=make.on_off(starts_per_hour=starts), device_choice=device(rates=(600.0, 300.0)))
    answer = make.ask("O9", case)
    assert (answer.outcome, answer.margin) == (outcome, pytest.approx(300 / starts))
    assert "contact 300.0, the slowest in the chain, is made for 300 an hour" in answer.text


@pytest.mark.parametrize(("cycle", "outcome"), [(10.0, "holds"), (9.0, "broken")])
def test_one_operation_a_cycle(make, device, cycle, outcome):
    """360 an hour are one in 10 s."""
    case = make.case("heater", "time_proportioned", settings=make.proportioned(cycle_time=cycle), device_choice=device(rates=(360.0,)))
    assert make.ask("O9", case).outcome == outcome


def test_nothing_is_judged_that_has_no_rate_or_no_settings(make, device):
    solid = make.case("heater", "on_off", "ssr", device_choice=device(rates=(None,)))
    assert make.ask("O9", solid).outcome == "does_not_apply"
    travelling = make.case("motor_valve", "three_point", settings=make.stepped(), device_choice=device(rates=(360.0,)))
    assert make.ask("O9", travelling).outcome == "does_not_apply"
    assert make.ask("O9", make.case("heater", "on_off", device_choice=device(rates=(360.0,)))).outcome == "unanswered"

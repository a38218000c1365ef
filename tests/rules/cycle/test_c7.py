"""C7 on a public network: 2 kW to neutral changes the voltage by 0.4 x 2000/230^2 = 1.51 percent; 71.1 s is the shortest cycle."""

from dataclasses import replace

import pytest

HEATER = {"power": "2 kW", "voltage": "230 V", "phases": "1"}


def public(make, name, mode, settings, element=None, device=None, **supply):
    made = make.case(name, mode, device, settings=settings, **({"element": element} if element else {}))
    return replace(made, panel=make.panel(supply={"network": "public", **supply}))


CASES = [
    pytest.param(90.0, "holds", id="slow enough"),
    pytest.param(72.0, "holds", id="just slow enough"),
    pytest.param(70.0, "broken", id="just too fast"),
    pytest.param(10.0, "broken", id="far too fast"),
]


@pytest.mark.parametrize(("cycle", "outcome"), CASES)
def test_a_heater_in_time_proportion(make, cycle, outcome):
    assert make.ask("C7", public(make, "heater", "time_proportioned", make.proportioned(cycle_time=cycle), HEATER)).outcome == outcome


def test_the_window_and_what_opens_it(make):
    """At a 30 s cycle: 4 changes a minute, between 3 (1.95) and 5 (1.64 percent) straight in logarithms 1.769: 1.512/1.769 = 0.855."""
    answer = make.ask("C7", public(make, "heater", "time_proportioned", make.proportioned(cycle_time=30.0, most=40.0), HEATER))
    assert answer.outcome == "broken"
    assert "1.51 percent of 3.3 percent allowed" in answer.text
    assert "severity is 0.855 of 0.65 allowed" in answer.text
    assert "it would take 71.1 s or more, and control allows 40 s" in answer.text
    assert "three-phase connection" in answer.text
    assert answer.margin == pytest.approx(0.65 / 0.855, rel=2e-3)


@pytest.mark.parametrize(("starts", "outcome"), [(40.0, "holds"), (60.0, "broken")])
def test_on_off_by_its_most_starts(make, starts, outcome):
    """40 starts an hour are a cycle of 90 s, 60 one of 60 s."""
    assert make.ask("C7", public(make, "heater", "on_off", make.on_off(starts_per_hour=starts), HEATER)).outcome == outcome


def test_a_motors_start(make):
    """8.4 A x 6 over 0.283 ohm, of 231 V: 6.2 percent, above the 4 that are allowed however rare."""
    answer = make.ask("C7", public(make, "compressor", "on_off", make.on_off(starts_per_hour=4.0)))
    assert answer.outcome == "broken"
    assert "Each start dips the voltage by 6.18 percent of 4 percent allowed" in answer.text
    assert "soft starter" in answer.text


def test_a_private_network_and_what_is_throttled(make):
    private = make.case("heater", "time_proportioned", settings=make.proportioned(), element=HEATER)
    assert make.ask("C7", private).outcome == "does_not_apply"
    assert make.ask("C7", public(make, "heater", "analogue", make.continuous(), HEATER)).outcome == "does_not_apply"


def test_beyond_the_scope_it_says_so(make):
    answer = make.ask("C7", public(make, "heater", "time_proportioned", make.proportioned(), {**HEATER, "power": "5 kW"}))
    assert answer.outcome == "does_not_apply"
    assert "16 A" in answer.text


def test_what_is_not_settled_is_unanswered(make):
    assert make.ask("C7", public(make, "heater", "time_proportioned", make.unsized, HEATER)).outcome == "unanswered"

"""O3: solid state does not isolate."""

import dataclasses

import pytest


@pytest.mark.parametrize(("isolator", "outcome"), [("yes", "holds"), ("no", "broken")])
@pytest.mark.parametrize(("mode", "kind"), [("on_off", "ssr"), ("analogue", "power_controller")])
def test_outcome(make, device, isolator, outcome, mode, kind):
    case = make.case("heater", mode, kind, device_choice=device())
    case = dataclasses.replace(case, panel=make.panel(supply={"isolator": isolator}))
    answer = make.ask("O3", case)
    assert answer.outcome == outcome
    assert "lock" in answer.text


def test_a_contact_opens(make, device):
    assert make.ask("O3", make.case("heater", "on_off", "contactor", device_choice=device())).outcome == "does_not_apply"

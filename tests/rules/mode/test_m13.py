"""M13: one candidate alone cannot say what separates it from the others."""

import pytest


@pytest.mark.parametrize("mode", ["on_off", "time_proportioned", "analogue"])
def test_it_is_left_to_the_choice(make, mode):
    answer = make.ask("M13", make.case("heater", mode))
    assert answer.outcome == "does_not_apply"
    assert "relay, contactor, solid state, power controller, signal" in answer.text

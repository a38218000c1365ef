"""O10: live zero."""

import pytest


@pytest.mark.parametrize(
    ("signal", "outcome"),
    [("4-20 mA", "holds"), ("2-10 V", "holds"), ("1-5 V", "holds"), ("0-20 mA", "broken"), ("0-10 V", "broken"), ("0-5 V", "broken")],
)
def test_outcome(make, signal, outcome):
    assert make.ask("O10", make.case("valve", "analogue", "signal", element={"signal": signal})).outcome == outcome
    settings = make.continuous(signal=signal)
    assert make.ask("O10", make.case("heater", "analogue", "power_controller", settings=settings)).outcome == outcome


def test_pulses_have_no_zero(make):
    assert make.ask("O10", make.case("heater", "on_off")).outcome == "does_not_apply"
    assert make.ask("O10", make.case("heater", "analogue", "power_controller")).outcome == "does_not_apply"

"""S2: times to danger and to spoiling."""

import pytest


def test_every_time_is_named(make):
    faults = make.faults(on=(120.0, True, None), off=(20.0, None, None), on_danger=1200.0, on_spoil=300.0, off_spoil=5400.0)
    answer = make.ask("S2", make.case("heater", "on_off", faults=faults))
    assert answer.outcome == "holds"
    assert answer.text == (
        "Stuck on it takes 20 min to danger; stuck on it takes 300 s to spoiling; stuck off it takes 90 min to spoiling."
    )


def test_nothing_is_reached(make):
    assert "reaches no declared limit" in make.ask("S2", make.case("heater", "on_off", faults=make.faults())).text


@pytest.mark.parametrize(("element", "outcome"), [("heater", "unanswered"), ("compressor", "does_not_apply")])
def test_not_computed_and_not_declared(make, element, outcome):
    assert make.ask("S2", make.case(element, "on_off")).outcome == outcome

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
    faults = make.faults(on=(80.0, False, None), off=(20.0, None, None))
    assert "reaches no declared limit" in make.ask("S2", make.case("heater", "on_off", faults=faults)).text


@pytest.mark.parametrize(
    ("on", "off"),
    [
        pytest.param((120.0, True, None), (50.0, None, None), id="danger, stuck on"),
        pytest.param((80.0, False, None), (50.0, None, None), id="spoiled at 75, stuck on"),
        pytest.param((70.0, False, None), (40.0, None, None), id="spoiled at 40, stuck off"),
        pytest.param((70.0, False, None), (None, None, None), id="never settles, stuck off"),
    ],
)
def test_what_is_reached_without_a_time_is_not_said_to_be_safe(make, on, off):
    limits = {"spoils_high": "75 degC", "spoils_low": "40 degC"}
    answer = make.ask("S2", make.case("heater", "on_off", limits=limits, faults=make.faults(on=on, off=off)))
    assert answer.outcome == "unanswered"
    assert "was not computed" in answer.text


@pytest.mark.parametrize(("element", "outcome"), [("heater", "unanswered"), ("compressor", "does_not_apply")])
def test_not_computed_and_not_declared(make, element, outcome):
    assert make.ask("S2", make.case(element, "on_off")).outcome == outcome

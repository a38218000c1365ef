"""M6: steady or relaxed."""

import pytest

RELAXED = {"stability": "relaxed"}
PROPORTIONAL = [("time_proportioned", "contactor"), ("time_proportioned", "ssr"), ("analogue", "power_controller")]


def test_steady_is_proportional(make):
    assert make.ask("M6", make.case("heater", "on_off", settings=make.on_off())).outcome == "broken"
    for mode, device in PROPORTIONAL:
        assert make.ask("M6", make.case("heater", mode, device)).outcome == "holds"


@pytest.mark.parametrize(
    ("least", "most", "on_off", "proportional"),
    [
        pytest.param(0.4, 2.0, "holds", "broken", id="fits"),
        pytest.param(1.0, 1.0, "holds", "broken", id="just fits"),
        pytest.param(1.1, 1.0, "broken", "holds", id="does not fit"),
        pytest.param(1.1, 0.0, "broken", "holds", id="no differential is small enough"),
    ],
)
def test_relaxed_is_on_off_where_it_fits(make, least, most, on_off, proportional):
    settings = make.on_off(least=least, most=most)
    switched = make.ask("M6", make.case("heater", "on_off", settings=settings, need=RELAXED))
    pulsed = make.ask("M6", make.case("heater", "time_proportioned", on_off=settings, need=RELAXED))
    assert (switched.outcome, pulsed.outcome) == (on_off, proportional)


def test_margins_meet_at_the_limit(make):
    settings = make.on_off(least=0.5, most=2.0)
    assert make.ask("M6", make.case("heater", "on_off", settings=settings, need=RELAXED)).margin == pytest.approx(4.0)
    assert make.ask("M6", make.case("heater", "time_proportioned", on_off=settings, need=RELAXED)).margin == pytest.approx(0.25)


@pytest.mark.parametrize("element", ["compressor", "blower", "burner"])
def test_what_is_switched_whole_is_not_asked(make, element):
    assert make.ask("M6", make.case(element, "on_off")).outcome == "does_not_apply"


@pytest.mark.parametrize(
    ("element", "mode", "device"),
    [("valve", "analogue", "signal"), ("motor_valve", "three_point", "relay_pair"), ("lamp", "analogue", "power_controller")],
)
def test_relaxed_does_not_ask_what_must_be_throttled(make, element, mode, device):
    assert make.ask("M6", make.case(element, mode, device, need=RELAXED)).outcome == "does_not_apply"


def test_relaxed_without_on_off_figures_is_unanswered(make):
    assert make.ask("M6", make.case("heater", "time_proportioned", need=RELAXED)).outcome == "unanswered"

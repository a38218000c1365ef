"""S3: solid state is taken to fail closed."""

import pytest


@pytest.mark.parametrize(
    ("device", "mode", "outcome"),
    [
        pytest.param("ssr", "time_proportioned", "holds", id="solid state"),
        pytest.param("power_controller", "analogue", "holds", id="power controller"),
        pytest.param("contactor", "on_off", "does_not_apply", id="contacts"),
        pytest.param("signal", "analogue", "does_not_apply", id="signal"),
    ],
)
def test_outcome(make, device, mode, outcome):
    assert make.ask("S3", make.case("heater", mode, device, faults=make.faults(on=(120.0, True, None)))).outcome == outcome


def test_where_it_ends_is_said(make):
    past = make.case("heater", "on_off", "ssr", faults=make.faults(on=(120.0, True, None)))
    short = make.case("heater", "on_off", "ssr", faults=make.faults(on=(80.0, False, None)))
    away = make.case("heater", "on_off", "ssr", faults=make.faults(on=(None, True, None)))
    assert "settles at 120.0 °C, past the danger at 95.0 °C" in make.ask("S3", past).text
    assert "settles at 80.0 °C, short of the danger at 95.0 °C" in make.ask("S3", short).text
    assert "runs on without settling, past the danger" in make.ask("S3", away).text


def test_unanswered(make):
    assert make.ask("S3", make.case("heater", "on_off", "ssr")).outcome == "unanswered"
    unknown = make.case("heater", "on_off", "ssr", faults=make.faults(on=(120.0, None, None)), limits={"danger_high": None})
    assert make.ask("S3", unknown).needs == ("limits.danger_high",)


def test_without_a_danger_of_its_own_a_valve_on_cold_is_followed_too(make):
    asked = make.case("cold_valve", "on_off", "ssr", faults=make.faults(on=(-5.0, None, None)))
    assert make.ask("S3", asked).text.startswith("The device fails closed as a rule: then the value settles at −5.0 °C.")

"""S1: danger at 95 degC above a setpoint of 65 degC; normal running ends at 66 degC (1.0 K above).

The plant settles 100 K above 20 degC with full output in 1200 s, so stuck on at a value v it rises by (120 - v)/1200 K/s:
0.045 K/s at 66 degC, 0.9 K through a sensor lag of 20 s.
"""

import pytest

PLANT = {"response": {"change": "100 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "20 degC"}}
COLD_PLANT = {"response": {"change": "40 K", "time_constant": "20 min", "dead_time": "25 s", "rest_value": "30 degC"}}


def case(make, on=(120.0, True, None), off=(20.0, None, None), element="valve", plant=PLANT, settings=None, **changes):
    return make.case(element, "on_off", faults=make.faults(on=on, off=off), settings=settings or make.on_off(), plant=plant, **changes)


def test_short_of_the_danger_nothing_is_needed(make):
    """30 K to the danger, 20 K to where it settles."""
    answer = make.ask("S1", case(make, on=(85.0, False, None)))
    assert answer.outcome == "holds"
    assert "settles at 85.0 °C" in answer.text
    assert "neither passes a declared danger" in answer.text
    assert answer.margin == pytest.approx(30 / 20)


def test_without_a_limiter_one_is_asked_for_with_its_room(make):
    """The latest set value is 95 - 0.9 = 94.1 degC; from the setpoint that is 29.1 K against 1 K of normal running."""
    answer = make.ask("S1", case(make))
    assert answer.outcome == "holds"
    assert "independent limiter with its own sensor, its own switching device and manual reset is part of the loop" in answer.text
    assert "between 66.0 °C, the end of normal running, and 94.1 °C, for a sensor lag of 20 s" in answer.text
    assert answer.margin == pytest.approx(29.1)


@pytest.mark.parametrize(
    ("limiter", "outcome"),
    [
        pytest.param({"set": "88 degC", "sensor_lag": "20 s"}, "holds", id="in its room"),
        pytest.param({"set": "88 degC"}, "holds", id="lag assumed"),
        pytest.param({"set": "66 degC"}, "broken", id="at the end of normal running"),
        pytest.param({"set": "66.1 degC"}, "holds", id="just clear of it"),
        pytest.param({"set": "95 degC"}, "broken", id="at the danger"),
        # (120 - 94)/1200 x 20 = 0.433 K; x 60 = 1.3 K
        pytest.param({"set": "94 degC", "sensor_lag": "20 s"}, "holds", id="acts at 94.4"),
        pytest.param({"set": "94 degC", "sensor_lag": "60 s"}, "broken", id="acts at 95.3, past the danger"),
        pytest.param({"set": "88 degC", "resets": "automatic"}, "broken", id="resets by itself"),
    ],
)
def test_a_declared_limiter(make, limiter, outcome):
    assert make.ask("S1", case(make, limits={"limiter": limiter})).outcome == outcome


def test_the_true_value_when_it_acts_is_named(make):
    """(120 - 88)/1200 x 60 = 1.6 K."""
    answer = make.ask("S1", case(make, limits={"limiter": {"set": "88 degC", "sensor_lag": "60 s"}}))
    assert "acts at a true value of 89.6 °C through its sensor lag of 60 s" in answer.text


@pytest.mark.parametrize(
    ("above", "outcome"),
    [pytest.param(29.0, "holds", id="room left: 94 < 94.5"), pytest.param(29.7, "broken", id="normal running past the latest set value")],
)
def test_no_room(make, above, outcome):
    """At 94 degC the rise is 0.433 K in 20 s, so the latest is 94.6 degC."""
    answer = make.ask("S1", case(make, settings=make.on_off(enforced={"above": above})))
    assert answer.outcome == outcome


def test_heat_without_a_danger_is_unanswered(make):
    for element in ("heater", "burner", "valve", "lamp", "solenoid"):
        asked = make.case(element, "on_off", faults=make.faults(), limits={"danger_high": None})
        assert make.ask("S1", asked).needs == ("limits.danger_high",), element


def test_what_does_not_heat_and_declares_no_danger_is_not_asked(make):
    assert make.ask("S1", make.case("compressor", "on_off", faults=make.faults())).outcome == "does_not_apply"


def test_faults_that_were_not_computed(make):
    assert make.ask("S1", make.case("heater", "on_off")).outcome == "unanswered"


def test_stuck_off_asks_for_an_alarm(make):
    """A cold room of 4 degC, 5 K above which is normal, that warms to 30 degC past a danger of 15 degC.

    At 5 degC it warms by 25/1200 K/s, 0.4167 K in 20 s: the latest alarm is at 14.6 degC.
    """
    asked = case(
        make, element="compressor", on=(-10.0, None, None), off=(30.0, True, None), plant=COLD_PLANT,
        limits={"danger_high": "15 degC", "consequence": "product"},
    )  # fmt: skip
    answer = make.ask("S1", asked)
    assert answer.outcome == "holds"
    assert "Stuck off the value settles at 30.0 °C, past the danger at 15.0 °C" in answer.text
    assert "alarm independent of the loop is part of it, set between 5.0 °C" in answer.text
    assert "14.6 °C" in answer.text
    assert "at stake: product" in answer.text


def test_a_declared_alarm_in_the_room_is_the_one(make):
    asked = case(
        make, element="compressor", on=(-10.0, None, None), off=(30.0, True, None), plant=COLD_PLANT, limits={"danger_high": "15 degC"},
        alarms={"high": "10 degC"},
    )  # fmt: skip
    assert "The alarm at 10.0 °C lies between" in make.ask("S1", asked).text


def test_cold_that_freezes(make):
    """Stuck on, 40 K below 30 degC is -10 degC, past 1 degC: at 3.2 degC it falls by 13.2/1200 K/s, 0.22 K in 20 s."""
    answer = make.ask(
        "S1", case(make, element="compressor", on=(-10.0, None, True), off=(30.0, None, None), plant=COLD_PLANT,
                   limits={"danger_low": "1 degC"})
    )  # fmt: skip
    assert answer.outcome == "holds"
    assert "between 3.2 °C, the end of normal running, and 1.2 °C" in answer.text


def test_a_proportional_loop_reaches_as_far_as_its_overshoot(make):
    """0.2 K of ripple and 3 K of overshoot: normal running ends at 68 degC."""
    settings = make.proportioned(tuning=make.tuning(overshoot=3.0))
    asked = make.case("valve", "time_proportioned", "ssr", faults=make.faults(on=(120.0, True, None)), settings=settings, plant=PLANT)
    assert "between 68.0 °C" in make.ask("S1", asked).text


def test_a_value_that_does_not_settle(make):
    plant = {"rates": {"with_output": "2 K/min", "without_output": "1 K/min", "dead_time": "25 s"}}
    answer = make.ask("S1", case(make, on=(None, True, None), off=(None, None, None), plant=plant))
    assert answer.outcome == "holds"
    assert "Stuck on the value runs on without settling, past the danger at 95.0 °C" in answer.text
    # 2 K/min x 20 s = 0.67 K
    assert "94.3 °C" in answer.text

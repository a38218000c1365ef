"""C2: a 30 s cycle delays by 15 s at the least; a sudden load with 0.2 K ripple and 0.3 K error stays inside 1.5 K."""

import pytest

SUDDEN = {"sudden_load": "20 percent"}


@pytest.mark.parametrize(
    ("charged", "outcome"),
    [
        pytest.param(28.5, "holds", id="nearly a whole cycle"),
        pytest.param(15.0, "holds", id="half a cycle"),
        pytest.param(14.0, "broken", id="less than half"),
        pytest.param(0.0, "broken", id="nothing"),
    ],
)
def test_the_delay_is_charged(make, charged, outcome):
    tuning = make.tuning(delay_without_cycle=45.0, effective_delay=45.0 + charged)
    answer = make.ask("C2", make.case("heater", "time_proportioned", settings=make.proportioned(tuning=tuning)))
    assert answer.outcome == outcome


@pytest.mark.parametrize(("pulses", "outcome"), [(["ramp"], "holds"), (["latched"], "broken"), (["ramp", "latched"], "broken")])
def test_only_a_ramp_is_charged_less(make, pulses, outcome):
    controllers = [{"name": f"controller {pulse}", "pulse": pulse} for pulse in pulses]
    tuning = make.tuning(effective_delay=45.0)
    case = make.case("heater", "time_proportioned", settings=make.proportioned(tuning=tuning), controllers=controllers)
    assert make.ask("C2", case).outcome == outcome


def test_an_unstable_loop_is_refused(make):
    case = make.case("heater", "time_proportioned", settings=make.proportioned(tuning=make.tuning(stable=False)))
    answer = make.ask("C2", case)
    assert answer.outcome == "broken"
    assert "not stable" in answer.text


@pytest.mark.parametrize(
    ("load", "outcome"),
    [(0.5, "holds"), pytest.param(1.0, "holds", id="at the limit"), (1.1, "broken"), pytest.param(None, "unanswered", id="not computed")],
)
def test_sudden_load(make, load, outcome):
    settings = make.proportioned(tuning=make.tuning(load_deviation=load))
    answer = make.ask("C2", make.case("heater", "time_proportioned", settings=settings, need=SUDDEN))
    assert answer.outcome == outcome
    assert answer.margin == (pytest.approx(1.5 / (load + 0.5)) if load else None)


def test_what_was_judged_is_said(make):
    case = make.case("heater", "time_proportioned", settings=make.proportioned())
    assert make.ask("C2", case).text.endswith("no sudden load is declared, so no deviation is judged.")


def test_unanswered_and_not_asked(make):
    assert make.ask("C2", make.case("heater", "time_proportioned")).outcome == "unanswered"
    assert make.ask("C2", make.case("heater", "analogue")).outcome == "does_not_apply"
